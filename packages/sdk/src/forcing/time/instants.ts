import type { Notebook } from '../findings.js';
import type { TimeLayout } from '../layout.js';
import { stampReader } from './pattern.js';
import { zoneOf } from './zone.js';

const HOUR = 3_600_000;

/**
 * Turns a file's stamps, in the file's order, into instants (ms since 1970 UTC); NaN and a problem where one cannot be placed.
 * The order matters: the repeated hour of daylight saving is told apart by it when `repeatedHour` is `inOrder`.
 * A stamp without a clock stands for `readAt` in the zone's standard time, so that days stay 24 hours long.
 * @returns a function of (text, row); call `report` on it once at the end
 */
export function instantReader(
  time: TimeLayout,
  where: string,
  notebook: Notebook,
): { read: (text: string, row: number) => number; report: () => void } {
  const readStamp = stampReader(time.writtenAs ?? 'iso');
  const zone = zoneOf(time.zone ?? 'UTC');
  const [readHour, readMinute] = time.readAt.split(':').map(Number);
  const readAtMs = (readHour * 60 + readMinute) * 60_000;
  const rows24: number[] = [];
  const rowsRepeated: number[] = [];
  const rowsMissing: number[] = [];
  const rowsOffset: number[] = [];
  let previous = -Infinity;

  const place = (wallMs: number, row: number): number => {
    const instants = zone.instantsOf(wallMs);
    if (instants.length === 1) return instants[0];
    if (instants.length === 0) {
      rowsMissing.push(row);
      return time.missingHour === 'shift' ? wallMs - zone.standardOffset(wallMs) : NaN;
    }
    rowsRepeated.push(row);
    if (time.repeatedHour === 'inOrder') return instants[0] > previous ? instants[0] : instants[1];
    return time.repeatedHour === 'refuse' ? NaN : instants[time.repeatedHour === 'first' ? 0 : 1];
  };

  return {
    read(text, row) {
      const stamp = readStamp(text);
      if (!stamp) {
        notebook.problem({ code: 'time-unreadable', path: where, row, expected: `a time written as ${time.writtenAs}`, received: text });
        return NaN;
      }
      if (stamp.midnightAs24) rows24.push(row);
      let instant: number;
      if (stamp.offsetMinutes !== null) {
        rowsOffset.push(row);
        instant = stamp.wallMs - stamp.offsetMinutes * 60_000;
      } else if (!stamp.hasClock) {
        instant = stamp.wallMs + readAtMs - zone.standardOffset(stamp.wallMs);
      } else {
        instant = place(stamp.wallMs, row);
      }
      if (Number.isFinite(instant)) previous = instant;
      return instant;
    },
    report() {
      notebook.noteRows(rows24, {
        code: 'time-24',
        severity: 'note',
        where,
        seen: `${rows24.length} times written as 24:00`,
        done: 'read as 00:00 of the next day',
      });
      if (rowsMissing.length > 0 && time.missingHour === 'refuse') {
        notebook.problem({
          code: 'time-does-not-exist',
          path: where,
          row: rowsMissing[0],
          expected: `times that the clock of ${zone.name} shows`,
          received: `${rowsMissing.length} in the hour that is left out when daylight saving begins`,
          hint: 'The logger probably keeps standard time all year: give its fixed offset as the zone, or set missingHour to shift.',
        });
      }
      if (rowsRepeated.length > 0 && time.repeatedHour === 'refuse') {
        notebook.problem({
          code: 'time-twice',
          path: where,
          row: rowsRepeated[0],
          expected: 'times that name one instant',
          received: `${rowsRepeated.length} in the hour that comes twice when daylight saving ends`,
          hint: 'Set repeatedHour to inOrder, first or second.',
        });
      }
      notebook.noteRows(time.missingHour === 'shift' ? rowsMissing : [], {
        code: 'missing-hour',
        severity: 'warning',
        where,
        seen: `${rowsMissing.length} times in the hour that daylight saving leaves out`,
        done: `read in the standard time of ${zone.name}`,
        settle: 'If the logger keeps standard time all year, give its fixed offset as the zone.',
      });
      notebook.noteRows(time.repeatedHour === 'refuse' ? [] : rowsRepeated, {
        code: 'repeated-hour',
        severity: 'warning',
        where,
        seen: `${rowsRepeated.length} times in the hour that comes twice when daylight saving ends`,
        done: time.repeatedHour === 'inOrder' ? 'told apart by the order of the rows' : `all taken as the ${time.repeatedHour} of the two`,
        settle: 'A record in UTC or a fixed offset has no such hour.',
      });
      if (rowsOffset.length > 0 && time.zone !== null && zone.instantsOf(12 * HOUR)[0] !== 12 * HOUR) {
        notebook.noteRows(rowsOffset, {
          code: 'offset-in-stamps',
          severity: 'note',
          where,
          seen: `${rowsOffset.length} times that carry their own offset`,
          done: `taken by their own offset, not by ${zone.name}`,
        });
      }
    },
  };
}
