import type { ColumnState } from './columnState.js';
import type { InflowClock } from './inflowClock.js';

/** Index of the first parcel (towards younger) that entered wholly at or after `time`, looked for from `near` on. */
export function firstYoungerThan(state: ColumnState, time: number, near: number): number {
  let first = Math.min(near, state.count);
  while (first > 0 && state.entryStart[first - 1] >= time) first--;
  while (first < state.count && state.entryStart[first] < time) first++;
  return first;
}

/** Share of parcel i that entered after `time`; `near` as in `InflowClock.amountAt`. */
export function shareAfter(state: ColumnState, clock: InflowClock | null, i: number, time: number, near: number): number {
  const start = state.entryStart[i];
  const end = state.entryEnd[i];
  if (time >= end) return 0;
  if (time <= start) return 1;
  if (clock === null || state.curves.isOne(i)) return (end - time) / (end - start);
  return state.curves.shareAbove(i, clock.amountAt(time, near));
}

/** The time by which the given share of parcel i (counted from its younger end) had not yet entered. */
export function timeOfShare(state: ColumnState, clock: InflowClock | null, i: number, share: number): number {
  const start = state.entryStart[i];
  const end = state.entryEnd[i];
  if (clock === null || state.curves.isOne(i)) return end - share * (end - start);
  const time = clock.timeAt(state.curves.enteredAt(i, 1 - share));
  return time < start ? start : time > end ? end : time;
}

/** Entry time of the water at which outflow f reaches `amount` mm, counted from the youngest; NaN if its parcels give less. */
export function timeOfAmount(state: ColumnState, clock: InflowClock | null, f: number, amount: number): number {
  if (state.count === 0 || !(state.cumulative[f][0] >= amount)) return NaN;
  let low = 0;
  let high = state.count;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (state.cumulative[f][middle] >= amount) low = middle;
    else high = middle;
  }
  const above = low + 1 < state.count ? state.cumulative[f][low + 1] : 0;
  const given = state.takenFrom(f, low);
  const share = given > 0 ? (amount - above) / given : 0;
  return timeOfShare(state, clock, low, share < 0 ? 0 : share > 1 ? 1 : share);
}
