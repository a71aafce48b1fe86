import { normalQuantile } from '../../numeric/normal.js';
import type { MoveRandom } from './moves.js';
import type { Member } from './state.js';

/**
 * Latin hypercube of normal scores: in each dimension one point in each of `count` equally likely strata.
 * @returns [count][dimensions], standard normal times `spread`
 * @source McKay, Beckman & Conover (1979), Technometrics 21:239–245
 */
export function hypercube(count: number, dimensions: number, spread: number, random: MoveRandom): number[][] {
  const points = Array.from({ length: count }, () => new Array<number>(dimensions).fill(0));
  for (let j = 0; j < dimensions; j++) {
    const strata = points.map((_, i) => i);
    for (let i = count - 1; i > 0; i--) {
      const other = random.integer(i + 1);
      [strata[i], strata[other]] = [strata[other], strata[i]];
    }
    // 1 − u lies in (0, 1], so that no score is infinite below; the clamp keeps it from being so above
    for (let i = 0; i < count; i++) {
      const share = (strata[i] + (1 - random.uniform())) / count;
      points[i][j] = spread * normalQuantile(Math.min(share, 1 - 1e-9));
    }
  }
  return points;
}

/**
 * One generation of differential evolution: each member is pulled towards one of the better ones and shifted by a difference of two
 * others.
 * @source Storn & Price (1997), Journal of Global Optimization 11:341–359; the pull: Zhang & Sanderson (2009), IEEE Trans. Evol. Comput.
 *   13:945–958
 */
export function proposeSearch(population: readonly Member[], random: MoveRandom): number[][] {
  const count = population.length;
  const order = Array.from(population.keys()).sort((a, b) => population[b].logDensity - population[a].logDensity || a - b);
  const better = Math.max(2, Math.ceil(0.2 * count));
  return population.map(({ point }) => {
    const guide = population[order[random.integer(better)]].point;
    const plus = population[random.integer(count)].point;
    const minus = population[random.integer(count)].point;
    const factor = 0.5 + 0.4 * random.uniform();
    const forced = random.integer(point.length);
    return point.map((x, j) => (random.uniform() < 0.9 || j === forced ? x + factor * (guide[j] - x) + factor * (plus[j] - minus[j]) : x));
  });
}

/** Keeps the better of each member and its trial. */
export function acceptSearch(population: readonly Member[], points: readonly number[][], logDensities: ArrayLike<number>): Member[] {
  return population.map((member, i) => (logDensities[i] > member.logDensity ? { point: points[i], logDensity: logDensities[i] } : member));
}

/**
 * Whether the population is spread like the posterior: log densities of a normal posterior lie about d/2 below the mode, so that a
 * median d below the best (2 at least) covers it with some to spare, while a collapsed population would teach too short moves.
 */
export function isSettled(population: readonly Member[], dimensions: number): boolean {
  const sorted = population.map((member) => member.logDensity).sort((a, b) => b - a);
  return sorted[0] - sorted[sorted.length >> 1] <= Math.max(2, dimensions);
}

/** Chains' first states: members at random, without repetition, of those within 3 d (6 at least) of the best, or the best ones. */
export function chooseChains(population: readonly Member[], chains: number, dimensions: number, random: MoveRandom): Member[] {
  const ordered = [...population].sort((a, b) => b.logDensity - a.logDensity);
  const limit = ordered[0].logDensity - 3 * Math.max(2, dimensions);
  const near = ordered.filter((member, i) => member.logDensity >= limit || i < chains);
  return Array.from({ length: chains }, () => near.splice(random.integer(near.length), 1)[0]);
}
