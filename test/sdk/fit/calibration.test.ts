import { describe, expect, it } from 'vitest';
import { logLikelihood } from '../../../packages/sdk/src/fit/likelihood.js';
import { fromScore } from '../../../packages/sdk/src/fit/priorMath.js';
import type { Prior } from '../../../packages/sdk/src/fit/priors.js';
import { keptDraws, runSampler } from '../../../packages/sdk/src/fit/sampler/run.js';
import { openSampler } from '../../../packages/sdk/src/fit/sampler/sampler.js';
import { Random } from '../../../packages/sdk/src/numeric/random.js';
import { chiSquareUniform, kolmogorovCdf, kolmogorovSmirnov, rankCounts, rankOf } from '../../calibration.js';
import checks from '../../checks/metrics.json';

describe('chiSquareUniform(counts), general library', () => {
  it('the printed case', () => {
    const { chiSquare, degrees, p } = chiSquareUniform(checks.sbc_chi2.bin_counts);
    expect(chiSquare).toBeCloseTo(checks.sbc_chi2.chi2, 10);
    expect(degrees).toBe(checks.sbc_chi2.df);
    expect(p).toBeCloseTo(checks.sbc_chi2.p, 10);
  });
});

describe('kolmogorovSmirnov(values), general library', () => {
  it('the printed case, exact p', () => {
    const { distance, p } = kolmogorovSmirnov(checks.pit_example.u);
    expect(distance).toBeCloseTo(checks.pit_example.D, 12);
    expect(p).toBeCloseTo(checks.pit_example.p_exact, 10);
  });

  it.each(checks.ks_critical_5pct)('critical distance at n = $n', ({ n, D }) => {
    expect(kolmogorovCdf(n, D)).toBeCloseTo(0.95, 9);
  });
});

describe('rankCounts(ranks, draws, bins)', () => {
  it('puts every rank of 0 … draws into its bin', () => {
    expect(rankOf(2.5, [1, 2, 3, 4])).toBe(2);
    expect(rankCounts([0, 1, 2, 3, 4, 5, 6, 7, 8, 9], 9, 5)).toEqual([2, 2, 2, 2, 2]);
    expect(() => rankCounts([0], 9, 3)).toThrow(RangeError);
  });
});

/**
 * Simulation-based calibration (Talts et al. 2018) of priors, likelihood and sampler together on a small analytic problem: level,
 * slope and error size of a line, values below a detection limit censored.
 */
describe('intervals mean what they say', () => {
  const priors: Prior[] = [
    { prior: 'normal', mean: 1, sd: 2 },
    { prior: 'uniform', low: -1, high: 3 },
    { prior: 'logUniform', low: 0.2, high: 2 },
  ];
  const times = [-1.5, -1, -0.5, 0, 0.4, 0.8, 1.2, 1.6];
  const detectionLimit = -0.5;
  const repeats = 200;
  const draws = 99;

  it('ranks of the truth are uniform over 200 simulated data sets', async () => {
    const random = Random.fromSeed(2024);
    const ranks: number[][] = priors.map(() => []);
    for (let repeat = 0; repeat < repeats; repeat++) {
      const truth = priors.map((prior) => fromScore(prior, random.normal()));
      const exact = times.map((t) => truth[0] + truth[1] * t + truth[2] * random.normal());
      const measured = exact.map((value) =>
        value < detectionLimit ? { value: detectionLimit, censored: 'below' as const } : { value, censored: undefined },
      );
      const sampler = openSampler({ dimensions: 3, seed: repeat, effectiveSize: 150, rHat: 1.03 });
      await runSampler(sampler, (points) =>
        points.map((z) => {
          const [level, slope, size] = priors.map((prior, j) => fromScore(prior, z[j]));
          let sum = z.reduce((total, x) => total - 0.5 * x * x, 0);
          measured.forEach(({ value, censored }, i) => {
            sum += logLikelihood({ error: 'normal', constant: size }, value, level + slope * times[i], 0, censored);
          });
          return sum;
        }),
      );
      expect(sampler.state.outcome).toBe('converged');
      const kept = keptDraws(sampler.state, draws).points;
      priors.forEach((prior, j) => {
        ranks[j].push(
          rankOf(
            truth[j],
            kept.map((z) => fromScore(prior, z[j])),
          ),
        );
      });
    }
    for (const own of ranks) {
      // both tests at 0.1 % on three quantities: a sound sampler fails here in 0.6 % of seeds, and the seed is fixed
      expect(chiSquareUniform(rankCounts(own, draws, 10)).p).toBeGreaterThan(0.001);
      expect(kolmogorovSmirnov(own.map((rank) => (rank + 0.5) / (draws + 1))).p).toBeGreaterThan(0.001);
    }
  }, 120_000);
});
