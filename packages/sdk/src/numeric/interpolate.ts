/**
 * First index whose entry is greater than x, by bisection; the length if there is none.
 *
 * @param at     [n] increasing (equal neighbours allowed); not checked
 * @param x      same unit; NaN gives the length of the range
 * @param length how many entries count, from the start
 */
export function upperBound(at: ArrayLike<number>, x: number, length = at.length): number {
  let low = 0;
  let high = length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (at[middle] > x) high = middle;
    else low = middle + 1;
  }
  return low;
}

/**
 * Piecewise-linear interpolation, held constant beyond both ends. Where two places are equal the function jumps, and takes the
 * later value at the place itself.
 *
 * @param at    [n] places, increasing; not checked
 * @param value [n] values at these places, any unit
 * @param x     place, same unit as `at`
 * @returns a value; NaN if n = 0 or x is NaN
 */
export function interpolateHeld(at: ArrayLike<number>, value: ArrayLike<number>, x: number): number {
  const n = at.length;
  if (n === 0 || x !== x) return NaN;
  const next = upperBound(at, x);
  if (next === 0) return value[0];
  if (next === n) return value[n - 1];
  const from = at[next - 1];
  // Weighting both ends, rather than adding a difference, returns either end exactly.
  const share = (x - from) / (at[next] - from);
  return (1 - share) * value[next - 1] + share * value[next];
}
