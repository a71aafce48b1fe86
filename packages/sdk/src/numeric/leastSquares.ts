/** What a linear regression found. */
export interface LinearFit {
  /** [p] */
  coefficients: Float64Array;
  /** [p×p] row-major; for coefficients of units u_i it has units u_i·u_j. NaN where there are no degrees of freedom. */
  covariance: Float64Array;
  /** [n] observed minus fitted, in the unit of the observations. */
  residuals: Float64Array;
  /** √(Σ w r² / (n − p)), the standard deviation of a residual of weight 1; NaN if n = p. Rows of weight 0 are not counted in n. */
  residualSd: number;
}

/**
 * Weighted linear least squares: the coefficients c that make Σ wᵢ (yᵢ − Σⱼ Xᵢⱼ cⱼ)² least, by Householder reflections.
 *
 * The covariance is s² (XᵀWX)⁻¹ with s the {@link LinearFit.residualSd}: weights need only be right in proportion.
 *
 * @param design       [n×p] row-major; n ≥ p ≥ 1
 * @param observations [n]
 * @param weights      [n] ≥ 0, inverse variances up to a common factor; all 1 if left out
 * @returns the fit; undefined if the columns are linearly dependent (to 1e-12 of their lengths), or fewer than p rows have
 *          weight, or a number is not finite
 * @source G. Golub and C. Van Loan, Matrix Computations, section on full-rank least squares (from memory)
 */
export function leastSquares(
  design: ArrayLike<number>,
  observations: ArrayLike<number>,
  weights?: ArrayLike<number>,
): LinearFit | undefined {
  const n = observations.length;
  const p = design.length / n;
  if (!(Number.isInteger(p) && p >= 1 && n >= p)) return undefined;
  const a = new Float64Array(n * p);
  const y = new Float64Array(n);
  let counted = 0;
  for (let i = 0; i < n; i++) {
    const weight = weights ? weights[i] : 1;
    if (!(weight >= 0)) return undefined;
    if (weight > 0) counted++;
    const root = Math.sqrt(weight);
    y[i] = root * observations[i];
    for (let j = 0; j < p; j++) a[i * p + j] = root * design[i * p + j];
  }
  if (counted < p) return undefined;
  for (let j = 0; j < p; j++) if (!reflect(a, y, n, p, j)) return undefined;

  const coefficients = new Float64Array(p);
  for (let j = p - 1; j >= 0; j--) {
    let rest = y[j];
    for (let k = j + 1; k < p; k++) rest -= a[j * p + k] * coefficients[k];
    coefficients[j] = rest / a[j * p + j];
  }
  const residuals = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    residuals[i] = observations[i];
    for (let j = 0; j < p; j++) residuals[i] -= design[i * p + j] * coefficients[j];
  }
  // What is left of y below row p is the residual in turned axes.
  let square = 0;
  for (let i = p; i < n; i++) square += y[i] * y[i];
  if (!Number.isFinite(square) || !coefficients.every(Number.isFinite)) return undefined;
  const variance = counted > p ? square / (counted - p) : NaN;
  return { coefficients, covariance: scaledInverse(a, p, variance), residuals, residualSd: Math.sqrt(variance) };
}

/** Turns column j into a multiple of the j-th axis; false if nothing of the column is left to turn. */
function reflect(a: Float64Array, y: Float64Array, n: number, p: number, j: number): boolean {
  let above = 0;
  let square = 0;
  for (let i = 0; i < j; i++) above += a[i * p + j] ** 2;
  for (let i = j; i < n; i++) square += a[i * p + j] ** 2;
  const length = Math.sqrt(square);
  if (!(length > 1e-12 * Math.sqrt(above + square))) return false;
  // The sign that adds, so that the first entry of the mirror vector does not cancel.
  const diagonal = a[j * p + j] > 0 ? -length : length;
  const first = a[j * p + j] - diagonal;
  const scale = -1 / (diagonal * first);
  for (let k = j + 1; k <= p; k++) {
    let dot = first * (k < p ? a[j * p + k] : y[j]);
    for (let i = j + 1; i < n; i++) dot += a[i * p + j] * (k < p ? a[i * p + k] : y[i]);
    dot *= scale;
    if (k < p) a[j * p + k] -= dot * first;
    else y[j] -= dot * first;
    for (let i = j + 1; i < n; i++) {
      if (k < p) a[i * p + k] -= dot * a[i * p + j];
      else y[i] -= dot * a[i * p + j];
    }
  }
  a[j * p + j] = diagonal;
  return true;
}

/** variance·(RᵀR)⁻¹ from the upper triangle R left in the first p rows. */
function scaledInverse(r: Float64Array, p: number, variance: number): Float64Array {
  const inverse = new Float64Array(p * p);
  for (let column = 0; column < p; column++) {
    for (let i = column; i >= 0; i--) {
      let rest = i === column ? 1 : 0;
      for (let k = i + 1; k <= column; k++) rest -= r[i * p + k] * inverse[k * p + column];
      inverse[i * p + column] = rest / r[i * p + i];
    }
  }
  const covariance = new Float64Array(p * p);
  for (let i = 0; i < p; i++) {
    for (let j = 0; j < p; j++) {
      let dot = 0;
      for (let k = Math.max(i, j); k < p; k++) dot += inverse[i * p + k] * inverse[j * p + k];
      covariance[i * p + j] = variance * dot;
    }
  }
  return covariance;
}
