import { describe, expect, it } from 'vitest';
import { drawGuide, guideLogDensity } from '../../../packages/sdk/src/fit/sampler/guide.js';
import { fitGuide } from '../../../packages/sdk/src/fit/sampler/guideFit.js';
import { proposeMove } from '../../../packages/sdk/src/fit/sampler/moves.js';
import { Random } from '../../../packages/sdk/src/numeric/random.js';

/** Four chains of independent draws of a banana: x normal, y = x² + 0.3 normal. */
function bananaChains(random: Random, length: number): number[][][] {
  return Array.from({ length: 4 }, () =>
    Array.from({ length }, () => {
      const x = random.normal();
      return [x, x * x + 0.3 * random.normal()];
    }),
  );
}

describe('fitGuide(chains)', () => {
  const random = Random.fromSeed(12);
  const guide = fitGuide(bananaChains(random, 200));
  if (!guide) throw new Error('no guide');
  const logPi = Math.log(Math.PI);

  it('draws are distributed as its density says: the mean of p/q is 1 for any density p', () => {
    const target = ([x, y]: number[]): number => -0.5 * x * x - 0.5 * ((y - x * x) / 0.3) ** 2 - Math.log(2 * Math.PI * 0.3);
    const ratios = Array.from({ length: 40_000 }, () => {
      const point = drawGuide(guide, random);
      return Math.exp(target(point) - (guideLogDensity(guide, point) - logPi));
    });
    const mean = ratios.reduce((a, b) => a + b, 0) / ratios.length;
    const error = Math.sqrt(ratios.reduce((sum, r) => sum + (r - mean) ** 2, 0)) / ratios.length;
    expect(Math.abs(mean - 1)).toBeLessThan(4 * error);
    expect(error).toBeLessThan(0.01);
  });

  it('follows a curve with several parts, whose weights add up to one', () => {
    expect(guide.parts.length).toBeGreaterThan(3);
    expect(guide.parts.reduce((sum, part) => sum + part.weight, 0)).toBeCloseTo(1, 12);
  });

  it('is null for too few points and for points that lie in a plane', () => {
    expect(fitGuide([[[1, 2]], [[2, 3]]])).toBeNull();
    const flat = bananaChains(random, 50).map((chain) => chain.map(([x]) => [x, 2 * x]));
    expect(fitGuide(flat)).toBeNull();
  });
});

describe('proposeMove(from, archive, guide, shares, random)', () => {
  const random = Random.fromSeed(4);
  const archive = Array.from({ length: 40 }, () => [random.normal(), random.normal(), random.normal()]);

  it('a snooker move stays on the line through an archived state and carries (d − 1) log of the stretch', () => {
    const from = [0.2, -0.1, 0.4];
    for (let k = 0; k < 50; k++) {
      const { point, correction } = proposeMove(from, archive, null, { difference: 0, snooker: 1, guided: 0 }, random);
      const step = point.map((x, j) => x - from[j]);
      const fits = archive.some((pivot) => {
        const line = from.map((x, j) => x - pivot[j]);
        const t = step.reduce((sum, s, j) => sum + s * line[j], 0) / line.reduce((sum, l) => sum + l * l, 0);
        const onLine = step.every((s, j) => Math.abs(s - t * line[j]) < 1e-9);
        return onLine && Math.abs(correction - 2 * Math.log(Math.abs(1 + t))) < 1e-9;
      });
      expect(fits).toBe(true);
    }
  });

  it('from the archived state itself it stays', () => {
    const { point, correction } = proposeMove(
      archive[0],
      [archive[0], archive[0], archive[0]],
      null,
      { difference: 0, snooker: 1, guided: 0 },
      random,
    );
    expect([point, correction]).toEqual([archive[0], 0]);
  });

  it('a difference move is symmetric: no correction, as often forwards as back', () => {
    let forwards = 0;
    for (let k = 0; k < 4000; k++) {
      const { point, correction } = proposeMove([0, 0, 0], archive, null, { difference: 1, snooker: 0, guided: 0 }, random);
      expect(correction).toBe(0);
      const moved = point.find((x) => x !== 0) ?? 0;
      if (moved > 0) forwards++;
    }
    // four standard errors of a fair coin
    expect(Math.abs(forwards - 2000)).toBeLessThan(4 * Math.sqrt(1000));
  });
});
