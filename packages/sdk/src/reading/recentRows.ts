import { type Forcing, type Station, type StationRows } from '../contract.js';
import { type Issue, RillageError } from '../errors.js';
import { instantMs, instantText } from './readingTime.js';

export const RECENT_STEPS = 400;
const DAY_MS = 86_400_000;
/** Steps: how far a row's start may be off the grid, rounding of instants to whole seconds included. */
const OFF_GRID = 1e-3;
/** mm/day: rows sent again may differ by the rounding of a file, not by more. */
const SAME_FLUX = 1e-9;
const SHOWN = 20;

/** The last rows of a forcing behind earlier ones. */
export function recentRows(forcing: Forcing, earlier?: StationRows): StationRows {
  const { stepDays } = forcing;
  const before = earlier?.inflow.length ?? 0;
  const drop = Math.max(0, before + forcing.inflow.length - RECENT_STEPS);
  const start = instantMs(earlier?.start ?? forcing.start, 'start') + drop * stepDays * DAY_MS;
  const tail = (old: readonly number[] | undefined, added: Float64Array): number[] => {
    const keepOld = Math.max(0, before - drop);
    const head = keepOld > 0 ? (old ?? []).slice(before - keepOld) : [];
    return [...head, ...added.subarray(Math.max(0, added.length - (RECENT_STEPS - keepOld)))];
  };
  return {
    start: instantText(start),
    inflow: tail(earlier?.inflow, forcing.inflow),
    outflows: Object.fromEntries(
      Object.keys(forcing.outflows).map((name) => [name, tail(earlier?.outflows[name], forcing.outflows[name] as Float64Array)]),
    ),
  };
}

/**
 * How many of the forcing's first rows the station already has.
 * @throws RillageError 'step-differs', 'off-grid', 'time-gap', 'contradicting-rows'
 */
export function rowsKnown(station: Station, forcing: Forcing, stationEnd: number): number {
  const checkpoint = (station.members[0] as Station['members'][number]).checkpoint;
  if (Math.abs(forcing.stepDays - checkpoint.stepDays) > 1e-12) {
    throw new RillageError({
      code: 'step-differs',
      path: 'stepDays',
      expected: String(checkpoint.stepDays),
      received: String(forcing.stepDays),
    });
  }
  const stepMs = checkpoint.stepDays * DAY_MS;
  const exact = (stationEnd - instantMs(forcing.start, 'start')) / stepMs;
  const offset = Math.round(exact);
  if (Math.abs(exact - offset) > OFF_GRID) {
    throw new RillageError({
      code: 'off-grid',
      path: 'start',
      expected: `steps that join ${instantText(stationEnd)}`,
      received: forcing.start,
    });
  }
  if (offset < 0) {
    throw new RillageError({
      code: 'time-gap',
      path: 'start',
      expected: `rows from ${instantText(stationEnd)} or earlier`,
      received: forcing.start,
      hint: `${-offset} step(s) are missing between the station and these rows; add them first.`,
    });
  }
  const known = Math.min(offset, forcing.inflow.length);
  refuseContradictions(station, forcing, offset, known);
  return known;
}

function refuseContradictions(station: Station, forcing: Forcing, offset: number, known: number): void {
  const { recent } = station;
  if (!recent) return;
  const issues: Issue[] = [];
  const shift = recent.inflow.length - offset;
  const compare = (path: string, old: readonly number[], given: Float64Array): void => {
    for (let i = Math.max(0, -shift); i < known && issues.length < SHOWN; i += 1) {
      const before = old[shift + i] as number;
      const now = given[i] as number;
      if (Math.abs(before - now) <= SAME_FLUX) continue;
      issues.push({
        code: 'contradicting-rows',
        path: `${path}[${i}]`,
        step: i,
        expected: `${before} mm/day, as the station has it`,
        received: String(now),
        hint: 'A corrected record needs a new run from before the correction.',
      });
    }
  };
  compare('inflow', recent.inflow, forcing.inflow);
  for (const name of Object.keys(recent.outflows)) {
    const given = forcing.outflows[name];
    if (given) compare(`outflows.${name}`, recent.outflows[name] as number[], given);
  }
  if (issues.length > 0) throw new RillageError(issues);
}
