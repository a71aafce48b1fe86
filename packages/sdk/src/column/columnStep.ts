import type { SelectionEvaluator } from '../selection/index.js';
import type { ColumnState } from './columnState.js';
import { StepIntegrator } from './integrator.js';
import { FastPass } from './fastPass.js';
import { SmoothPass } from './smoothPass.js';

/** Error allowed in the share of the step's outflow taken above any one boundary. */
export const EXACT_TOLERANCE = 1e-9;
export const DEFAULT_TOLERANCE = 2e-5;
/** The same where selections have corners or steep ends, which the fast pass is not made for. */
export const UNEVEN_TOLERANCE = 2e-6;
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
  private readonly smooth: SmoothPass | null;
  private readonly tolerance: number;
  private readonly largestPart: number;
  private readonly above: Float64Array;
  private readonly loss: Float64Array;
  private readonly added: Float64Array;
  /** Whether one parcel alone decides, so that a boundary's small drift would show: then the integrator moves all of them. */
  careful = false;
  private lastInflow = 0;

  constructor(
    private readonly evaluator: SelectionEvaluator,
    everyAge: boolean,
  ) {
    const count = evaluator.names.length;
    this.integrator = new StepIntegrator(evaluator);
    this.fast = everyAge ? null : FastPass.for(evaluator);
    this.smooth = everyAge || this.fast !== null ? null : SmoothPass.for(evaluator);
    this.tolerance = everyAge ? EXACT_TOLERANCE : this.fast !== null ? DEFAULT_TOLERANCE : UNEVEN_TOLERANCE;
    this.largestPart = evaluator.pieces.some((active) => active.curve?.cornered) ? CORNERED_PART : 1;
    this.preTaken = new Float64Array(count);
    this.above = new Float64Array(count);
    this.loss = new Float64Array(count);
    this.added = new Float64Array(count);
  }

  /** Share of an outflow that a merged parcel may give: within it, ages and concentrations are no longer told apart. */
  get largestMerged(): number {
    return this.largestPart < 1 ? 0.0015 : this.fast !== null ? 0.02 : 0.0045;
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
    const { above } = this;
    const fast = this.careful ? null : this.fast;
    const smooth = this.careful ? null : this.smooth;
    const outflows = state.outflows;
    const totalBefore = state.total;
    let out = 0;
    for (let f = 0; f < outflows; f++) out += flux[f];
    const totalAfter = totalBefore + (inflow - out) * days;
    above.fill(0);
    if (out <= 0) this.fill(state, enters ? inflow * days : 0);
    else {
      const rate = Math.max(inflow, out);
      const lastRate = Math.max(this.lastInflow, out);
      if (fast !== null) {
        const stretch = Math.abs(totalAfter - totalBefore) / Math.min(totalBefore, totalAfter);
        fast.setStep(rate, lastRate, flux, days, stretch);
      }
      const tolerance = this.careful ? Math.min(this.tolerance, UNEVEN_TOLERANCE) : this.tolerance;
      this.integrator.setStep(days, inflow, flux, totalBefore, tolerance, this.largestPart);
      let edge = 0;
      let i = state.count - 1;
      if (enters) {
        if (fast !== null && fast.allowsFour(0, inflow, flux, days, totalBefore)) {
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
        if (fast !== null && fast.allowsFour(start, inflow, flux, days, totalBefore)) {
          fast.four(start, inflow, flux, days, totalBefore, inflow - out);
          this.settle(state, i, 0, flux, days, fast.taken, fast.pair);
        } else if (smooth !== null && smooth.serves(start, Math.min(totalBefore, totalAfter), rate, lastRate, out, days)) {
          smooth.move(start, i, state.lastShare, inflow, flux, days, 0.5 * (totalBefore + totalAfter));
          this.settle(state, i, 0, flux, days, smooth.taken, smooth.share);
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

  /** Without outflow every parcel keeps its depth and a new one takes what falls; Ω is looked up for the predictor of the next step. */
  private fill(state: ColumnState, fallen: number): void {
    const looks = this.fast !== null || this.smooth !== null;
    if (fallen > 0) state.depth[state.count - 1] = fallen;
    let edge = 0;
    for (let i = state.count - 1; i >= 0; i--) {
      edge += state.depth[i];
      if (looks) this.evaluator.evaluate(edge, state.total + fallen, this.loss);
      for (let f = 0; f < state.outflows; f++) {
        state.cumulative[f][i] = 0;
        if (looks) state.lastShare[f][i] = Math.min(1, this.loss[f]);
      }
    }
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
    // what each outflow still lacks after all parcels gave what its selection asked of them
    let lacking = 0;
    for (let f = 0; f < outflows; f++) {
      this.loss[f] = Math.max(0, flux[f] * days - cumulative[f][0]);
      lacking += this.loss[f];
      this.added[f] = 0;
    }
    for (; i >= 0; i--) {
      const excess = Math.min(depth[i] - Math.max(0, bottom - edge), lacking);
      if (excess > 0) {
        for (let f = 0; f < outflows; f++) {
          const part = (excess * this.loss[f]) / lacking;
          this.added[f] += part;
          this.loss[f] -= part;
        }
        depth[i] -= excess;
        lacking -= excess;
      }
      for (let f = 0; f < outflows; f++) cumulative[f][i] += this.added[f];
      edge += depth[i];
    }
  }
}
