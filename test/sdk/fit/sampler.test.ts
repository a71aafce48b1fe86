import { describe, expect, it } from 'vitest';
import { fromScore } from '../../../packages/sdk/src/fit/priorMath.js';
import type { Prior } from '../../../packages/sdk/src/fit/priors.js';
import { type Evaluate, chainsOf, keptDraws, runSampler, summariseSampler } from '../../../packages/sdk/src/fit/sampler/run.js';
import { type Sampler, openSampler } from '../../../packages/sdk/src/fit/sampler/sampler.js';
import type { SamplerSettings } from '../../../packages/sdk/src/fit/sampler/settings.js';
import type { SamplerState } from '../../../packages/sdk/src/fit/sampler/state.js';
import { diagnoseChains } from '../../../packages/sdk/src/fit/convergence.js';
import metrics from '../../checks/metrics.json';

type Density = (point: number[]) => number;

const each =
  (density: Density): Evaluate =>
  (points) =>
    points.map(density);
const standard: Density = (z) => z.reduce((sum, x) => sum - 0.5 * x * x, 0);

async function sampled(density: Density, settings: SamplerSettings): Promise<Sampler> {
  const sampler = openSampler(settings);
  await runSampler(sampler, each(density));
  return sampler;
}

/** Mean, sd and 5 and 95 % quantiles of one unknown, with the Monte-Carlo errors that the chains state. */
function described(state: SamplerState, dimension: number, map: (z: number) => number = (z) => z) {
  const chains = chainsOf(state, dimension).map((chain) => chain.map(map));
  const sorted = Float64Array.from(chains.flatMap((chain) => Array.from(chain))).sort();
  const at = (p: number): number => sorted[Math.round(p * (sorted.length - 1))];
  return { ...diagnoseChains(chains), q05: at(0.05), q95: at(0.95) };
}

describe('runSampler on the conjugate normal posterior', () => {
  const { y, prior_mean, prior_sd, sigma, post_mean, post_sd, q05, q95 } = metrics.conjugate_normal;
  const prior: Prior = { prior: 'normal', mean: prior_mean, sd: prior_sd };
  const density: Density = ([z]) => {
    const mean = fromScore(prior, z);
    return -0.5 * z * z - y.reduce((sum, value) => sum + 0.5 * ((value - mean) / sigma) ** 2, 0);
  };

  it.each([1, 2, 3, 4, 5])('recovers it within Monte-Carlo error, seed %i', async (seed) => {
    const { state } = await sampled(density, { dimensions: 1, seed, effectiveSize: 1000 });
    expect(state.outcome).toBe('converged');
    const result = described(state, 0, (z) => fromScore(prior, z));
    // four stated standard errors; the quantiles' by √(p(1−p)/ESS)/density, density at q05 of a normal 0.103/sd
    expect(Math.abs(result.mean - post_mean)).toBeLessThan(4 * result.meanError);
    expect(Math.abs(result.sd - post_sd)).toBeLessThan(4 * result.sdError);
    const quantileError = (Math.sqrt((0.05 * 0.95) / result.tailSize) / 0.103) * post_sd;
    expect(Math.abs(result.q05 - q05)).toBeLessThan(4 * quantileError);
    expect(Math.abs(result.q95 - q95)).toBeLessThan(4 * quantileError);
  });
});

