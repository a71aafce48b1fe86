import type { Curve } from './curve.js';
import { hermite } from './hermite.js';

const FIRST_INTERVALS = 512;
const MOST_INTERVALS = 8192;
const TOLERANCE = 1e-10;

/**
 * A curve G(x) with constant parameters as cubic Hermite pieces in a coordinate z that takes the power-law ends out of it:
 * z = √(x / (x + centre)) over depth; z = √(x/2) below and 1 − √((1 − x)/2) above x = ½ over total storage.
 *
 * Intervals are doubled until the error at their middles is below 1e-10, but for those next to a singular end, where G itself is
 * evaluated. @source own derivation; held against G in test/sdk/selection
 */
export class CurveTable {
  private readonly intervals: number;
  /** [2 (intervals + 1)] value and slope × interval width at each node. */
  private readonly nodes: Float64Array;
  private readonly lowest: number;
  private readonly highest: number;
  private readonly centre: number;
  private readonly overTotal: boolean;

  constructor(
    private readonly curve: Curve,
    private readonly p: number,
    private readonly q: number,
  ) {
    this.overTotal = curve.over === 'total';
    this.centre = Math.max(curve.centre(p, q), 1e-6);
    let intervals = FIRST_INTERVALS;
    let nodes = this.tabulate(intervals);
    let good = this.goodRange(nodes, intervals);
    while (good.high - good.low < 0.9 * intervals && intervals < MOST_INTERVALS) {
      intervals *= 2;
      nodes = this.tabulate(intervals);
      good = this.goodRange(nodes, intervals);
    }
    this.intervals = intervals;
    this.nodes = nodes;
    this.lowest = good.low;
    this.highest = good.high;
  }

  share(x: number): number {
    if (x <= 0) return 0;
    if (this.overTotal && x >= 1) return 1;
    const place = this.coordinate(x) * this.intervals;
    const k = place | 0;
    if (k < this.lowest || k >= this.highest) return this.curve.share(x, this.p, this.q);
    return hermite(this.nodes, 2 * k, 2, place - k);
  }

  private coordinate(x: number): number {
    if (!this.overTotal) return Math.sqrt(x / (x + this.centre));
    return x < 0.5 ? Math.sqrt(0.5 * x) : 1 - Math.sqrt(0.5 * (1 - x));
  }

  private inverse(z: number): number {
    if (!this.overTotal) return (this.centre * z * z) / (1 - z * z);
    return z < 0.5 ? 2 * z * z : 1 - 2 * (1 - z) * (1 - z);
  }

  /** dx/dz */
  private stretch(z: number): number {
    if (this.overTotal) return z < 0.5 ? 4 * z : 4 * (1 - z);
    const rest = 1 - z * z;
    return (2 * this.centre * z) / (rest * rest);
  }

  private tabulate(intervals: number): Float64Array {
    const nodes = new Float64Array(2 * (intervals + 1));
    for (let k = 1; k < intervals; k++) {
      const z = k / intervals;
      const x = this.inverse(z);
      const slope = (this.curve.density(x, this.p, this.q) * this.stretch(z)) / intervals;
      nodes[2 * k] = this.curve.share(x, this.p, this.q);
      nodes[2 * k + 1] = Number.isFinite(slope) ? slope : 0;
    }
    nodes[2 * intervals] = 1;
    return nodes;
  }

  /** The widest run of intervals, around the middle, whose middles are right; tested on every sixteenth and on all near the ends. */
  private goodRange(nodes: Float64Array, intervals: number): { low: number; high: number } {
    const wrong = (k: number): boolean => {
      const exact = this.curve.share(this.inverse((k + 0.5) / intervals), this.p, this.q);
      return !(Math.abs(hermite(nodes, 2 * k, 2, 0.5) - exact) <= TOLERANCE);
    };
    let low = 0;
    let high = intervals;
    const ends = 32;
    for (let k = 0; k < intervals; k += k < ends || k >= intervals - ends ? 1 : 16) {
      if (!wrong(k)) continue;
      if (k < intervals / 2) low = k < ends ? k + 4 : k + 16;
      else {
        high = Math.max(k >= intervals - ends ? k - 4 : k - 16, low);
        break;
      }
    }
    return { low, high };
  }
}
