/**
 * Standard normal quantile to about 0.003: a place to start an iteration from, not a result.
 *
 * @param p probability, 0 < p < 1
 * @returns z with Φ(z) ≈ p
 * @source Abramowitz and Stegun 26.2.22 (from memory)
 */
export function roughNormalQuantile(p: number): number {
  const t = Math.sqrt(-2 * Math.log(p < 0.5 ? p : 1 - p));
  const z = t - (2.30753 + 0.27061 * t) / (1 + t * (0.99229 + t * 0.04481));
  return p < 0.5 ? -z : z;
}