describe('runSampler on shapes with known moments', () => {
  it('five correlated normals, correlation 0.95, posterior 30 times narrower than the start', async () => {
    const rho = 0.95;
    const scale = 1 / 30;
    // inverse of (1 − ρ) I + ρ 1 1ᵀ
    const density: Density = (z) => {
      const x = z.map((v) => (v - 0.8) / scale);
      const total = x.reduce((a, b) => a + b, 0);
      const squares = x.reduce((a, b) => a + b * b, 0);
      return -0.5 * ((squares - (rho * total * total) / (1 + 4 * rho)) / (1 - rho));
    };
    const { state } = await sampled(density, { dimensions: 5, seed: 4 });
    expect(state.outcome).toBe('converged');
    for (let j = 0; j < 5; j++) {
      const { mean, sd, meanError, sdError } = described(state, j);
      expect(Math.abs(mean - 0.8)).toBeLessThan(4 * meanError);
      expect(Math.abs(sd - scale)).toBeLessThan(4 * sdError);
    }
  });

  it('a banana: x₁ normal, x₂ = x₁² + normal', async () => {
    const density: Density = ([a, b]) => -0.5 * a * a - 0.5 * ((b - a * a) / 0.3) ** 2;
    const { state } = await sampled(density, { dimensions: 2, seed: 9 });
    expect(state.outcome).toBe('converged');
    const first = described(state, 0);
    const second = described(state, 1);
    expect(Math.abs(first.mean)).toBeLessThan(4 * first.meanError);
    expect(Math.abs(first.sd - 1)).toBeLessThan(4 * first.sdError);
    // E x₂ = 1, Var x₂ = Var x₁² + 0.09 = 2.09
    expect(Math.abs(second.mean - 1)).toBeLessThan(4 * second.meanError);
    expect(Math.abs(second.sd - Math.sqrt(2.09))).toBeLessThan(4 * second.sdError);
  });

  it('a bounded prior that the data do not inform comes back as it was', async () => {
    const prior: Prior = { prior: 'logUniform', low: 20, high: 2000 };
    const { state } = await sampled(standard, { dimensions: 2, seed: 2 });
    const result = described(state, 0, (z) => Math.log(fromScore(prior, z)));
    expect(Math.abs(result.mean - (Math.log(20) + Math.log(2000)) / 2)).toBeLessThan(4 * result.meanError);
    expect(Math.abs(result.sd - Math.log(100) / Math.sqrt(12))).toBeLessThan(4 * result.sdError);
    expect(Math.min(...keptDraws(state).points.map(([z]) => fromScore(prior, z)))).toBeGreaterThanOrEqual(20);
  });

  it('a target cut off at its mode: the mean is that of the half normal', async () => {
    const { state } = await sampled((z) => (z[0] > 0 ? standard(z) : -Infinity), { dimensions: 3, seed: 6 });
    const result = described(state, 0);
    expect(Math.abs(result.mean - Math.sqrt(2 / Math.PI))).toBeLessThan(4 * result.meanError);
    const { prior, later } = summariseSampler(state);
    // half of the start is impossible, and counted
    expect(prior.impossible / prior.tried).toBeCloseTo(0.5, 1);
    expect(later.impossible).toBeGreaterThan(0);
  });

  it('two modes of different size, five standard deviations apart, in their proportion', async () => {
    const mode = (x: number, centre: number, sd: number): number => Math.exp(-0.5 * ((x - centre) / sd) ** 2) / sd;
    const density: Density = ([a, b]) => Math.log(0.7 * mode(a, -0.8, 0.32) + 0.3 * mode(a, 0.8, 0.32)) - 0.5 * b * b;
    const { state } = await sampled(density, { dimensions: 2, seed: 3, effectiveSize: 1000 });
    expect(state.outcome).toBe('converged');
    const chains = chainsOf(state, 0).map((chain) => chain.map((x) => (x < 0 ? 1 : 0)));
    const { mean, meanError } = diagnoseChains(chains);
    const expected = 0.7 * (1 - 0.0062) + 0.3 * 0.0062;
    expect(Math.abs(mean - expected)).toBeLessThan(4 * meanError);
  });
});

describe('runSampler: one seed, one answer', () => {
  const settings: SamplerSettings = { dimensions: 3, seed: 42, effectiveSize: 100 };
  const density: Density = (z) => standard(z.map((x, j) => (x - 0.2 * j) * (j + 2)));

  it('whoever evaluates: one, two, three at a time, in any order, later or at once', async () => {
    const alone = await sampled(density, settings);
    for (const workers of [2, 3]) {
      const sampler = openSampler(settings);
      await runSampler(sampler, async (points) => {
        const out = new Float64Array(points.length);
        const share = Array.from({ length: workers }, (_, w) => points.map((_p, i) => i).filter((i) => i % workers === w));
        await Promise.all(
          share.reverse().map(async (indices) => {
            await Promise.resolve();
            for (const i of indices.reverse()) out[i] = density(points[i]);
          }),
        );
        return out;
      });
      expect(sampler.state).toEqual(alone.state);
    }
  });

  it('another seed, another run', async () => {
    const other = await sampled(density, { ...settings, seed: 43 });
    const alone = await sampled(density, settings);
    expect(other.state.chains).not.toEqual(alone.state.chains);
  });

  it('saved as JSON at any generation, with points out or not, it goes on bit for bit', async () => {
    const whole = await sampled(density, settings);
    for (const stop of [0, 1, 5, 40, 90]) {
      for (const asked of [false, true]) {
        const first = openSampler(settings);
        for (let k = 0; k < stop && first.state.phase !== 'done'; k++) first.accept(first.propose().map(density));
        if (asked) first.propose();
        const saved = JSON.parse(JSON.stringify(first.state)) as SamplerState;
        const second = openSampler(saved);
        await runSampler(second, each(density));
        expect(JSON.stringify(second.state)).toBe(JSON.stringify(whole.state));
      }
    }
  });
});
