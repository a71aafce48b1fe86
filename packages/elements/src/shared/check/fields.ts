/** Checks a value found at a place; throws `Unfit` with the place where it does not hold. */
export type Check = (value: unknown, at: string) => void;

export class Unfit extends Error {}

/** A check from a test. */
export const that =
  (holds: (value: unknown) => boolean): Check =>
  (value, at) => {
    if (!holds(value)) throw new Unfit(at);
  };

export const isNumber = (value: unknown): value is number => Number.isFinite(value);

export const text = that((value) => typeof value === 'string');
export const flag = that((value) => typeof value === 'boolean');
export const positive = that((value) => isNumber(value) && value > 0);
export const amount = that((value) => isNumber(value) && value >= 0);
// Shares are sums of thousands of parcels.
export const slack = 1e-6;
export const share = that((value) => isNumber(value) && value >= -slack && value <= 1 + slack);
export const instant = that((value) => typeof value === 'string' && value.length < 40 && isNumber(Date.parse(value)));
export const oneOf = (...words: unknown[]): Check => that((value) => words.includes(value));

export const orNull =
  (check: Check): Check =>
  (value, at) =>
    value === null || check(value, at);

/** May be absent or null. */
export const maybe =
  (check: Check): Check =>
  (value, at) =>
    value == null || check(value, at);

/** An object whose named fields hold; others are let be. */
export const fields =
  (checks: Record<string, Check>): Check =>
  (value, at) => {
    that((it) => typeof it === 'object' && it !== null && !Array.isArray(it))(value, at);
    for (const name in checks) checks[name]!((value as Record<string, unknown>)[name], at ? `${at}.${name}` : name);
  };

/** At most a hundred entries that all hold. */
export const listOf =
  (check: Check): Check =>
  (value, at) => {
    that((it) => Array.isArray(it) && it.length <= 100)(value, at);
    (value as unknown[]).forEach((entry, index) => check(entry, `${at}[${index}]`));
  };

/** A range, low end first, or null: not assessed. */
export const rangeOf = (end: Check): Check =>
  orNull((value, at) => {
    fields({ low: end, high: end })(value, at);
    const { low, high } = value as { low: number; high: number };
    that(() => low <= high)(value, at);
  });

/** The first place that does not hold, or null. */
export function firstUnfit(check: Check, value: unknown): string | null {
  try {
    check(value, '');
    return null;
  } catch (error) {
    if (error instanceof Unfit) return error.message || 'file';
    throw error;
  }
}
