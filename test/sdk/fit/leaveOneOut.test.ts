import { describe, expect, it } from 'vitest';
import { leaveOneOut, logSumExp, smoothWeights } from '../../../packages/sdk/src/fit/leaveOneOut.js';
import { fitParetoTail, paretoQuantile } from '../../../packages/sdk/src/fit/paretoTail.js';
import { Random } from '../../../packages/sdk/src/numeric/random.js';
import fitValues from '../../checks/fitValues.json';
import metrics from '../../checks/metrics.json';

const logNormal = (y: number, mean: number, sd: number): number =>
  -0.5 * ((y - mean) / sd) ** 2 - Math.log(sd) - 0.5 * Math.log(2 * Math.PI);

/** Posterior of a normal mean with known error: textbook conjugate formulas. */
function posterior(y: number[], prior: { mean: number; sd: number }, sigma: number): { mean: number; sd: number } {
  const precision = 1 / prior.sd ** 2 + y.length / sigma ** 2;
  return { mean: (prior.mean / prior.sd ** 2 + y.reduce((a, b) => a + b, 0) / sigma ** 2) / precision, sd: 1 / Math.sqrt(precision) };
}

describe('leaveOneOut(logLikelihoods) against the exact answer of a conjugate normal model', () => {
  const random = Random.fromSeed(11);
  const sigma = 0.7;
  const prior = { mean: 0, sd: 2 };
  const y = [...metrics.conjugate_normal.y, ...Array.from({ length: 25 }, () => 2 + sigma * random.normal())];
  const exactOf = (values: number[]): number[] =>
    values.map((value, i) => {
      const rest = posterior(
        values.filter((_, j) => j !== i),
        prior,
        sigma,
      );
      return logNormal(value, rest.mean, Math.hypot(rest.sd, sigma));
    });
  const densities = (values: number[], draws: number): number[][] => {
    const { mean, sd } = posterior(values, prior, sigma);
    return Array.from({ length: draws }, () => {
      const theta = mean + sd * random.normal();
      return values.map((value) => logNormal(value, theta, sigma));
    });
  };
  const estimate = (values: number[], draws: number): ReturnType<typeof leaveOneOut> => leaveOneOut(densities(values, draws));

  it('every sample, and their sum, within Monte-Carlo error', () => {
    const exact = exactOf(y);
    const draws = densities(y, 4000);
    const result = leaveOneOut(draws);
    // log mean exp(−log p) has the standard error sd(1/p)/mean(1/p)/√S; four of them
    result.pointwise.forEach((value, i) => {
      const inverse = draws.map((row) => Math.exp(-row[i]));
      const mean = inverse.reduce((a, b) => a + b, 0) / 4000;
      const error = Math.sqrt(inverse.reduce((sum, x) => sum + (x / mean - 1) ** 2, 0) / 4000 / 4000);
      expect(Math.abs(value - exact[i])).toBeLessThan(4 * error);
      expect(error).toBeLessThan(0.02);
    });
    expect(Math.abs(result.elpd - exact.reduce((a, b) => a + b, 0))).toBeLessThan(0.05);
    expect(result.unreliable).toEqual([]);
    // one parameter, well informed
    expect(result.effectiveParameters).toBeGreaterThan(0.4);
    expect(result.effectiveParameters).toBeLessThan(2);
  });

  it('says which sample it cannot leave out', () => {
    const wild = [...metrics.conjugate_normal.y, 9];
    const result = estimate(wild, 2000);
    expect(result.unreliable).toContain(5);
    expect(result.shape[5]).toBeGreaterThan(result.shapeLimit);
  });

  it.each([
    ['too-few-draws', [[1], [2]]],
    ['shape', [...Array.from({ length: 30 }, () => [1, 2]), [1]]],
    ['not-finite', Array.from({ length: 30 }, (_, s) => [s === 7 ? -Infinity : 1])],
  ])('throws %s', (code, rows) => {
    expect(() => leaveOneOut(rows)).toThrow(expect.objectContaining({ code }) as Error);
  });
});

describe('smoothWeights(logRatios)', () => {
  it('leaves equal ratios equal', () => {
    const { logWeights, shape } = smoothWeights(new Float64Array(100).fill(-3));
    expect(shape).toBe(-Infinity);
    logWeights.forEach((w) => expect(w).toBeCloseTo(-Math.log(100), 12));
  });

  it('weights add up to one, keep their order and do not change with a constant', () => {
    const random = Random.fromSeed(3);
    const ratios = Array.from({ length: 400 }, () => 1.5 * random.normal());
    const { logWeights } = smoothWeights(ratios);
    expect(logSumExp(logWeights)).toBeCloseTo(0, 12);
    const order = ratios.map((_, i) => i).sort((a, b) => ratios[a] - ratios[b]);
    for (let k = 1; k < order.length; k++) expect(logWeights[order[k]]).toBeGreaterThanOrEqual(logWeights[order[k - 1]]);
    smoothWeights(ratios.map((r) => r + 700)).logWeights.forEach((w, i) => expect(w).toBeCloseTo(logWeights[i], 8));
  });
});

describe('fitParetoTail(excesses)', () => {
  it.each(fitValues.paretoTail.cases)('shape $shape, scale $scale, from its own quantiles', ({ shape, scale, excesses }) => {
    const fit = fitParetoTail(excesses);
    // the weak prior pulls by 10 of 210 towards 0.5
    const pulled = (shape * 200 + 5) / 210;
    expect(Math.abs(fit.shape - pulled)).toBeLessThan(0.05);
    expect(Math.abs(fit.scale / scale - 1)).toBeLessThan(0.06);
  });

  it('is NaN for equal excesses', () => {
    expect(fitParetoTail([1, 1, 1, 1, 1]).shape).toBeNaN();
  });

  it('paretoQuantile: the exponential limit at shape 0 is continuous', () => {
    expect(paretoQuantile({ shape: 1e-9, scale: 2 }, 0.9)).toBeCloseTo(paretoQuantile({ shape: 0, scale: 2 }, 0.9), 6);
    expect(paretoQuantile({ shape: 0, scale: 2 }, 0.9)).toBeCloseTo(2 * Math.log(10), 12);
  });
});
