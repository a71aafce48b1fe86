import { describe, expect, it } from 'vitest';
import { compareNumbers } from './numbers.mjs';

const text = (...values: (number | null)[]): string => JSON.stringify({ series: [values] });

describe('compareNumbers', () => {
  it('counts equal numbers', () => {
    expect(compareNumbers(text(1, 2, 3), text(1, 2, 3))).toEqual({ count: 3, largest: 0 });
  });

  it('forgives the last places and nothing more', () => {
    expect(compareNumbers(text(1, 2), text(1 + 4e-13, 2)).largest).toBeLessThan(1e-12);
    expect(() => compareNumbers(text(1, 2), text(1 + 1e-9, 2))).toThrow('largest relative difference');
  });

  it('refuses what is missing, or mostly no number', () => {
    expect(() => compareNumbers(text(1, 2), text(1))).toThrow('2 numbers');
    expect(() => compareNumbers(text(1, null), text(1, 2))).toThrow('number 1 is null');
    expect(() => compareNumbers(text(null, null, 1), text(null, null, 1))).toThrow('only 1 of 3');
  });
});
