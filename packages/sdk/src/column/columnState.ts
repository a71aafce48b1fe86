import { EntryCurves } from './entryCurves.js';

const FIRST_CAPACITY = 256;
/**
 * Near the surface a selection's density changes within a parcel: how much two may give together, times how much of the depth above their
 * older edge they are.
 */
const NEAR_TOP = 0.003;

/**
 * The storage as parcels, oldest at index 0, youngest last. Times are in steps since the record began (negative during spin-up),
 * depths and entered amounts in mm. Below parcel 0 lies the pre-record water.
 */
export class ColumnState {
  capacity = 0;
  count = 0;
  /** [capacity] mm of each parcel still stored. */
  depth = new Float64Array(0);
  /** [capacity] entry interval of each parcel. */
  entryStart = new Float64Array(0);
  entryEnd = new Float64Array(0);
  /** How what is left lies within each parcel, so that an age can be placed inside a merged one. */
  readonly curves = new EntryCurves();
  /** [outflows × capacity] Ω last seen at the older edge of each parcel: the predictor of the next midpoint. */
  readonly lastShare: Float64Array<ArrayBuffer>[];
  /** [tracers × capacity] */
  concentration = new Float64Array(0);
  /** [capacity] depth at the start of the step, with what enters in it; kept where a tracer reacts. */
  before = new Float64Array(0);
  /** [capacity] index of the followed inflow, −1 otherwise. */
  followed = new Int32Array(0);
  /** [outflows × capacity] scratch of a step: mm taken from each parcel and all younger ones. */
  readonly cumulative: Float64Array<ArrayBuffer>[];

  /** mm of pre-record water. */
  preRecord: number;
  /** mm in storage altogether, by the fluxes. */
  total: number;
  /** Parcels 0 … assumed − 1 came with spin-up. */
  assumed = 0;

  constructor(
    readonly outflows: number,
    readonly tracers: number,
    initialStorage: number,
  ) {
    this.lastShare = Array.from({ length: outflows }, () => new Float64Array(0));
    this.cumulative = Array.from({ length: outflows }, () => new Float64Array(0));
    this.preRecord = initialStorage;
    this.total = initialStorage;
    this.reserve(FIRST_CAPACITY);
  }

  reserve(capacity: number): void {
    if (capacity <= this.capacity) return;
    const size = Math.max(capacity, 2 * this.capacity);
    this.depth = grown(this.depth, size);
    this.before = grown(this.before, size);
    this.entryStart = grown(this.entryStart, size);
    this.entryEnd = grown(this.entryEnd, size);
    this.curves.reserve(size);
    for (let f = 0; f < this.outflows; f++) {
      this.lastShare[f] = grown(this.lastShare[f], size);
      this.cumulative[f] = grown(this.cumulative[f], size);
    }
    this.concentration = regrown(this.concentration, this.tracers, this.capacity, size);
    const followed = new Int32Array(size).fill(-1);
    followed.set(this.followed);
    this.followed = followed;
    this.capacity = size;
  }

  append(entryStart: number, entryEnd: number, enteredBefore: number, enteredAfter: number, followed: number): void {
    if (this.count === this.capacity) this.reserve(this.count + 1);
    const i = this.count++;
    this.depth[i] = 0;
    this.entryStart[i] = entryStart;
    this.entryEnd[i] = entryEnd;
    this.curves.start(i, enteredBefore, enteredAfter);
    this.followed[i] = followed;
    for (let f = 0; f < this.outflows; f++) this.lastShare[f][i] = 0;
  }

  /** Notes every depth before a step; the youngest parcel is what enters in it, if anything does. */
  keepBefore(entering: number): void {
    this.before.set(this.depth.subarray(0, this.count));
    if (entering > 0) this.before[this.count - 1] = entering;
  }

  /** mm that outflow f took from parcel i in the step. */
  takenFrom(f: number, i: number): number {
    const reached = this.cumulative[f];
    return i + 1 < this.count ? reached[i] - reached[i + 1] : reached[i];
  }

