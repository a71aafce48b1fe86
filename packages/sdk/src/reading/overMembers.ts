import { weightedQuantile, weightedQuantiles } from '../numeric/weightedQuantile.js';

/** The p-quantile over the members; the value itself for one; NaN where any member has none (no outflow: a fact, not an error). */
export function overMembers(values: Float64Array, weights: Float64Array, p: number): number {
  if (values.length === 1) return values[0] as number;
  return values.every(Number.isFinite) ? weightedQuantile(values, weights, p) : NaN;
}

/** Low end, middle and high end of the 5–95 % range over the members, as {@link overMembers} gives each. */
export function rangeOverMembers(values: Float64Array, weights: Float64Array): [number, number, number] {
  if (values.length === 1) return [values[0] as number, values[0] as number, values[0] as number];
  return (values.every(Number.isFinite) ? weightedQuantiles(values, weights, [0.05, 0.5, 0.95]) : [NaN, NaN, NaN]) as [
    number,
    number,
    number,
  ];
}
