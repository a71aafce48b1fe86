import { describe, expect, it } from 'vitest';
import { autocorrelation, binomialRange, crpsEnsemble, crpsNormal, intervalCoverage } from '../../../packages/sdk/src/fit/predictive.js';
import checks from '../../checks/metrics.json';

describe('binomialRange(count, probability)', () => {
  it.each(checks.coverage_binomial_95pct_range)('n = $n, p = $nominal: $lo … $hi (general library)', ({ n, nominal, lo, hi }) => {
    expect(binomialRange(n, nominal)).toEqual([lo, hi]);
  });

  it('matches the range given with the rank test', () => {
    const counts = checks.sbc_chi2.bin_counts;
    expect(
      binomialRange(
        counts.reduce((a, b) => a + b, 0),
        0.1,
      ),
    ).toEqual(checks.sbc_chi2.bin_95pct_range_binomial);
  });

  it('stays sound at the ends and for very many trials', () => {
    expect(binomialRange(10, 0)).toEqual([0, 0]);
    expect(binomialRange(10, 1)).toEqual([10, 10]);
    const [low, high] = binomialRange(1e6, 0.5);
    // normal limit: 500 000 ± 1.96 · 500
    expect(Math.abs(low - (5e5 - 980))).toBeLessThan(3);
    expect(Math.abs(high - (5e5 + 980))).toBeLessThan(3);
  });
});

describe('intervalCoverage(observed, low, high, nominal)', () => {
  const observed = Array.from({ length: 100 }, (_, i) => i);
  const reaching = (inside: number): { low: number[]; high: number[] } => ({
    low: observed.map((y, i) => (i < inside ? y : y + 1)),
    high: observed.map((y) => y + 2),
  });

  it.each([
    [90, 'asStated'],
    [83, 'tooNarrow'],
    [96, 'tooWide'],
  ] as const)('%i of 100 at 90 %%: %s', (inside, verdict) => {
    const { low, high } = reaching(inside);
    expect(intervalCoverage(observed, low, high, 0.9)).toMatchObject({ inside, of: 100, share: inside / 100, expected: [84, 95], verdict });
  });

  it('throws on different lengths', () => {
    expect(() => intervalCoverage([1, 2], [0], [3, 3], 0.9)).toThrow(expect.objectContaining({ code: 'shape' }) as Error);
  });
});

describe('crpsNormal(observed, mean, sd), Gneiting & Raftery 2007', () => {
  it.each(checks.crps.gaussian)('z = $z', ({ z, crps }) => {
    expect(crpsNormal(z, 0, 1)).toBeCloseTo(crps, 12);
    expect(crpsNormal(5 + 3 * z, 5, 3)).toBeCloseTo(3 * crps, 12);
  });

  it('is the absolute error without spread', () => {
    expect(crpsNormal(1, 3, 0)).toBe(2);
  });
});

describe('crpsEnsemble(observed, members)', () => {
  it('energy and fair form', () => {
    expect(crpsEnsemble(checks.crps.obs, checks.crps.ensemble)).toBeCloseTo(checks.crps.crps_energy, 14);
    expect(crpsEnsemble(checks.crps.obs, checks.crps.ensemble, { fair: true })).toBeCloseTo(checks.crps.crps_fair, 14);
  });

  it('one member: the absolute error; fair needs two', () => {
    expect(crpsEnsemble(1, [4])).toBe(3);
    expect(crpsEnsemble(1, [4], { fair: true })).toBeNaN();
    expect(crpsEnsemble(1, [])).toBeNaN();
  });
});

describe('autocorrelation(values, maxLag)', () => {
  it('of a short series, worked by hand', () => {
    // 1 2 3 4: deviations −1.5 −0.5 0.5 1.5, sums 5, 1.25, −1.5
    expect(Array.from(autocorrelation([1, 2, 3, 4], 2))).toEqual([1, 0.25, -0.3]);
  });

  it('is NaN for a constant series', () => {
    expect(autocorrelation([2, 2, 2], 1).every(Number.isNaN)).toBe(true);
  });
});
