import type { ActivePiece } from './evaluator.js';
import { hermite } from './hermite.js';

const INTERVALS = 1024;
const TOLERANCE = 1e-10;

/**
 * All outflows' selections at once, where every curve over depth is constant and smooth: cubic Hermite pieces in z = √(S/(S + centre)),
 * good to 1e-10, plus what is uniform over total storage. Above `shallowest` mm and below `deepest` it must not be asked.
 */
export class JointTable {
  readonly shallowest: number;
  readonly deepest: number;
  private constructor(
    /** [2 (INTERVALS + 1) × outflows] value and slope × width by node, outflow by outflow. */
    private readonly nodes: Float64Array,
    private readonly slopes: Float64Array,
    private readonly centre: number,
    lowest: number,
    highest: number,
  ) {
    this.shallowest = depthAt(lowest / INTERVALS, centre);
    this.deepest = highest >= INTERVALS ? Infinity : depthAt(highest / INTERVALS, centre);
  }

  /** null where a piece moves with a driver, has corners, is a limit or a costly curve over total storage. */
  static for(pieces: readonly ActivePiece[], outflows: number): JointTable | null {
    const suited = pieces.every(
      (active) => active.steady && active.curve !== null && !active.curve.cornered && (!active.overTotal || isUniform(active)),
    );
    const curved = pieces.filter((active) => !active.overTotal);
    if (!suited || curved.length === 0) return null;
    let logs = 0;
    for (const active of curved) logs += Math.log(active.curve!.centre(active.p, active.q) / active.inverseScale);
    const centre = Math.exp(logs / curved.length);
    const stride = 2 * outflows;
    const nodes = new Float64Array(stride * (INTERVALS + 1));
    const slopes = new Float64Array(outflows);
    for (const active of pieces) {
      if (active.overTotal) slopes[active.outflow] += active.weight;
      else tabulate(active, nodes, stride, centre);
    }
    const wrong = (k: number): boolean => {
      const depth = depthAt((k + 0.5) / INTERVALS, centre);
      for (let f = 0; f < outflows; f++) {
        let exact = 0;
        for (const active of curved) if (active.outflow === f) exact += active.weight * shareOf(active, depth * active.inverseScale);
        if (!(Math.abs(hermite(nodes, k * stride + 2 * f, stride, 0.5) - exact) <= TOLERANCE)) return true;
      }
      return false;
    };
    let lowest = 1;
    let highest = INTERVALS;
    for (let k = 1; k < INTERVALS; k += k < 32 ? 1 : 12) {
      if (!wrong(k)) continue;
      if (k < INTERVALS / 2) lowest = k < 32 ? k + 3 : k + 12;
      else {
        highest = k - 12;
        break;
      }
    }
    return lowest > INTERVALS / 4 ? null : new JointTable(nodes, slopes, centre, lowest, highest);
  }

  evaluate(depth: number, total: number, out: Float64Array): void {
    const stride = 2 * out.length;
    const place = Math.sqrt(depth / (depth + this.centre)) * INTERVALS;
    const k = place | 0;
    const part = depth < total ? depth / total : 1;
    for (let f = 0; f < out.length; f++) out[f] = hermite(this.nodes, k * stride + 2 * f, stride, place - k) + this.slopes[f] * part;
  }
}

function isUniform(active: ActivePiece): boolean {
  return active.curve!.name === 'uniform';
}

/** From the curve's own table where it has one: ten times faster, and good to the same 1e-10. */
function shareOf(active: ActivePiece, x: number): number {
  return active.table !== null ? active.table.share(x) : active.curve!.share(x, active.p, active.q);
}

function depthAt(z: number, centre: number): number {
  return (centre * z * z) / (1 - z * z);
}

function tabulate(active: ActivePiece, nodes: Float64Array, stride: number, centre: number): void {
  const column = 2 * active.outflow;
  for (let k = 1; k < INTERVALS; k++) {
    const z = k / INTERVALS;
    const x = depthAt(z, centre) * active.inverseScale;
    const rest = 1 - z * z;
    const slope = (active.curve!.density(x, active.p, active.q) * active.inverseScale * ((2 * centre * z) / (rest * rest))) / INTERVALS;
    nodes[k * stride + column] += active.weight * shareOf(active, x);
    nodes[k * stride + column + 1] += active.weight * (Number.isFinite(slope) ? slope : 0);
  }
  nodes[INTERVALS * stride + column] += active.weight;
}
