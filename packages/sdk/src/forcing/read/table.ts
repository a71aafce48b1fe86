import type { Notebook } from '../findings.js';
import type { IntakeLimits, SettledColumn, SettledSource } from '../layout.js';
import type { SourceText } from '../text/sources.js';
import { tokenize, type Row } from '../text/tokenize.js';
import { daysInMonth } from '../time/pattern.js';
import { instantReader } from '../time/instants.js';
import { applyEdits } from './edits.js';

/** One column's cells with the time each belongs to, in the order of time. */
export interface TimedCells {
  column: SettledColumn;
  source: SettledSource;
  /** `source: header`, for findings. */
  where: string;
  /** [n] stamp, ms since 1970 UTC. With `from`, the end of the interval. */
  at: Float64Array;
  /** [n] beginning of the interval; null where it follows from the neighbouring row. */
  from: Float64Array | null;
  /** [n] line in the text, from 1. */
  rows: Int32Array;
  texts: string[];
}

const DAY = 86_400_000;

/** The cells of every column that holds something, under the source's layout. Problems go to the notebook. */
export function readTable(input: SourceText, source: SettledSource, limits: IntakeLimits, notebook: Notebook): TimedCells[] {
  const { rows, remarks, strayQuotes, hadByteOrderMark } = tokenize(input.text, {
    splitAt: source.splitAt,
    remarkMark: source.remarkMark,
    maxRows: limits.rows,
    maxColumns: limits.columns,
  });
  applyEdits(rows, source, notebook);
  const where = source.name;
  if (hadByteOrderMark)
    notebook.note({ code: 'byte-order-mark', severity: 'note', where, seen: 'a byte-order mark before the first cell', done: 'left out' });
  notebook.noteRows(
    remarks.map(({ line }) => line),
    { code: 'remarks', severity: 'note', where, seen: `${remarks.length} lines that begin with ${source.remarkMark}`, done: 'left out' },
  );
  notebook.noteRows(strayQuotes, {
    code: 'stray-quote',
    severity: 'warning',
    where,
    seen: 'text after a closing quote',
    done: 'joined to the cell',
  });
  if (source.dataFrom > 1) {
    const line = rows[Math.min(source.dataFrom, rows.length) - 1]?.line ?? 1;
    if (source.dataFrom > 2 || source.namesRow === 0) {
      notebook.note({
        code: 'rows-above',
        severity: 'note',
        where,
        count: source.dataFrom - 1,
        seen: `${source.dataFrom - 1} rows above line ${line}`,
        done: 'taken as names, units and description, not as values',
      });
    }
  }
  const names = source.namesRow > 0 ? (rows[source.namesRow - 1]?.cells ?? []) : null;
  if (names) checkNames(names, source, notebook);
  const data = keepDataRows(rows, names, source, notebook);
  if (data.length === 0) {
    notebook.problem({ code: 'no-rows', path: where, expected: 'rows of values', received: `${rows.length} rows, none of them of values` });
    return [];
  }
  return source.table === 'months' ? readMonths(data, source, notebook) : readRows(data, source, notebook);
}

function checkNames(names: readonly string[], source: SettledSource, notebook: Notebook): void {
  for (const column of source.columns) {
    const found = names[column.position - 1];
    if (column.holds === 'ignored' || column.name === '' || found === column.name) continue;
    notebook.problem({
      code: 'column-renamed',
      path: `${source.name}: column ${column.position}`,
      expected: `the header ${JSON.stringify(column.name)}`,
      received: found === undefined ? 'no such column' : JSON.stringify(found),
      hint: 'The file is not laid out as the layout says. Propose a layout anew, or set the name to an empty text.',
    });
  }
  const twice = names.filter((name, index) => name !== '' && names.indexOf(name) !== index);
  if (twice.length > 0) {
    notebook.note({
      code: 'duplicate-columns',
      severity: 'warning',
      where: source.name,
      seen: `columns of one name: ${[...new Set(twice)].join(', ')}`,
      done: 'kept apart by their positions',
    });
  }
}

