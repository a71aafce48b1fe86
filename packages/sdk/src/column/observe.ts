import type { ColumnState } from './columnState.js';
import type { InflowClock } from './inflowClock.js';

/** Index of the first parcel (towards younger) that entered wholly at or after `time`. */
export function firstYoungerThan(state: ColumnState, time: number): number {
  let low = -1;
  let high = state.count;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (state.entryStart[middle] >= time) high = middle;
    else low = middle;
  }
  return high;
}

/** Share of parcel i that entered after `time`, by the amounts that entered. */
export function shareAfter(state: ColumnState, clock: InflowClock | null, i: number, time: number): number {
  const start = state.entryStart[i];
  const end = state.entryEnd[i];
  if (time >= end) return 0;
  if (time <= start) return 1;
  const before = state.enteredBefore[i];
  const after = state.enteredAfter[i];
  if (clock === null || end - start <= 1) return (end - time) / (end - start);
  const share = (after - clock.amountAt(time)) / (after - before);
  return share < 0 ? 0 : share > 1 ? 1 : share;
}

/** The time by which the given share of parcel i (counted from its younger end) had not yet entered. */
export function timeOfShare(state: ColumnState, clock: InflowClock | null, i: number, share: number): number {
  const start = state.entryStart[i];
  const end = state.entryEnd[i];
  if (clock === null || end - start <= 1) return end - share * (end - start);
  const time = clock.timeAt(state.enteredAfter[i] - share * (state.enteredAfter[i] - state.enteredBefore[i]));
  return time < start ? start : time > end ? end : time;
}

/** mm that outflow f took in this step from water that entered after `time`; `first` from {@link firstYoungerThan}. */
export function takenAfter(state: ColumnState, clock: InflowClock | null, f: number, time: number, first: number): number {
  const whole = first < state.count ? state.cumulative[f][first] : 0;
  const i = first - 1;
  if (i < 0 || state.entryEnd[i] <= time) return whole;
  return whole + shareAfter(state, clock, i, time) * state.takenFrom(f, i);
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
