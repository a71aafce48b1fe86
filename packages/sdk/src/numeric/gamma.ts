import { lowerSeries, upperFraction } from './gammaSeries.js';
import { gammaUniform, inUniformRegion } from './gammaUniform.js';
import { logGammaOnePlus } from './logGamma.js';

/**
 * Regularised lower incomplete gamma function P(a, x) = 1/Γ(a) ∫₀ˣ t^(a−1) e^(−t) dt: the distribution function of a gamma
 * variable of shape a and scale 1.
 *
 * Power series below x ≈ a + 1, continued fraction above, uniform expansion for large a near x = a. Relative error below 1e-12
 * wherever the result is a normal number. No allocation; at most about a hundred terms for a below 20.
 *
 * @param a shape, dimensionless, a > 0
 * @param x dimensionless, x ≥ 0 (below 0 the result is 0)
 * @returns P in [0, 1]; NaN if a is not a finite number > 0 or x is NaN
 * @source DLMF 8.2.4, 8.7.1, 8.9.2, 8.12 (equation numbers from memory)
 */
export function gammaP(a: number, x: number): number {
  if (!(a > 0) || a === Infinity || x !== x) return NaN;
  if (x <= 0) return 0;
  if (x === Infinity) return 1;
  if (inUniformRegion(a, x)) return gammaUniform(a, x, -1);
  if (x < a + 1) return lowerSeries(a, x);
  return 1 - upperFraction(a, x);
}

/**
 * Regularised upper incomplete gamma function Q(a, x) = 1 − P(a, x), with a small relative error also in the far tail where
 * 1 − P would be nothing but rounding.
 *
 * @param a shape, dimensionless, a > 0
 * @param x dimensionless, x ≥ 0 (below 0 the result is 1)
 * @returns Q in [0, 1]; NaN if a is not a finite number > 0 or x is NaN
 * @source as {@link gammaP}
 */
export function gammaQ(a: number, x: number): number {
  if (!(a > 0) || a === Infinity || x !== x) return NaN;
  if (x <= 0) return 1;
  if (x === Infinity) return 0;
  if (inUniformRegion(a, x)) return gammaUniform(a, x, 1);
  if (a < 1 && x < 1.5) return upperSmallShape(a, x);
  if (x < a + 1) return 1 - lowerSeries(a, x);
  return upperFraction(a, x);
}

/** For small a both 1 and P are close to each other: 1 − x^a/Γ(a+1)·(1 + a·Σ…) is summed without forming P. */
function upperSmallShape(a: number, x: number): number {
  const logLeading = a * Math.log(x) - logGammaOnePlus(a);
  let term = 1;
  let sum = 0;
  for (let n = 1; n < 60; n++) {
    term *= -x / n;
    const part = term / (a + n);
    sum += part;
    if (Math.abs(part) <= 1e-17) break;
  }
  return -Math.expm1(logLeading) - Math.exp(logLeading) * a * sum;
}
