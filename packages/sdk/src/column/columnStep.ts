import type { SelectionEvaluator } from '../selection/index.js';
import type { ColumnState } from './columnState.js';
import { StepIntegrator } from './integrator.js';
import { FastPass } from './fastPass.js';

/** Error allowed in the share of the step's outflow taken above any one boundary. */
export const EXACT_TOLERANCE = 1e-9;
export const DEFAULT_TOLERANCE = 2e-5;
/** Share of a step at most taken at once where a selection has corners, which an error estimate may step over. */
const CORNERED_PART = 0.125;

/**
 * One step of the whole column: the increasing map of every boundary and what each outflow took above it. Parcels that enter in the
 * step must have been appended (with depth 0) before.
 */
export class ColumnStep {
  /** [outflows] mm taken from pre-record water in the step. */
  readonly preTaken: Float64Array;
  private readonly integrator: StepIntegrator;
  private readonly fast: FastPass | null;
  private readonly tolerance: number;
  private readonly largestPart: number;
  private readonly above: Float64Array;
  private readonly loss: Float64Array;
  private readonly given: Float64Array;
  /** Cumulative amounts of the parcel above as they were before the bottom was held. */
  private readonly previous: Float64Array;
  private lastInflow = 0;

  constructor(evaluator: SelectionEvaluator, everyAge: boolean) {
    const count = evaluator.names.length;
    this.integrator = new StepIntegrator(evaluator);
    this.fast = everyAge ? null : FastPass.for(evaluator);
    this.tolerance = everyAge ? EXACT_TOLERANCE : DEFAULT_TOLERANCE;
    this.largestPart = evaluator.pieces.some((active) => active.curve?.cornered) ? CORNERED_PART : 1;
    this.preTaken = new Float64Array(count);
    this.above = new Float64Array(count);
    this.loss = new Float64Array(count);
    this.given = new Float64Array(count);
    this.previous = new Float64Array(count);
  }

  /** The inflow of the step before: part of the state, since the choice of method looks at it. */
  get previousInflow(): number {
    return this.lastInflow;
  }
  set previousInflow(value: number) {
    this.lastInflow = value;
  }

  /**
   * @param state    column at the start of the step; moved to its end
   * @param enters   whether the youngest parcel is the inflow of this step
   * @param inflow   mm/day
   * @param flux     [outflows] mm/day
   */
  advance(state: ColumnState, enters: boolean, inflow: number, flux: Float64Array, days: number): void {
    const { above, fast } = this;
    const outflows = state.outflows;
    const totalBefore = state.total;
    let out = 0;
    for (let f = 0; f < outflows; f++) out += flux[f];
    const totalAfter = totalBefore + (inflow - out) * days;
    above.fill(0);
    if (out <= 0) this.fill(state, enters ? inflow * days : 0);
    else {
      if (fast !== null) {
        const stretch = Math.abs(totalAfter - totalBefore) / Math.min(totalBefore, totalAfter);
        fast.setStep(Math.max(inflow, out), Math.max(this.lastInflow, out), flux, days, stretch);
      }
      this.integrator.setStep(days, inflow, flux, totalBefore, this.tolerance, this.largestPart);
      let edge = 0;
      let i = state.count - 1;
      if (enters) {
        if (fast !== null && inflow > out) {
          fast.four(0, inflow, flux, days, totalBefore, inflow - out);
          this.settle(state, i--, inflow * days, flux, days, fast.taken, fast.pair);
        } else {
          this.integrator.carry(0);
          this.settle(state, i--, inflow * days, flux, days, this.integrator.taken, this.integrator.share);
        }
      }
      for (; i >= 0; i--) {
        const start = edge + state.depth[i];
        if (fast !== null && start >= fast.oneFrom) break;
        edge = start;
        if (fast !== null && (start >= fast.fourFrom || inflow > out)) {
          fast.four(start, inflow, flux, days, totalBefore, inflow - out);
          this.settle(state, i, 0, flux, days, fast.taken, fast.pair);
        } else {
          this.integrator.carry(start);
          this.settle(state, i, 0, flux, days, this.integrator.taken, this.integrator.share);
        }
      }
      if (i >= 0) {
        const middle = totalBefore + 0.5 * (inflow - out) * days;
        fast!.run(state, i, edge, above[0], outflows > 1 ? above[1] : 0, inflow, flux, days, middle);
        for (let f = 0; f < outflows; f++) above[f] = state.cumulative[f][0];
      }
    }
    state.total = totalAfter;
    let gone = this.fromPreRecord(state, flux, days);
    if (gone > state.preRecord) {
      this.holdAboveBottom(state, flux, days);
      gone = this.fromPreRecord(state, flux, days);
    }
    state.preRecord = Math.max(0, state.preRecord - gone);
    this.lastInflow = inflow;
  }

