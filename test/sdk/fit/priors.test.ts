import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  drawPrior,
  fromScore,
  priorCdf,
  priorLogDensity,
  priorQuantile,
  priorRange,
  scoreLogJacobian,
  toScore,
} from '../../../packages/sdk/src/fit/priorMath.js';
import { type Prior, checkPrior, isPrior } from '../../../packages/sdk/src/fit/priors.js';
import { Random } from '../../../packages/sdk/src/numeric/random.js';
import { kolmogorovSmirnov } from '../../calibration/ranks.mjs';
import checks from '../../checks/fitValues.json';

const cases = checks.priors.map(({ prior, rows }) => ({ prior: prior as Prior, rows, name: JSON.stringify(prior) }));

describe.each(cases)('$name, values of a general library', ({ prior, rows }) => {
  it.each(rows)('at x = $x', ({ x, cdf, logDensity }) => {
    expect(priorLogDensity(prior, x)).toBeCloseTo(logDensity, 8);
    expect(Math.abs(priorCdf(prior, x) / cdf - 1)).toBeLessThan(1e-9);
    const [low, high] = priorRange(prior);
    const size = Number.isFinite(high - low) ? high - low : Math.abs(x);
    expect(Math.abs(priorQuantile(prior, cdf) - x) / size).toBeLessThan(1e-8);
  });

  it('fromScore and toScore are inverse, increasing, and carry their Jacobian', () => {
    for (const z of [-5, -2.2, -0.4, 0, 0.3, 1.7, 4.5]) {
      const x = fromScore(prior, z);
      expect(toScore(prior, x)).toBeCloseTo(z, 6);
      const h = 1e-4;
      const slope = (fromScore(prior, z + h) - fromScore(prior, z - h)) / (2 * h);
      expect(slope).toBeGreaterThan(0);
      // central difference: relative error of order h²
      if (Math.abs(z) < 3) expect(Math.abs(Math.log(slope) - scoreLogJacobian(prior, z))).toBeLessThan(1e-5);
    }
  });

  it('far scores stay within the range', () => {
    const [low, high] = priorRange(prior);
    for (const z of [-30, -9, 9, 30]) {
      expect(fromScore(prior, z)).toBeGreaterThanOrEqual(low);
      expect(fromScore(prior, z)).toBeLessThanOrEqual(high);
    }
  });

  it('is impossible outside its range', () => {
    const [low, high] = priorRange(prior);
    if (Number.isFinite(low)) expect([priorLogDensity(prior, low - 1), priorCdf(prior, low - 1)]).toEqual([-Infinity, 0]);
    if (Number.isFinite(high)) expect([priorLogDensity(prior, high + 1), priorCdf(prior, high + 1)]).toEqual([-Infinity, 1]);
  });

  it('drawPrior: draws are distributed as stated', () => {
    const random = Random.fromSeed(17);
    const { p } = kolmogorovSmirnov(Array.from({ length: 300 }, () => priorCdf(prior, drawPrior(prior, random))));
    expect(p).toBeGreaterThan(0.001);
  });
});

describe('truncatedNormal in the far tail', () => {
  const prior: Prior = { prior: 'truncatedNormal', mean: 0, sd: 1, low: 30 };

  it('tends to an exponential above the cut, rate 30', () => {
    expect(priorQuantile(prior, 0.5)).toBeCloseTo(30 + Math.log(2) / 30, 4);
    expect(priorCdf(prior, 30 + Math.log(2) / 30)).toBeCloseTo(0.5, 2);
    expect(Math.exp(priorLogDensity(prior, 30))).toBeCloseTo(30.03, 1);
  });
});

describe('priorQuantile(prior, p)', () => {
  const anyPrior = fc.oneof(
    fc
      .tuple(fc.double({ min: -50, max: 50, noNaN: true }), fc.double({ min: 0.1, max: 50, noNaN: true }))
      .map(([low, width]): Prior => ({ prior: 'uniform', low, high: low + width })),
    fc
      .tuple(fc.double({ min: 0.01, max: 50, noNaN: true }), fc.double({ min: 1.1, max: 500, noNaN: true }))
      .map(([low, factor]): Prior => ({ prior: 'logUniform', low, high: low * factor })),
    fc
      .tuple(fc.double({ min: 0.3, max: 20, noNaN: true }), fc.double({ min: 0.3, max: 20, noNaN: true }))
      .map(([a, b]): Prior => ({ prior: 'beta', a, b })),
    fc
      .tuple(fc.double({ min: -5, max: 5, noNaN: true }), fc.double({ min: 0.1, max: 5, noNaN: true }))
      .map(([mean, sd]): Prior => ({ prior: 'truncatedNormal', mean, sd, low: mean - sd, high: mean + 2 * sd })),
  );

  it('is undone by priorCdf', () => {
    fc.assert(
      fc.property(anyPrior, fc.double({ min: 0.001, max: 0.999, noNaN: true }), (prior, p) => {
        expect(priorCdf(prior, priorQuantile(prior, p))).toBeCloseTo(p, 8);
      }),
      { seed: 1, numRuns: 200 },
    );
  });
});

describe('checkPrior(value, path)', () => {
  it.each([
    [{ prior: 'uniform', low: 0, high: 1 }, []],
    [{ prior: 'truncatedNormal', mean: 0, sd: 1, high: 3 }, []],
    [{ prior: 'triangular', low: 0, high: 1 }, ['unknown-prior']],
    [{ prior: 'constructor' }, ['unknown-prior']],
    [{ prior: 'uniform', low: 0, hihg: 1 }, ['unknown-field', 'not-finite']],
    [{ prior: 'uniform', low: 1, high: 1 }, ['empty-range']],
    [{ prior: 'logUniform', low: 0, high: 1 }, ['not-positive']],
    [{ prior: 'normal', mean: Infinity, sd: -1 }, ['not-finite', 'not-positive']],
    [{ prior: 'truncatedNormal', mean: 0, sd: 1 }, ['no-bound']],
    [{ prior: 'beta', a: '2', b: 5 }, ['not-finite']],
  ])('%j: %j', (value, codes) => {
    expect(isPrior(value)).toBe(true);
    expect(checkPrior(value, 'selection.discharge.scale').map((issue) => issue.code)).toEqual(codes);
  });

  it('isPrior is false for what makes no such claim', () => {
    for (const value of [3, null, 'prior', [], { form: 'gamma' }]) expect(isPrior(value)).toBe(false);
  });
});
