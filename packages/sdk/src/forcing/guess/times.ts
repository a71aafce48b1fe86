import type { Row } from '../text/tokenize.js';
import { stampReader, type WallTime } from '../time/pattern.js';

export interface TimeGuess {
  /** Positions from 0. */
  columns: number[];
  from: number[];
  /** null where day and month cannot be told apart. */
  writtenAs: string | null;
  /** Patterns that fit every row. */
  candidates: string[];
  hasOffsets: boolean;
  hasClock: boolean;
  /** First row of values, index. */
  firstRow: number;
}

const DATES = [
  'YYYY/MM/DD',
  'YYYY.MM.DD',
  'DD.MM.YYYY',
  'DD.MM.YY',
  'DD/MM/YYYY',
  'MM/DD/YYYY',
  'DD-MM-YYYY',
  'MM-DD-YYYY',
  'DD/MM/YY',
  'MM/DD/YY',
  'DD-MON-YYYY',
  'DD MON YYYY',
  'DD-MON-YY',
  'MON DD, YYYY',
  'MON DD YYYY',
];
const CLOCKS = ['', ' hh:mm', ' hh:mm:ss', ' hh:mm AP', ' hh:mm:ss AP', ' hh:mm Z', ' hh:mm:ss Z', 'Thh:mm', 'Thh:mm:ss'];
const PATTERNS = ['iso', 'YYYYMMDDhhmm', 'YYYYMMDDhh', ...DATES.flatMap((date) => CLOCKS.map((clock) => date + clock))];
const SERIAL_WORDS = /date|time|datum|zeit|tag|day|fecha|jour/i;
const LOOK_AT = 60;

/** Looks for the column, or the columns, that say when; null where none does. */
export function guessTimes(rows: readonly Row[]): TimeGuess | null {
  return stampColumns(rows) ?? splitDate(rows) ?? serialColumn(rows);
}

function stampColumns(rows: readonly Row[]): TimeGuess | null {
  const width = Math.min(50, Math.max(0, ...rows.slice(0, 200).map(({ cells }) => cells.length)));
  const found: { column: number; writtenAs: string[]; first: number }[] = [];
  for (let column = 0; column < width && found.length < 2; column++) {
    const first = firstStamp(rows, column);
    if (first < 0) continue;
    const sample = spreadOver(rows, first, column);
    const fitting = fittingPatterns(sample, 0.9);
    if (fitting.length > 0) found.push({ column, writtenAs: exactOnAll(rows, first, column, fitting), first });
  }
  if (found.length === 0) return null;
  const [one, two] = found;
  const columns = [two && two.column === one.column + 1 ? two.column : one.column];
  const from = columns[0] === one.column ? [] : [one.column];
  let candidates = one.writtenAs;
  const sample = spreadOver(rows, one.first, one.column);
  let hasClock = stampsOf(sample, candidates[0]).some((stamp) => stamp.hasClock);
  const clock = from.length === 0 && !hasClock ? clockColumn(rows, one.first, one.column + 1) : null;
  if (clock !== null) {
    columns.push(one.column + 1);
    candidates = candidates.map((pattern) => (pattern === 'iso' ? 'iso' : pattern + clock));
    hasClock = true;
  }
  const hasOffsets = stampsOf(sample, candidates[0]).some((stamp) => stamp.offsetMinutes !== null);
  return { columns, from, candidates, writtenAs: settled(candidates), hasOffsets, hasClock, firstRow: one.first };
}

/** Dots between numbers put the day first wherever they are used (common practice); slashes and dashes do not tell. */
function settled(candidates: string[]): string | null {
  const dayFirst = candidates.some((pattern) => /^DD[/-]MM/.test(pattern));
  const monthFirst = candidates.some((pattern) => /^MM[/-]DD/.test(pattern));
  return dayFirst && monthFirst ? null : (candidates[0] ?? null);
}

/** First row whose cell reads as a time, and the next row of that column does as well unless it is the last. */
function firstStamp(rows: readonly Row[], column: number): number {
  for (let index = 0; index < Math.min(rows.length, 200); index++) {
    if (!looksLikeTime(rows[index].cells[column])) continue;
    if (index + 1 >= rows.length || looksLikeTime(rows[index + 1].cells[column]) || looksLikeTime(rows[index + 2]?.cells[column]))
      return index;
  }
  return -1;
}

function looksLikeTime(cell: string | undefined): boolean {
  return cell !== undefined && cell.length >= 6 && cell.length <= 40 && /\d/.test(cell) && READERS.some((read) => read(cell) !== null);
}

const READERS = PATTERNS.map(stampReader);

