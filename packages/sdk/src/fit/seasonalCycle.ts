import { RillageError } from '../errors.js';
import { type Matrix3, invert3, multiply3, weightedProducts } from './matrix3.js';

/** A seasonal cycle c(t) = mean + cosine · cos ωt + sine · sin ωt = mean + amplitude · cos(ωt − phase), with its errors. */
export interface SeasonalCycle {
  mean: number;
  cosine: number;
  sine: number;
  amplitude: number;
  /** Radians, [0, 2π). */
  phase: number;
  /** Standard errors. */
  meanError: number;
  amplitudeError: number;
  phaseError: number;
  /** [N] 0..1: what the robust step left of each sample's weight; 0 is an outlier. */
  kept: Float64Array;
  count: number;
}

export interface SeasonalCycleOptions {
  /** In the unit of the times. Default 365.2425 (days). */
  period?: number;
  /** [N] ≥ 0, e.g. the flow or rain that each sample stands for. Default equal. */
  weights?: ArrayLike<number>;
  /** Give wild samples less weight. Default true. */
  robust?: boolean;
}

/**
 * Sine fit to a seasonal tracer by iteratively reweighted least squares: Huber weights until near, then Tukey's bisquare with the
 * residuals' median absolute deviation as scale. Errors from the sandwich covariance of the estimator, so that volume weights, which
 * are no inverse variances, do not distort them.
 *
 * @param times   [N] in any one unit, N ≥ 5
 * @param values  [N] concentrations
 * @returns the cycle; errors in the unit of the values (phase: radians), 0 for a perfect fit
 * @throws RillageError 'shape' | 'not-finite' | 'negative' (a weight) | 'too-few-samples' | 'no-cycle' (times do not spread over the period)
 * @source model: Kirchner (2016), Hydrol. Earth Syst. Sci. 20:279–297; weights and constants: Holland & Welsch (1977), Communications in
 *   Statistics A6:813–827 (from memory); covariance: Huber (1981), Robust Statistics, section 7.6 (from memory)
 */
export function fitSeasonalCycle(times: ArrayLike<number>, values: ArrayLike<number>, options: SeasonalCycleOptions = {}): SeasonalCycle {
  const count = times.length;
  const volume = options.weights ? Float64Array.from(options.weights) : new Float64Array(count).fill(1);
  checkSeries(times, values, volume);
  const omega = (2 * Math.PI) / (options.period ?? 365.2425);
  const design = Array.from({ length: count }, (_, i) => [1, Math.cos(omega * times[i]), Math.sin(omega * times[i])]);
  const kept = new Float64Array(count).fill(1);
  let coefficients = solve(design, values, volume, kept);
  let scale = 0;
  if (options.robust ?? true) {
    for (let round = 0; round < ROUNDS; round++) {
      const rest = residuals(design, values, coefficients);
      scale = 1.4826 * medianOf(rest.filter((_, i) => volume[i] > 0).map(Math.abs));
      if (!(scale > 1e-12 * largest(values))) break;
      for (let i = 0; i < count; i++) kept[i] = round < HUBER_ROUNDS ? huber(rest[i] / scale) : bisquare(rest[i] / scale);
      const next = solve(design, values, volume, kept);
      const change = Math.max(...next.map((x, k) => Math.abs(x - coefficients[k])));
      coefficients = next;
      if (round > HUBER_ROUNDS && change <= 1e-12 * scale) break;
    }
  }
  const covariance = sandwich(design, residuals(design, values, coefficients), volume, kept, scale);
  const [mean, cosine, sine] = coefficients;
  const amplitude = Math.hypot(cosine, sine);
  const along = quadratic(covariance, cosine / amplitude, sine / amplitude);
  const across = quadratic(covariance, -sine / amplitude, cosine / amplitude);
  return {
    mean,
    cosine,
    sine,
    amplitude,
    phase: (Math.atan2(sine, cosine) + 2 * Math.PI) % (2 * Math.PI),
    meanError: Math.sqrt(covariance[0][0]),
    amplitudeError: Math.sqrt(along),
    phaseError: Math.sqrt(across) / amplitude,
    kept,
    count,
  };
}

