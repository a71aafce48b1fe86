import type { ActivePiece, SelectionEvaluator } from '../selection/index.js';
import type { ColumnState } from './columnState.js';

const INTERVALS = 2048;
const CHECK_NODES = 96;
const CHECK_DECADES = 8;
const CHECK_LOWEST = -5;

/** One outflow as the fast pass sees it: Ω = T(S / scale) + slope · S / total. */
interface FastOutflow {
  /** [2 × INTERVALS + 2] value and rise of T over each interval of z = √(x/(x + centre)). */
  table: Float64Array;
  centre: number;
  /** The piece whose scale is driven; null when the table is in mm. */
  scaled: ActivePiece | null;
  /** Share taken uniformly from total storage. */
  slope: number;
  /** [CHECK_NODES] greatest |T''| and T' from each node on, per unit of x², x. */
  curvature: Float64Array;
  density: Float64Array;
}

/**
 * The fast pass of the default mode, for one or two outflows whose selections are smooth and unbounded (exponential, gamma, their
 * mixtures) or uniform over total storage. One midpoint step a parcel: the depth at mid-step is predicted with the Ω last seen at that
 * parcel, so that one look-up a step keeps second order. `allows` says from which depth on that is accurate enough.
 */
export class MidpointPass {
  private readonly outflows: FastOutflow[];
  private readonly shared: boolean;

  private constructor(
    outflows: FastOutflow[],
    private readonly count: number,
  ) {
    this.outflows = outflows;
    this.shared = outflows.every((one) => one.scaled === null && one.centre === outflows[0].centre);
  }

  /** null where the catchment's selections do not suit it. */
  static for(evaluator: SelectionEvaluator): MidpointPass | null {
    const count = evaluator.names.length;
    if (count > 2) return null;
    const groups = evaluator.names.map((_name, f) => evaluator.pieces.filter((active) => active.outflow === f));
    if (!groups.flat().every(isSuited)) return null;
    const moving = groups.map((group) => group.filter((active) => !active.steady));
    if (moving.some((list, f) => list.length > 1 || (list.length === 1 && groups[f].length > 1))) return null;
    const steadyOverDepth = groups.flat().filter((active) => !active.overTotal && active.steady);
    let logs = 0;
    for (const active of steadyOverDepth) logs += Math.log(active.curve!.centre(active.p, active.q) / active.inverseScale);
    const common = steadyOverDepth.length > 0 ? Math.exp(logs / steadyOverDepth.length) : 1;
    const outflows = groups.map((group, f) => {
      const scaled = moving[f][0] ?? null;
      return describe(group, scaled, scaled === null ? common : scaled.curve!.centre(scaled.p, scaled.q));
    });
    if (count === 1) outflows.push(describe([], null, outflows[0].scaled === null ? outflows[0].centre : common));
    return new MidpointPass(outflows, count);
  }

  /**
   * Whether a midpoint step is accurate enough for a boundary at `depth` and all below it.
   * @param rate  mm/day, greatest speed of the boundary in this step or the last
   */
  allows(depth: number, rate: number, flux: Float64Array, days: number, tolerance: number): boolean {
    let out = 0;
    let error = 0;
    let pull = 0;
    for (let f = 0; f < this.count; f++) {
      const one = this.outflows[f];
      const inverse = one.scaled === null ? 1 : one.scaled.inverseScale;
      const node = checkNode((depth * inverse) / one.centre);
      error += (flux[f] * one.curvature[node] * inverse * inverse * (rate * days) ** 2) / 24;
      pull += flux[f] * one.density[node] * inverse;
      out += flux[f];
    }
    return error + 0.25 * pull * pull * days * days * rate <= tolerance * out;
  }

