import type { ActivePiece, SelectionEvaluator } from '../selection/index.js';
import type { ColumnState } from './columnState.js';
import { describeOutflow, depthOfNode, LAST_NODE, type FastOutflow } from './fastOutflow.js';

/** Of every table; a constant of this file, since one that is imported costs a fifth of the loop's time. */
const INTERVALS = 1024;

/** Errors allowed in the share of an outflow taken above a boundary in a step, for one look-up and for four. */
const ONE_TOLERANCE = 5e-4;
const FOUR_TOLERANCE = 3e-4;
/** Parts into which a step is cut for boundaries near the surface. */
const SHALLOW_PARTS = 4;
/** Boundaries that start above this share of the step's inflow begin near the singular start. */
const NEAR_SURFACE = 0.3;
/** Share of a boundary's water that may leave in a step for a fixed number of parts. */
const DRAINED = 0.3;
/** How far the Ω seen at mid-step is extrapolated to the step's end, where the next step begins; below 1, so that errors die out. */
const AHEAD = 0.8;

/**
 * The fast pass of the default mode, for one or two outflows whose selections are smooth and unbounded (exponential, gamma, their
 * mixtures) or uniform over total storage. Deep boundaries take one midpoint step: the depth at mid-step is predicted with the Ω last
 * seen at that parcel, so that one look-up a step keeps second order. Shallower ones take four look-ups (the classical fourth-order
 * step); for those above `fourFrom` the adaptive integrator is needed.
 */
export class FastPass {
  /** mm: boundaries at least this deep may take one look-up, four look-ups. */
  oneFrom = Infinity;
  fourFrom = Infinity;
  /** [outflows] mm taken above the boundary last moved by `four`. */
  readonly taken: Float64Array;
  /** [2] Ω last looked up: after `four`, at the end of the step. */
  readonly pair = new Float64Array(2);
  private readonly slope0: number;
  private readonly slope1: number;
  /** Table intervals per √mm. */
  private perRoot0: number;
  private perRoot1: number;
  private readonly oneNode: Int32Array;
  private readonly fourNode: Int32Array;

  private constructor(
    private readonly outflows: FastOutflow[],
    private readonly count: number,
    /** [4 (INTERVALS + 1)] value and rise of both outflows, interleaved. */
    private readonly table: Float64Array,
  ) {
    this.taken = new Float64Array(count);
    this.slope0 = outflows[0].slope;
    this.slope1 = outflows[1].slope;
    this.perRoot0 = INTERVALS / outflows[0].reach;
    this.perRoot1 = INTERVALS / outflows[1].reach;
    this.oneNode = new Int32Array(count);
    this.fourNode = new Int32Array(count);
  }

  /** null where the catchment's selections do not suit it. */
  static for(evaluator: SelectionEvaluator): FastPass | null {
    const count = evaluator.names.length;
    if (count > 2) return null;
    const groups = evaluator.names.map((_name, f) => evaluator.pieces.filter((active) => active.outflow === f));
    if (!groups.flat().every(isSuited)) return null;
    const moving = groups.map((group) => group.filter((active) => !active.steady));
    if (moving.some((list, f) => list.length > 1 || (list.length === 1 && groups[f].length > 1))) return null;
    const table = new Float64Array(4 * (INTERVALS + 1));
    const outflows = [0, 1].map((f) => describeOutflow(groups[f] ?? [], moving[f]?.[0] ?? null, table, 2 * f));
    return new FastPass(outflows, count, table);
  }

  /**
   * Sets `oneFrom` and `fourFrom` for a step, from the errors of the midpoint rule (h²R²/24 · second derivative of Ω), of its predictor,
   * and of Simpson's rule (h⁴R⁴/2880 · fourth derivative).
   * @param rate      mm/day, greatest speed R of a boundary in this step
   * @param lastRate  the same of the step before: the predictor comes from there
   * @param stretch   relative change of total storage over the step
   */
  setStep(rate: number, lastRate: number, flux: Float64Array, days: number, stretch: number): void {
    const [a, b] = this.outflows;
    if (a.scaled !== null) this.perRoot0 = (INTERVALS / a.reach) * Math.sqrt(a.scaled.inverseScale);
    if (b.scaled !== null) this.perRoot1 = (INTERVALS / b.reach) * Math.sqrt(b.scaled.inverseScale);
    let out = 0;
    let uniform = 0;
    for (let f = 0; f < this.count; f++) {
      out += flux[f];
      uniform += (flux[f] * this.outflows[f].slope * stretch * stretch) / 3;
    }
    const allowedOne = (ONE_TOLERANCE * out - uniform) / this.count;
    const allowedFour = (FOUR_TOLERANCE * out - 0.01 * uniform) / this.count;
    this.oneFrom = allowedOne > 0 ? 0 : Infinity;
    this.fourFrom = allowedFour > 0 ? 0 : Infinity;
    for (let f = 0; f < this.count; f++) {
      const one = this.outflows[f];
      const inverse = one.scaled === null ? 1 : one.scaled.inverseScale;
      const reach = (inverse * rate * days) ** 2;
      const curvature = (flux[f] * reach) / 24;
      const lag = (1 - AHEAD) * 0.25 * flux[f] * flux[f] * inverse * inverse * days * days * (rate + lastRate);
      const bend = (flux[f] * reach * reach) / 2880;
      const oneDepth = this.leastDepth(
        this.oneNode,
        f,
        (n) => curvature * one.curvature[n] + lag * one.density[n] * one.density[n] <= allowedOne,
      );
      if (oneDepth > this.oneFrom) this.oneFrom = oneDepth;
      const fourDepth = this.leastDepth(this.fourNode, f, (n) => bend * one.bend[n] <= allowedFour);
      if (fourDepth > this.fourFrom) this.fourFrom = fourDepth;
    }
    // a look-up must not stand for a path that begins near the singular start
    if (this.oneFrom < rate * days) this.oneFrom = rate * days;
    if (this.fourFrom < 0.5 * rate * days) this.fourFrom = 0.5 * rate * days;
  }

