import { weightedQuantile } from '../numeric/weightedQuantile.js';

/** The p-quantile over the members; the value itself for one; NaN where any member has none (no outflow: a fact, not an error). */
export function overMembers(values: Float64Array, weights: Float64Array, p: number): number {
  if (values.length === 1) return values[0] as number;
  return values.every(Number.isFinite) ? weightedQuantile(values, weights, p) : NaN;
}
