import { type Guide, drawGuide, guideLogDensity } from './guide.js';

export type MoveName = 'difference' | 'snooker' | 'guided';

/** Where a chain would go, and what decides. */
export interface Proposal {
  move: MoveName;
  point: number[];
  /** log of the Hastings factor: added to the difference of log densities. */
  correction: number;
  /** log of the uniform number below which the ratio must not lie; drawn with the proposal so that evaluation order cannot matter. */
  threshold: number;
}

/** What moves need of a seeded generator. */
export interface MoveRandom {
  /** Uniform on [0, 1). */
  uniform(): number;
  normal(): number;
  /** Whole number of 0 … count − 1. */
  integer(count: number): number;
}

/** Shares of the three moves, sum 1. */
export type MoveShares = Record<MoveName, number>;

/**
 * One proposal. Each kind alone leaves the target unchanged given the archive and the guide, so any mixture of them does.
 * @param archive  past states, 3 or more
 * @source difference and snooker moves: ter Braak & Vrugt (2008), Statistics and Computing 18:435–446; guided: independence
 *   Metropolis–Hastings, Tierney (1994), Annals of Statistics 22:1701–1762
 */
export function proposeMove(
  from: readonly number[],
  archive: readonly (readonly number[])[],
  guide: Guide | null,
  shares: MoveShares,
  random: MoveRandom,
): Proposal {
  const choice = random.uniform();
  const threshold = Math.log(1 - random.uniform());
  if (guide && choice < shares.guided) return guidedMove(from, guide, threshold, random);
  if (choice < shares.guided + shares.snooker) return snookerMove(from, archive, threshold, random);
  return differenceMove(from, archive, threshold, random);
}

/**
 * x* = x + γ (1 + ε) (z₁ − z₂) + e on a random subset of the unknowns, γ = 2.38/√(2 d′), every tenth time γ = 1 (jumps between modes).
 * Symmetric: z₁ − z₂ is as likely as z₂ − z₁, and the subset does not depend on x.
 */
function differenceMove(from: readonly number[], archive: readonly (readonly number[])[], threshold: number, random: MoveRandom): Proposal {
  const [first, second] = distinctPair(archive.length, random);
  const crossover = (1 + random.integer(3)) / 3;
  const forced = random.integer(from.length);
  const moving = from.map((_, j) => random.uniform() < crossover || j === forced);
  const count = moving.filter(Boolean).length;
  const full = random.uniform() < 0.1;
  const gamma = (full ? 1 : 2.38 / Math.sqrt(2 * count)) * (1 + 0.1 * (random.uniform() - 0.5));
  const point = from.map((x, j) => {
    const jitter = 1e-5 * random.normal();
    return moving[j] ? x + gamma * (archive[first][j] - archive[second][j]) + jitter : x;
  });
  return { move: 'difference', point, correction: 0, threshold };
}

/**
 * x* = x + γ ((z₁ − z₂)·u) u along the line from an archived z to x, u = (x − z)/‖x − z‖, γ uniform on 1.2…2.2; Hastings factor
 * (‖x* − z‖/‖x − z‖)^(d−1). Where z is x itself the chain stays.
 */
function snookerMove(from: readonly number[], archive: readonly (readonly number[])[], threshold: number, random: MoveRandom): Proposal {
  const pivot = archive[random.integer(archive.length)];
  const [first, second] = distinctPair(archive.length, random);
  const gamma = 1.2 + random.uniform();
  const before = distance(from, pivot);
  if (before === 0) return { move: 'snooker', point: from.slice(), correction: 0, threshold };
  let along = 0;
  for (let j = 0; j < from.length; j++) along += ((archive[first][j] - archive[second][j]) * (from[j] - pivot[j])) / before;
  const point = from.map((x, j) => x + (gamma * along * (x - pivot[j])) / before);
  const after = distance(point, pivot);
  return { move: 'snooker', point, correction: (from.length - 1) * Math.log(after / before), threshold };
}

/** x* from the guide, whatever x; Hastings factor q(x)/q(x*). */
function guidedMove(from: readonly number[], guide: Guide, threshold: number, random: MoveRandom): Proposal {
  const point = drawGuide(guide, random);
  return { move: 'guided', point, correction: guideLogDensity(guide, from) - guideLogDensity(guide, point), threshold };
}

function distinctPair(count: number, random: MoveRandom): [number, number] {
  const first = random.integer(count);
  const second = random.integer(count - 1);
  return [first, second >= first ? second + 1 : second];
}

function distance(a: readonly number[], b: readonly number[]): number {
  let sum = 0;
  for (let j = 0; j < a.length; j++) sum += (a[j] - b[j]) ** 2;
  return Math.sqrt(sum);
}