  /** mm from which on a look-up is good, found from the node that was it in the step before. */
  private leastDepth(nodes: Int32Array, f: number, good: (node: number) => boolean): number {
    const { centre, scaled } = this.outflows[f];
    let node = nodes[f];
    while (node < LAST_NODE && !good(node)) node++;
    while (node > 0 && good(node - 1)) node--;
    nodes[f] = node;
    return node === 0 ? 0 : depthOfNode(node, centre) / (scaled === null ? 1 : scaled.inverseScale);
  }

  /**
   * Moves one boundary from `start` mm by the classical fourth-order step; `taken` and `share` hold the result. A shallow one's step
   * is cut into parts, near the surface in a time s with t = s^4, which takes the singular start Ω ~ S^a, S ~ t out of it.
   */
  four(start: number, inflow: number, flux: Float64Array, days: number, totalBefore: number, totalRate: number): void {
    const { taken, pair } = this;
    const flux0 = flux[0];
    const flux1 = this.count > 1 ? flux[1] : 0;
    const parts = start < this.fourFrom ? SHALLOW_PARTS : 1;
    const rooted = inflow > 0 && start < NEAR_SURFACE * inflow * days;
    const wide = 1 / parts;
    let x0 = 0;
    let x1 = 0;
    for (let part = 0; part < parts; part++) {
      const s0 = part * wide;
      const s1 = s0 + 0.5 * wide;
      const s2 = part === parts - 1 ? 1 : s0 + wide;
      const t0 = (rooted ? s0 * s0 * s0 * s0 : s0) * days;
      const t1 = (rooted ? s1 * s1 * s1 * s1 : s1) * days;
      const t2 = (rooted ? s2 * s2 * s2 * s2 : s2) * days;
      const v0 = (rooted ? 4 * s0 * s0 * s0 : 1) * days * wide;
      const v1 = (rooted ? 4 * s1 * s1 * s1 : 1) * days * wide;
      const v2 = (rooted ? 4 * s2 * s2 * s2 : 1) * days * wide;
      const middle = 1 / (totalBefore + totalRate * t1);
      const end = 1 / (totalBefore + totalRate * t2);
      const from = start - x0 - x1;
      this.look(from + inflow * t0, 1 / (totalBefore + totalRate * t0));
      const a0 = flux0 * pair[0] * v0;
      const a1 = flux1 * pair[1] * v0;
      this.look(from + inflow * t1 - 0.5 * (a0 + a1), middle);
      const b0 = flux0 * pair[0] * v1;
      const b1 = flux1 * pair[1] * v1;
      this.look(from + inflow * t1 - 0.5 * (b0 + b1), middle);
      const c0 = flux0 * pair[0] * v1;
      const c1 = flux1 * pair[1] * v1;
      this.look(from + inflow * t2 - c0 - c1, end);
      x0 += (a0 + 2 * (b0 + c0) + flux0 * pair[0] * v2) / 6;
      x1 += (a1 + 2 * (b1 + c1) + flux1 * pair[1] * v2) / 6;
    }
    taken[0] = x0;
    if (this.count > 1) taken[1] = x1;
  }

  /** Whether `four` may move a boundary that starts at `start` mm: deep enough, or cut in parts and not about to be used up. */
  allowsFour(start: number, inflow: number, flux: Float64Array, days: number, total: number): boolean {
    if (start >= this.fourFrom) return true;
    if (this.fourFrom === Infinity) return false;
    const reached = start + inflow * days;
    this.look(reached, 1 / total);
    const drain = flux[0] * this.pair[0] + (this.count > 1 ? flux[1] * this.pair[1] : 0);
    return drain * days < DRAINED * reached;
  }

