import { RillageError } from '../../errors.js';
import type { SettledLayout } from '../layout.js';
import type { Notebook } from '../findings.js';
import { stampReader } from '../time/pattern.js';
import { zoneOf } from '../time/zone.js';
import type { Pieces } from './series.js';

/** The steps of a forcing: `count` of `stepMs` each, from `startMs`. */
export interface Grid {
  startMs: number;
  stepMs: number;
  count: number;
}

const DAY = 86_400_000;

/**
 * The longest run of whole steps that every series reaches, or the period that the layout names.
 * @throws RillageError 'no-common-period' | 'too-many-steps' | 'time-unreadable' | 'zone-unknown'
 */
export function gridOver(series: readonly Pieces[], layout: SettledLayout, notebook: Notebook): Grid {
  const stepMs = Math.round(layout.grid.stepDays * 1440) * 60_000;
  const reaching = series.filter(({ from }) => from.length > 0);
  const starts = reaching.map(({ from }) => from[0]);
  const ends = reaching.map(({ to }) => to[to.length - 1]);
  const origin = originOf(layout, starts[0] ?? 0);
  const bounds = { from: boundOf(layout, 'from'), to: boundOf(layout, 'to') };
  const first = Math.ceil((bounds.from ?? Math.max(...starts)) / stepMs - origin / stepMs - 1e-9);
  const end = Math.floor((bounds.to ?? Math.min(...ends)) / stepMs - origin / stepMs + 1e-9);
  if (!(end > first)) {
    throw new RillageError({
      code: 'no-common-period',
      path: 'grid',
      expected: 'at least one step that every series reaches',
      received: reaching.map(({ where }, index) => `${where} ${day(starts[index])} to ${day(ends[index])}`).join('; '),
      hint: 'Check the dates, the order of day and month, and the zone.',
    });
  }
  if (end - first > layout.limits.steps) {
    throw new RillageError({
      code: 'too-many-steps',
      path: 'grid',
      expected: `at most ${layout.limits.steps} steps`,
      received: String(end - first),
      hint: 'Is a year misread? Otherwise take longer steps, or raise limits.steps.',
    });
  }
  const grid = { startMs: origin + first * stepMs, stepMs, count: end - first };
  reaching.forEach(({ where }, index) => noteTrimmed(where, starts[index], ends[index], grid, notebook));
  return grid;
}

/** Midnight, or `dayBegins`, of the zone's standard time on the day the record begins. */
function originOf({ grid }: SettledLayout, near: number): number {
  const [hour, minute] = grid.dayBegins.split(':').map(Number);
  const offset = zoneOf(grid.zone ?? 'UTC').standardOffset(near);
  return Math.floor(near / DAY) * DAY + (hour * 60 + minute) * 60_000 - offset;
}

function boundOf(layout: SettledLayout, key: 'from' | 'to'): number | null {
  const text = layout.grid[key];
  if (text === null) return null;
  const stamp = stampReader('iso')(text);
  if (!stamp) throw new RillageError({ code: 'time-unreadable', path: `grid.${key}`, expected: 'an ISO date or instant', received: text });
  if (stamp.offsetMinutes !== null) return stamp.wallMs - stamp.offsetMinutes * 60_000;
  const [hour, minute] = stamp.hasClock ? [0, 0] : layout.grid.dayBegins.split(':').map(Number);
  return stamp.wallMs + (hour * 60 + minute) * 60_000 - zoneOf(layout.grid.zone ?? 'UTC').standardOffset(stamp.wallMs);
}

function noteTrimmed(where: string, start: number, end: number, grid: Grid, notebook: Notebook): void {
  const before = Math.max(0, Math.round((grid.startMs - start) / grid.stepMs));
  const after = Math.max(0, Math.round((end - grid.startMs) / grid.stepMs - grid.count));
  if (before + after === 0) return;
  notebook.note({
    code: 'outside-common-period',
    severity: 'note',
    where,
    count: before + after,
    seen: `${before} steps before and ${after} after the period that every series reaches`,
    done: `left out; the record runs from ${day(grid.startMs)} to ${day(grid.startMs + grid.count * grid.stepMs)}`,
    settle: 'Name the period in grid.from and grid.to.',
  });
}

/**
 * Mean of a series over each step, by exact overlap in time.
 * @returns [count] NaN where the pieces do not cover the whole step; `resampled` counts steps made of parts of pieces
 */
export function ontoGrid(series: Pieces, grid: Grid): { values: Float64Array; resampled: number } {
  const values = new Float64Array(grid.count);
  const covered = new Float64Array(grid.count);
  const parts = new Uint8Array(grid.count);
  for (let index = 0; index < series.from.length; index++) {
    const begin = (series.from[index] - grid.startMs) / grid.stepMs;
    const end = (series.to[index] - grid.startMs) / grid.stepMs;
    const length = end - begin;
    for (let step = Math.max(0, Math.floor(begin)); step < Math.min(grid.count, Math.ceil(end)); step++) {
      const low = Math.max(begin, step);
      const high = Math.min(end, step + 1);
      const middle = ((low + high) / 2 - begin) / length;
      const mean =
        series.first[index] === series.last[index]
          ? series.first[index]
          : series.first[index] + (series.last[index] - series.first[index]) * middle;
      // A piece that is the step keeps its digits.
      if (high - low === 1) values[step] = mean;
      else values[step] += mean * (high - low);
      covered[step] += high - low;
      if (high - low < 1 && (begin < step || end > step + 1)) parts[step] = 1;
    }
  }
  let resampled = 0;
  for (let step = 0; step < grid.count; step++) {
    if (covered[step] < 1 - 1e-9) values[step] = NaN;
    else resampled += parts[step];
  }
  return { values, resampled };
}

export function day(ms: number): string {
  return Number.isFinite(ms) ? new Date(ms).toISOString().slice(0, 10) : 'never';
}
