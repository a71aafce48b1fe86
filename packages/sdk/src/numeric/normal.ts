import { gammaP, gammaQ } from './gamma.js';
import { roughNormalQuantile } from './roughNormalQuantile.js';

/**
 * Error function erf(x) = 2/√π ∫₀ˣ e^(−t²) dt = P(½, x²) for x ≥ 0, odd in x.
 *
 * @param x dimensionless
 * @returns a number in [−1, 1]; NaN if x is NaN
 * @source DLMF 7.2.1, 7.11.1 (equation numbers from memory)
 */
export function erf(x: number): number {
  if (Math.abs(x) < 1e-9) return x * 1.1283791670955126; // 2/√π; the next term is below 1e-18, and x² must not underflow
  return x < 0 ? -gammaP(0.5, x * x) : gammaP(0.5, x * x);
}

/**
 * Complementary error function erfc(x) = 1 − erf(x) = Q(½, x²) for x ≥ 0, with a relative error below 2e-14 + 4e-16·x².
 *
 * @param x dimensionless
 * @returns a number in [0, 2]; NaN if x is NaN
 * @source as {@link erf}
 */
export function erfc(x: number): number {
  return x < 0 ? 1 + gammaP(0.5, x * x) : gammaQ(0.5, x * x);
}

/**
 * Standard normal distribution function Φ(z) = ½ erfc(−z/√2), relatively accurate in the lower tail; use Φ(−z) for the upper.
 *
 * @param z dimensionless
 * @returns a number in [0, 1]; NaN if z is NaN
 */
export function normalCdf(z: number): number {
  return z < 0 ? 0.5 * gammaQ(0.5, 0.5 * z * z) : 0.5 + 0.5 * gammaP(0.5, 0.5 * z * z);
}

/**
 * Standard normal quantile: the z with Φ(z) = p. Newton's method on ln Φ, which is concave in z, so that it cannot cycle; about
 * four evaluations of Φ. Error below 2e-15·(1 + |z|).
 *
 * @param p probability, 0 ≤ p ≤ 1
 * @returns z; −∞ at 0, +∞ at 1; NaN outside [0, 1]
 */
export function normalQuantile(p: number): number {
  if (!(p >= 0 && p <= 1)) return NaN;
  if (p === 0) return -Infinity;
  if (p === 1) return Infinity;
  if (p > 0.5) return -normalQuantile(1 - p);
  const target = Math.log(p);
  // The rough start may be positive just below ½; the lower half is where Φ is relatively accurate.
  let z = Math.min(0, roughNormalQuantile(p));
  for (let n = 0; n < 20; n++) {
    const value = normalCdf(z);
    if (value === 0) {
      z += 0.01;
      continue;
    }
    const step = (target - Math.log(value)) * value * Math.exp(0.5 * z * z) * ROOT_TWO_PI;
    z += step;
    // Convergence is quadratic: after a step below 1e-8 the next one would be below 1e-16.
    if (Math.abs(step) < 1e-8) break;
  }
  return z;
}

const ROOT_TWO_PI = 2.5066282746310002;
