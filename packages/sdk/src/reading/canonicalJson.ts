import { RillageError } from '../errors.js';

const DEEPEST = 64;

/**
 * The one spelling of plain data: keys in order of their UTF-16 code units, shortest numbers that read back the same, no white space
 * (as RFC 8785, the JSON Canonicalization Scheme). Typed arrays become arrays; undefined fields are left out.
 * @throws RillageError 'not-json' where a value has no JSON form (NaN, Infinity, functions, more than 64 levels), with its path
 * @source RFC 8785, section 3.2 (from memory)
 */
export function canonicalJson(value: unknown): string {
  return spell(value, '', 0);
}

function spell(value: unknown, path: string, depth: number): string {
  if (depth > DEEPEST) throw refused(path, `at most ${DEEPEST} levels`, 'more');
  if (value === null || typeof value === 'boolean' || typeof value === 'string') return JSON.stringify(value);
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) throw refused(path, 'a finite number', String(value));
    return JSON.stringify(value);
  }
  if (Array.isArray(value) || isNumberArray(value)) {
    const items: string[] = [];
    for (let i = 0; i < value.length; i += 1) items.push(spell(value[i], `${path}[${i}]`, depth + 1));
    return `[${items.join(',')}]`;
  }
  if (typeof value === 'object') {
    const record = value as Record<string, unknown>;
    const fields: string[] = [];
    for (const key of Object.keys(record).sort()) {
      if (record[key] === undefined) continue;
      fields.push(`${JSON.stringify(key)}:${spell(record[key], path ? `${path}.${key}` : key, depth + 1)}`);
    }
    return `{${fields.join(',')}}`;
  }
  throw refused(path, 'plain data', typeof value);
}

function isNumberArray(value: unknown): value is Float64Array | Uint8Array {
  return value instanceof Float64Array || value instanceof Uint8Array;
}

function refused(path: string, expected: string, received: string): RillageError {
  return new RillageError({ code: 'not-json', path: path || 'the value itself', expected, received });
}
