import { gammaP, gammaQ } from './gamma.js';
import { gammaFactor } from './gammaSeries.js';
import { logGammaOnePlus } from './logGamma.js';
import { roughNormalQuantile } from './roughNormalQuantile.js';

/**
 * Quantile of the gamma distribution of shape a and scale 1: the x with P(a, x) = p.
 *
 * Newton's method on ln P (ln Q for p > ½) as a function of u = ln x. Both are concave in u, so the iteration cannot cycle: from
 * one side it converges monotonically, from the other it first steps over the root. Relative error of x about
 * 1e-14·(1 + 1/a), and where the root lies below the smallest number, 0.
 *
 * @param a shape, dimensionless, a > 0
 * @param p probability, 0 ≤ p ≤ 1
 * @returns x ≥ 0; 0 at p = 0, +∞ at p = 1; NaN if a is not a finite number > 0 or p lies outside [0, 1]
 * @source the logarithm of the distribution function of a log-concave density is concave (common knowledge)
 */
export function gammaPInverse(a: number, p: number): number {
  if (!(a > 0) || a === Infinity || !(p >= 0 && p <= 1)) return NaN;
  if (p === 0) return 0;
  if (p === 1) return Infinity;
  const lower = p <= 0.5;
  const target = Math.log(lower ? p : 1 - p);
  // P < x^a/Γ(a+1), so this start is never above the root; it is nearly exact for small a or p.
  let u = (Math.log(p) + logGammaOnePlus(a)) / a;
  if (u < SMALLEST_LOG) return Math.exp(u);
  const wilsonHilferty = 1 - 1 / (9 * a) + roughNormalQuantile(p) / (3 * Math.sqrt(a));
  if (wilsonHilferty > 0) u = Math.max(u, Math.log(a) + 3 * Math.log(wilsonHilferty));

  let last = Infinity;
  // The outermost place where the value was too small to be a number: never go back beyond it.
  let edge = lower ? -Infinity : Infinity;
  for (let n = 0; n < 100; n++) {
    const x = Math.exp(u);
    const value = lower ? gammaP(a, x) : gammaQ(a, x);
    if (value === 0) {
      edge = u;
      u += (lower ? 1 : -1) / Math.sqrt(1 + a);
      continue;
    }
    const slope = ((lower ? a : -a) * gammaFactor(a, x)) / value;
    let step = Math.min(2, (target - Math.log(value)) / slope);
    if (lower ? u + step <= edge : u + step >= edge) step = (edge - u) / 2;
    u += step;
    const size = Math.abs(step);
    // The step after one below 1e-9 would be below 1e-17; a step that no longer shrinks is rounding.
    if (size < 1e-9 || (size < 1e-6 && size >= last)) break;
    last = size;
  }
  return Math.exp(u);
}

/** ln of the smallest normal number. */
const SMALLEST_LOG = -708;
