import { RillageError } from '../errors.js';
import { fitParetoTail, paretoQuantile } from './paretoTail.js';

/** How well draws predict each sample when it is left out. */
export interface LeaveOneOut {
  /** Σ of `pointwise`: expected log predictive density; higher predicts better. */
  elpd: number;
  /** Standard error of `elpd` from the spread between samples. */
  standardError: number;
  /** [N] log predictive density of each sample given all others. */
  pointwise: Float64Array;
  /** [N] shape of the tail of the importance ratios; the weights of a sample are not to be trusted above `shapeLimit`. */
  shape: Float64Array;
  /** min(1 − 1/log₁₀ S, 0.7) for S draws. */
  shapeLimit: number;
  /** Indices of samples whose shape exceeds the limit: highly influential ones. */
  unreliable: number[];
  /** Effective number of parameters: lpd − elpd. */
  effectiveParameters: number;
}

/**
 * Pareto-smoothed importance-sampling leave-one-out.
 *
 *     elpd_i = log Σ_s w_is p(y_i | θ_s) / Σ_s w_is,   w_is the smoothed ratios 1 / p(y_i | θ_s)
 *
 * @param logLikelihoods  [S draws][N samples] log p(y_i | θ_s); S ≥ 25, all finite
 * @param options.relativeEfficiency  effective draws / S, sets the tail's length; default 1
 * @throws RillageError 'too-few-draws' | 'shape' | 'not-finite', with the first bad place
 * @source Vehtari, Gelman & Gabry (2017), Statistics and Computing 27:1413–1432; limits of the shape: Vehtari et al. (2024), J. Mach.
 *   Learn. Res. 25(72)
 */
export function leaveOneOut(logLikelihoods: readonly ArrayLike<number>[], options: { relativeEfficiency?: number } = {}): LeaveOneOut {
  const draws = logLikelihoods.length;
  const samples = logLikelihoods[0]?.length ?? 0;
  checkMatrix(logLikelihoods, samples);
  const pointwise = new Float64Array(samples);
  const shape = new Float64Array(samples);
  const own = new Float64Array(draws);
  let fitted = 0;
  for (let i = 0; i < samples; i++) {
    for (let s = 0; s < draws; s++) own[s] = logLikelihoods[s][i];
    const smoothed = smoothWeights(
      own.map((x) => -x),
      options.relativeEfficiency ?? 1,
    );
    shape[i] = smoothed.shape;
    pointwise[i] = logSumExp(smoothed.logWeights.map((w, s) => w + own[s]));
    fitted += logSumExp(own) - Math.log(draws);
  }
  const elpd = pointwise.reduce((a, b) => a + b, 0);
  const mean = elpd / samples;
  const spread = pointwise.reduce((sum, x) => sum + (x - mean) ** 2, 0) / (samples - 1);
  const shapeLimit = Math.min(1 - 1 / Math.log10(draws), 0.7);
  const unreliable = Array.from(shape.keys()).filter((i) => !(shape[i] <= shapeLimit));
  return { elpd, standardError: Math.sqrt(samples * spread), pointwise, shape, shapeLimit, unreliable, effectiveParameters: fitted - elpd };
}

/** Importance weights made safe. */
export interface SmoothedWeights {
  /** [S] normalised: their exponentials add up to 1. */
  logWeights: Float64Array;
  /** Of the fitted tail; Infinity when the tail could not be fitted, −Infinity when all weights are equal. */
  shape: number;
}

/**
 * Pareto smoothing of importance ratios: the largest ones are replaced by quantiles of a generalised Pareto fitted to them, none above
 * the largest raw one.
 * @param logRatios  [S] up to a constant
 * @param relativeEfficiency  effective draws / S
 * @source Vehtari et al. (2024), J. Mach. Learn. Res. 25(72), section 2
 */
export function smoothWeights(logRatios: ArrayLike<number>, relativeEfficiency = 1): SmoothedWeights {
  const draws = logRatios.length;
  const raw = Float64Array.from(logRatios);
  const greatest = raw.reduce((a, b) => Math.max(a, b), -Infinity);
  const least = raw.reduce((a, b) => Math.min(a, b), Infinity);
  for (let s = 0; s < draws; s++) raw[s] -= greatest;
  let shape = greatest - least <= 1e-12 ? -Infinity : Infinity;
  const tailLength = Math.ceil(Math.min(0.2 * draws, 3 * Math.sqrt(draws / relativeEfficiency)));
  if (shape === Infinity && tailLength >= 5) {
    const order = Array.from(raw.keys()).sort((a, b) => raw[a] - raw[b] || a - b);
    const tail = order.slice(draws - tailLength);
    const threshold = Math.exp(raw[order[draws - tailLength - 1]]);
    const fit = fitParetoTail(tail.map((s) => Math.exp(raw[s]) - threshold));
    if (Number.isFinite(fit.shape)) {
      shape = fit.shape;
      tail.forEach((s, rank) => {
        raw[s] = Math.min(0, Math.log(threshold + paretoQuantile(fit, (rank + 0.5) / tailLength)));
      });
    }
  }
  const total = logSumExp(raw);
  return { logWeights: raw.map((w) => w - total), shape };
}

/** log Σ exp(x_i) without overflow; −Infinity for none. */
export function logSumExp(values: ArrayLike<number>): number {
  let greatest = -Infinity;
  for (let i = 0; i < values.length; i++) if (values[i] > greatest) greatest = values[i];
  if (greatest === -Infinity) return -Infinity;
  let sum = 0;
  for (let i = 0; i < values.length; i++) sum += Math.exp(values[i] - greatest);
  return greatest + Math.log(sum);
}

function checkMatrix(rows: readonly ArrayLike<number>[], samples: number): void {
  if (rows.length < 25)
    throw new RillageError({ code: 'too-few-draws', path: 'logLikelihoods', expected: '25 draws or more', received: String(rows.length) });
  for (let s = 0; s < rows.length; s++) {
    const path = `logLikelihoods[${s}]`;
    if (rows[s].length !== samples)
      throw new RillageError({ code: 'shape', path, expected: `${samples} samples`, received: String(rows[s].length) });
    for (let i = 0; i < samples; i++) {
      if (!Number.isFinite(rows[s][i]))
        throw new RillageError({ code: 'not-finite', path: `${path}[${i}]`, expected: 'a finite number', received: String(rows[s][i]) });
    }
  }
}
