/** 3 × 3, symmetric in all uses here. */
export type Matrix3 = [number[], number[], number[]];

/** Σ_i w_i x_i x_iᵀ over rows of three. */
export function weightedProducts(rows: readonly number[][], weights: ArrayLike<number>): Matrix3 {
  const sum: Matrix3 = [
    [0, 0, 0],
    [0, 0, 0],
    [0, 0, 0],
  ];
  rows.forEach((row, i) => {
    for (let j = 0; j < 3; j++) for (let k = 0; k < 3; k++) sum[j][k] += weights[i] * row[j] * row[k];
  });
  return sum;
}

/** Inverse by cofactors; null when the determinant is lost in rounding (relative to the product of the diagonal). */
export function invert3(m: Matrix3): Matrix3 | null {
  const cofactor = (j: number, k: number): number => {
    const [a, b] = [(j + 1) % 3, (j + 2) % 3];
    const [c, d] = [(k + 1) % 3, (k + 2) % 3];
    return m[a][c] * m[b][d] - m[a][d] * m[b][c];
  };
  const determinant = m[0][0] * cofactor(0, 0) + m[0][1] * cofactor(0, 1) + m[0][2] * cofactor(0, 2);
  if (!(Math.abs(determinant) > 1e-12 * Math.abs(m[0][0] * m[1][1] * m[2][2]))) return null;
  return [0, 1, 2].map((j) => [0, 1, 2].map((k) => cofactor(k, j) / determinant)) as Matrix3;
}

export function multiply3(a: Matrix3, b: Matrix3): Matrix3 {
  return a.map((row) => [0, 1, 2].map((k) => row[0] * b[0][k] + row[1] * b[1][k] + row[2] * b[2][k])) as Matrix3;
}
