import { leastSquares, type LinearFit } from './leastSquares.js';
import { quantileSorted } from './quantile.js';

/** A robust fit: `weights` [n] says how much each row counted in the end, 1 fully, 0 not at all. */
export interface RobustFit extends LinearFit {
  weights: Float64Array;
  /** Whether the coefficients settled to 1e-9 of their standard errors within 100 rounds. */
  settled: boolean;
}

/**
 * Linear regression in which rows far from the rest count less: least squares repeated, each time with weights from the last
 * residuals r, in units of their spread s = median |r| / 0.6745.
 *
 * - `huber`: weight min(1, 1.345 s/|r|); a unique answer, still moved somewhat by gross outliers.
 * - `tukey`: weight (1 − (r/4.685 s)²)², 0 beyond; ignores gross outliers. Started from the Huber answer.
 *
 * Both have 95 % of the efficiency of least squares if the errors are normal. The covariance is s²·Σψ²/(n−p)/(Σψ′/n)²·(XᵀX)⁻¹.
 *
 * @param design       [n×p] row-major; n > p
 * @param observations [n]
 * @param shape        which weights
 * @returns the fit; undefined as for {@link leastSquares}, or if so many rows have weight 0 that the rest do not determine it
 * @source P. Huber 1981, Robust Statistics, sections 7.6 and 7.8 (from memory); J. Tukey's biweight
 */
export function robustLeastSquares(
  design: ArrayLike<number>,
  observations: ArrayLike<number>,
  shape: 'huber' | 'tukey' = 'huber',
): RobustFit | undefined {
  const plain = leastSquares(design, observations);
  const n = observations.length;
  const p = design.length / n;
  if (!plain || n <= p) return undefined;
  const huber = iterate(design, observations, plain, huberWeight);
  const fit = huber && shape === 'tukey' ? iterate(design, observations, huber, tukeyWeight) : huber;
  if (!fit) return undefined;

  const spread = spreadOf(fit.residuals);
  let squares = 0;
  let slopes = 0;
  for (const residual of fit.residuals) {
    const z = spread > 0 ? residual / spread : 0;
    squares += (spread * z * (shape === 'tukey' ? tukeyWeight(z) : huberWeight(z))) ** 2;
    slopes += shape === 'tukey' ? tukeySlope(z) : Math.abs(z) <= HUBER ? 1 : 0;
  }
  const variance = squares / (n - p) / (slopes / n) ** 2;
  // The plain fit holds s²·(XᵀX)⁻¹ of its own.
  const factor = variance / plain.residualSd ** 2;
  const covariance = plain.residualSd > 0 ? plain.covariance.map((entry) => entry * factor) : plain.covariance;
  return { ...fit, covariance, residualSd: spread };
}

const HUBER = 1.345;
const TUKEY = 4.685;

function iterate(
  design: ArrayLike<number>,
  observations: ArrayLike<number>,
  start: LinearFit,
  weightOf: (z: number) => number,
): RobustFit | undefined {
  let fit = start;
  for (let round = 0; ; round++) {
    const spread = spreadOf(fit.residuals);
    const weights = fit.residuals.map((residual) => (spread > 0 ? weightOf(residual / spread) : 1));
    if (!(spread > 0) || round === 100) return { ...fit, weights, settled: !(spread > 0) };
    const next = leastSquares(design, observations, weights);
    if (!next) return undefined;
    const p = next.coefficients.length;
    const settled = next.coefficients.every((c, j) => Math.abs(c - fit.coefficients[j]) <= 1e-9 * Math.sqrt(next.covariance[j * p + j]));
    fit = next;
    if (settled) return { ...fit, weights, settled };
  }
}

/** Standard deviation of normal residuals, from the median of their sizes. */
function spreadOf(residuals: Float64Array): number {
  return quantileSorted(residuals.map(Math.abs).sort(), 0.5) / 0.6744897501960817;
}

function huberWeight(z: number): number {
  return Math.min(1, HUBER / Math.abs(z));
}

function tukeyWeight(z: number): number {
  return Math.abs(z) < TUKEY ? (1 - (z / TUKEY) ** 2) ** 2 : 0;
}

/** Derivative of z·{@link tukeyWeight}. */
function tukeySlope(z: number): number {
  const square = (z / TUKEY) ** 2;
  return square < 1 ? (1 - square) * (1 - 5 * square) : 0;
}
