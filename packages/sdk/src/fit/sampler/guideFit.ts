import { logSumExp } from '../leaveOneOut.js';
import { type Guide, type GuidePart, guideLogDensity, guidePart, partLogDensity } from './guide.js';

/** Parts follow the posterior closely; each has a skirt, and all have one wide part, whose heavy tails let a chain that strayed go again. */
const DEGREES = 10;
const WIDE_DEGREES = 4;
const WIDE_WEIGHT = 0.05;
const WIDE_STRETCH = 1.5;
const SKIRT_SHARE = 0.25;
const SKIRT_STRETCH = 2;
const MOST_PARTS = 8;
const MOST_POINTS = 400;
const ROUNDS = 10;

type Points = readonly (readonly number[])[];

/**
 * A guide fitted to points: the number of parts (1 to 8) is the one under which points of other chains are likeliest, each half of the
 * chains judging the fit to the other.
 * @param chains  [c][n][d] points chain by chain, 2 chains or more
 * @returns null if there are too few distinct points to shape even one part
 */
export function fitGuide(chains: readonly Points[]): Guide | null {
  const all = thinned(chains.flat());
  if (all.length < 5 * (all[0]?.length ?? Infinity)) return null;
  const halves = [0, 1].map((half) => thinned(chains.filter((_, c) => c % 2 === half).flat()));
  let best: { parts: number; score: number } | null = null;
  let worse = 0;
  for (let parts = 1; parts <= MOST_PARTS && all.length >= 10 * parts * all[0].length; parts++) {
    const fits = halves.map((half) => fitMixture(half, parts));
    if (!fits[0] || !fits[1]) break;
    const score = meanLogDensity(fits[0], halves[1]) + meanLogDensity(fits[1], halves[0]);
    if (best && score <= best.score) {
      if (++worse === 2) break;
    } else {
      best = { parts, score };
      worse = 0;
    }
  }
  return fitMixture(all, best?.parts ?? 1) ?? fitMixture(all, 1);
}

function meanLogDensity(guide: Guide, points: Points): number {
  return points.reduce((sum, point) => sum + guideLogDensity(guide, point), 0) / points.length;
}

/** Expectation–maximisation from slices along the direction of greatest spread; covariances are drawn towards that of all points. */
function fitMixture(points: Points, parts: number): Guide | null {
  const whole = momentsOf(
    points,
    points.map(() => 1),
  );
  const wide = whole && partOf(WIDE_WEIGHT, whole, WIDE_STRETCH, WIDE_DEGREES);
  if (!whole || !wide) return null;
  const share = (1 - WIDE_WEIGHT) / parts;
  let mixture: GuidePart[] = [];
  let responsibilities = slices(points, whole, parts);
  for (let round = 0; round <= (parts > 1 ? ROUNDS : 0); round++) {
    const next: GuidePart[] = [];
    for (const weights of responsibilities) {
      const moments = momentsOf(points, weights);
      const part = moments && partOf((moments.total / points.length) * (1 - WIDE_WEIGHT), shrunk(moments, whole, parts), 1, DEGREES);
      if (!part || part.weight < 0.1 * share) return null;
      next.push(part);
    }
    mixture = next;
    responsibilities = responsibilitiesOf(points, mixture);
  }
  const cores = mixture.map(({ weight, mean, root }) => guidePart(weight * (1 - SKIRT_SHARE), DEGREES, mean, root));
  const skirts = mixture.map(({ weight, mean, root }) => guidePart(weight * SKIRT_SHARE, WIDE_DEGREES, mean, scaled(root, SKIRT_STRETCH)));
  return { parts: [...cores, ...skirts, wide] };
}

function responsibilitiesOf(points: Points, mixture: readonly GuidePart[]): number[][] {
  const shares = mixture.map(() => new Array<number>(points.length));
  points.forEach((point, i) => {
    const logs = mixture.map((part) => partLogDensity(part, point));
    const total = logSumExp(logs);
    for (let k = 0; k < logs.length; k++) shares[k][i] = Math.exp(logs[k] - total);
  });
  return shares;
}

