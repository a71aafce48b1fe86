import { describe, expect, it } from 'vitest';
import { fitSeasonalCycle } from '../../../packages/sdk/src/fit/seasonalCycle.js';
import { Random } from '../../../packages/sdk/src/numeric/random.js';
import {
  cycleResponse,
  gammaCycleResponse,
  matchGamma,
  seasonalYoungWater,
  youngThreshold,
} from '../../../packages/sdk/src/fit/youngWater.js';
import checks from '../../checks/seasonalCycle.json';

const gamma = checks.sinusoid_gamma;

describe('gammaCycleResponse and matchGamma, Kirchner 2016', () => {
  it.each(gamma.rows)('shape $alpha, mean $mean_yr years', (row) => {
    const response = gammaCycleResponse(row.alpha, row.beta_yr, 1);
    expect(Math.abs(response.ratio / row.amplitude_ratio - 1)).toBeLessThan(gamma.tol_rel_formula);
    expect(Math.abs(response.lag / row.phase_rad - 1)).toBeLessThan(gamma.tol_rel_formula);

    const match = matchGamma(row.amplitude_ratio, row.phase_rad, 1);
    expect(match?.shape).toBeCloseTo(row.alpha, 8);
    expect((match?.scale ?? 0) / row.beta_yr).toBeCloseTo(1, 8);
    expect(match?.threshold).toBeCloseTo(row.tau_yw_fit_yr, 8);
    expect(match?.shareAtThreshold).toBeCloseTo(row.F_yw_at_fit, 8);
    expect(match?.exactThreshold).toBeCloseTo(row.tau_where_P_equals_AR_yr, 8);
    expect(Math.abs(row.amplitude_ratio - (match?.shareAtThreshold ?? NaN))).toBeLessThan(gamma.tol_abs_Fyw_vs_AR);
    expect(match?.withinCurve).toBe(true);
  });

  it('the published curve stays within 0.0544 of the ratio, worst where the scan found it', () => {
    const [alpha, ratio] = gamma.max_dev_scan.at_alpha_AR;
    const lag = alpha * Math.atan(Math.sqrt(ratio ** (-2 / alpha) - 1));
    const match = matchGamma(ratio, lag, 1);
    expect(Math.abs((match?.shareAtThreshold ?? NaN) - ratio)).toBeCloseTo(gamma.max_dev_scan.max_abs, 8);
  });

  it('for a given ratio the lag grows with the shape, so that one shape answers', () => {
    for (const ratio of [0.02, 0.3, 0.7, 0.98]) {
      let before = 0;
      for (let shape = 0.01; shape < 10; shape *= 1.05) {
        const lag = shape * Math.atan(Math.sqrt(Math.expm1((-2 / shape) * Math.log(ratio))));
        expect(lag).toBeGreaterThan(before);
        before = lag;
      }
    }
  });

  it('no match for a ratio of 1 or more, a lag of 0, or one out of reach', () => {
    expect(matchGamma(1.1, 0.5)).toBeNull();
    expect(matchGamma(0.5, 0)).toBeNull();
    expect(matchGamma(0.5, 6.2)).toBeNull();
  });

  it('aggregation of two exponential catchments: the young share is kept where the mean age is not', () => {
    const { amplitude_ratio, apparent_exponential_mean_yr } = checks.aggregation_example;
    const fast = gammaCycleResponse(1, 0.1, 1);
    const slow = gammaCycleResponse(1, 5, 1);
    const part = (wave: (x: number) => number): number => 0.5 * fast.ratio * wave(fast.lag) + 0.5 * slow.ratio * wave(slow.lag);
    const ratio = Math.hypot(part(Math.cos), part(Math.sin));
    expect(ratio).toBeCloseTo(amplitude_ratio, 12);
    const apparent = Math.sqrt(1 / ratio ** 2 - 1) / (2 * Math.PI);
    expect(apparent).toBeCloseTo(apparent_exponential_mean_yr, 12);
    const threshold = youngThreshold(1);
    const share = 0.5 * -Math.expm1(-threshold / 0.1) + 0.5 * -Math.expm1(-threshold / 5);
    expect(share).toBeCloseTo(checks.aggregation_example['F_yw_at_0.1888yr'], 12);
  });
});

