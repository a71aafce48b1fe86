import { type Issue, RillageError, throwIfAny } from '../errors.js';
import { type Prior, checkPrior, isPrior } from './priors.js';

/** A prior and where it stands: keys and indices from the root. */
export interface PlacedPrior {
  /** As text: `selection.discharge.scale.value[1]`. */
  path: string;
  keys: (string | number)[];
  prior: Prior;
}

/**
 * Every prior in a plain, JSON-safe structure, in the order of its keys.
 * @param data  objects, arrays, numbers, strings, booleans, null; left as it is
 * @returns in the order that {@link substitute} expects values
 * @throws RillageError, a batch: whatever `checkPrior` finds, 'not-finite' for a number, 'not-plain' for a function, class instance or cycle
 */
export function collectPriors(data: unknown): PlacedPrior[] {
  const found: PlacedPrior[] = [];
  const issues: Issue[] = [];
  walk(data, [], [], found, issues);
  throwIfAny(issues);
  return found;
}

/**
 * The structure with numbers in place of its priors.
 * @param priors  what {@link collectPriors} found in `data`
 * @param values  one number for each, same order
 * @returns a copy; parts without priors are shared with `data`, which is not changed
 * @throws RillageError 'shape' if the counts differ
 */
export function substitute<T = unknown>(data: unknown, priors: readonly PlacedPrior[], values: ArrayLike<number>): T {
  if (values.length !== priors.length) {
    throw new RillageError({ code: 'shape', path: 'values', expected: `${priors.length} values`, received: String(values.length) });
  }
  let result = data;
  priors.forEach(({ keys }, i) => {
    result = replaced(result, keys, 0, values[i]);
  });
  return result as T;
}

/** A path as text, `outflows.discharge[412]`; keys that are no plain names are quoted. */
export function pathText(keys: readonly (string | number)[]): string {
  return keys
    .map((key, i) =>
      typeof key === 'number'
        ? `[${key}]`
        : /^[\p{L}_$][\p{L}\p{N}_$]*$/u.test(key)
          ? i === 0
            ? key
            : `.${key}`
          : `[${JSON.stringify(key)}]`,
    )
    .join('');
}

function walk(value: unknown, keys: (string | number)[], above: unknown[], found: PlacedPrior[], issues: Issue[]): void {
  if (value === null || value === undefined || typeof value === 'string' || typeof value === 'boolean') return;
  const path = pathText(keys);
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) issues.push({ code: 'not-finite', path, expected: 'a finite number', received: String(value) });
    return;
  }
  if (!isPlain(value) || above.includes(value)) {
    issues.push({ code: 'not-plain', path, expected: 'plain data', received: above.includes(value) ? 'a cycle' : typeof value });
    return;
  }
  if (isPrior(value)) {
    const problems = checkPrior(value, path);
    if (problems.length > 0) issues.push(...problems);
    else found.push({ path, keys, prior: value });
    return;
  }
  const inside = [...above, value];
  if (Array.isArray(value)) value.forEach((item, i) => walk(item, [...keys, i], inside, found, issues));
  else for (const key of Object.keys(value)) walk((value as Record<string, unknown>)[key], [...keys, key], inside, found, issues);
}

function isPlain(value: unknown): value is object {
  if (typeof value !== 'object' || value === null) return false;
  if (Array.isArray(value)) return true;
  const prototype: unknown = Object.getPrototypeOf(value);
  return prototype === null || prototype === Object.prototype || Object.getPrototypeOf(prototype) === null;
}

function replaced(value: unknown, keys: readonly (string | number)[], depth: number, number: number): unknown {
  if (depth === keys.length) return number;
  const key = keys[depth];
  if (Array.isArray(value)) return value.map((item: unknown, i) => (i === key ? replaced(item, keys, depth + 1, number) : item));
  const record = value as Record<string, unknown>;
  // entries, not assignment: a key named __proto__ stays an ordinary key
  return Object.fromEntries(Object.entries(record).map(([k, item]) => [k, k === key ? replaced(item, keys, depth + 1, number) : item]));
}
