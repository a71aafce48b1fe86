import type { Finding } from '../contract.js';
import { shorten } from '../errors.js';
import { Notebook } from './findings.js';
import { guessDelimiter, guessNumberMarks, guessRemarkMark } from './guess/dialect.js';
import { guessRows, unitInHeader, unitText } from './guess/rows.js';
import { guessTimes, type TimeGuess } from './guess/times.js';
import { ABSENT_NUMBERS, ABSENT_WORDS, RAIN_WORDS, roleOf, STREAM_WORDS, TRACE_WORDS } from './guess/words.js';
import type { ColumnLayout, Holds, Layout, SourceLayout, StandsFor } from './layout.js';
import { takeSources, type Sources, type SourceText } from './text/sources.js';
import { tokenize, type Row } from './text/tokenize.js';
import { stampReader } from './time/pattern.js';
import { findUnit } from '../units/parseUnit.js';

export interface LayoutGuess {
  /** A proposal, for the caller to confirm: what the files do not say is null in it, and a finding says so. */
  layout: Layout;
  findings: Finding[];
}

const MOST_ROWS = 2_000_000;
const MOST_COLUMNS = 2000;
const WEATHER: ReadonlySet<Holds> = new Set([
  'dewPoint',
  'humidityMax',
  'humidityMin',
  'humidityMean',
  'windSpeed',
  'sunshine',
  'solarRadiation',
  'tmin',
  'tmax',
  'tmean',
]);

/**
 * Looks at an agency's texts and proposes how to read them. It decides nothing that a file leaves open: an order of day and month that
 * fits both ways, a zone that no stamp carries, a unit that no header names come back as null with a finding each, and `readForcing`
 * refuses the layout until they are settled. Time is linear in the size of the texts.
 * @throws RillageError as `readForcing` does for a source that is empty, HTML, or larger than the cap
 */
export function guessLayout(sources: Sources): LayoutGuess {
  const notebook = new Notebook();
  const texts = takeSources(sources, notebook);
  notebook.stopIfAny();
  const layout: Layout = { sources: texts.map((source) => guessSource(source, notebook)) };
  const hasZone = texts.length > 0 && layout.sources.every((source) => source.time.zone === 'UTC');
  layout.grid = { stepDays: 1, dayBegins: '00:00', zone: hasZone ? 'UTC' : null };
  if (!hasZone) {
    open(
      notebook,
      'zone-open',
      'grid.zone',
      'stamps without an offset',
      'Say in which zone the clock runs: UTC, a fixed offset such as +01:00, or an IANA name.',
    );
  }
  const columns = layout.sources.flatMap((source) => source.columns);
  if (columns.some(({ holds, unit }) => holds === 'outflow' && unit !== undefined && unit !== null && /m3|m³|l\/s|ft|cfs/i.test(unit))) {
    open(notebook, 'area-open', 'areaKm2', 'a flow in volume per time', 'Give the catchment area in km², so that flow becomes mm/day.');
  }
  const has = (what: Holds, as = ''): boolean => columns.some(({ holds, as: name }) => holds === what && (as === '' || name === as));
  if (!has('outflow', 'evapotranspiration') && has('tmin') && has('tmax')) {
    layout.evapotranspiration = { method: 'hargreaves', as: 'evapotranspiration' };
    notebook.note({
      code: 'evapotranspiration-proposed',
      severity: 'note',
      where: 'evapotranspiration',
      seen: 'temperatures, and no evapotranspiration',
      done: 'Proposed Hargreaves from the temperatures.',
      settle: 'Give the latitude, or null for no evapotranspiration.',
    });
  }
  return { layout, findings: notebook.findings };
}

