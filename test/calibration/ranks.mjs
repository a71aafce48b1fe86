import gammainc from '@stdlib/math-base-special-gammainc';

/**
 * Ranks for simulation-based calibration: draw the truth from the prior, simulate data, fit, and count how many of the posterior's draws
 * lie below the truth. If intervals mean what they say, ranks are uniform on 0 … draws.
 * Source: Talts, Betancourt, Simpson, Vehtari & Gelman (2018), arXiv:1804.06788.
 * @param {number} truth
 * @param {ArrayLike<number>} draws
 */
export function rankOf(truth, draws) {
  let below = 0;
  for (let i = 0; i < draws.length; i++) if (draws[i] < truth) below++;
  return below;
}

/**
 * Counts of ranks 0 … draws in equal bins; `draws + 1` must be a multiple of `bins`.
 * @param {readonly number[]} ranks
 * @param {number} draws
 * @param {number} bins
 */
export function rankCounts(ranks, draws, bins) {
  if ((draws + 1) % bins !== 0) throw new RangeError(`${draws + 1} possible ranks do not divide into ${bins} bins`);
  const counts = new Array(bins).fill(0);
  for (const rank of ranks) counts[Math.floor((rank * bins) / (draws + 1))]++;
  return counts;
}

/**
 * Pearson's test of equal bins: χ² = Σ (n_i − N/B)²/(N/B), p = Q(df/2, χ²/2).
 * @param {readonly number[]} counts
 */
export function chiSquareUniform(counts) {
  const expected = counts.reduce((a, b) => a + b, 0) / counts.length;
  const chiSquare = counts.reduce((sum, n) => sum + (n - expected) ** 2 / expected, 0);
  const degrees = counts.length - 1;
  return { chiSquare, degrees, p: gammainc(chiSquare / 2, degrees / 2, true, true) };
}

/**
 * Kolmogorov–Smirnov test of values against the uniform distribution on 0..1, with the exact p (n up to a few hundred).
 * @param {ArrayLike<number>} values
 */
export function kolmogorovSmirnov(values) {
  const sorted = Float64Array.from(values).sort();
  const count = sorted.length;
  let distance = 0;
  sorted.forEach((u, i) => {
    distance = Math.max(distance, (i + 1) / count - u, u - i / count);
  });
  return { distance, p: 1 - kolmogorovCdf(count, distance) };
}

/**
 * P(D_n < d) exactly. Source: Marsaglia, Tsang & Wang (2003), Journal of Statistical Software 8(18).
 * @param {number} count
 * @param {number} distance
 */
export function kolmogorovCdf(count, distance) {
  const k = Math.floor(count * distance) + 1;
  const size = 2 * k - 1;
  const h = k - count * distance;
  let matrix = Array.from({ length: size }, (_, i) => Array.from({ length: size }, (__, j) => (i - j + 1 < 0 ? 0 : 1)));
  for (let i = 0; i < size; i++) {
    matrix[i][0] -= h ** (i + 1);
    matrix[size - 1][i] -= h ** (size - i);
  }
  matrix[size - 1][0] += 2 * h - 1 > 0 ? (2 * h - 1) ** size : 0;
  matrix = matrix.map((row, i) => row.map((x, j) => (i - j + 1 > 0 ? x / factorial(i - j + 1) : x)));
  // n!/nⁿ spread over the factors keeps every product within range
  let product = matrix.map((row, i) => row.map((_, j) => (i === j ? 1 : 0)));
  for (let i = 1; i <= count; i++) product = multiply(product, matrix).map((row) => row.map((x) => (x * i) / count));
  return product[k - 1][k - 1];
}

/** @param {number} n */
function factorial(n) {
  return n <= 1 ? 1 : n * factorial(n - 1);
}

/**
 * @param {number[][]} a
 * @param {number[][]} b
 */
function multiply(a, b) {
  return a.map((row) => b[0].map((_, j) => row.reduce((sum, x, i) => sum + x * b[i][j], 0)));
}
