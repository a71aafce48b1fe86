import { describe, expect, test } from 'vitest';
import { choleskyOf, eigenOfSymmetric, solveLower } from '../../../packages/sdk/src/fit/matrix.js';
import { rankCorrelation } from '../../../packages/sdk/src/fit/rankCorrelation.js';

// Eigenvalues, Cholesky factor and rank correlations from a general library (numpy, scipy), to the digits printed.
const matrix = [
  [4, 1, 0.5, -1],
  [1, 3, 0.2, 0],
  [0.5, 0.2, 2, 0.7],
  [-1, 0, 0.7, 5],
];

describe('eigenOfSymmetric(matrix)', () => {
  const { values, vectors } = eigenOfSymmetric(matrix);
  test('finds the eigenvalues', () => {
    const expected = [1.59962565, 2.3673838, 4.2863439, 5.74664664];
    [...values].sort((a, b) => a - b).forEach((value, k) => expect(value).toBeCloseTo(expected[k], 7));
  });

  test('A V = V Λ and VᵀV = I', () => {
    for (let j = 0; j < 4; j++) {
      for (let k = 0; k < 4; k++) {
        const product = matrix[j].reduce((sum, x, i) => sum + x * vectors[i][k], 0);
        expect(product).toBeCloseTo(values[k] * vectors[j][k], 12);
        const dot = vectors.reduce((sum, row) => sum + row[j] * row[k], 0);
        expect(dot).toBeCloseTo(j === k ? 1 : 0, 12);
      }
    }
  });
});

describe('choleskyOf(matrix)', () => {
  test('is the lower triangle', () => {
    const lower = choleskyOf(matrix)!;
    expect(lower[1][1]).toBeCloseTo(1.6583124, 7);
    expect(lower[3][2]).toBeCloseTo(0.58810969, 7);
    expect(lower[3][3]).toBeCloseTo(2.09317933, 7);
    const x = solveLower(lower, [2, 1, 0.5, -0.3]);
    lower.forEach((row, j) => expect(row.reduce((sum, l, k) => sum + l * (x[k] ?? 0), 0)).toBeCloseTo([2, 1, 0.5, -0.3][j], 12));
  });

  test('is null where there is none', () => {
    expect(
      choleskyOf([
        [1, 2],
        [2, 1],
      ]),
    ).toBeNull();
  });
});

describe('rankCorrelation(a, b)', () => {
  test('without and with ties', () => {
    expect(rankCorrelation([106, 100, 86, 101, 99, 103, 97, 113, 112, 110], [7, 27, 2, 50, 28, 29, 20, 12, 6, 17])).toBeCloseTo(
      -0.17575757575757575,
      12,
    );
    expect(rankCorrelation([1, 2, 2, 3, 5, 5, 5, 8], [2, 1, 4, 4, 3, 9, 7, 7])).toBeCloseTo(0.7144097497387378, 12);
  });

  test('is NaN for a constant series and for two pairs', () => {
    expect(rankCorrelation([1, 1, 1], [1, 2, 3])).toBeNaN();
    expect(rankCorrelation([1, 2], [1, 2])).toBeNaN();
  });
});
