import { type StationHistory } from '../contract.js';
import { type Members } from './members.js';
import { overMembers } from './overMembers.js';
import { instantMs, instantText } from './readingTime.js';

/** A little over ten daily years. */
export const HISTORY_STEPS = 3660;
const DAY_MS = 86_400_000;
const SHARE_DIGITS = 4;
const DAY_DIGITS = 1;
const OTHER_DIGITS = 4;

type Series = (number | null)[];

/**
 * One value a step of what a reading says, over the last {@link HISTORY_STEPS} steps of the runs: middle of the members and, for more than
 * one, the 5–95 % range. Rounded (shares to 0.0001, days to 0.1) so that the file stays small; null where there was no outflow.
 */
export function historyOf(members: Members): StationHistory {
  const from = Math.max(0, members.steps - HISTORY_STEPS);
  const { outflows, weights, assessed } = members;
  const first = outflows[0] as Members['outflows'][number];
  const over = (series: readonly ArrayLike<number>[], p: number, digits: number): Series => {
    const values = new Float64Array(series.length);
    return Array.from({ length: members.steps - from }, (_, i) => {
      for (let m = 0; m < series.length; m += 1) values[m] = (series[m] as ArrayLike<number>)[from + i] as number;
      return rounded(overMembers(values, weights, p), digits);
    });
  };
  const byKey = (
    keys: readonly string[],
    of: (key: string) => readonly ArrayLike<number>[],
    p: number,
    digits: number,
  ): Record<string, Series> => Object.fromEntries(keys.map((key) => [key, over(of(key), p, digits)]));

  const ages = [...first.youngerShare.keys()].sort((a, b) => a - b).map(String);
  const sharesOf = (key: string): Float64Array[] => outflows.map((outflow) => outflow.youngerShare.get(Number(key)) as Float64Array);
  const medians = outflows.map((outflow) => outflow.quantiles.get(0.5));
  const medianDays = medians.map((median) => median?.days ?? new Float64Array(members.steps).fill(NaN));
  const beyond = Array.from({ length: members.steps - from }, (_, i): 0 | 1 => {
    const weight = medians.reduce((sum, median, m) => sum + (median?.beyondRecord[from + i] === 1 ? (weights[m] as number) : 0), 0);
    return weight >= 0.5 ? 1 : 0;
  });
  const ranges = assessed
    ? {
        youngerLow: byKey(ages, sharesOf, 0.05, SHARE_DIGITS),
        youngerHigh: byKey(ages, sharesOf, 0.95, SHARE_DIGITS),
        medianLow: over(medianDays, 0.05, DAY_DIGITS),
        medianHigh: over(medianDays, 0.95, DAY_DIGITS),
      }
    : {};
  return {
    start: instantText(instantMs(members.start, 'start') + from * members.stepDays * DAY_MS),
    stepDays: members.stepDays,
    flow: over([first.flow], 0.5, OTHER_DIGITS),
    younger: byKey(ages, sharesOf, 0.5, SHARE_DIGITS),
    medianDays: over(medianDays, 0.5, DAY_DIGITS),
    medianBeyondRecord: beyond,
    preRecordShare: over(
      outflows.map((outflow) => outflow.preRecordShare),
      0.5,
      SHARE_DIGITS,
    ),
    concentration: byKey(
      Object.keys(first.concentration),
      (key) => outflows.map((outflow) => outflow.concentration[key] as Float64Array),
      0.5,
      OTHER_DIGITS,
    ),
    ...ranges,
  };
}

/** The old history with the new one behind it, cut at the front to {@link HISTORY_STEPS}. Neither is changed. */
export function joinHistory(old: StationHistory, added: StationHistory): StationHistory {
  const drop = Math.max(0, old.flow.length + added.flow.length - HISTORY_STEPS);
  const join = <T>(a: readonly T[] = [], b: readonly T[] = []): T[] => [...a, ...b].slice(drop);
  const joinAll = (a: Record<string, Series> = {}, b: Record<string, Series> = {}): Record<string, Series> =>
    Object.fromEntries(
      Object.keys(a).map((key) => [key, join(a[key], Object.hasOwn(b, key) ? b[key] : new Array<null>(added.flow.length).fill(null))]),
    );
  return {
    start: instantText(instantMs(old.start, 'history.start') + drop * old.stepDays * DAY_MS),
    stepDays: old.stepDays,
    flow: join(old.flow, added.flow),
    younger: joinAll(old.younger, added.younger),
    medianDays: join(old.medianDays, added.medianDays),
    medianBeyondRecord: join(old.medianBeyondRecord, added.medianBeyondRecord),
    preRecordShare: join(old.preRecordShare, added.preRecordShare),
    concentration: joinAll(old.concentration, added.concentration),
    ...(old.youngerLow ? { youngerLow: joinAll(old.youngerLow, added.youngerLow) } : {}),
    ...(old.youngerHigh ? { youngerHigh: joinAll(old.youngerHigh, added.youngerHigh) } : {}),
    ...(old.medianLow ? { medianLow: join(old.medianLow, added.medianLow) } : {}),
    ...(old.medianHigh ? { medianHigh: join(old.medianHigh, added.medianHigh) } : {}),
  };
}

function rounded(value: number, digits: number): number | null {
  return Number.isFinite(value) ? Number(value.toFixed(digits)) : null;
}

/** The last `steps` of a history; all of it where it has no more. Not changed. */
export function lastOfHistory(history: StationHistory, steps: number): StationHistory {
  const drop = Math.max(0, history.flow.length - steps);
  const cut = <T>(value: T): T => {
    if (Array.isArray(value)) return value.slice(drop) as T;
    if (typeof value !== 'object' || value === null) return value;
    return Object.fromEntries(Object.entries(value).map(([key, series]) => [key, cut(series as unknown)])) as T;
  };
  return { ...cut(history), start: instantText(instantMs(history.start, 'history.start') + drop * history.stepDays * DAY_MS) };
}
