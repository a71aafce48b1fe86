import { lowerSeries, upperFraction } from './gammaSeries.js';
import { deviance } from './logGamma.js';

/** Below this shape the series and the fraction are as quick; the expansion needs a large a. */
const SMALLEST_SHAPE = 30;
const TERMS = 26;

/** Whether {@link gammaUniform} is accurate at (a, x): a ≥ 30 and x within 40 % of a. */
export function inUniformRegion(a: number, x: number): boolean {
  return a >= SMALLEST_SHAPE && Math.abs(x - a) < 0.4 * a;
}

/**
 * Incomplete gamma function for large a, uniformly in x: Q = ½ erfc(η√(a/2)) + R, P = ½ erfc(−η√(a/2)) − R, with
 * ½η² = x/a − 1 − ln(x/a), sign of η that of x − a, and R = e^(−aη²/2)/√(2πa)·S(η). Relative error below 1e-13 for both.
 *
 * @param a    shape, a ≥ 30
 * @param x    |x − a| < 0.4 a
 * @param side 1 for the upper function Q, −1 for the lower P
 * @source N. Temme 1979; S by the backward recurrence of Gil, Segura and Temme 2012 (from memory)
 */
export function gammaUniform(a: number, x: number, side: 1 | -1): number {
  const halfSquare = deviance(a, x);
  const eta = (x < a ? -1 : 1) * Math.sqrt((2 * halfSquare) / a);
  // Clenshaw-like: coefficient m of the polynomial in η is f[m] + (m+1)/a times coefficient m+1 of order two higher.
  let above = COEFFICIENTS[TERMS];
  let here = COEFFICIENTS[TERMS - 1];
  let sum = above * eta + here;
  for (let m = TERMS - 2; m > 0; m--) {
    const next = COEFFICIENTS[m] + ((m + 1) * above) / a;
    above = here;
    here = next;
    sum = sum * eta + here;
  }
  const remainder = (Math.exp(-halfSquare) / Math.sqrt(2 * Math.PI * a)) * (sum / (1 + above / a));
  // erfc(√h) = Q(½, h)
  const tail = halfSquare === 0 ? 0.5 : 0.5 * (halfSquare < 1.5 ? 1 - lowerSeries(0.5, halfSquare) : upperFraction(0.5, halfSquare));
  return (side * eta >= 0 ? tail : 1 - tail) + side * remainder;
}

/**
 * Taylor coefficients of f(η) = η/(λ − 1). With μ = λ − 1 = Σ α_k η^k the definition of η gives μ′ = f + η and f·μ = η, a
 * recurrence for both, so no table has to be carried.
 */
const COEFFICIENTS: Float64Array = /* @__PURE__ */ taylorCoefficients();

function taylorCoefficients(): Float64Array {
  const f = new Float64Array(TERMS + 1);
  const alpha = new Float64Array(TERMS + 2);
  f[0] = 1;
  alpha[1] = 1;
  for (let m = 1; m <= TERMS; m++) {
    // Coefficient of η^(m+1) in f·μ is 0: f_m α_1 + Σ f_j α_(m+1−j) + f_0 α_(m+1) = 0, with f_m = (m+1) α_(m+1) − [m = 1].
    let known = 0;
    for (let j = 1; j < m; j++) known += f[j] * alpha[m + 1 - j];
    const excess = m === 1 ? 1 : 0;
    alpha[m + 1] = (excess - known) / (m + 2);
    f[m] = (m + 1) * alpha[m + 1] - excess;
  }
  return f;
}
