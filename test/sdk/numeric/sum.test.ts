import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { sum } from '../../../packages/sdk/src/numeric/sum.js';

describe('sum(values)', () => {
  test('sum keeps what the plain sum loses', () => {
    expect(sum([1, 1e100, 1, -1e100])).toBe(2);
    expect(sum(new Float64Array(10).fill(0.1))).toBe(1);
    expect(sum(new Float64Array(1e6).fill(0.1))).toBe(100000);
  });

  test('sum is exact wherever whole numbers and their negatives cancel, in any order', () => {
    fc.assert(
      fc.property(fc.array(fc.maxSafeInteger(), { maxLength: 30 }), fc.integer({ min: -1024, max: 1024 }), (list, n) => {
        const extra = n / 1024; // few enough digits for the carry to hold them beside those of the whole numbers
        expect(sum([...list, extra, ...list.map((entry) => -entry)])).toBe(extra + 0);
      }),
      { seed: 61 },
    );
  });

  test('sum of nothing is 0, and infinities and NaN go through', () => {
    expect([sum([]), sum([1, Infinity]), sum([Infinity, -Infinity]), sum([1, NaN])]).toEqual([0, Infinity, NaN, NaN]);
  });
});