  /** Ω of both outflows at one depth, into `pair`. */
  private look(depth: number, inverseTotal: number): void {
    const { pair, table } = this;
    const at = depth > 0 ? depth : 0;
    const root = Math.sqrt(at);
    const place0 = root * this.perRoot0;
    const place1 = root * this.perRoot1;
    const k0 = Math.min(place0 | 0, INTERVALS) << 2;
    const k1 = Math.min(place1 | 0, INTERVALS) << 2;
    const share0 = table[k0] + (place0 - (k0 >> 2)) * table[k0 + 1] + this.slope0 * at * inverseTotal;
    const share1 = table[k1 + 2] + (place1 - (k1 >> 2)) * table[k1 + 3] + this.slope1 * at * inverseTotal;
    pair[0] = share0 < 1 ? share0 : 1;
    pair[1] = share1 < 1 ? share1 : 1;
  }

  /**
   * Moves parcels `from` … 0 through the step. `edge`, `x0` and `x1` are the depth and the amounts taken above parcel `from`;
   * `state.depth`, `cumulative` and `lastShare` hold the result. Where a parcel would lose more than it has, or less than nothing, its
   * loss is cut and the rest falls to the next older one.
   */
  run(
    state: ColumnState,
    from: number,
    edge: number,
    x0: number,
    x1: number,
    inflow: number,
    flux: Float64Array,
    days: number,
    totalAtMiddle: number,
  ): void {
    const two = this.count > 1;
    if (!two && this.spare.length < state.capacity) this.spare = new Float64Array(state.capacity);
    const out0 = flux[0] * days;
    const out1 = two ? flux[1] * days : 0;
    const place = this.place;
    place[0] = edge;
    place[1] = x0;
    place[2] = x1;
    const last1 = two ? state.lastShare[1] : this.spare;
    const reached1 = two ? state.cumulative[1] : this.spare;
    let i = from;
    while (i >= 0) {
      i = this.sweep(
        i,
        state.depth,
        state.lastShare[0],
        last1,
        state.cumulative[0],
        reached1,
        this.table,
        place,
        0.5 * days * inflow,
        out0,
        out1,
        this.slope0 / totalAtMiddle,
        this.slope1 / totalAtMiddle,
      );
      if (i < 0) return;
      const mm = state.depth[i];
      const loss0 = Math.max(0, place[3]);
      const loss1 = Math.max(0, place[4]);
      const all = loss0 + loss1;
      const keep = all > mm ? mm / all : 1;
      place[1] += keep * loss0;
      place[2] += keep * loss1;
      state.depth[i] = all > mm ? 0 : mm - all;
      state.cumulative[0][i] = place[1];
      reached1[i] = place[2];
      i--;
    }
  }

  /**
   * The loop that a run's cost is made of, kept free of everything else: moves parcels from `i` down until one would lose more than it has
   * or less than nothing, and returns its index, −1 if there is none. `place` holds edge, x0, x1 and that parcel's losses.
   */
  private sweep(
    i: number,
    depth: Float64Array,
    last0: Float64Array,
    last1: Float64Array,
    reached0: Float64Array,
    reached1: Float64Array,
    table: Float64Array,
    place: Float64Array,
    push: number,
    out0: number,
    out1: number,
    slope0: number,
    slope1: number,
  ): number {
    const perRoot0 = this.perRoot0;
    const perRoot1 = this.perRoot1;
    const pull0 = 0.5 * out0;
    const pull1 = 0.5 * out1;
    let edge = place[0];
    let x0 = place[1];
    let x1 = place[2];
    for (; i >= 0; i--) {
      const mm = depth[i];
      edge += mm;
      const before0 = last0[i];
      const before1 = last1[i];
      const middle = edge + push - pull0 * before0 - pull1 * before1;
      const root = Math.sqrt(middle);
      const at0 = root * perRoot0;
      const at1 = root * perRoot1;
      const k0 = Math.min(at0 | 0, INTERVALS);
      const k1 = Math.min(at1 | 0, INTERVALS);
      const q0 = k0 << 2;
      const q1 = k1 << 2;
      const share0 = table[q0] + (at0 - k0) * table[q0 + 1] + slope0 * middle;
      const share1 = table[q1 + 2] + (at1 - k1) * table[q1 + 3] + slope1 * middle;
      last0[i] = share0 + AHEAD * (share0 - before0);
      last1[i] = share1 + AHEAD * (share1 - before1);
      const now0 = out0 * share0;
      const now1 = out1 * share1;
      const loss0 = now0 - x0;
      const loss1 = now1 - x1;
      const rest = mm - loss0 - loss1;
      if (!(loss0 >= 0 && loss1 >= 0 && rest >= 0)) {
        place[0] = edge;
        place[1] = x0;
        place[2] = x1;
        place[3] = loss0;
        place[4] = loss1;
        return i;
      }
      x0 = now0;
      x1 = now1;
      depth[i] = rest;
      reached0[i] = now0;
      reached1[i] = now1;
    }
    return -1;
  }

  private readonly place = new Float64Array(5);
  /** Stands in for the second outflow where there is one only. */
  private spare = new Float64Array(0);
}

function isSuited(active: ActivePiece): boolean {
  if (active.limit !== null || active.curve === null || active.curve.cornered) return false;
  if (active.curve.name === 'uniform') return active.steady;
  if (active.overTotal) return false;
  return active.steady || active.piece.weights.length === 0 ? active.table !== null || !active.curve.costly : false;
}
