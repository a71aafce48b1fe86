import { shorten, type Issue } from '../errors.js';

/** Reads fields of untrusted plain data one by one, with a default where absent, and collects what is wrong. */
export class Taker {
  readonly issues: Issue[] = [];

  object(value: unknown, path: string): Record<string, unknown> {
    if (typeof value === 'object' && value !== null && !Array.isArray(value)) return value as Record<string, unknown>;
    this.#wrong(path, 'an object', value);
    return {};
  }

  list(value: unknown, path: string, atMost: number): unknown[] {
    if (value === undefined) return [];
    if (Array.isArray(value) && value.length <= atMost) return value as unknown[];
    this.#wrong(path, `a list of at most ${atMost}`, Array.isArray(value) ? `${value.length} entries` : value);
    return [];
  }

  text(value: unknown, path: string, fallback: string, atMost = 200): string {
    if (value === undefined) return fallback;
    if (typeof value === 'string' && value.length <= atMost) return value;
    this.#wrong(path, `a text of at most ${atMost} characters`, value);
    return fallback;
  }

  /** Text, or null for unsettled. */
  textOrNull(value: unknown, path: string, fallback: string | null): string | null {
    return value === null ? null : value === undefined ? fallback : this.text(value, path, '');
  }

  choice<T extends string>(value: unknown, path: string, choices: readonly T[], fallback: T): T {
    if (value === undefined) return fallback;
    if (choices.includes(value as T)) return value as T;
    this.#wrong(path, `one of ${choices.map((choice) => JSON.stringify(choice)).join(', ')}`, value);
    return fallback;
  }

  number(value: unknown, path: string, fallback: number, low = -Infinity, high = Infinity): number {
    if (value === undefined) return fallback;
    if (typeof value === 'number' && Number.isFinite(value) && value >= low && value <= high) return value;
    this.#wrong(path, `a number from ${low} to ${high}`, value);
    return fallback;
  }

  numberOrNull(value: unknown, path: string, low = -Infinity, high = Infinity): number | null {
    return value === null || value === undefined ? null : this.number(value, path, low, low, high);
  }

  whole(value: unknown, path: string, fallback: number, low: number, high: number): number {
    const number = this.number(value, path, fallback, low, high);
    if (Number.isInteger(number)) return number;
    this.#wrong(path, 'a whole number', value);
    return fallback;
  }

  flag(value: unknown, path: string): boolean {
    if (value === undefined || typeof value === 'boolean') return value ?? false;
    this.#wrong(path, 'true or false', value);
    return false;
  }

  /** `hh:mm` */
  clock(value: unknown, path: string, fallback: string): string {
    const text = this.text(value, path, fallback, 5);
    if (/^([01]\d|2[0-3]):[0-5]\d$/.test(text)) return text;
    this.#wrong(path, 'a clock as hh:mm', value);
    return fallback;
  }

  #wrong(path: string, expected: string, received: unknown): void {
    if (this.issues.length < 200) this.issues.push({ code: 'layout-invalid', path, expected, received: shorten(received) });
  }
}