function guessSource(source: SourceText, notebook: Notebook): SourceLayout {
  const remarkMark = guessRemarkMark(source.text);
  const { splitAt } = guessDelimiter(source.text, remarkMark);
  const { rows } = tokenize(source.text, { splitAt, remarkMark, maxRows: MOST_ROWS, maxColumns: MOST_COLUMNS });
  const time = guessTimes(rows);
  const where = source.name;
  if (time === null) {
    open(
      notebook,
      'time-open',
      `${where}.time`,
      'no column that reads as a time',
      'Name the columns that say when, and how they are written.',
    );
    return { name: source.name, splitAt, remarkMark, namesRow: 1, dataFrom: 2, time: { columns: [1], writtenAs: null }, columns: [] };
  }
  const timeColumns = new Set([...time.columns, ...time.from]);
  const head = guessRows(rows, time.firstRow);
  const body = rows.slice(time.firstRow);
  const marks = guessNumberMarks(body, timeColumns);
  note(
    notebook,
    where,
    `cells split at ${splitAt === '\t' ? 'tabs' : splitAt}, decimal mark ${marks.decimalMark}, remarks after ${remarkMark}`,
  );
  if (marks.isAmbiguous) {
    notebook.noteRows(marks.commaRows, {
      code: 'decimal-open',
      severity: 'warning',
      where,
      seen: 'numbers like 1,234 and none that tells whether the comma is a decimal or a thousands mark',
      done: 'Proposed a decimal comma.',
      settle: 'Set decimalMark and groupMark.',
    });
  }
  reportTime(time, where, notebook);
  const everyDays = spacingOf(body, time);
  const remarks = source.text.slice(0, 5000);
  const columns = columnsOf(rows, body, head, time, marks.decimalMark, `${source.name} ${remarks}`, notebook, where);
  return {
    name: source.name,
    splitAt,
    decimalMark: marks.decimalMark,
    groupMark: marks.groupMark,
    remarkMark,
    namesRow: head.namesRow,
    unitsRow: head.unitsRow,
    typesRow: head.typesRow,
    dataFrom: head.dataFrom,
    table: time.writtenAs === 'YYYY MM' ? 'months' : 'rows',
    time: {
      columns: time.columns.map((column) => column + 1),
      from: time.from.map((column) => column + 1),
      writtenAs: time.writtenAs,
      zone: time.hasOffsets ? 'UTC' : null,
      ...(time.from.length > 0 && !time.hasClock ? { lastDayIncluded: true } : {}),
    },
    everyDays: time.from.length > 0 || columns.some(({ holds }) => holds === 'streamTracer' || holds === 'rainTracer') ? null : everyDays,
    columns,
  };
}

function reportTime(time: TimeGuess, where: string, notebook: Notebook): void {
  if (time.writtenAs === null) {
    open(
      notebook,
      'date-order-open',
      `${where}.time.writtenAs`,
      `dates that fit ${time.candidates.slice(0, 2).join(' and ')}`,
      'Say whether the day or the month stands first.',
    );
  } else if (time.writtenAs === 'serial1900') {
    open(
      notebook,
      'serial-dates',
      `${where}.time.writtenAs`,
      'spreadsheet day numbers, counted from 1900 or from 1904',
      'Confirm serial1900, or set serial1904.',
    );
  } else note(notebook, where, `times written as ${time.writtenAs}`);
  if (time.from.length > 0 && !time.hasClock) {
    open(
      notebook,
      'interval-end-open',
      `${where}.time.lastDayIncluded`,
      'intervals from one date to another',
      'Proposed that the last day named belongs to the interval; confirm it.',
    );
  }
}

function columnsOf(
  rows: readonly Row[],
  body: readonly Row[],
  head: { namesRow: number; unitsRow: number },
  time: TimeGuess,
  decimalMark: '.' | ',',
  context: string,
  notebook: Notebook,
  where: string,
): ColumnLayout[] {
  const names = head.namesRow > 0 ? rows[head.namesRow - 1].cells : [];
  const units = head.unitsRow > 0 ? rows[head.unitsRow - 1].cells : [];
  const width = Math.min(MOST_COLUMNS, Math.max(names.length, ...body.slice(0, 200).map(({ cells }) => cells.length), 0));
  const taken = new Set([...time.columns, ...time.from]);
  const fromRain = time.from.length > 0 || (RAIN_WORDS.test(context) && !STREAM_WORDS.test(context));
  const columns: ColumnLayout[] = [];
  for (let index = 0; index < width; index++) {
    if (taken.has(index)) continue;
    const name = names[index] ?? '';
    const cells = body.map((row) => row.cells[index] ?? '');
    const position = index + 1;
    const role = name === '' ? null : roleOf(name);
    const isNumeric = numericShare(cells, decimalMark) > 0.5;
    if (role === null || !isNumeric) {
      if (isNumeric)
        open(
          notebook,
          'column-open',
          `${where}.${shorten(name, 40) || position}`,
          'numbers under a header that says nothing known',
          'Say what the column holds, or leave it ignored.',
        );
      columns.push({ position, name, holds: 'ignored' });
      continue;
    }
    const written = unitText(units[index] ?? '') || unitInHeader(name);
    const unit = written !== null && written !== '' && findUnit(written) !== null ? written : null;
    if (unit === null) open(notebook, 'unit-open', `${where}.${shorten(name, 40)}`, 'no unit in the header or below it', 'Give the unit.');
    columns.push(describeColumn(position, name, role, unit, cells, decimalMark, fromRain));
  }
  return columns;
}