interface Moments {
  total: number;
  mean: number[];
  covariance: number[][];
}

function momentsOf(points: Points, weights: ArrayLike<number>): Moments | null {
  const dimensions = points[0].length;
  let total = 0;
  for (let i = 0; i < points.length; i++) total += weights[i];
  if (!(total > 0)) return null;
  const mean = new Array<number>(dimensions).fill(0);
  for (let i = 0; i < points.length; i++) {
    for (let j = 0; j < dimensions; j++) mean[j] += (weights[i] * points[i][j]) / total;
  }
  const covariance = mean.map(() => new Array<number>(dimensions).fill(0));
  for (let i = 0; i < points.length; i++) {
    const point = points[i];
    for (let j = 0; j < dimensions; j++) {
      const share = (weights[i] * (point[j] - mean[j])) / total;
      for (let k = 0; k <= j; k++) covariance[j][k] += share * (point[k] - mean[k]);
    }
  }
  return { total, mean, covariance };
}

/** As if d + 2 more points had the spread of one slice of the whole. */
function shrunk(moments: Moments, whole: Moments, parts: number): Moments {
  const extra = moments.mean.length + 2;
  const slice = parts ** (-2 / moments.mean.length);
  const covariance = moments.covariance.map((row, j) =>
    row.map((x, k) => (moments.total * x + extra * slice * whole.covariance[j][k]) / (moments.total + extra)),
  );
  return { ...moments, covariance };
}

function partOf(weight: number, { mean, covariance }: Moments, stretch: number, degrees: number): GuidePart | null {
  const root = cholesky(scaled(covariance, stretch * stretch));
  return root && guidePart(weight, degrees, mean, root);
}

function scaled(matrix: readonly number[][], factor: number): number[][] {
  return matrix.map((row) => row.map((x) => factor * x));
}

/** Equal slices of the points along the direction of greatest spread, as weights of 0 and 1. */
function slices(points: Points, { mean, covariance }: Moments, parts: number): number[][] {
  const direction = widestDirection(covariance);
  const along = points.map((point) => point.reduce((sum, x, j) => sum + (x - mean[j]) * direction[j], 0));
  const order = along.map((_, i) => i).sort((a, b) => along[a] - along[b] || a - b);
  const slice = new Array<number>(points.length);
  order.forEach((i, rank) => (slice[i] = Math.floor((rank * parts) / points.length)));
  return Array.from({ length: parts }, (_, k) => points.map((__, i) => (slice[i] === k ? 1 : 0)));
}

/** Leading eigenvector by power iteration; a rough one serves. */
function widestDirection(covariance: readonly number[][]): number[] {
  let direction = covariance.map((_, j) => Math.sqrt(covariance[j][j]));
  for (let round = 0; round < 50; round++) {
    const next = direction.map((_, j) => direction.reduce((sum, x, k) => sum + covariance[Math.max(j, k)][Math.min(j, k)] * x, 0));
    const size = Math.hypot(...next);
    direction = next.map((x) => x / size);
  }
  return direction;
}

function cholesky(lower: readonly number[][]): number[][] | null {
  const root = lower.map((row) => row.slice());
  for (let j = 0; j < root.length; j++) {
    for (let k = 0; k <= j; k++) {
      let sum = lower[j][k];
      for (let i = 0; i < k; i++) sum -= root[j][i] * root[k][i];
      if (k < j) root[j][k] = sum / root[k][k];
      else if (!(sum > 1e-10 * lower[j][j])) return null;
      else root[j][j] = Math.sqrt(sum);
    }
  }
  return root;
}

/** Evenly spread points, bounded in number so that the fit's cost is. */
function thinned(points: Points): Points {
  if (points.length <= MOST_POINTS) return points;
  return Array.from({ length: MOST_POINTS }, (_, i) => points[Math.floor((i * points.length) / MOST_POINTS)]);
}
