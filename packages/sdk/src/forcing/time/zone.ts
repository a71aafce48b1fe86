import { RillageError } from '../../errors.js';
import { offsetOf } from './pattern.js';

const MINUTE = 60_000;
const DAY = 86_400_000;

export interface Zone {
  name: string;
  /** Every instant whose wall clock this is, in order: one as a rule, two in the repeated hour, none in the missing one. */
  instantsOf(wallMs: number): number[];
  /** ms east of UTC without daylight saving, in the year of that wall clock. */
  standardOffset(wallMs: number): number;
}

/**
 * A zone by name: `UTC`, a fixed offset (`+01:00`), or an IANA name by the platform's own tables.
 * @throws RillageError 'zone-unknown'
 */
export function zoneOf(name: string): Zone {
  if (/^(UTC|Z)$/i.test(name)) return fixedZone('UTC', 0);
  if (/^[+-]\d{2}:?\d{2}$/.test(name)) {
    const minutes = offsetOf(name);
    if (Math.abs(minutes) <= 18 * 60) return fixedZone(name, minutes * MINUTE);
  }
  return ianaZone(name);
}

function fixedZone(name: string, offset: number): Zone {
  return { name, instantsOf: (wallMs) => [wallMs - offset], standardOffset: () => offset };
}

/** Asks the platform once a quarter-hour at most and remembers each year's changes, for a formatter call costs microseconds. */
function ianaZone(name: string): Zone {
  const clock = formatter(name);
  const years = new Map<number, { from: number[]; offset: number[] }>();
  const offsetAt = (instant: number): number => {
    const year = new Date(instant).getUTCFullYear();
    let changes = years.get(year);
    if (!changes) years.set(year, (changes = changesOf(clock, year)));
    let index = changes.from.length - 1;
    while (index > 0 && changes.from[index] > instant) index -= 1;
    return changes.offset[index];
  };
  return {
    name,
    instantsOf(wallMs) {
      const candidates = new Set([offsetAt(wallMs - DAY), offsetAt(wallMs + DAY)]);
      return [...candidates]
        .map((offset) => wallMs - offset)
        .filter((instant) => instant + offsetAt(instant) === wallMs)
        .sort((a, b) => a - b);
    },
    standardOffset(wallMs) {
      const year = new Date(wallMs).getUTCFullYear();
      return Math.min(offsetAt(Date.UTC(year, 0, 1)), offsetAt(Date.UTC(year, 6, 1)));
    },
  };
}

function formatter(name: string): (instant: number) => number {
  let format: Intl.DateTimeFormat;
  try {
    if (!/^[A-Za-z][A-Za-z0-9_+\-/]{1,50}$/.test(name)) throw new RangeError(name);
    format = new Intl.DateTimeFormat('en-US', {
      timeZone: name,
      hourCycle: 'h23',
      year: 'numeric',
      month: 'numeric',
      day: 'numeric',
      hour: 'numeric',
      minute: 'numeric',
      second: 'numeric',
    });
  } catch {
    throw new RillageError({
      code: 'zone-unknown',
      path: 'zone',
      expected: 'UTC, a fixed offset such as +01:00, or an IANA name such as Europe/Vienna',
      received: name,
    });
  }
  return (instant) => {
    const part: Record<string, number> = {};
    for (const { type, value } of format.formatToParts(instant)) part[type] = Number(value);
    const wall = Date.UTC(part['year'], part['month'] - 1, part['day'], part['hour'], part['minute'], part['second']);
    return wall - Math.floor(instant / 1000) * 1000;
  };
}

/** Instants within a UTC year at which the offset changes, to the minute, and the offset from each on. */
function changesOf(offsetAt: (instant: number) => number, year: number): { from: number[]; offset: number[] } {
  const end = Date.UTC(year + 1, 0, 1);
  let last = Date.UTC(year, 0, 1);
  const changes = { from: [last], offset: [offsetAt(last)] };
  for (let next = last + 7 * DAY; last < end; next = Math.min(next + 7 * DAY, end)) {
    const offset = offsetAt(next);
    if (offset !== changes.offset[changes.offset.length - 1]) {
      let low = last;
      let high = next;
      while (high - low > MINUTE) {
        const middle = low + Math.floor((high - low) / 2 / MINUTE) * MINUTE;
        if (offsetAt(middle) === offset) high = middle;
        else low = middle;
      }
      changes.from.push(high);
      changes.offset.push(offset);
    }
    last = next;
  }
  return changes;
}
