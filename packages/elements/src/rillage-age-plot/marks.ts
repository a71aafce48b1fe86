import { amountIn, lengths } from '../shared/format.js';
import type { AgeMark, Frame } from './axis.js';
import type { Speech } from './view.js';

/** Marks people know on a stretched axis; whole years (or months, in a short record) on an even one. */
export function ageMarks(speech: Speech, { log, recordDays }: Frame): AgeMark[] {
  // A mark in the last hundredth would sit on the record's edge, which is a mark of its own.
  if (log) return human.map(({ days, key }) => ({ days, label: speech.say(key) })).filter(({ days }) => days <= recordDays * 1.01);
  const unit = recordDays > 3 * lengths.year ? 'year' : recordDays > 3 * lengths.month ? 'month' : 'day';
  const every = Math.max(1, Math.ceil(recordDays / lengths[unit] / 8));
  const count = Math.floor(recordDays / lengths[unit] / every + 0.01);
  return Array.from({ length: count }, (_, index) => (index + 1) * every).map((value) => ({
    days: value * lengths[unit],
    label: amountIn(speech.tag, value, unit),
  }));
}

const human = [
  { days: 7, key: 'plot.week' },
  { days: 30, key: 'plot.month' },
  { days: 91, key: 'plot.season' },
  { days: 365, key: 'plot.year' },
  { days: 3652, key: 'plot.tenYears' },
] as const;
