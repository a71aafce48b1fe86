import { betaFactor, betaI, betaIComplement } from './beta.js';
import { logGamma, logGammaOnePlus } from './logGamma.js';
import { roughNormalQuantile } from './roughNormalQuantile.js';

/**
 * Quantile of the beta distribution: the x with I_x(a, b) = p.
 *
 * Newton's method on ln I (on ln(1 − I) for p > ½) as a function of t = ln(x/(1−x)). The density of t is log-concave for every a
 * and b, so both are concave in t and the iteration cannot cycle. Relative error of x about 1e-14·(1 + 1/a), of 1 − x as the
 * spacing of numbers below 1 allows.
 *
 * @param p probability, 0 ≤ p ≤ 1
 * @param a dimensionless, a > 0
 * @param b dimensionless, b > 0
 * @returns x in [0, 1]; NaN if a or b is not a finite number > 0 or p lies outside [0, 1]
 * @source own derivation from the concavity of ln x^a(1−x)^b in t
 */
export function betaIInverse(p: number, a: number, b: number): number {
  if (!(a > 0 && b > 0) || a === Infinity || b === Infinity || !(p >= 0 && p <= 1)) return NaN;
  if (p === 0 || p === 1) return p;
  const lower = p <= 0.5;
  const target = Math.log(lower ? p : 1 - p);
  let t = start(p, lower, target, a, b);
  let last = Infinity;
  // The outermost place where the value was too small to be a number: never go back beyond it.
  let edge = lower ? -Infinity : Infinity;
  for (let n = 0; n < 100; n++) {
    const x = 1 / (1 + Math.exp(-t));
    const y = 1 / (1 + Math.exp(t));
    if (x < 1e-300 || y < 1e-300) break;
    const fromLeft = x < y;
    // Whichever of x and 1 − x is the smaller is handed on, since only that one is known to full relative accuracy.
    const evaluate = fromLeft === lower ? betaI : betaIComplement;
    const value = fromLeft ? evaluate(x, a, b) : evaluate(y, b, a);
    if (value === 0) {
      edge = t;
      t += (lower ? 1 : -1) * Math.sqrt(1 / a + 1 / b);
      continue;
    }
    const slope = ((lower ? 1 : -1) * betaFactor(x, y, a, b)) / value;
    let step = (target - Math.log(value)) / slope;
    if (lower ? t + step <= edge : t + step >= edge) step = (edge - t) / 2;
    t += step;
    const size = Math.abs(step);
    // The step after one below 1e-9 would be below 1e-17; a step that no longer shrinks is rounding.
    if (size < 1e-9 || (size < 1e-6 && size >= last)) break;
    last = size;
  }
  return 1 / (1 + Math.exp(-t));
}

/** The nearer of the tangent of the tail, which never passes the root, and the normal approximation in t. */
function start(p: number, lower: boolean, target: number, a: number, b: number): number {
  const near = lower ? a : b;
  const far = lower ? b : a;
  const tail = (target + logGammaOnePlus(near) + logGamma(far) - logGamma(a + b)) / near;
  const normal = Math.log(a / b) + roughNormalQuantile(p) * Math.sqrt(1 / a + 1 / b);
  return lower ? Math.max(tail, normal) : Math.min(-tail, normal);
}