  /**
   * Adds what was taken in a part of a step to `sum` ([outflows × capacity] by parcel, replaced if it is too short); after the last part
   * the whole step's amounts stand in `cumulative`.
   */
  addTaken(sum: Float64Array<ArrayBuffer>, last: boolean): Float64Array<ArrayBuffer> {
    const size = this.outflows * this.capacity;
    const all = sum.length === size ? sum : regrown(sum, this.outflows, sum.length / this.outflows, this.capacity);
    for (let f = 0; f < this.outflows; f++) {
      const base = f * this.capacity;
      for (let i = 0; i < this.count; i++) all[base + i] += this.takenFrom(f, i);
      if (!last) continue;
      let reached = 0;
      for (let i = this.count - 1; i >= 0; i--) {
        reached += all[base + i];
        this.cumulative[f][i] = reached;
      }
    }
    return all;
  }

  /**
   * Drops used-up parcels and merges neighbours whose joint entry interval is at most `resolution` × the age of its younger end and
   * that together give at most the share `largest` of any outflow.
   * Depth, entered amounts and tracer mass add up exactly; the boundary between them is forgotten.
   */
  merge(now: number, resolution: number, largest: number): void {
    let kept = 0;
    let assumed = 0;
    // mm from the surface to the older edge of the parcel kept last
    let edge = this.total - this.preRecord;
    let width = 0;
    for (let i = 0; i < this.count; i++) {
      if (this.depth[i] <= 0 && this.followed[i] < 0) continue;
      const last = kept - 1;
      const isAssumed = i < this.assumed;
      const joins =
        resolution > 0 &&
        last >= 0 &&
        this.followed[i] < 0 &&
        this.followed[last] < 0 &&
        isAssumed === last < assumed &&
        this.entryEnd[i] - this.entryStart[last] <= resolution * (now - this.entryEnd[i]) &&
        this.feeds(last, i) <= Math.min(largest, (NEAR_TOP * edge) / (width + this.depth[i]));
      if (joins) {
        width += this.depth[i];
        this.join(last, i);
      } else {
        edge -= width;
        width = this.depth[i];
        if (kept !== i) this.move(kept, i);
        kept++;
        if (isAssumed) assumed = kept;
      }
    }
    this.count = kept;
    this.assumed = assumed;
  }

  /** Largest share of an outflow that parcels `older` and `younger` give together. */
  private feeds(older: number, younger: number): number {
    let most = 0;
    for (let f = 0; f < this.outflows; f++) {
      const share = this.lastShare[f];
      const above = younger + 1 < this.count ? share[younger + 1] : 0;
      most = Math.max(most, share[older] - above);
    }
    return most;
  }

  /** Adds parcel `younger` to parcel `older`, whose older edge stays. */
  private join(older: number, younger: number): void {
    const a = this.depth[older];
    const b = this.depth[younger];
    for (let t = 0; t < this.tracers; t++) {
      const base = t * this.capacity;
      this.concentration[base + older] = (a * this.concentration[base + older] + b * this.concentration[base + younger]) / (a + b);
    }
    this.depth[older] = a + b;
    this.entryEnd[older] = this.entryEnd[younger];
    this.curves.join(older, younger, a / (a + b));
  }

  private move(to: number, from: number): void {
    this.depth[to] = this.depth[from];
    this.entryStart[to] = this.entryStart[from];
    this.entryEnd[to] = this.entryEnd[from];
    this.curves.move(to, from);
    this.followed[to] = this.followed[from];
    for (let f = 0; f < this.outflows; f++) this.lastShare[f][to] = this.lastShare[f][from];
    for (let t = 0; t < this.tracers; t++) this.concentration[t * this.capacity + to] = this.concentration[t * this.capacity + from];
  }
}

function grown(old: Float64Array<ArrayBuffer>, size: number): Float64Array<ArrayBuffer> {
  const larger = new Float64Array(size);
  larger.set(old);
  return larger;
}

function regrown(old: Float64Array<ArrayBuffer>, rows: number, width: number, size: number): Float64Array<ArrayBuffer> {
  const larger = new Float64Array(rows * size);
  for (let row = 0; row < rows; row++) larger.set(old.subarray(row * width, (row + 1) * width), row * size);
  return larger;
}