describe('cycleResponse(ageDays, youngerShare, period), other distributions', () => {
  const turn = 2 * Math.PI;
  const lagClose = (value: number, reference: number, digits: number): void => {
    expect(Math.cos(value - reference)).toBeCloseTo(1, digits);
  };

  it.each(checks.sinusoid_other.rows)('mean $mean_yr years', (row) => {
    const [uniformRatio, uniformLag] = row.uniform_ages_0_2T;
    const uniform = cycleResponse([2 * row.mean_yr], [1], 1);
    expect(uniform.ratio).toBeCloseTo(uniformRatio, 12);
    if (uniformRatio > 1e-9) lagClose(uniform.lag, uniformLag, 12);

    const piston = cycleResponse([row.mean_yr, row.mean_yr], [0, 1], 1);
    expect(piston.ratio).toBeCloseTo(row.piston[0], 12);
    lagClose(piston.lag, row.piston[1] % turn, 12);

    // tables of 20 000 ages: the table's own error is (ω Δ)²/24 < 1e-6
    const ages = Array.from({ length: 20_000 }, (_, k) => ((k + 1) * 20 * row.mean_yr) / 20_000);
    const exponential = cycleResponse(
      ages,
      ages.map((t) => -Math.expm1(-t / row.mean_yr)),
      1,
    );
    expect(exponential.ratio).toBeCloseTo(row.exponential[0], 5);
    lagClose(exponential.lag, row.exponential[1], 5);

    const eta = 1.5;
    const lagging = row.mean_yr * (1 - 1 / eta);
    const delayed = cycleResponse(
      ages,
      ages.map((t) => (t <= lagging ? 0 : -Math.expm1((-(t - lagging) * eta) / row.mean_yr))),
      1,
    );
    expect(delayed.ratio).toBeCloseTo(row['epm_eta1.5'][0], 4);
    lagClose(delayed.lag, row['epm_eta1.5'][1], 4);
  });

  it('water beyond the table is wholly damped', () => {
    expect(cycleResponse([0, 0], [0, 0.4]).ratio).toBeCloseTo(0.4, 14);
  });
});

