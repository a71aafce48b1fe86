import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { quantileSorted } from '../../../packages/sdk/src/numeric/quantile.js';
import { weightedQuantile } from '../../../packages/sdk/src/numeric/weightedQuantile.js';
import values from '../../checks/numericValues.json' with { type: 'json' };
import { expectAbsolute } from './near.js';

const numbers = fc.array(fc.double({ min: -1e3, max: 1e3, noNaN: true }), { minLength: 1, maxLength: 20 });
const probability = fc.double({ min: 0, max: 1, noNaN: true });

describe('quantileSorted(sorted, p)', () => {
  test('quantileSorted is the default quantile of numpy', () => {
    const { values: sorted, p, expected } = values.quantile;
    p.forEach((probability, i) => expectAbsolute(quantileSorted(sorted, probability), expected[i], 1e-14, `p = ${probability}`));
  });

  test('quantileSorted of nothing, or outside 0 … 1, is NaN; of one value that value', () => {
    expect([quantileSorted([], 0.5), quantileSorted([1, 2], -0.1), quantileSorted([1, 2], NaN)]).toEqual([NaN, NaN, NaN]);
    expect([quantileSorted([3], 0), quantileSorted([3], 1), quantileSorted([3, Infinity], 0)]).toEqual([3, 3, 3]);
  });
});

describe('weightedQuantile(values, weights, p)', () => {
  test('weightedQuantile with equal weights is quantileSorted of the sorted values', () => {
    fc.assert(
      fc.property(numbers, probability, fc.double({ min: 1e-3, max: 1e3, noNaN: true }), (list, p, weight) => {
        const sorted = [...list].sort((a, b) => a - b);
        const received = weightedQuantile(
          list,
          list.map(() => weight),
          p,
        );
        expectAbsolute(received, quantileSorted(sorted, p), 1e-10, `p = ${p}`);
      }),
      { seed: 41 },
    );
  });

  test('weightedQuantile never decreases in p, stays between the extremes, and leaves its input alone', () => {
    fc.assert(
      fc.property(numbers, probability, probability, (list, p1, p2) => {
        const weights = list.map((_, i) => 0.1 + ((i * 7) % 5));
        const before = [...list];
        const low = weightedQuantile(list, weights, Math.min(p1, p2));
        const high = weightedQuantile(list, weights, Math.max(p1, p2));
        expect(high).toBeGreaterThanOrEqual(low - 1e-12);
        expect(low).toBeGreaterThanOrEqual(Math.min(...list));
        expect(high).toBeLessThanOrEqual(Math.max(...list));
        expect(list).toEqual(before);
      }),
      { seed: 42 },
    );
  });

  test('weightedQuantile worked by hand: values 1, 2, 4 of weights 1, 2, 1 stand at 0, ½, 1', () => {
    expect([0, 0.25, 0.5, 0.75, 1].map((p) => weightedQuantile([4, 1, 2], [1, 1, 2], p))).toEqual([1, 1.5, 2, 3, 4]);
  });

  test('weightedQuantile leaves out weight 0 and refuses broken weights', () => {
    expect(weightedQuantile([1, NaN, 3], [1, 0, 1], 0.5)).toBe(2);
    expect(weightedQuantile([1, 2], [0, 0], 0.5)).toBeNaN();
    expect(weightedQuantile([1, 2], [1, -1], 0.5)).toBeNaN();
    expect(weightedQuantile([1, NaN], [1, 1], 0.5)).toBeNaN();
    expect(weightedQuantile([1, 2], [1, 1], 2)).toBeNaN();
  });
});
