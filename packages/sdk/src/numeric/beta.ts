import { deviance, stirlingRemainder } from './logGamma.js';

/**
 * Regularised incomplete beta function I_x(a, b) = 1/B(a, b) ∫₀ˣ t^(a−1) (1−t)^(b−1) dt: the distribution function of a beta
 * variable.
 *
 * Continued fraction on the side of the mean where it converges quickly, the complement on the other. Relative error below 1e-12
 * while the result is not close to 1; see {@link betaIComplement} for what is left above. No allocation.
 *
 * @param x dimensionless; below 0 the result is 0, above 1 it is 1
 * @param a dimensionless, a > 0
 * @param b dimensionless, b > 0
 * @returns I in [0, 1]; NaN if a or b is not a finite number > 0 or x is NaN
 * @source DLMF 8.17.1 and 8.17.22 (equation numbers from memory)
 */
export function betaI(x: number, a: number, b: number): number {
  if (!(a > 0 && b > 0) || a === Infinity || b === Infinity || x !== x) return NaN;
  if (x <= 0) return 0;
  if (x >= 1) return 1;
  return x * (a + b + 2) <= a + 1 ? fraction(x, 1 - x, a, b) : 1 - fraction(1 - x, x, b, a);
}

/**
 * 1 − I_x(a, b) = I_(1−x)(b, a), with a small relative error also where I is close to 1. (For a far below 1 the relative error
 * grows to about 1e-16 / a.)
 *
 * @param x dimensionless; below 0 the result is 1, above 1 it is 0
 * @param a dimensionless, a > 0
 * @param b dimensionless, b > 0
 * @returns a number in [0, 1]; NaN as in {@link betaI}
 * @source as {@link betaI}
 */
export function betaIComplement(x: number, a: number, b: number): number {
  if (!(a > 0 && b > 0) || a === Infinity || b === Infinity || x !== x) return NaN;
  if (x <= 0) return 1;
  if (x >= 1) return 0;
  return x * (a + b + 2) <= a + 1 ? 1 - fraction(x, 1 - x, a, b) : fraction(1 - x, x, b, a);
}

/**
 * x^a (1−x)^b / B(a, b): the density of the beta distribution times x(1−x), formed without cancellation for large a and b.
 *
 * @param x 0 < x < 1
 * @param y 1 − x, given apart because it may be known more accurately
 * @source C. Loader 2000 (from memory)
 */
export function betaFactor(x: number, y: number, a: number, b: number): number {
  const n = a + b;
  const exponent = stirlingRemainder(n) - stirlingRemainder(a) - stirlingRemainder(b) - deviance(a, n * x) - deviance(b, n * y);
  return Math.exp(exponent) * Math.sqrt(((a / n) * b) / (2 * Math.PI));
}

/** Modified Lentz evaluation. The even and odd coefficients are taken in pairs. */
function fraction(x: number, y: number, a: number, b: number): number {
  const factor = betaFactor(x, y, a, b);
  if (factor === 0) return 0;
  const n = a + b;
  let c = 1;
  let d = 1 / away(1 - (n * x) / (a + 1));
  let product = d;
  for (let m = 1; m < 10_000; m++) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m));
    d = 1 / away(1 + even * d);
    c = away(1 + even / c);
    product *= c * d;
    const odd = (-(a + m) * (n + m) * x) / ((a + 2 * m) * (a + 2 * m + 1));
    d = 1 / away(1 + odd * d);
    c = away(1 + odd / c);
    const change = c * d;
    product *= change;
    if (Math.abs(change - 1) <= 2.3e-16) break;
  }
  return (factor * product) / a;
}

function away(denominator: number): number {
  return Math.abs(denominator) < 1e-300 ? 1e-300 : denominator;
}