  /** mm that the outflows take from below the last parcel, all together. */
  private fromPreRecord(state: ColumnState, flux: Float64Array, days: number): number {
    let gone = 0;
    for (let f = 0; f < state.outflows; f++) {
      const last = state.count > 0 ? state.cumulative[f][0] : 0;
      this.preTaken[f] = Math.max(0, flux[f] * days - last);
      gone += this.preTaken[f];
    }
    return gone;
  }

  /** Without outflow every parcel keeps its depth and a new one takes what falls. */
  private fill(state: ColumnState, fallen: number): void {
    for (let f = 0; f < state.outflows; f++) {
      state.cumulative[f].fill(0, 0, state.count);
    }
    if (fallen > 0) state.depth[state.count - 1] = fallen;
  }

  /** Books what was taken above the boundary below parcel i; never more than there is, never less than nothing. */
  private settle(
    state: ColumnState,
    i: number,
    fallen: number,
    flux: Float64Array,
    days: number,
    taken: Float64Array,
    share: Float64Array,
  ): void {
    const { above, loss } = this;
    let all = 0;
    for (let f = 0; f < above.length; f++) {
      loss[f] = Math.max(0, Math.min(taken[f], flux[f] * days) - above[f]);
      all += loss[f];
    }
    const there = state.depth[i] + fallen;
    const keep = all > there ? there / all : 1;
    for (let f = 0; f < above.length; f++) {
      loss[f] *= keep;
      above[f] += loss[f];
      state.cumulative[f][i] = above[f];
      state.lastShare[f][i] = share[f];
    }
    state.depth[i] = all > there ? 0 : Math.max(0, there - all);
  }

  /**
   * No boundary lies below total storage: once the pre-record water is used up, what a selection would take from below comes from the
   * oldest water there is. The excess depth goes to the outflows in proportion to what they still lack.
   */
  private holdAboveBottom(state: ColumnState, flux: Float64Array, days: number): void {
    const { count, outflows, cumulative, depth } = state;
    const bottom = state.total;
    let edge = 0;
    let i = count - 1;
    for (; i >= 0; i--) {
      if (edge + depth[i] > bottom) break;
      edge += depth[i];
    }
    this.above.fill(0);
    if (i + 1 < count) for (let f = 0; f < outflows; f++) this.above[f] = cumulative[f][i + 1];
    let rewritten = false;
    for (; i >= 0; i--) {
      let lacking = 0;
      for (let f = 0; f < outflows; f++) {
        // what this parcel gave before, from the amounts not yet rewritten
        const before = i + 1 < count ? (rewritten ? this.previous[f] : cumulative[f][i + 1]) : 0;
        this.given[f] = cumulative[f][i] - before;
        this.loss[f] = Math.max(0, flux[f] * days - this.above[f] - this.given[f]);
        lacking += this.loss[f];
      }
      const excess = Math.min(depth[i] - Math.max(0, bottom - edge), lacking);
      for (let f = 0; f < outflows; f++) {
        this.previous[f] = cumulative[f][i];
        if (excess > 0) this.given[f] += (excess * this.loss[f]) / lacking;
        this.above[f] += this.given[f];
        cumulative[f][i] = this.above[f];
      }
      rewritten = true;
      if (excess > 0) depth[i] -= excess;
      edge += depth[i];
    }
  }
}
