import { describe, expect, it } from 'vitest';
import { stackingWeights } from '../../../packages/sdk/src/fit/stackingWeights.js';

/** Leave-one-out log densities of invented alternatives. */
const scores = (seed: number, count = 60): number[] =>
  Array.from({ length: count }, (_, i) => -1.5 + Math.sin(i * 12.9898 * (seed + 1) + seed) * 1.2);

describe('stackingWeights(pointwise)', () => {
  it('one alternative takes all', () => {
    expect(stackingWeights([scores(1)])).toMatchObject({ weights: Float64Array.of(1), shortfall: 0 });
  });

  it('one that is worse on every sample gets nothing', () => {
    const { weights } = stackingWeights([scores(1), scores(1).map((x) => x - 0.5)]);
    expect(weights[0]).toBeGreaterThan(1 - 1e-6);
  });

  it('twins share', () => {
    const { weights } = stackingWeights([scores(1), scores(1)]);
    expect(Array.from(weights)).toEqual([0.5, 0.5]);
  });

  it('closed form: each alternative certain on its own samples, weights are the samples’ shares', () => {
    // maximise 30 log w + 10 log(1 − w): w = 3/4
    const first = Array.from({ length: 40 }, (_, i) => (i < 30 ? 0 : -50));
    const second = Array.from({ length: 40 }, (_, i) => (i < 30 ? -50 : 0));
    const { weights, elpd } = stackingWeights([first, second]);
    expect(weights[0]).toBeCloseTo(0.75, 9);
    expect(elpd).toBeCloseTo(30 * Math.log(0.75) + 10 * Math.log(0.25), 9);
  });

  it('no point of a fine grid over three alternatives does better, and the bound holds', () => {
    const rows = [scores(1), scores(2), scores(5)];
    const { weights, elpd, shortfall } = stackingWeights(rows);
    expect(weights.reduce((a, b) => a + b, 0)).toBeCloseTo(1, 12);
    expect(shortfall).toBeLessThanOrEqual(1e-6);
    let best = -Infinity;
    for (let a = 0; a <= 100; a++) {
      for (let b = 0; a + b <= 100; b++) {
        const w = [a / 100, b / 100, (100 - a - b) / 100];
        best = Math.max(
          best,
          rows[0].reduce((sum, _, i) => sum + Math.log(rows.reduce((p, row, k) => p + w[k] * Math.exp(row[i]), 0)), 0),
        );
      }
    }
    expect(best).toBeLessThanOrEqual(elpd + 1e-6);
    expect(best).toBeGreaterThan(elpd - 0.05);
  });

  it('log densities far from 0 neither overflow nor underflow', () => {
    const rows = [scores(1), scores(2)];
    const plain = stackingWeights(rows);
    const shifted = stackingWeights(rows.map((row) => row.map((x) => x - 5000)));
    expect(shifted.weights[0]).toBeCloseTo(plain.weights[0], 6);
  });

  it.each([
    ['shape', [[1, 2], [1]]],
    ['shape', []],
    ['not-finite', [[1, -Infinity]]],
  ])('throws %s', (code, rows) => {
    expect(() => stackingWeights(rows)).toThrow(expect.objectContaining({ code }) as Error);
  });
});