function describeColumn(
  position: number,
  name: string,
  role: { holds: Holds; as: string },
  unit: string | null,
  cells: readonly string[],
  decimalMark: '.' | ',',
  fromRain: boolean,
): ColumnLayout {
  const holds: Holds = role.holds === 'streamTracer' && fromRain ? 'rainTracer' : role.holds;
  const standsFor: StandsFor =
    holds === 'rainTracer'
      ? 'bulk'
      : holds === 'streamTracer'
        ? 'instant'
        : isDepth(unit) && !WEATHER.has(holds)
          ? 'totalFollowing'
          : 'meanFollowing';
  const column: ColumnLayout = { position, name, holds, as: role.as, unit, standsFor };
  const absent = absentCells(cells, decimalMark, holds);
  if (absent.length > 0) column.absent = absent;
  const trace = [...new Set(cells.filter((cell) => TRACE_WORDS.has(cell.toLowerCase())))];
  if (holds === 'precipitation' && trace.length > 0) column.trace = trace;
  if (holds === 'streamTracer') column.of = 'discharge';
  return column;
}

/** A depth per step rather than a rate: mm, in, cm. */
function isDepth(unit: string | null): boolean {
  return unit !== null && /^(mm|cm|in|inch(es)?)$/i.test(unit);
}

/** Words for "no value", and numbers that can be none for what the column holds. */
function absentCells(cells: readonly string[], decimalMark: '.' | ',', holds: Holds): string[] {
  const traces = holds === 'precipitation' ? TRACE_WORDS : new Set<string>();
  const found = new Set<string>();
  const mayBeNegative =
    holds === 'tmin' || holds === 'tmax' || holds === 'tmean' || holds === 'dewPoint' || holds === 'streamTracer' || holds === 'rainTracer';
  for (const cell of cells) {
    if (cell === '' || found.has(cell)) continue;
    const lower = cell.toLowerCase();
    if (ABSENT_WORDS.has(lower) && !traces.has(lower)) found.add(cell);
    const value = Number(decimalMark === ',' ? cell.replace(',', '.') : cell);
    if (!ABSENT_NUMBERS.includes(value)) continue;
    if (value < -200 || (value < 0 && !mayBeNegative) || value >= 9999) found.add(cell);
  }
  return [...found];
}

function numericShare(cells: readonly string[], decimalMark: '.' | ','): number {
  let filled = 0;
  let numeric = 0;
  for (const cell of cells) {
    if (cell === '') continue;
    filled += 1;
    const plain = (decimalMark === ',' ? cell.replace(',', '.') : cell).replace(/^[<>]\s*/, '').replace(/[\s']/g, '');
    if (plain !== '' && Number.isFinite(Number(plain))) numeric += 1;
  }
  return filled > 0 ? numeric / filled : 0;
}

/** The commonest spacing of the first rows in days; null where fewer than half of them share one. */
function spacingOf(body: readonly Row[], time: TimeGuess): number | null {
  if (time.writtenAs === null || time.writtenAs === 'YYYY MM') return time.writtenAs === null ? null : 1;
  const read = stampReader(time.writtenAs);
  const counts = new Map<number, number>();
  let before = NaN;
  let seen = 0;
  for (const { cells } of body.slice(0, 400)) {
    const stamp = read(time.columns.map((column) => cells[column] ?? '').join(' '));
    if (stamp === null) continue;
    const minutes = stamp.wallMs / 60_000;
    if (!Number.isNaN(before)) {
      counts.set(minutes - before, (counts.get(minutes - before) ?? 0) + 1);
      seen += 1;
    }
    before = minutes;
  }
  const [spacing, count] = [...counts].sort((a, b) => b[1] - a[1])[0] ?? [0, 0];
  return spacing > 0 && count >= 0.5 * seen ? spacing / 1440 : null;
}

function open(notebook: Notebook, code: string, where: string, seen: string, settle: string): void {
  notebook.note({ code, severity: 'warning', where, seen, done: 'Left open.', settle });
}

function note(notebook: Notebook, where: string, seen: string): void {
  notebook.note({ code: 'read-as', severity: 'note', where, seen, done: 'Proposed.' });
}
