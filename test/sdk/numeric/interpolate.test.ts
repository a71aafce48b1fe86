import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { interpolateHeld, upperBound } from '../../../packages/sdk/src/numeric/interpolate.js';

describe('upperBound(at, x)', () => {
  test('upperBound counts the entries not above x', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: -20, max: 20 })), fc.integer({ min: -22, max: 22 }), (list, x) => {
        const sorted = [...list].sort((a, b) => a - b);
        expect(upperBound(sorted, x)).toBe(sorted.filter((entry) => entry <= x).length);
      }),
      { seed: 51 },
    );
  });

  test('upperBound looks at the first entries only, if told how many', () => {
    expect([upperBound([1, 2, 3, 0, 0], 9, 3), upperBound([], 1), upperBound([1, 2], NaN)]).toEqual([3, 0, 2]);
  });
});

describe('interpolateHeld(at, value, x)', () => {
  const at = Float64Array.of(0, 1, 3);
  const value = Float64Array.of(10, 20, 0);

  test('interpolateHeld is linear between places and held beyond them', () => {
    expect([-5, 0, 0.5, 1, 2, 3, 99].map((x) => interpolateHeld(at, value, x))).toEqual([10, 10, 15, 20, 10, 0, 0]);
  });

  test('interpolateHeld reproduces any straight line', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 3, noNaN: true }), (x) => {
        expect(interpolateHeld(at, [2, 5, 11], x)).toBeCloseTo(2 + 3 * x, 13);
      }),
      { seed: 52 },
    );
  });

  test('interpolateHeld at a jump takes the later value, and of nothing is NaN', () => {
    expect(interpolateHeld([0, 1, 1, 2], [0, 1, 5, 6], 1)).toBe(5);
    expect([interpolateHeld([], [], 1), interpolateHeld(at, value, NaN)]).toEqual([NaN, NaN]);
  });
});
