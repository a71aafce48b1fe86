/** [n][n], row-major. */
export type Matrix = number[][];

/** Lower triangle L with L Lᵀ = A; null where A is not positive definite (to 1e-12 of its diagonal). */
export function choleskyOf(matrix: Matrix): Matrix | null {
  const size = matrix.length;
  const lower = matrix.map(() => new Array<number>(size).fill(0));
  for (let j = 0; j < size; j++) {
    for (let k = 0; k <= j; k++) {
      let sum = matrix[j][k];
      for (let i = 0; i < k; i++) sum -= lower[j][i] * lower[k][i];
      if (j !== k) lower[j][k] = sum / lower[k][k];
      else if (sum > 1e-12 * matrix[j][j]) lower[j][j] = Math.sqrt(sum);
      else return null;
    }
  }
  return lower;
}

/** x with L x = b. */
export function solveLower(lower: Matrix, right: readonly number[]): number[] {
  const x: number[] = [];
  for (let j = 0; j < lower.length; j++) {
    let sum = right[j];
    for (let k = 0; k < j; k++) sum -= lower[j][k] * x[k];
    x.push(sum / lower[j][j]);
  }
  return x;
}

/**
 * Eigenvalues and vectors of a symmetric matrix by Jacobi's rotations.
 * @returns `vectors[j][i]` is component j of vector i; unsorted
 * @source Golub & Van Loan, Matrix Computations, section on Jacobi methods (from memory); checked by A V = V Λ in the tests
 */
export function eigenOfSymmetric(matrix: Matrix): { values: number[]; vectors: Matrix } {
  const size = matrix.length;
  const a = matrix.map((row, j) => row.map((x, k) => (x + matrix[k][j]) / 2));
  const vectors = a.map((_row, j) => a.map((_other, k) => (j === k ? 1 : 0)));
  for (let sweep = 0; sweep < 60; sweep++) {
    let off = 0;
    let all = 0;
    for (let j = 0; j < size; j++) for (let k = 0; k < size; k++) [off, all] = [off + (j === k ? 0 : a[j][k] ** 2), all + a[j][k] ** 2];
    if (off <= 1e-28 * all) break;
    for (let p = 0; p < size; p++) for (let q = p + 1; q < size; q++) rotate(a, vectors, p, q);
  }
  return { values: a.map((row, j) => row[j]), vectors };
}

function rotate(a: Matrix, vectors: Matrix, p: number, q: number): void {
  if (a[p][q] === 0) return;
  const theta = (a[q][q] - a[p][p]) / (2 * a[p][q]);
  const t = (theta >= 0 ? 1 : -1) / (Math.abs(theta) + Math.hypot(theta, 1));
  const c = 1 / Math.hypot(t, 1);
  const s = t * c;
  for (let k = 0; k < a.length; k++) [a[k][p], a[k][q]] = [c * a[k][p] - s * a[k][q], s * a[k][p] + c * a[k][q]];
  for (let k = 0; k < a.length; k++) [a[p][k], a[q][k]] = [c * a[p][k] - s * a[q][k], s * a[p][k] + c * a[q][k]];
  for (const row of vectors) [row[p], row[q]] = [c * row[p] - s * row[q], s * row[p] + c * row[q]];
}