function spreadOver(rows: readonly Row[], first: number, column: number): string[] {
  const step = Math.max(1, Math.floor((rows.length - first) / LOOK_AT));
  const cells: string[] = [];
  for (let index = first; index < rows.length; index += step) cells.push(rows[index].cells[column] ?? '');
  return cells.filter((cell) => cell !== '');
}

function fittingPatterns(cells: readonly string[], share: number): string[] {
  return PATTERNS.filter((_, index) => cells.filter((cell) => READERS[index](cell) !== null).length >= share * cells.length);
}

/** Among patterns that fit the sample, those that fit the most rows of all; a 13th month settles the order of day and month here. */
function exactOnAll(rows: readonly Row[], first: number, column: number, patterns: readonly string[]): string[] {
  if (patterns.length === 1) return [...patterns];
  const counts = patterns.map((pattern) => {
    const read = READERS[PATTERNS.indexOf(pattern)];
    let count = 0;
    for (let index = first; index < rows.length; index++) if (read(rows[index].cells[column] ?? '') !== null) count += 1;
    return count;
  });
  const most = Math.max(...counts);
  return patterns.filter((_, index) => counts[index] === most);
}

function stampsOf(cells: readonly string[], pattern: string | undefined): WallTime[] {
  if (pattern === undefined) return [];
  const read = stampReader(pattern);
  return cells.map((cell) => read(cell)).filter((stamp) => stamp !== null);
}

function clockColumn(rows: readonly Row[], first: number, column: number): string | null {
  const cells = spreadOver(rows, first, column);
  if (cells.length === 0) return null;
  const share = (test: RegExp): number => cells.filter((cell) => test.test(cell)).length / cells.length;
  if (share(/^\d{1,2}:\d{2}$/) > 0.9) return ' hh:mm';
  if (share(/^\d{1,2}:\d{2}:\d{2}$/) > 0.9) return ' hh:mm:ss';
  return share(/^\d{1,2}:\d{2} *[ap]\.?m\.?$/i) > 0.9 ? ' hh:mm AP' : null;
}

/** Year, month and day in columns of their own; without the day in a table of months. */
function splitDate(rows: readonly Row[]): TimeGuess | null {
  const width = Math.min(12, Math.max(0, ...rows.slice(0, 50).map(({ cells }) => cells.length)));
  for (let column = 0; column + 1 < width; column++) {
    const first = rows.findIndex(
      ({ cells }, index) => index < 50 && inRange(cells[column], 1700, 2299) && inRange(cells[column + 1], 1, 12),
    );
    if (first < 0) continue;
    const body = rows.slice(first, first + LOOK_AT);
    const all = (offset: number, low: number, high: number): boolean =>
      body.every(({ cells }) => inRange(cells[column + offset], low, high));
    if (!all(0, 1700, 2299) || !all(1, 1, 12)) continue;
    const base = { from: [], hasOffsets: false, hasClock: false, firstRow: first };
    const isMonths = (rows[first]?.cells.length ?? 0) - column >= 30;
    if (!isMonths && all(2, 1, 31))
      return { ...base, columns: [column, column + 1, column + 2], writtenAs: 'YYYY MM DD', candidates: ['YYYY MM DD'] };
    if (isMonths) return { ...base, columns: [column, column + 1], writtenAs: 'YYYY MM', candidates: ['YYYY MM'] };
  }
  return null;
}

function inRange(cell: string | undefined, low: number, high: number): boolean {
  return cell !== undefined && /^\d{1,4}$/.test(cell) && Number(cell) >= low && Number(cell) <= high;
}

/** Spreadsheet days: rising numbers between 1 January 1955 and 2119 under a header that speaks of time. */
function serialColumn(rows: readonly Row[]): TimeGuess | null {
  const width = Math.min(50, Math.max(0, ...rows.slice(0, 50).map(({ cells }) => cells.length)));
  for (let column = 0; column < width; column++) {
    const first = rows.findIndex(({ cells }, index) => index < 50 && /^\d{5}([.,]\d+)?$/.test(cells[column] ?? ''));
    if (first < 1 || !rows.slice(0, first).some(({ cells }) => SERIAL_WORDS.test(cells[column] ?? ''))) continue;
    const values = spreadOver(rows, first, column).map((cell) => Number(cell.replace(',', '.')));
    const rising = values.every((value, index) => value > 20_000 && value < 80_000 && (index === 0 || value > values[index - 1]));
    if (!rising) continue;
    const hasClock = values.some((value) => !Number.isInteger(value));
    return {
      columns: [column],
      from: [],
      writtenAs: 'serial1900',
      candidates: ['serial1900', 'serial1904'],
      hasOffsets: false,
      hasClock,
      firstRow: first,
    };
  }
  return null;
}