function keepDataRows(rows: Row[], names: readonly string[] | null, source: SettledSource, notebook: Notebook): Row[] {
  const width = Math.max(
    names?.length ?? 0,
    ...source.columns.map(({ position, daysAcross }) => position + daysAcross - 1),
    ...source.time.columns,
  );
  const key = names?.join('\u0001');
  const repeated: number[] = [];
  const long: number[] = [];
  const short: number[] = [];
  const trailing: number[] = [];
  const kept: Row[] = [];
  for (let index = source.dataFrom - 1; index < rows.length; index++) {
    const row = rows[index];
    if (row.cells.every((cell) => cell === '')) continue;
    if (key !== undefined && row.cells.length === names?.length && row.cells.join('\u0001') === key) repeated.push(row.line);
    else if (row.cells.length > width && row.cells.slice(width).some((cell) => cell !== '')) long.push(row.line);
    else {
      if (row.cells.length > width) trailing.push(row.line);
      else if (row.cells.length < width) short.push(row.line);
      kept.push(row);
    }
  }
  const where = source.name;
  notebook.noteRows(repeated, {
    code: 'repeated-header',
    severity: 'note',
    where,
    seen: 'the names row again among the values',
    done: 'left out',
  });
  notebook.noteRows(trailing, {
    code: 'trailing-delimiters',
    severity: 'note',
    where,
    seen: 'empty cells beyond the last column',
    done: 'left out',
  });
  notebook.noteRows(short, {
    code: 'short-rows',
    severity: 'warning',
    where,
    seen: `rows with fewer than ${width} cells`,
    done: 'the cells at their end taken as absent',
  });
  if (source.longRows === 'skip') {
    notebook.noteRows(long, {
      code: 'long-rows',
      severity: 'warning',
      where,
      seen: `rows with more than ${width} cells`,
      done: 'left out, so their values are gaps',
    });
  } else if (long.length > 0) {
    notebook.problem({
      code: 'long-row',
      path: where,
      row: long[0],
      expected: `${width} cells`,
      received: `more, in ${long.length} rows`,
      hint:
        source.splitAt === ','
          ? 'A decimal comma without quotes does this. Have the file written with another delimiter, or set longRows to skip.'
          : 'Set longRows to skip to leave such rows out.',
    });
  }
  return kept;
}

function readRows(data: Row[], source: SettledSource, notebook: Notebook): TimedCells[] {
  const { time } = source;
  const stamps = instantReader(time, `${source.name}: time`, notebook);
  const stamped = data.map((row) => stamps.read(joined(row.cells, time.columns), row.line));
  stamps.report();
  const starts = time.from.length > 0 ? instantReader(time, `${source.name}: beginning`, notebook) : null;
  const from = starts && data.map((row) => starts.read(joined(row.cells, time.from), row.line));
  const at = time.lastDayIncluded ? stamped.map((instant) => instant + DAY) : stamped;
  const order = orderOf(at, source, notebook, data);
  return source.columns
    .filter(({ holds }) => holds !== 'ignored')
    .map((column) => ({
      column,
      source,
      where: `${source.name}: ${column.name === '' ? `column ${column.position}` : column.name}`,
      at: Float64Array.from(order, (index) => at[index]),
      from: from && Float64Array.from(order, (index) => from[index]),
      rows: Int32Array.from(order, (index) => data[index].line),
      texts: order.map((index) => data[index].cells[column.position - 1] ?? ''),
    }));
}