describe('fitSeasonalCycle(times, values)', () => {
  const { t_yr, C, A, phase, k, a, b, tol_abs } = checks.sine_fit;

  it.each([
    ['plain', { period: 1, robust: false }],
    ['robust', { period: 1 }],
    ['weighted', { period: 1, weights: t_yr.map((_, i) => 1 + (i % 4)) }],
  ])('exact data, %s', (_, options) => {
    const cycle = fitSeasonalCycle(t_yr, C, options);
    expect(Math.abs(cycle.amplitude - A)).toBeLessThan(tol_abs);
    expect(Math.abs(cycle.phase - phase)).toBeLessThan(tol_abs);
    expect(Math.abs(cycle.mean - k)).toBeLessThan(tol_abs);
    expect(Math.abs(cycle.cosine - a)).toBeLessThan(tol_abs);
    expect(Math.abs(cycle.sine - b)).toBeLessThan(tol_abs);
    expect(cycle.amplitudeError).toBeLessThan(tol_abs);
  });

  const times = Array.from({ length: 120 }, (_, i) => i * 14);
  const wave = (t: number): number => -9 + 3 * Math.cos((2 * Math.PI * t) / 365.2425 - 0.7);

  it('a few wild samples move the robust fit little, and are named', () => {
    const random = Random.fromSeed(8);
    const values = times.map((t, i) => wave(t) + 0.3 * random.normal() + (i % 15 === 3 ? 12 : 0));
    const robust = fitSeasonalCycle(times, values);
    const plain = fitSeasonalCycle(times, values, { robust: false });
    expect(Math.abs(robust.mean + 9)).toBeLessThan(0.15);
    expect(Math.abs(plain.mean + 9)).toBeGreaterThan(0.5);
    times.forEach((_, i) => (i % 15 === 3 ? expect(robust.kept[i]).toBe(0) : expect(robust.kept[i]).toBeGreaterThan(0)));
  });

  it.each([
    ['equal weights', undefined],
    ['uneven weights', times.map((_, i) => (i % 7 === 0 ? 6 : 0.5))],
  ])('stated errors are those found over 400 repeats: %s', (_, weights) => {
    const random = Random.fromSeed(21);
    const amplitudes: number[] = [];
    const phases: number[] = [];
    let amplitudeError = 0;
    let phaseError = 0;
    for (let repeat = 0; repeat < 400; repeat++) {
      const cycle = fitSeasonalCycle(
        times,
        times.map((t) => wave(t) + 0.8 * random.normal()),
        weights ? { weights } : {},
      );
      amplitudes.push(cycle.amplitude);
      phases.push(cycle.phase);
      amplitudeError += cycle.amplitudeError / 400;
      phaseError += cycle.phaseError / 400;
    }
    const spread = (x: number[]): number => Math.sqrt(x.reduce((s, v) => s + (v - x.reduce((p, q) => p + q, 0) / 400) ** 2, 0) / 399);
    // a spread over 400 repeats is itself known to 3.5 %; a sandwich from 120 unevenly weighted samples runs up to 10 % low
    expect(amplitudeError / spread(amplitudes)).toBeGreaterThan(0.85);
    expect(amplitudeError / spread(amplitudes)).toBeLessThan(1.12);
    expect(phaseError / spread(phases)).toBeGreaterThan(0.85);
    expect(phaseError / spread(phases)).toBeLessThan(1.12);
  });

  it.each([
    ['shape', [1, 2, 3], [1, 2], {}],
    ['not-finite', [1, 2, 3, 4, NaN], [1, 2, 3, 4, 5], {}],
    ['too-few-samples', [1, 50, 100, 200], [1, 2, 3, 4], {}],
    ['negative', [1, 50, 100, 200, 300], [1, 2, 3, 4, 5], { weights: [1, 1, -1, 1, 1] }],
    ['no-cycle', [10, 10, 10, 10, 10], [1, 2, 3, 4, 5], {}],
  ])('throws %s', (code, t, y, options) => {
    expect(() => fitSeasonalCycle(t, y, options)).toThrow(expect.objectContaining({ code }) as Error);
  });
});

describe('seasonalYoungWater(rain, stream)', () => {
  const times = Array.from({ length: 60 }, (_, i) => i * 21);
  const cycle = (amplitude: number, lag: number): ReturnType<typeof fitSeasonalCycle> =>
    fitSeasonalCycle(
      times,
      times.map((t) => amplitude * Math.cos((2 * Math.PI * t) / 365.2425 - lag)),
    );

  it('recovers ratio, lag and threshold in days', () => {
    const row = gamma.rows[2];
    const result = seasonalYoungWater(cycle(4, 6), cycle(4 * row.amplitude_ratio, 6 + row.phase_rad));
    expect(result.verdict).toBe('fine');
    expect(result.fraction).toBeCloseTo(row.amplitude_ratio, 9);
    expect(result.lag).toBeCloseTo(row.phase_rad, 8);
    expect(result.match?.threshold).toBeCloseTo(row.tau_yw_fit_yr * 365.2425, 5);
  });

  it('says when the stream swings more than the rain, and when it runs ahead of it', () => {
    expect(seasonalYoungWater(cycle(1, 1), cycle(2, 1.5)).verdict).toBe('ratioAboveOne');
    expect(seasonalYoungWater(cycle(2, 1), cycle(1, 0.9))).toMatchObject({ verdict: 'noGamma', match: null });
  });
});
