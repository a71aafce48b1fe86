import type { Sample } from '../../contract.js';
import { parseUnit } from '../../units/parseUnit.js';
import type { Notebook } from '../findings.js';
import { cellReader } from './number.js';
import type { TimedCells } from './table.js';

/** A sample with its line in the text, for findings. */
export interface ReadSample extends Sample {
  row: number;
}

/**
 * Laboratory values of one column. A value below or above a limit stays, as censored. A bulk sample without a stated beginning reaches back to the
 * sample before it; the first of such is left out, which is reported.
 */
export function readSamples(cells: TimedCells, notebook: Notebook): ReadSample[] {
  const { column, where } = cells;
  const unit = column.unit;
  if (unit === null) {
    notebook.problem({
      code: 'layout-unsettled',
      path: `${where}: unit`,
      expected: 'the unit of the values, such as permil or mg/L',
      received: 'none',
    });
    return [];
  }
  notebook.attempt(() => void parseUnit(unit), { path: where }, undefined);
  const read = cellReader(column, cells.source);
  const rain = column.holds === 'rainTracer';
  const found: Record<'absent' | 'censored' | 'open', number[]> = { absent: [], censored: [], open: [] };
  const samples: ReadSample[] = [];
  cells.texts.forEach((text, index) => {
    const row = cells.rows[index];
    const { value, mark } = read(text);
    if (mark === 'absent') return void found.absent.push(row);
    if (mark === 'unreadable' || mark === 'accumulated') {
      notebook.problem({
        code: 'not-a-number',
        path: where,
        row,
        expected: 'a number, a limit such as <0.05, or a cell that the layout names',
        received: text,
      });
      return;
    }
    const from = startOf(cells, index);
    if (Number.isNaN(from)) return void found.open.push(row);
    const to = column.standsFor.endsWith('Following') ? from + spacing(cells) : cells.at[index];
    if (!(to >= from)) {
      notebook.problem({ code: 'interval-empty', path: where, row, expected: 'an interval that ends after it begins', received: text });
      return;
    }
    if (mark === 'below' || mark === 'above') found.censored.push(row);
    samples.push({
      tracer: column.as,
      of: rain ? 'inflow' : column.of,
      from: iso(from),
      to: iso(to),
      value: mark === 'trace' ? 0 : value,
      unit,
      ...(column.standardError === null ? {} : { error: column.standardError }),
      ...(mark === 'below' || mark === 'above' ? { censored: mark } : {}),
      row,
    });
  });
  notebook.noteRows(found.absent, {
    code: 'absent-values',
    severity: 'note',
    where,
    seen: `${found.absent.length} samples without a value`,
    done: 'left out',
  });
  notebook.noteRows(found.censored, {
    code: 'censored-sample',
    severity: 'note',
    where,
    seen: `${found.censored.length} values given as a limit`,
    done: 'kept as censored',
  });
  notebook.noteRows(found.open, {
    code: 'interval-unknown',
    severity: 'warning',
    where,
    seen: 'a bulk sample whose beginning no earlier sample states',
    done: 'left out',
    settle: 'Give a column with the beginning of each interval in time.from.',
  });
  return samples;
}

/** Beginning of the interval a value stands for: its column, the row before, the nominal spacing, or the instant itself. */
function startOf(cells: TimedCells, index: number): number {
  if (cells.from) return cells.from[index];
  const { standsFor } = cells.column;
  if (standsFor === 'instant' || standsFor.endsWith('Following')) return cells.at[index];
  const every = spacing(cells);
  const before = index > 0 ? cells.at[index - 1] : NaN;
  if (every > 0 && !(cells.at[index] - before < 1.5 * every)) return cells.at[index] - every;
  return before;
}

function spacing({ source }: TimedCells): number {
  return (source.everyDays ?? 0) * 86_400_000;
}

function iso(ms: number): string {
  return new Date(ms).toISOString();
}