  /**
   * Moves parcels `from` … 0 through the step. `depthAbove` and `above` are the depth and the amounts taken above parcel `from`.
   * Returns nothing; `state.depth`, `taken`, `cumulative` and `lastShare` hold the result. Where a parcel would lose more than it
   * has, or less than nothing, its loss is cut and the rest falls to the next older one.
   */
  run(
    state: ColumnState,
    from: number,
    depthAbove: number,
    above0: number,
    above1: number,
    inflow: number,
    flux: Float64Array,
    days: number,
    totalAtMiddle: number,
  ): void {
    const { depth, capacity, taken, cumulative, lastShare } = state;
    const [a, b] = this.outflows;
    const flux0 = flux[0];
    const flux1 = this.count > 1 ? flux[1] : 0;
    const second = this.count > 1 ? capacity : 0;
    const out0 = flux0 * days;
    const out1 = flux1 * days;
    const half = 0.5 * days;
    const push = half * inflow;
    const pull0 = half * flux0;
    const pull1 = half * flux1;
    const table0 = a.table;
    const table1 = b.table;
    const shared = this.shared;
    const centre0 = a.scaled === null ? a.centre : a.centre / a.scaled.inverseScale;
    const centre1 = b.scaled === null ? b.centre : b.centre / b.scaled.inverseScale;
    const slope0 = a.slope / totalAtMiddle;
    const slope1 = b.slope / totalAtMiddle;
    let edge = depthAbove;
    let x0 = above0;
    let x1 = above1;
    for (let i = from; i >= 0; i--) {
      const mm = depth[i];
      edge += mm;
      let middle = edge + push - pull0 * lastShare[i];
      if (second !== 0) middle -= pull1 * lastShare[second + i];
      const root0 = Math.sqrt(middle / (middle + centre0)) * INTERVALS;
      const k0 = root0 | 0;
      const share0 = table0[2 * k0] + (root0 - k0) * table0[2 * k0 + 1] + slope0 * middle;
      const target0 = out0 * (share0 < 1 ? share0 : 1);
      lastShare[i] = share0;
      let loss0 = target0 - x0;
      let loss1 = 0;
      if (second !== 0) {
        const root1 = shared ? root0 : Math.sqrt(middle / (middle + centre1)) * INTERVALS;
        const k1 = root1 | 0;
        const share1 = table1[2 * k1] + (root1 - k1) * table1[2 * k1 + 1] + slope1 * middle;
        lastShare[second + i] = share1;
        loss1 = out1 * (share1 < 1 ? share1 : 1) - x1;
      }
      let rest = mm - loss0 - loss1;
      if (loss0 < 0 || loss1 < 0 || rest < 0) {
        if (loss0 < 0) loss0 = 0;
        if (loss1 < 0) loss1 = 0;
        const all = loss0 + loss1;
        if (all > mm) {
          loss0 *= mm / all;
          loss1 *= mm / all;
          rest = 0;
        } else rest = mm - all;
      }
      x0 += loss0;
      depth[i] = rest;
      taken[i] = loss0;
      cumulative[i] = x0;
      if (second !== 0) {
        x1 += loss1;
        taken[second + i] = loss1;
        cumulative[second + i] = x1;
      }
    }
  }
}

function isSuited(active: ActivePiece): boolean {
  if (active.limit !== null || active.curve === null || active.curve.cornered) return false;
  if (active.curve.name === 'uniform') return active.steady;
  if (active.overTotal) return false;
  return active.steady || active.piece.weights.length === 0 ? active.table !== null || !active.curve.costly : false;
}

function describe(group: readonly ActivePiece[], scaled: ActivePiece | null, centre: number): FastOutflow {
  const curved = group.filter((active) => !active.overTotal);
  const value = (x: number): number => {
    let sum = 0;
    for (const active of curved) {
      const at = scaled === null ? x * active.inverseScale : x;
      sum += active.weight * (active.table !== null ? active.table.share(at) : active.curve!.share(at, active.p, active.q));
    }
    return sum;
  };
  const slopeAt = (x: number): number => {
    let sum = 0;
    for (const active of curved) {
      const per = scaled === null ? active.inverseScale : 1;
      sum += active.weight * per * active.curve!.density(x * per, active.p, active.q);
    }
    return sum;
  };
  const whole = curved.reduce((sum, active) => sum + active.weight, 0);
  const table = new Float64Array(2 * INTERVALS + 2);
  let before = 0;
  for (let k = 0; k <= INTERVALS; k++) {
    const z = (k + 1) / INTERVALS;
    table[2 * k] = before;
    const after = k + 1 < INTERVALS ? value((centre * z * z) / (1 - z * z)) : whole;
    table[2 * k + 1] = after - before;
    before = after;
  }
  const curvature = new Float64Array(CHECK_NODES);
  const density = new Float64Array(CHECK_NODES);
  for (let n = CHECK_NODES - 1; n >= 0; n--) {
    const x = centre * 10 ** (CHECK_LOWEST + (CHECK_DECADES * n) / (CHECK_NODES - 1));
    const here = Math.abs(slopeAt(1.005 * x) - slopeAt(0.995 * x)) / (0.01 * x);
    curvature[n] = Math.max(here, n + 1 < CHECK_NODES ? curvature[n + 1] : 0);
    density[n] = Math.max(slopeAt(x), n + 1 < CHECK_NODES ? density[n + 1] : 0);
  }
  const slope = group.filter((active) => active.overTotal).reduce((sum, active) => sum + active.weight, 0);
  return { table, centre, scaled, slope, curvature, density };
}

/** Node at or above log10(x / centre), downwards: its envelope covers all that is deeper. */
function checkNode(ratio: number): number {
  const place = Math.floor(((Math.log10(ratio) - CHECK_LOWEST) * (CHECK_NODES - 1)) / CHECK_DECADES);
  return place < 0 ? 0 : place >= CHECK_NODES ? CHECK_NODES - 1 : place;
}
