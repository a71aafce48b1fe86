import { enrichment, growingProfile, meanOfDecay, type TracerPlan } from '../tracers/parcelTracer.js';
import type { ColumnState } from './columnState.js';

/** What a tracer's mass did so far, in concentration × mm. */
export class TracerLedger {
  entered = 0;
  left = 0;
  /** Lost by decay, or gained (negative) towards an equilibrium. */
  reacted = 0;
  /** Gained (or lost, negative) by holding the pre-record water at its stated concentration while an outflow leaves solute behind. */
  held = 0;
}

const profile = new Float64Array(2);

/**
 * Moves one tracer through a step whose water is already moved (`state.cumulative`, `state.depth`).
 * @param index     which tracer of the state
 * @param entered   mm of inflow to the youngest parcel, 0 if nothing entered
 * @param inflow    concentration of the inflow (ignored without inflow)
 * @param days      length of the step
 * @param preTaken  [outflows] mm taken from pre-record water
 * @param out       [outflows] the mass that left with each outflow is added here
 */
export function moveTracer(
  state: ColumnState,
  plan: TracerPlan,
  index: number,
  ledger: TracerLedger,
  entered: number,
  inflow: number,
  days: number,
  preTaken: Float64Array,
  out: Float64Array,
): void {
  const { cumulative, capacity, count, outflows } = state;
  const concentration = state.concentration.subarray(index * capacity, index * capacity + count);
  if (entered > 0) {
    concentration[count - 1] = inflow;
    ledger.entered += entered * inflow;
  }
  for (let f = 0; f < outflows; f++) {
    const mass = preTaken[f] * plan.carried[f] * plan.preRecord;
    ledger.left += mass;
    ledger.held -= preTaken[f] * plan.preRecord - mass;
    out[f] += mass;
  }
  if (!plan.conservative) {
    react(state, plan, ledger, concentration, entered, days, out);
    return;
  }
  for (let f = 0; f < outflows; f += 2) carryMass(cumulative, f, Math.min(f + 1, outflows - 1), concentration, count, ledger, out);
}

/** Adds Σ taken × concentration of outflows f and g (g may be f) to `out`; two at a time, as the loop waits for its own sums. */
function carryMass(
  cumulative: readonly Float64Array[],
  f: number,
  g: number,
  concentration: Float64Array,
  count: number,
  ledger: TracerLedger,
  out: Float64Array,
): void {
  const first = cumulative[f];
  const second = cumulative[g];
  let above0 = 0;
  let above1 = 0;
  let sum0 = 0;
  let sum1 = 0;
  for (let i = count - 1; i >= 0; i--) {
    const c = concentration[i];
    const reached0 = first[i];
    const reached1 = second[i];
    sum0 += (reached0 - above0) * c;
    sum1 += (reached1 - above1) * c;
    above0 = reached0;
    above1 = reached1;
  }
  out[f] += sum0;
  ledger.left += sum0;
  if (g === f) return;
  out[g] += sum1;
  ledger.left += sum1;
}

function react(
  state: ColumnState,
  plan: TracerPlan,
  ledger: TracerLedger,
  concentration: Float64Array,
  entered: number,
  days: number,
  out: Float64Array,
): void {
  const { depth, count, outflows } = state;
  const { carried, rate, target } = plan;
  const decay = Math.exp(-rate * days);
  const meanDecay = meanOfDecay(rate * days);
  for (let i = 0; i < count; i++) {
    let water = 0;
    let withSolute = 0;
    for (let f = 0; f < outflows; f++) {
      const mm = state.takenFrom(f, i);
      water += mm;
      withSolute += carried[f] * mm;
    }
    const after = depth[i];
    const before = state.before[i];
    const old = concentration[i];
    let end: number;
    let mean: number;
    if (after <= 0) {
      // used up: whatever solute there was leaves with what carries any
      end = old;
      mean = withSolute > 0 ? (before * old) / withSolute : old;
    } else if (entered > 0 && i === count - 1) {
      const retained = after + withSolute; // J − Σ(1 − a) q, as depths
      const start = (before * old) / retained;
      growingProfile(retained / after, rate * days, profile);
      end = target + (start - target) * profile[0];
      mean = target + (start - target) * profile[1];
    } else {
      const enriched = old * enrichment(before, after, water > 0 ? 1 - withSolute / water : 0);
      const mixed = withSolute > 0 ? (before * old - after * enriched) / withSolute : old;
      end = rate === 0 ? enriched : target + (enriched - target) * decay;
      mean = rate === 0 ? mixed : target + (mixed - target) * meanDecay;
    }
    concentration[i] = end;
    let left = 0;
    for (let f = 0; f < outflows; f++) {
      const mass = carried[f] * state.takenFrom(f, i) * mean;
      out[f] += mass;
      left += mass;
    }
    ledger.left += left;
    const rest = before * old - left - end * after;
    if (after <= 0 && withSolute <= 0) leaveBehind(state, ledger, concentration, i, rest);
    else ledger.reacted += rest;
  }
}

/** The solute of a parcel whose water went without it stays with the next older water. */
function leaveBehind(state: ColumnState, ledger: TracerLedger, concentration: Float64Array, i: number, mass: number): void {
  let older = i - 1;
  while (older >= 0 && state.depth[older] <= 0) older--;
  if (older >= 0) concentration[older] += mass / state.depth[older];
  else ledger.held -= mass;
}
