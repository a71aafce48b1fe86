import type { Notebook } from '../findings.js';
import type { SettledColumn } from '../layout.js';
import { converter } from '../../units/convert.js';
import { parseUnit } from '../../units/parseUnit.js';
import { cellReader } from './number.js';
import type { TimedCells } from './table.js';

/** A series as pieces of time, sorted, that do not overlap: a mean rate over each, or a straight line between instants. */
export interface Pieces {
  where: string;
  /** [n] ms */
  from: Float64Array;
  to: Float64Array;
  /** [n] value at the beginning and at the end; equal but between instants. */
  first: Float64Array;
  last: Float64Array;
  /** [n] line in the text */
  rows: Int32Array;
}

const DAY = 86_400_000;
const FLUXES = new Set(['precipitation', 'inflow', 'outflow']);
/** Unit in which each kind of series is kept; drivers keep their own. */
const KEPT_IN: Readonly<Record<string, string>> = {
  precipitation: 'mm/d',
  inflow: 'mm/d',
  outflow: 'mm/d',
  tmin: 'Cel',
  tmax: 'Cel',
  tmean: 'Cel',
  dewPoint: 'Cel',
  humidityMax: '%',
  humidityMin: '%',
  humidityMean: '%',
  windSpeed: 'm/s',
  sunshine: 'h',
  solarRadiation: 'MJ/m2/d',
};

/** One column's cells as pieces of time in the unit kept inside. */
export function readSeries(cells: TimedCells, areaKm2: number | null, notebook: Notebook): Pieces {
  const values = readValues(cells, notebook);
  const total = cells.column.standsFor.startsWith('total') || cells.column.standsFor === 'runningTotal';
  const toKept = unitConverter(cells, total, areaKm2, notebook);
  const present = values.value.map((value, index) => (Number.isNaN(value) ? -1 : index)).filter((index) => index >= 0);
  const pieces =
    cells.column.standsFor === 'instant' ? betweenInstants(cells, values, present) : overIntervals(cells, values, present, notebook);
  for (let index = 0; index < pieces.from.length; index++) {
    const days = total ? (pieces.to[index] - pieces.from[index]) / DAY : 1;
    pieces.first[index] = toKept(pieces.first[index]) / days;
    pieces.last[index] = toKept(pieces.last[index]) / days;
  }
  if (FLUXES.has(cells.column.holds)) checkNegative(pieces, cells.column, notebook);
  return pieces;
}

interface Values {
  value: number[];
  accumulated: boolean[];
}

function readValues(cells: TimedCells, notebook: Notebook): Values {
  const { column, where } = cells;
  const read = cellReader(column, cells.source);
  const values: Values = { value: [], accumulated: [] };
  const rows: Record<'absent' | 'trace' | 'below', number[]> = { absent: [], trace: [], below: [] };
  cells.texts.forEach((text, index) => {
    const cell = read(text);
    const row = cells.rows[index];
    let value = cell.value;
    if (cell.mark === 'unreadable') {
      notebook.problem({
        code: 'not-a-number',
        path: where,
        row,
        expected: 'a number, or a cell that the layout names',
        received: text,
        hint: 'If it means "no value", add it to absent.',
      });
    } else if (cell.mark === 'below' || cell.mark === 'above') {
      if (cell.mark === 'above' || column.belowDetection === 'refuse') {
        notebook.problem({
          code: 'censored-value',
          path: where,
          row,
          expected: 'a measured value',
          received: text,
          hint: 'Say in belowDetection what a value below the limit stands for.',
        });
      }
      rows.below.push(row);
      value = cell.value * ({ refuse: 1, limit: 1, half: 0.5, zero: 0 } as const)[column.belowDetection];
    } else if (cell.mark === 'trace') rows.trace.push(row);
    else if (cell.mark === 'absent') rows.absent.push(row);
    values.value.push(value);
    values.accumulated.push(
      cell.mark === 'accumulated' || (column.accumulates === 'afterGap' && index > 0 && Number.isNaN(values.value[index - 1])),
    );
  });
  notebook.noteRows(rows.absent, {
    code: 'absent-values',
    severity: 'note',
    where,
    seen: `${rows.absent.length} cells without a value`,
    done: 'taken as gaps',
  });
  notebook.noteRows(rows.trace, {
    code: 'trace',
    severity: 'note',
    where,
    seen: `${rows.trace.length} traces, too little to measure`,
    done: 'taken as zero, not as gaps',
  });
  if (column.belowDetection !== 'refuse') {
    notebook.noteRows(rows.below, {
      code: 'below-detection',
      severity: 'warning',
      where,
      seen: `${rows.below.length} values below a limit`,
      done: `taken as ${column.belowDetection} of it`,
    });
  }
  return values;
}

function unitConverter(cells: TimedCells, total: boolean, areaKm2: number | null, notebook: Notebook): (value: number) => number {
  const { holds, unit } = cells.column;
  const kept = KEPT_IN[holds];
  const same = (value: number): number => value;
  if (kept === undefined) return unit === null ? same : notebook.attempt(() => (parseUnit(unit), same), { path: cells.where }, same);
  if (unit === null) {
    notebook.problem({
      code: 'layout-unsettled',
      path: `${cells.where}: unit`,
      expected: `a unit that converts to ${kept}`,
      received: 'none',
    });
    return same;
  }
  const facts = areaKm2 === null ? {} : { areaKm2 };
  return notebook.attempt(() => converter(unit, total ? 'mm' : kept, facts), { path: cells.where, hint: unitHint(total, holds) }, same);
}

