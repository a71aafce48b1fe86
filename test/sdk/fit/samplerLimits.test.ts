import { describe, expect, it } from 'vitest';
import { keptDraws, runSampler, samplerProgress, summariseSampler } from '../../../packages/sdk/src/fit/sampler/run.js';
import { openSampler } from '../../../packages/sdk/src/fit/sampler/sampler.js';
import type { SamplerState } from '../../../packages/sdk/src/fit/sampler/state.js';

const standard = (z: number[]): number => z.reduce((sum, x) => sum - 0.5 * x * x, 0);
const code = (value: string): Error => expect.objectContaining({ code: value }) as Error;

describe('openSampler(settings)', () => {
  it.each([
    ['setting', { dimensions: 0, seed: 1 }],
    ['setting', { dimensions: 2, seed: 1.5 }],
    ['setting', { dimensions: 2, seed: 1, chains: 2 }],
    ['unknown-field', { dimensions: 2, seed: 1, chain: 4 }],
  ])('throws %s for %j', (expected, settings) => {
    expect(() => openSampler(settings)).toThrow(code(expected));
  });

  it('throws sampler-state for a state it did not write, and leaves a saved one as it was', () => {
    const saved = openSampler({ dimensions: 2, seed: 1 }).state;
    expect(() => openSampler({ ...saved, version: 2 } as unknown as SamplerState)).toThrow(code('sampler-state'));
    const before = JSON.stringify(saved);
    const reopened = openSampler(saved);
    reopened.accept(reopened.propose().map(standard));
    expect(JSON.stringify(saved)).toBe(before);
  });
});

describe('accept(logDensities)', () => {
  it('throws shape for a wrong number or without points out, log-density for NaN or +Infinity', () => {
    const sampler = openSampler({ dimensions: 2, seed: 1 });
    expect(() => sampler.accept([0])).toThrow(code('shape'));
    const points = sampler.propose();
    expect(() => sampler.accept([0])).toThrow(code('shape'));
    expect(() => sampler.accept(points.map(() => NaN))).toThrow(code('log-density'));
    expect(() => sampler.accept(points.map(() => Infinity))).toThrow(code('log-density'));
    // refused answers change nothing: the same points are still out
    expect(sampler.propose()).toEqual(points);
  });
});

describe('runSampler at its limits', () => {
  it('a density without a possible point ends as noPossiblePoint, counted', async () => {
    const sampler = openSampler({ dimensions: 2, seed: 1 });
    await runSampler(sampler, (points) => points.map(() => -Infinity));
    const { outcome, converged, prior, draws, best } = summariseSampler(sampler.state);
    expect({ outcome, converged, draws, best }).toEqual({ outcome: 'noPossiblePoint', converged: false, draws: 0, best: null });
    expect(prior.tried).toBe(20 * 24);
    expect(prior.impossible).toBe(prior.tried);
  });

  it('a small possible corner is found', async () => {
    const sampler = openSampler({ dimensions: 2, seed: 1, effectiveSize: 100 });
    await runSampler(sampler, (points) => points.map((z) => (z[0] > 1.2 && z[1] > 0.5 ? standard(z) : -Infinity)));
    const { outcome, prior } = summariseSampler(sampler.state);
    expect(outcome).toBe('converged');
    // Φ(−1.2) Φ(−0.5) = 0.0355
    expect(1 - prior.impossible / prior.tried).toBeCloseTo(0.0355, 1);
  });

  it('too few evaluations: capped, not converged, with what there is', async () => {
    const sampler = openSampler({ dimensions: 4, seed: 1, evaluations: 600 });
    await runSampler(sampler, (points) => points.map(standard));
    const summary = summariseSampler(sampler.state);
    expect(summary).toMatchObject({ outcome: 'capped', converged: false });
    expect(summary.evaluations).toBeGreaterThanOrEqual(600);
    expect(summary.evaluations).toBeLessThan(630);
  });

  it('chains on two peaks that no move joins are not called converged', async () => {
    const peaks = (z: number[]): number => Math.max(...[-1.5, 1.5].map((c) => z.reduce((s, x) => s - 0.5 * ((x - c) / 0.002) ** 2, 0)));
    const sampler = openSampler({ dimensions: 6, seed: 5, evaluations: 6000, searchGenerations: 60, population: 40 });
    // the two halves of the population are kept apart by starting each chain on its own peak
    while (sampler.state.phase === 'start' || sampler.state.phase === 'search') sampler.accept(sampler.propose().map(peaks));
    const { state } = sampler;
    state.chains = state.chains.map((_, c) => ({ point: new Array<number>(6).fill(c % 2 ? 1.5 : -1.5), logDensity: 0 }));
    state.archive = state.archive.map((_, i) => new Array<number>(6).fill(i % 2 ? 1.5 : 1.501));
    await runSampler(sampler, (points) => points.map(peaks));
    expect(state.outcome).toBe('capped');
  });

  it('aborted: throws at once, keeps the state, goes on to the same end', async () => {
    const settings = { dimensions: 2, seed: 7, effectiveSize: 100 };
    const whole = openSampler(settings);
    await runSampler(whole, (points) => points.map(standard));

    const sampler = openSampler(settings);
    const controller = new AbortController();
    let calls = 0;
    const never = new Promise<number[]>(() => undefined);
    const run = runSampler(
      sampler,
      (points) => {
        if (++calls < 30) return Promise.resolve(points.map(standard));
        controller.abort();
        return never;
      },
      { signal: controller.signal },
    );
    await expect(run).rejects.toThrow(code('aborted'));
    expect(keptDraws(sampler.state, 10).points.length).toBeLessThanOrEqual(10);
    await runSampler(sampler, (points) => points.map(standard));
    expect(sampler.state).toEqual(whole.state);
  });

  it('progress rises to 1', async () => {
    const shares: number[] = [];
    const sampler = openSampler({ dimensions: 2, seed: 7 });
    await runSampler(sampler, (points) => points.map(standard), { onProgress: ({ share }) => shares.push(share) });
    expect(shares.at(-1)).toBe(1);
    expect(shares.every((share) => share >= 0 && share <= 1)).toBe(true);
    expect(samplerProgress(sampler.state)).toMatchObject({ phase: 'done' });
    expect(samplerProgress(sampler.state).acceptance).toBeGreaterThan(0.1);
  });

  it('keptDraws(state, count) are spread evenly over all draws', async () => {
    const sampler = openSampler({ dimensions: 1, seed: 7 });
    await runSampler(sampler, (points) => points.map(standard));
    const all = keptDraws(sampler.state);
    const some = keptDraws(sampler.state, 50);
    expect(some.points).toHaveLength(50);
    const places = some.logDensities.map((value) => all.logDensities.indexOf(value));
    expect(Math.max(...places)).toBeGreaterThan(0.9 * all.points.length);
    expect(keptDraws(sampler.state, 1e9).points).toHaveLength(all.points.length);
  });
});
