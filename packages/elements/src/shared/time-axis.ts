import { date, msPerDay } from './format.js';

/** A mark on a time axis. */
export interface TimeMark {
  /** ms since 1970 */
  time: number;
  label: string;
}

/**
 * Round moments between two instants: years, months, days or hours, about `most` of them at most.
 * @param from, to  ms since 1970
 */
export function timeMarks(language: string, from: number, to: number, most: number): TimeMark[] {
  const span = to - from;
  const unit = units.find(({ length }) => Math.floor(span / length) <= most) ?? units[units.length - 1]!;
  const { starts, options } = unit;
  return starts(from, to)
    .filter((time) => time >= from && time <= to)
    .map((time) => ({ time, label: date(language, time, options) }));
}

const year = (time: number): number => new Date(time).getUTCFullYear();

/** Every `months` months, counted from a January. */
const everyMonths =
  (months: number) =>
  (from: number, to: number): number[] => {
    const marks: number[] = [];
    const first = months > 12 ? Math.floor(year(from) / (months / 12)) * (months / 12) : year(from);
    for (let month = 0; ; month += months) {
      const time = Date.UTC(first, month, 1);
      if (time > to || marks.length > 2000) return marks;
      marks.push(time);
    }
  };
const every =
  (length: number) =>
  (from: number, to: number): number[] => {
    const first = Math.ceil(from / length);
    return Array.from({ length: Math.max(0, Math.floor(to / length) - first + 1) }, (_, index) => (first + index) * length);
  };

interface Unit {
  /** ms */
  length: number;
  starts: (from: number, to: number) => number[];
  options: Intl.DateTimeFormatOptions;
}
const hours = (count: number): Unit => ({
  length: (count * msPerDay) / 24,
  starts: every((count * msPerDay) / 24),
  options: { hour: 'numeric', minute: '2-digit' },
});
const days = (count: number): Unit => ({
  length: count * msPerDay,
  starts: every(count * msPerDay),
  options: { day: 'numeric', month: 'short' },
});
const months = (count: number): Unit => ({
  length: count * 30.4375 * msPerDay,
  starts: everyMonths(count),
  options: count < 12 ? { month: 'short', year: '2-digit' } : { year: 'numeric' },
});
const units: Unit[] = [
  hours(1),
  hours(6),
  days(1),
  days(7),
  months(1),
  months(3),
  months(12),
  months(24),
  months(60),
  months(120),
  months(600),
];
