import type { TracerRule } from '../contract.js';

/**
 * How one solute rides on the parcels. Within a step a parcel of depth v is well mixed and exchanges at constant rates; per outflow a
 * share a_f of its concentration leaves with the water, and what is inside approaches `target` at the first-order `rate` (decay is
 * the case target = 0, decay and equilibrium add up).
 */
export interface TracerPlan {
  readonly name: string;
  readonly preRecord: number;
  /** [outflows] a_f */
  readonly carried: Float64Array;
  /** All a_f are 1 and nothing reacts: concentration never changes after entry. */
  readonly conservative: boolean;
  readonly rate: number;
  readonly target: number;
}

export function planTracer(name: string, rule: TracerRule, outflows: readonly string[]): TracerPlan {
  const carried = Float64Array.from(outflows, (outflow) => rule.carriedShare?.[outflow] ?? 1);
  const decay = rule.decayPerDay ?? 0;
  const approach = rule.equilibrium?.ratePerDay ?? 0;
  const rate = decay + approach;
  const target = rate > 0 && rule.equilibrium !== undefined ? (approach * rule.equilibrium.concentration) / rate : 0;
  return { name, preRecord: rule.preRecord, carried, conservative: rate === 0 && carried.every((share) => share === 1), rate, target };
}

/** (1 − e^(−x)) / x */
export function meanOfDecay(x: number): number {
  return x < 1e-8 ? 1 - x / 2 : -Math.expm1(-x) / x;
}

/**
 * Ratio of concentrations after and before a parcel went from depth `before` to `after` while a share `kept` of the concentration
 * stayed behind: (before/after)^kept. Exact at kept = 0 and 1; in between a second-order rational form where little is taken
 * (relative error below 2e-5), the power itself where much is.
 */
export function enrichment(before: number, after: number, kept: number): number {
  if (kept === 0) return 1;
  const taken = before - after;
  const middle = 0.5 * (before + after);
  if (taken > 0.08 * middle) return (before / after) ** kept;
  const half = 0.5 * kept * taken;
  return (middle + half) / (middle - half);
}

/**
 * Concentration profile of a parcel that grows from nothing over a step: depth v = β t with inflow J at concentration c and outflows
 * q_f of which a share a_f of the concentration leaves. The deviation D from `target` obeys t D' + g D + K t D = g D₀ with
 * g = (J − Σ(1 − a_f) q_f)/β, solved by the series D = D₀ Σ (−K t)^n / ((g+1)…(g+n)).
 * @returns [end, mean] of D / D₀ over the step
 */
export function growingProfile(g: number, rateTimesDays: number, out: Float64Array): void {
  let term = 1;
  let end = 1;
  let mean = 1;
  for (let n = 1; n < 200 && Math.abs(term) > 1e-17; n++) {
    term *= -rateTimesDays / (g + n);
    end += term;
    mean += term / (n + 1);
  }
  out[0] = end;
  out[1] = mean;
}
