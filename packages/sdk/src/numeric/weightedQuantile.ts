/**
 * Quantile of weighted values. Sorted, each value stands at the middle of its share of the cumulated weight; the first is moved to
 * 0, the last to 1, and between them the value is linear. With equal weights this is {@link quantileSorted} of the sorted values,
 * and only the ratios of the weights matter.
 *
 * @param values  [n] any unit, any order; not changed
 * @param weights [n] ≥ 0, any unit; values of weight 0 are left out
 * @param p       probability, 0 ≤ p ≤ 1
 * @returns a value in the same unit; NaN if no weight is positive, a value that counts or any weight is NaN, a weight is
 *          negative, or p lies outside [0, 1]
 * @source own extension of Hyndman and Fan's type 7 to weights
 */
export function weightedQuantile(values: ArrayLike<number>, weights: ArrayLike<number>, p: number): number {
  return weightedQuantiles(values, weights, [p])[0];
}

/** Several of them, for one sorting. @returns [p] */
export function weightedQuantiles(values: ArrayLike<number>, weights: ArrayLike<number>, ps: readonly number[]): number[] {
  const order: number[] = [];
  for (let i = 0; i < values.length; i++) {
    if (weights[i] === 0) continue;
    if (!(weights[i] > 0) || values[i] !== values[i]) return ps.map(() => NaN);
    order.push(i);
  }
  if (order.length === 0) return ps.map(() => NaN);
  order.sort((i, j) => values[i] - values[j]);
  let span = 0;
  for (let k = 1; k < order.length; k++) span += weights[order[k - 1]] + weights[order[k]];
  return ps.map((p) => (p >= 0 && p <= 1 ? along(p * span, order, values, weights) : NaN));
}

/** The value at which the cumulated weight of sorted values reaches `left`. */
function along(left: number, order: readonly number[], values: ArrayLike<number>, weights: ArrayLike<number>): number {
  for (let k = 1; k < order.length; k++) {
    const from = values[order[k - 1]];
    const to = values[order[k]];
    const width = weights[order[k - 1]] + weights[order[k]];
    if (left < width) return from + (left / width) * (to - from);
    left -= width;
  }
  return values[order[order.length - 1]];
}
