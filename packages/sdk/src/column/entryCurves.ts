/** Points kept between the ends of a parcel's curve. */
const KEPT = 3;
/** Numbers of a parcel: amounts at its ends and at the points between, then the shares at those points. */
export const STRIDE = 2 * KEPT + 2;
const SHARES = KEPT + 1;

/**
 * How the water that is left lies within each parcel: the share of its depth, counted from the older end, against the record's cumulative
 * inflow (mm). A straight line for one inflow; for a merged parcel the line through the points that matter most, since one summer's rain
 * may have gone while that of the week before is still there.
 */
export class EntryCurves {
  /** [capacity × STRIDE] */
  data = new Float64Array(0);
  private readonly amounts = new Float64Array(2 * KEPT + 3);
  private readonly shares = new Float64Array(2 * KEPT + 3);
  private points = 0;

  reserve(capacity: number): void {
    const larger = new Float64Array(capacity * STRIDE);
    larger.set(this.data);
    this.data = larger;
  }

  /** Parcel i is one inflow, that took the record's cumulative inflow from `before` to `after` mm. */
  start(i: number, before: number, after: number): void {
    const base = i * STRIDE;
    this.data.fill(after, base, base + STRIDE);
    this.data[base] = before;
    this.data.fill(1, base + SHARES + 1, base + STRIDE);
  }

  /** Whether parcel i is still one inflow, that came evenly. */
  isOne(i: number): boolean {
    return this.data[i * STRIDE + 1] === this.data[i * STRIDE + SHARES];
  }

  move(to: number, from: number): void {
    this.data.copyWithin(to * STRIDE, from * STRIDE, (from + 1) * STRIDE);
  }

  /** Parcel `older` becomes the two together, of which `part` of the depth is its own. */
  join(older: number, younger: number, part: number): void {
    const { data, amounts, shares } = this;
    const base = older * STRIDE;
    amounts[0] = data[base];
    shares[0] = 0;
    this.points = 1;
    this.add(older, 0, part);
    this.add(younger, part, 1 - part);
    while (this.points > KEPT + 2) this.dropLeast();
    const last = this.points - 1;
    for (let k = 1; k <= SHARES; k++) {
      const from = Math.min(k, last);
      data[base + k] = amounts[from];
      if (k < SHARES) data[base + SHARES + k] = shares[from];
    }
    data[base + SHARES] = amounts[last];
  }

  /** Cumulative inflow of the record at which the older `share` of parcel i's depth had entered, mm. */
  enteredAt(i: number, share: number): number {
    const { data } = this;
    const base = i * STRIDE;
    let before = 0;
    for (let k = 1; ; k++) {
      const after = k < SHARES ? data[base + SHARES + k] : 1;
      if (share <= after || k === SHARES) {
        const from = data[base + k - 1];
        return after > before ? from + ((share - before) / (after - before)) * (data[base + k] - from) : from;
      }
      before = after;
    }
  }

  /** Share of parcel i's depth that entered after the record's cumulative inflow was `amount` mm. */
  shareAbove(i: number, amount: number): number {
    const { data } = this;
    const base = i * STRIDE;
    let before = 0;
    for (let k = 1; k <= SHARES; k++) {
      const after = k < SHARES ? data[base + SHARES + k] : 1;
      if (amount < data[base + k]) {
        const from = data[base + k - 1];
        return amount <= from ? 1 - before : 1 - before - ((amount - from) / (data[base + k] - from)) * (after - before);
      }
      before = after;
    }
    return 0;
  }

  /** The points of parcel i, from below its older end, its shares scaled into `part` of the whole. */
  private add(i: number, share: number, part: number): void {
    const base = i * STRIDE;
    for (let k = 1; k <= SHARES; k++) {
      const amount = this.data[base + k];
      if (k < SHARES && amount === this.data[base + k + 1]) continue;
      this.amounts[this.points] = amount;
      this.shares[this.points++] = share + part * (k < SHARES ? this.data[base + SHARES + k] : 1);
    }
  }

  /** Drops the point that a straight line between its neighbours misses least. */
  private dropLeast(): void {
    const { amounts, shares } = this;
    let least = Infinity;
    let at = 1;
    for (let k = 1; k + 1 < this.points; k++) {
      const rise = (shares[k + 1] - shares[k - 1]) / (amounts[k + 1] - amounts[k - 1]);
      const miss = Math.abs(shares[k - 1] + rise * (amounts[k] - amounts[k - 1]) - shares[k]);
      if (miss < least) {
        least = miss;
        at = k;
      }
    }
    this.points--;
    amounts.copyWithin(at, at + 1, this.points + 1);
    shares.copyWithin(at, at + 1, this.points + 1);
  }
}