/** Positions sorted by time, with repeated times settled; sorting and repeats are reported. */
function orderOf(at: readonly number[], source: SettledSource, notebook: Notebook, data: readonly Row[]): number[] {
  const order = at.map((_, index) => index).filter((index) => Number.isFinite(at[index]));
  const unsorted = order.filter((index, place) => place > 0 && at[index] < at[order[place - 1]]);
  notebook.noteRows(
    unsorted.map((index) => data[index].line),
    {
      code: 'unsorted-times',
      severity: 'warning',
      where: source.name,
      seen: `${unsorted.length} rows earlier than the row above them`,
      done: 'sorted by time',
    },
  );
  if (unsorted.length > 0) order.sort((a, b) => at[a] - at[b] || a - b);
  if (source.everyDays === null) return order;
  const kept: number[] = [];
  const same: number[] = [];
  const differing: number[] = [];
  const used = source.columns.filter(({ holds }) => holds !== 'ignored').map(({ position }) => position - 1);
  for (const index of order) {
    const last = kept[kept.length - 1];
    if (last === undefined || at[last] !== at[index]) {
      kept.push(index);
      continue;
    }
    const equal = used.every((position) => data[last].cells[position] === data[index].cells[position]);
    (equal ? same : differing).push(data[index].line);
    if (!equal && source.repeatedTime === 'last') kept[kept.length - 1] = index;
  }
  notebook.noteRows(same, {
    code: 'duplicate-times',
    severity: 'warning',
    where: source.name,
    seen: 'rows that repeat a time and its values',
    done: 'kept once',
  });
  if (source.repeatedTime !== 'refuse') {
    notebook.noteRows(differing, {
      code: 'duplicate-times',
      severity: 'warning',
      where: source.name,
      seen: 'rows that repeat a time with other values',
      done: `the ${source.repeatedTime} kept`,
    });
  } else if (differing.length > 0) {
    notebook.problem({
      code: 'duplicate-times',
      path: source.name,
      row: differing[0],
      expected: 'one row for each time',
      received: `${differing.length} rows that repeat a time with other values`,
      hint: 'Set repeatedTime to first or last, or mend the file.',
    });
  }
  return kept;
}

function readMonths(data: Row[], source: SettledSource, notebook: Notebook): TimedCells[] {
  const { time } = source;
  return source.columns
    .filter(({ holds }) => holds !== 'ignored')
    .map((column) => {
      const where = `${source.name}: ${column.name === '' ? `column ${column.position}` : column.name}`;
      const stamps = instantReader(time, `${source.name}: month`, notebook);
      const cells: { at: number; row: number; text: string }[] = [];
      for (const row of data) {
        const month = stamps.read(joined(row.cells, time.columns), row.line);
        if (!Number.isFinite(month)) continue;
        // The stamp is the first of the month in local time; half a day in, its calendar month is certain in every zone.
        const inside = new Date(month + 15 * DAY);
        const days = daysInMonth(inside.getUTCFullYear(), inside.getUTCMonth() + 1);
        for (let day = 0; day < column.daysAcross; day++) {
          const text = row.cells[column.position - 1 + day] ?? '';
          if (day < days) cells.push({ at: month + day * DAY, row: row.line, text });
          else if (text !== '' && !column.absent.includes(text)) {
            notebook.problem({
              code: 'day-does-not-exist',
              path: where,
              row: row.line,
              expected: `${days} days in that month`,
              received: `${text} on day ${day + 1}`,
            });
          }
        }
      }
      stamps.report();
      cells.sort((a, b) => a.at - b.at || a.row - b.row);
      const repeated = cells.filter((cell, index) => index > 0 && cell.at === cells[index - 1].at);
      if (repeated.length > 0) {
        notebook.problem({
          code: 'duplicate-times',
          path: where,
          row: repeated[0].row,
          expected: 'one row for each month',
          received: 'a month that comes twice',
        });
      }
      return {
        column,
        source,
        where,
        at: Float64Array.from(cells, ({ at }) => at),
        from: null,
        rows: Int32Array.from(cells, ({ row }) => row),
        texts: cells.map(({ text }) => text),
      };
    });
}

function joined(cells: readonly string[], positions: readonly number[]): string {
  return positions.length === 1 ? (cells[positions[0] - 1] ?? '') : positions.map((position) => cells[position - 1] ?? '').join(' ');
}
