import { choleskyOf, eigenOfSymmetric, solveLower, type Matrix } from './matrix.js';

/** Draws widened by the doubt about single days of rain. */
export interface InputDoubt {
  /** [draws][unknowns] on the sampling scale. */
  points: number[][];
  /** [unknowns] standard deviation after over before, 1 or more. */
  widened: number[];
}

/**
 * Carries the doubt about the rain's daily concentrations into the draws. The likelihood takes residuals as independent, yet a day's
 * wrongly known rain shows in several samples and in every tracer at once. To first order a change r of the simulated samples moves the
 * draws by G r, G = Σ Jᵀ W, with Σ the draws' covariance, J the samples' response and W the inverse squared errors. Over redistributions
 * of the rain, r_m = s_m − s, the draws' covariance therefore gains
 *
 *     E = mean_m (G r_m)(G r_m)ᵀ − G D G ᵀ,   D = diag min(mean_m r_m², scale² − stated²)
 *
 * where D is the part that the fitted error already holds as if it were independent. Only directions in which E widens count. The draws
 * are stretched about their mean, z′ = z̄ + A (z − z̄), so that their covariance is Σ + E.
 *
 * @param points         [draws][unknowns] on the sampling scale
 * @param simulated      [draws][samples] at those points; columns with NaN (no flow) are left out
 * @param redistributed  [redistributions][samples] at `centre`, by `redistributed`
 * @param atCentre       [samples] simulated at `centre` with the filling that was fitted
 * @param scale          [samples] fitted error, the concentration's unit
 * @param stated         [samples] the laboratory's part of it
 * @source the sandwich covariance of a misspecified likelihood, Huber (1967); posterior draws adjusted to it: Ribatet, Cooley & Davison
 *   (2012), Statistica Sinica 22:813–845 (both from memory); E by own derivation
 */
export function carryInputDoubt(
  points: readonly number[][],
  simulated: readonly ArrayLike<number>[],
  redistributed: readonly ArrayLike<number>[],
  atCentre: ArrayLike<number>,
  scale: ArrayLike<number>,
  stated: ArrayLike<number>,
): InputDoubt {
  const unknowns = points[0].length;
  const mean = meanOf(points, unknowns);
  const sigma = covarianceOf(points, mean);
  const same = { points: points.map((z) => [...z]), widened: new Array<number>(unknowns).fill(1) };
  const lower = choleskyOf(sigma);
  if (lower === null || redistributed.length === 0) return same;
  const used = Array.from({ length: atCentre.length }, (_value, s) => s).filter(
    (s) => Number.isFinite(atCentre[s]) && scale[s] > 0 && redistributed.every((row) => Number.isFinite(row[s])),
  );
  // Cov(z, s_i) = Σ Jᵢᵀ where s is linear in z
  const gain = used.map((s) => {
    const centre = simulated.reduce((sum, row) => sum + row[s], 0) / simulated.length;
    return mean.map((m, j) => {
      let sum = 0;
      for (let d = 0; d < points.length; d++) sum += (points[d][j] - m) * (simulated[d][s] - centre);
      return sum / (points.length - 1) / scale[s] ** 2;
    });
  });
  const added: Matrix = mean.map(() => new Array<number>(unknowns).fill(0));
  const addProduct = (vector: readonly number[], weight: number): void => {
    for (let j = 0; j < unknowns; j++) for (let k = 0; k < unknowns; k++) added[j][k] += weight * vector[j] * vector[k];
  };
  const squares = new Float64Array(used.length);
  for (const row of redistributed) {
    const move = new Array<number>(unknowns).fill(0);
    used.forEach((s, i) => {
      const rest = row[s] - atCentre[s];
      squares[i] += rest ** 2 / redistributed.length;
      for (let j = 0; j < unknowns; j++) move[j] += gain[i][j] * rest;
    });
    addProduct(move, 1 / redistributed.length);
  }
  used.forEach((s, i) => addProduct(gain[i], -Math.min(squares[i], Math.max(0, scale[s] ** 2 - stated[s] ** 2))));
  const stretch = stretchFor(lower, added);
  return {
    points: points.map((z) => {
      const whitened = solveLower(
        lower,
        z.map((x, j) => x - mean[j]),
      );
      const stretched = times(stretch, whitened);
      return mean.map((m, j) => m + lower[j].reduce((sum, x, k) => (k <= j ? sum + x * stretched[k] : sum), 0));
    }),
    widened: mean.map((_m, j) => Math.sqrt(Math.max(1, variance(lower, stretch, j) / sigma[j][j]))),
  };
}

/** (I + max(0, L⁻¹ E L⁻ᵀ))^½ */
function stretchFor(lower: Matrix, added: Matrix): Matrix {
  const left = transposed(added.map((row) => solveLower(lower, row)));
  const whitened = left.map((row) => solveLower(lower, row));
  const { values, vectors } = eigenOfSymmetric(whitened);
  return values.map((_value, j) =>
    values.map((_other, k) => values.reduce((sum, value, i) => sum + Math.sqrt(1 + Math.max(0, value)) * vectors[j][i] * vectors[k][i], 0)),
  );
}

/** Of unknown j after the stretch: row j of L A Aᵀ Lᵀ. */
function variance(lower: Matrix, stretch: Matrix, j: number): number {
  const row = stretch.map((_r, k) => lower[j].reduce((sum, x, i) => (i <= j ? sum + x * stretch[i][k] : sum), 0));
  return row.reduce((sum, x) => sum + x * x, 0);
}

function times(matrix: Matrix, vector: readonly number[]): number[] {
  return matrix.map((row) => row.reduce((sum, x, k) => sum + x * vector[k], 0));
}

function transposed(matrix: Matrix): Matrix {
  return matrix[0].map((_x, k) => matrix.map((row) => row[k]));
}

function meanOf(points: readonly number[][], unknowns: number): number[] {
  return Array.from({ length: unknowns }, (_value, j) => points.reduce((sum, z) => sum + z[j], 0) / points.length);
}

function covarianceOf(points: readonly number[][], mean: readonly number[]): Matrix {
  return mean.map((m, j) =>
    mean.map((n, k) => points.reduce((sum, z) => sum + (z[j] - m) * (z[k] - n), 0) / Math.max(1, points.length - 1)),
  );
}