function unitHint(total: boolean, holds: string): string {
  if (!FLUXES.has(holds)) return 'Give the unit that the values have.';
  return total
    ? 'A total is a depth or a volume (mm, in, m3); for a rate such as mm/d or m3/s let standsFor say mean. A volume needs areaKm2.'
    : 'A mean or an instant is a rate (mm/d, m3/s, L/s); for a depth such as mm let standsFor say total. A flow needs areaKm2.';
}

function betweenInstants(cells: TimedCells, { value }: Values, present: number[]): Pieces {
  const longest = cells.source.everyDays === null ? Infinity : 1.5 * cells.source.everyDays * DAY;
  const pairs: [number, number][] = [];
  for (let place = 1; place < present.length; place++) {
    const [a, b] = [present[place - 1], present[place]];
    if (cells.at[b] - cells.at[a] < longest) pairs.push([a, b]);
  }
  return pieces(
    cells,
    pairs.map(([a, b]) => ({ from: cells.at[a], to: cells.at[b], first: value[a], last: value[b], row: cells.rows[b] })),
  );
}

/** Intervals reach to the neighbouring row where that is near the nominal spacing (an hour of daylight saving does not tear a hole), else the nominal spacing. */
function overIntervals(cells: TimedCells, { value, accumulated }: Values, present: number[], notebook: Notebook): Pieces {
  const { at, rows, where } = cells;
  const every = cells.source.everyDays === null ? Infinity : cells.source.everyDays * DAY;
  const running = cells.column.standsFor === 'runningTotal';
  const following = cells.column.standsFor.endsWith('Following');
  const list: Piece[] = [];
  const found: Record<'spread' | 'reset' | 'open', number[]> = { spread: [], reset: [], open: [] };
  present.forEach((index, place) => {
    const row = rows[index];
    const before = present[place - 1] as number | undefined;
    let piece: Piece;
    if (cells.from) piece = { from: cells.from[index], to: at[index], first: value[index], last: value[index], row };
    else if (running) {
      if (before === undefined) return;
      const reset = value[index] < value[before];
      if (reset) found.reset.push(row);
      if (at[index] - at[before] >= 1.5 * every) found.spread.push(row);
      const increment = reset ? value[index] : value[index] - value[before];
      piece = { from: at[before], to: at[index], first: increment, last: increment, row };
    } else {
      const next = at[index + 1] - at[index];
      const last = at[index] - at[index - 1];
      const span = following ? (next < 1.5 * every ? next : every) : last < 1.5 * every ? last : every;
      if (!Number.isFinite(span)) return void found.open.push(row);
      piece = {
        from: following ? at[index] : at[index] - span,
        to: following ? at[index] + span : at[index],
        first: value[index],
        last: value[index],
        row,
      };
      if (accumulated[index] && before !== undefined) {
        piece.from = list[list.length - 1]?.to ?? piece.from;
        if (piece.to - piece.from > 1.01 * span) found.spread.push(row);
      }
    }
    if (piece.to > piece.from) list.push(piece);
    else
      notebook.problem({
        code: 'interval-empty',
        path: where,
        row,
        expected: 'an interval that ends after it begins',
        received: new Date(piece.to).toISOString(),
      });
  });
  list.sort((a, b) => a.from - b.from);
  const overlap = list.find((piece, index) => index > 0 && piece.from < list[index - 1].to);
  if (overlap)
    notebook.problem({
      code: 'intervals-overlap',
      path: where,
      row: overlap.row,
      expected: 'intervals one after the other',
      received: 'one that begins before the last has ended',
    });
  notebook.noteRows(found.reset, {
    code: 'running-total-reset',
    severity: 'note',
    where,
    seen: 'a running total that fell',
    done: 'taken as a reset to zero: the new reading is the increment',
  });
  notebook.noteRows(found.spread, {
    code: 'accumulated',
    severity: 'warning',
    where,
    seen: 'totals that gather several intervals',
    done: 'spread evenly over them',
  });
  notebook.noteRows(found.open, {
    code: 'interval-unknown',
    severity: 'warning',
    where,
    seen: 'a value whose interval no neighbour bounds',
    done: 'left out',
  });
  return pieces(cells, list);
}

interface Piece {
  from: number;
  to: number;
  first: number;
  last: number;
  row: number;
}

function pieces(cells: TimedCells, list: readonly Piece[]): Pieces {
  const take = (key: 'from' | 'to' | 'first' | 'last'): Float64Array => Float64Array.from(list, (piece) => piece[key]);
  return {
    where: cells.where,
    from: take('from'),
    to: take('to'),
    first: take('first'),
    last: take('last'),
    rows: Int32Array.from(list, ({ row }) => row),
  };
}

function checkNegative({ first, last, rows, where }: Pieces, column: SettledColumn, notebook: Notebook): void {
  const negative: number[] = [];
  for (let index = 0; index < first.length; index++) {
    if (first[index] >= 0 && last[index] >= 0) continue;
    negative.push(rows[index]);
    if (column.negative === 'refuse' && negative.length <= 20) {
      notebook.problem({
        code: 'negative-flux',
        path: where,
        row: rows[index],
        expected: 'a flux of zero or more',
        received: `${Math.min(first[index], last[index])} mm/day`,
        hint: 'If it marks a missing value, add it to absent; if it is the noise of the instrument, set negative to zero.',
      });
    }
    first[index] = Math.max(0, first[index]);
    last[index] = Math.max(0, last[index]);
  }
  if (column.negative === 'zero') {
    notebook.noteRows(negative, {
      code: 'negative-flux',
      severity: 'warning',
      where,
      seen: `${negative.length} fluxes below zero`,
      done: 'set to zero',
    });
  }
}