const ROUNDS = 200;
/** The bisquare has several solutions; convex Huber rounds first bring it near the right one. */
const HUBER_ROUNDS = 10;

function huber(u: number): number {
  return Math.abs(u) <= 1.345 ? 1 : 1.345 / Math.abs(u);
}

function bisquare(u: number): number {
  const v = u / 4.685;
  return Math.abs(v) < 1 ? (1 - v * v) ** 2 : 0;
}

/** ψ′ of the bisquare: how the weighted residual answers to the residual. */
function bisquareSlope(u: number): number {
  const v = (u / 4.685) ** 2;
  return v < 1 ? (1 - v) * (1 - 5 * v) : 0;
}

function solve(design: number[][], values: ArrayLike<number>, volume: Float64Array, kept: Float64Array): number[] {
  const weights = volume.map((v, i) => v * kept[i]);
  const inverse = invert3(weightedProducts(design, weights));
  if (!inverse)
    throw new RillageError({
      code: 'no-cycle',
      path: 'times',
      expected: 'samples spread over the period',
      received: 'too few distinct phases',
    });
  const right = [0, 0, 0];
  design.forEach((row, i) => row.forEach((x, k) => (right[k] += weights[i] * x * values[i])));
  return inverse.map((row) => row[0] * right[0] + row[1] * right[1] + row[2] * right[2]);
}

function sandwich(design: number[][], rest: Float64Array, volume: Float64Array, kept: Float64Array, scale: number): Matrix3 {
  const robust = scale > 0;
  const bread = invert3(
    weightedProducts(
      design,
      volume.map((v, i) => v * (robust ? bisquareSlope(rest[i] / scale) : 1)),
    ),
  );
  const plain = invert3(
    weightedProducts(
      design,
      volume.map((v, i) => v * kept[i]),
    ),
  );
  const usable = bread && bread[0][0] > 0 && bread[1][1] > 0 && bread[2][2] > 0 ? bread : plain;
  if (!usable) throw new RillageError({ code: 'no-cycle', path: 'times', expected: 'samples spread over the period' });
  const meat = weightedProducts(
    design,
    volume.map((v, i) => (v * kept[i] * rest[i]) ** 2),
  );
  const product = multiply3(multiply3(usable, meat), usable);
  const used = kept.filter((k, i) => k > 0 && volume[i] > 0).length;
  const factor = used / Math.max(1, used - 3);
  return product.map((row) => row.map((x) => x * factor)) as Matrix3;
}

function quadratic(covariance: Matrix3, c: number, s: number): number {
  return c * c * covariance[1][1] + 2 * c * s * covariance[1][2] + s * s * covariance[2][2];
}

function residuals(design: number[][], values: ArrayLike<number>, coefficients: number[]): Float64Array {
  return Float64Array.from(
    values,
    (y, i) => y - design[i][0] * coefficients[0] - design[i][1] * coefficients[1] - design[i][2] * coefficients[2],
  );
}

function medianOf(values: Float64Array): number {
  const sorted = values.slice().sort();
  const half = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[half] : (sorted[half - 1] + sorted[half]) / 2;
}

function largest(values: ArrayLike<number>): number {
  let result = 0;
  for (let i = 0; i < values.length; i++) result = Math.max(result, Math.abs(values[i]));
  return result;
}

function checkSeries(times: ArrayLike<number>, values: ArrayLike<number>, volume: Float64Array): void {
  const count = times.length;
  if (values.length !== count || volume.length !== count) {
    throw new RillageError({ code: 'shape', expected: `${count} values and weights`, received: `${values.length} and ${volume.length}` });
  }
  for (let i = 0; i < count; i++) {
    if (!Number.isFinite(times[i]) || !Number.isFinite(values[i]) || !Number.isFinite(volume[i])) {
      throw new RillageError({ code: 'not-finite', path: `samples[${i}]`, expected: 'finite time, value and weight' });
    }
    if (volume[i] < 0)
      throw new RillageError({ code: 'negative', path: `weights[${i}]`, expected: '0 or more', received: String(volume[i]) });
  }
  const used = volume.filter((v) => v > 0).length;
  if (used < 5) throw new RillageError({ code: 'too-few-samples', path: 'times', expected: '5 samples or more', received: String(used) });
}
