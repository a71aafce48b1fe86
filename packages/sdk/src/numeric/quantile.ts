/**
 * Quantile by linear interpolation of the order statistics: at position (n − 1)·p, counted from 0.
 *
 * @param sorted [n] increasing, any unit; not checked
 * @param p      probability, 0 ≤ p ≤ 1
 * @returns a value in the same unit; NaN if n = 0 or p lies outside [0, 1]
 * @source R. J. Hyndman and Y. Fan 1996, The American Statistician 50, their type 7 (from memory)
 */
export function quantileSorted(sorted: ArrayLike<number>, p: number): number {
  const n = sorted.length;
  if (n === 0 || !(p >= 0 && p <= 1)) return NaN;
  const position = (n - 1) * p;
  const below = Math.floor(position);
  const share = position - below;
  return share === 0 ? sorted[below] : sorted[below] + share * (sorted[below + 1] - sorted[below]);
}
