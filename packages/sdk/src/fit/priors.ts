import type { Issue } from '../errors.js';
import { shorten } from '../errors.js';

/** What is believed of an unknown number before the samples are looked at. May stand wherever a number stands in a catchment. */
export type Prior =
  /** Equally likely between `low` and `high`. */
  | { prior: 'uniform'; low: number; high: number }
  /** Its logarithm equally likely between those of `low` and `high`, 0 < low: for a size known to an order of magnitude. */
  | { prior: 'logUniform'; low: number; high: number }
  | { prior: 'normal'; mean: number; sd: number }
  /** `logSd` is the standard deviation of the natural logarithm: 0.7 is about a factor of two either way. */
  | { prior: 'logNormal'; median: number; logSd: number }
  /** Normal, cut off below `low`, above `high`, or both, and scaled up to make good; `mean` and `sd` are those before the cut. */
  | { prior: 'truncatedNormal'; mean: number; sd: number; low?: number; high?: number }
  /** On 0 to 1. */
  | { prior: 'beta'; a: number; b: number };

export type PriorName = Prior['prior'];

const REQUIRED: Record<PriorName, readonly string[]> = {
  uniform: ['low', 'high'],
  logUniform: ['low', 'high'],
  normal: ['mean', 'sd'],
  logNormal: ['median', 'logSd'],
  truncatedNormal: ['mean', 'sd'],
  beta: ['a', 'b'],
};
const OPTIONAL: Partial<Record<PriorName, readonly string[]>> = { truncatedNormal: ['low', 'high'] };
const POSITIVE = new Set(['sd', 'logSd', 'median', 'a', 'b']);

/** Whether a value claims to be a prior: an object with a field `prior`. Its soundness is {@link checkPrior}'s business. */
export function isPrior(value: unknown): value is Prior {
  return typeof value === 'object' && value !== null && !Array.isArray(value) && Object.hasOwn(value, 'prior');
}

/**
 * Problems of a prior, none if it is sound. Nothing unknown is ignored.
 * @param path  where it stands, for the messages
 * @returns issues with codes 'unknown-prior' | 'unknown-field' | 'not-finite' | 'not-positive' | 'empty-range' | 'no-bound'
 */
export function checkPrior(value: unknown, path: string): Issue[] {
  const given = (typeof value === 'object' && value !== null ? value : {}) as Record<string, unknown>;
  const name = given.prior;
  if (typeof name !== 'string' || !Object.hasOwn(REQUIRED, name)) {
    return [
      { code: 'unknown-prior', path: `${path}.prior`, expected: `one of ${Object.keys(REQUIRED).join(', ')}`, received: shorten(name) },
    ];
  }
  const required = REQUIRED[name as PriorName];
  const optional = OPTIONAL[name as PriorName] ?? [];
  const issues: Issue[] = [];
  for (const key of Object.keys(given)) {
    if (key === 'prior' || required.includes(key) || optional.includes(key)) continue;
    issues.push({ code: 'unknown-field', path: `${path}.${key}`, expected: `one of ${[...required, ...optional].join(', ')}` });
  }
  for (const key of [...required, ...optional]) {
    const number = given[key];
    if (number === undefined && optional.includes(key)) continue;
    if (typeof number !== 'number' || !Number.isFinite(number)) {
      issues.push({ code: 'not-finite', path: `${path}.${key}`, expected: 'a finite number', received: shorten(number) });
    } else if ((POSITIVE.has(key) || (name === 'logUniform' && key === 'low')) && !(number > 0)) {
      issues.push({ code: 'not-positive', path: `${path}.${key}`, expected: 'above 0', received: String(number) });
    }
  }
  if (issues.length > 0) return issues;
  const { low, high } = given as { low?: number; high?: number };
  if (low !== undefined && high !== undefined && !(low < high)) {
    issues.push({ code: 'empty-range', path, expected: 'low below high', received: `low ${low}, high ${high}` });
  }
  if (name === 'truncatedNormal' && low === undefined && high === undefined) {
    issues.push({ code: 'no-bound', path, expected: 'low, high or both', hint: 'Without a bound, use the prior "normal".' });
  }
  return issues;
}
