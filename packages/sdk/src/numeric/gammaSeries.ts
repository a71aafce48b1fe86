import { deviance, stirlingRemainder } from './logGamma.js';

const TWO_PI = 2 * Math.PI;

/**
 * x^a e^(−x) / Γ(a + 1), the factor shared by the series, the fraction and (times a/x) the density of the gamma distribution.
 *
 * @param a shape, dimensionless, a > 0
 * @param x dimensionless, x > 0
 * @returns a number ≥ 0
 */
export function gammaFactor(a: number, x: number): number {
  return Math.exp(-deviance(a, x) - stirlingRemainder(a)) / Math.sqrt(TWO_PI * a);
}

/** P(a, x) by its power series; quick for x up to about a + 1. Unchecked: a > 0, x > 0. */
export function lowerSeries(a: number, x: number): number {
  let term = 1;
  let sum = 1;
  for (let n = 1; term > sum * 1e-17; n++) {
    term *= x / (a + n);
    sum += term;
  }
  return gammaFactor(a, x) * sum;
}

/**
 * Q(a, x) by its continued fraction, summed forward in Steed's form; quick from about x = a + 1. Unchecked: a > 0, x > 0.
 */
export function upperFraction(a: number, x: number): number {
  const factor = gammaFactor(a, x);
  if (factor === 0) return 0;
  let b = x + 1 - a;
  let d = 1 / b;
  let sum = d;
  let change = d;
  for (let n = 1; n < 10_000; n++) {
    const numerator = n * (a - n);
    b += 2;
    d = 1 / (b + numerator * d);
    change *= b * d - 1;
    sum += change;
    if (Math.abs(change) <= 1e-16 * sum) break;
  }
  return factor * a * sum;
}
