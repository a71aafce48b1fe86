/** Deviation from a straight line that may be forgotten, per mm that entered since: about the share of an outflow that it can misplace. */
const FORGOTTEN = 1e-3;

/**
 * Cumulative inflow against time, thinned with age where a straight line serves as well: it says how the rain was spread within a merged
 * parcel's entry interval, so that an age can be placed inside it. Its length grows much more slowly than the record: 1,262 points for 20 daily years.
 */
export class InflowClock {
  /** Steps since the record began, increasing. */
  times: number[] = [];
  /** mm entered by then, not decreasing. */
  amounts: number[] = [];
  /** Where the last answer of `amountAt` lay. */
  place = 0;

  add(start: number, end: number, before: number, after: number): void {
    if (this.times.length === 0 || this.times[this.times.length - 1] < start) this.push(start, before);
    this.push(end, after);
  }

  /**
   * mm that had entered by `time`; linear between what is kept.
   * @param near  a place from which to look, such as where the last step's answer lay
   */
  amountAt(time: number, near: number): number {
    const { times, amounts } = this;
    const k = (this.place = walkedTo(times, time, near));
    return k < 0 && times.length === 0 ? 0 : between(times, amounts, k, time);
  }

  /** The time by which `amount` mm had entered. */
  timeAt(amount: number): number {
    const { times, amounts } = this;
    return between(amounts, times, lastAtOrBelow(amounts, amount), amount);
  }

  thin(): void {
    const { times, amounts } = this;
    const entered = amounts.length > 0 ? amounts[amounts.length - 1] : 0;
    let kept = 0;
    for (let k = 0; k < times.length; k++) {
      if (kept > 0 && k + 1 < times.length) {
        const before = kept - 1;
        const rate = (amounts[k + 1] - amounts[before]) / (times[k + 1] - times[before]);
        const deviation = Math.abs(amounts[before] + rate * (times[k] - times[before]) - amounts[k]);
        if (deviation <= FORGOTTEN * (entered - amounts[k])) continue;
      }
      times[kept] = times[k];
      amounts[kept] = amounts[k];
      kept++;
    }
    times.length = kept;
    amounts.length = kept;
  }

  private push(time: number, amount: number): void {
    this.times.push(time);
    this.amounts.push(amount);
  }
}

/** y at x, where x lies between places k and k + 1 of a list; held beyond its ends. */
function between(xs: readonly number[], ys: readonly number[], k: number, x: number): number {
  if (k < 0) return ys[0];
  return k === xs.length - 1 ? ys[k] : ys[k] + ((x - xs[k]) / (xs[k + 1] - xs[k])) * (ys[k + 1] - ys[k]);
}

/** As `lastAtOrBelow`, one entry after the other from `near`. */
function walkedTo(list: readonly number[], value: number, near: number): number {
  let k = Math.min(near, list.length - 1);
  while (k >= 0 && list[k] > value) k--;
  while (k + 1 < list.length && list[k + 1] <= value) k++;
  return k;
}

/** Index of the last entry ≤ value in a list that does not decrease; −1 if all are above. */
function lastAtOrBelow(list: readonly number[], value: number): number {
  let low = -1;
  let high = list.length;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (list[middle] <= value) low = middle;
    else high = middle;
  }
  return low;
}
