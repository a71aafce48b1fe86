import type { ActivePiece } from '../selection/index.js';

/** What T may lack where its table ends. */
const COMPLETE = 1e-8;
const CHECK_NODES = 56;
export const LAST_NODE = CHECK_NODES - 1;
const CHECK_DECADES = 8;
const CHECK_LOWEST = -5;

/** One outflow as the fast pass sees it: Ω = T(S / scale) + slope · S / total. */
export interface FastOutflow {
  /** √x at which T is complete and its table ends. */
  reach: number;
  centre: number;
  /** The piece whose scale is driven; null when the table is in mm. */
  scaled: ActivePiece | null;
  /** Share taken uniformly from total storage. */
  slope: number;
  /** [CHECK_NODES] greatest absolute second and fourth derivative of T, and its first, from each node on. */
  curvature: Float64Array;
  bend: Float64Array;
  density: Float64Array;
}

/**
 * Tabulates one outflow's selection and what bounds the error of few look-ups.
 * @param table  [4 (intervals + 1)] takes value and rise of T over each interval of √x from 0 to `reach`, at `column` of every four
 */
export function describeOutflow(
  group: readonly ActivePiece[],
  scaled: ActivePiece | null,
  table: Float64Array,
  column: number,
): FastOutflow {
  const intervals = table.length / 4 - 1;
  const curved = group.filter((active) => !active.overTotal);
  const centres = curved.map((active) => active.curve!.centre(active.p, active.q) / (scaled === null ? active.inverseScale : 1));
  const centre = Math.max(1e-6, ...centres);
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
  let end = centre;
  while (whole - value(end) > COMPLETE) end *= 1.5;
  const reach = Math.sqrt(end);
  let before = 0;
  for (let k = 0; k < intervals; k++) {
    const root = (reach * (k + 1)) / intervals;
    const after = k + 1 < intervals ? value(root * root) : whole;
    table[4 * k + column] = before;
    table[4 * k + column + 1] = after - before;
    before = after;
  }
  table[4 * intervals + column] = whole;
  const curvature = new Float64Array(CHECK_NODES);
  const bend = new Float64Array(CHECK_NODES);
  const density = new Float64Array(CHECK_NODES);
  for (let n = CHECK_NODES - 1; n >= 0; n--) {
    const x = depthOfNode(n, centre);
    const d = 0.08 * x;
    const third = (slopeAt(x + 2 * d) - 2 * slopeAt(x + d) + 2 * slopeAt(x - d) - slopeAt(x - 2 * d)) / (2 * d * d * d);
    const here = Math.abs(slopeAt(1.005 * x) - slopeAt(0.995 * x)) / (0.01 * x);
    curvature[n] = Math.max(here, n + 1 < CHECK_NODES ? curvature[n + 1] : 0);
    bend[n] = Math.max(Math.abs(third), n + 1 < CHECK_NODES ? bend[n + 1] : 0);
    density[n] = Math.max(slopeAt(x), n + 1 < CHECK_NODES ? density[n + 1] : 0);
  }
  const slope = group.filter((active) => active.overTotal).reduce((sum, active) => sum + active.weight, 0);
  return { reach, centre, scaled, slope, curvature, bend, density };
}

/** x of a check node; nodes are spaced evenly in log x. */
export function depthOfNode(node: number, centre: number): number {
  return centre * nodes[node];
}

const nodes = Float64Array.from({ length: CHECK_NODES }, (_value, node) => 10 ** (CHECK_LOWEST + (CHECK_DECADES * node) / LAST_NODE));
