import { type Issue } from '../errors.js';

/** The part of JSON Schema 2020-12 that the published schemas use. */
export interface Schema {
  $schema?: string;
  $id?: string;
  title?: string;
  description?: string;
  $ref?: string;
  $defs?: Record<string, Schema>;
  type?: SchemaType | SchemaType[];
  const?: string | number;
  enum?: (string | number)[];
  required?: string[];
  properties?: Record<string, Schema>;
  additionalProperties?: boolean | Schema;
  items?: Schema;
  minItems?: number;
  maxItems?: number;
  minimum?: number;
  maximum?: number;
  exclusiveMinimum?: number;
  maxLength?: number;
  pattern?: string;
}
type SchemaType = 'object' | 'array' | 'string' | 'number' | 'integer' | 'boolean' | 'null';

const AT_MOST = 20;

/**
 * What in the data does not fit the schema, the first twenty places.
 * @param value  plain data as JSON.parse gives it
 * @param schema {@link Schema}; a `$ref` names one of its own `$defs`
 * @returns      issues with code 'shape'; empty where everything fits
 * @source JSON Schema 2020-12, the keywords named in {@link Schema}; held against a general validator in the tests
 */
export function checkSchema(value: unknown, schema: Schema): Issue[] {
  const issues: Issue[] = [];
  check(value, schema, schema, '', issues);
  return issues;
}

function check(value: unknown, given: Schema, root: Schema, path: string, issues: Issue[]): void {
  if (issues.length >= AT_MOST) return;
  const schema = given.$ref === undefined ? given : (root.$defs?.[given.$ref.slice('#/$defs/'.length)] ?? {});
  const fail = (expected: string): void => {
    issues.push({ code: 'shape', path: path || 'the file itself', expected, received: received(value) });
  };

  if (schema.const !== undefined && value !== schema.const) return fail(JSON.stringify(schema.const));
  if (schema.enum && !schema.enum.includes(value as string | number)) return fail(`one of ${schema.enum.join(', ')}`);
  if (schema.type !== undefined) {
    const types = Array.isArray(schema.type) ? schema.type : [schema.type];
    if (!types.some((type) => isType(value, type))) return fail(types.join(' or '));
  }
  if (typeof value === 'number') {
    if (schema.minimum !== undefined && value < schema.minimum) return fail(`at least ${schema.minimum}`);
    if (schema.maximum !== undefined && value > schema.maximum) return fail(`at most ${schema.maximum}`);
    if (schema.exclusiveMinimum !== undefined && value <= schema.exclusiveMinimum) return fail(`more than ${schema.exclusiveMinimum}`);
  } else if (typeof value === 'string') {
    if (schema.maxLength !== undefined && value.length > schema.maxLength) return fail(`at most ${schema.maxLength} characters`);
    if (schema.pattern !== undefined && !new RegExp(schema.pattern, 'u').test(value)) return fail(`text like ${schema.pattern}`);
  } else if (Array.isArray(value)) {
    if (schema.minItems !== undefined && value.length < schema.minItems) return fail(`at least ${schema.minItems} items`);
    if (schema.maxItems !== undefined && value.length > schema.maxItems) return fail(`at most ${schema.maxItems} items`);
    if (schema.items) for (let i = 0; i < value.length; i += 1) check(value[i], schema.items, root, `${path}[${i}]`, issues);
  } else if (typeof value === 'object' && value !== null) {
    checkObject(value as Record<string, unknown>, schema, root, path, issues);
  }
}

function checkObject(value: Record<string, unknown>, schema: Schema, root: Schema, path: string, issues: Issue[]): void {
  const at = (key: string): string => (path ? `${path}.${key}` : key);
  for (const key of schema.required ?? []) {
    if (!Object.hasOwn(value, key)) issues.push({ code: 'shape', path: at(key), expected: 'to be there', received: 'nothing' });
  }
  for (const key of Object.keys(value)) {
    const known = schema.properties && Object.hasOwn(schema.properties, key) ? schema.properties[key] : undefined;
    if (known) check(value[key], known, root, at(key), issues);
    else if (schema.additionalProperties === false) issues.push({ code: 'shape', path: at(key), expected: 'no such field', received: key });
    else if (typeof schema.additionalProperties === 'object') check(value[key], schema.additionalProperties, root, at(key), issues);
  }
}

function isType(value: unknown, type: SchemaType): boolean {
  switch (type) {
    case 'null':
      return value === null;
    case 'array':
      return Array.isArray(value);
    case 'object':
      return typeof value === 'object' && value !== null && !Array.isArray(value);
    case 'integer':
      return Number.isInteger(value);
    default:
      return typeof value === type;
  }
}

function received(value: unknown): string {
  if (Array.isArray(value)) return `an array of ${value.length}`;
  if (typeof value === 'object' && value !== null) return 'an object';
  return JSON.stringify(value) ?? String(value);
}
