import type { Row } from '../text/tokenize.js';
import { tokenize } from '../text/tokenize.js';
import type { SettledSource } from '../layout.js';

const CANDIDATES: readonly SettledSource['splitAt'][] = ['\t', ';', '|', ',', 'blanks'];
const LOOK_AT_ROWS = 300;
const HEAD_CHARACTERS = 60_000;

/** The mark of remark lines: the first of the usual ones that a line of the head begins with, else `#`. */
export function guessRemarkMark(text: string): string {
  const head = text.slice(0, HEAD_CHARACTERS).replace(/^\uFEFF/, '');
  return (
    ['#', '%', '!', '//', "'"].find((mark) => head.split(/\r\n?|\n/, LOOK_AT_ROWS).some((line) => line.trimStart().startsWith(mark))) ?? '#'
  );
}

/** The delimiter under which most rows of the head have one same number of cells, two at least. */
export function guessDelimiter(text: string, remarkMark: string): { splitAt: SettledSource['splitAt']; share: number } {
  let best = { splitAt: ',' as SettledSource['splitAt'], share: 0, width: 0 };
  for (const splitAt of CANDIDATES) {
    const rows = headRows(text, splitAt, remarkMark);
    const { width, share } = usualWidth(rows);
    if (width < 2) continue;
    // Blanks split nearly everything, so they must do it better than any mark.
    const weight = splitAt === 'blanks' ? share - 0.2 : share;
    if (weight > best.share + 0.02) best = { splitAt, share: weight, width };
  }
  return best;
}

function headRows(text: string, splitAt: SettledSource['splitAt'], remarkMark: string): Row[] {
  const head = text.slice(0, HEAD_CHARACTERS);
  const whole = head.length < text.length ? head.slice(0, Math.max(head.lastIndexOf('\n'), head.lastIndexOf('\r')) + 1) || head : head;
  try {
    return tokenize(whole, { splitAt, remarkMark, maxRows: Infinity, maxColumns: 5000, stopAfter: LOOK_AT_ROWS }).rows;
  } catch {
    return [];
  }
}

/** Number of cells that most rows have, and the share of rows that have it. */
export function usualWidth(rows: readonly Row[]): { width: number; share: number } {
  const counts = new Map<number, number>();
  for (const { cells } of rows) counts.set(cells.length, (counts.get(cells.length) ?? 0) + 1);
  const [width, count] = [...counts].sort((a, b) => b[1] - a[1] || b[0] - a[0])[0] ?? [0, 0];
  return { width, share: rows.length > 0 ? count / rows.length : 0 };
}

export interface NumberMarks {
  decimalMark: SettledSource['decimalMark'];
  groupMark: SettledSource['groupMark'];
  /** `1,234` alone: it may be either. */
  isAmbiguous: boolean;
  commaRows: number[];
}

/** Decimal and thousands marks from the cells of the columns that are not times. */
export function guessNumberMarks(rows: readonly Row[], timeColumns: ReadonlySet<number>): NumberMarks {
  let dots = 0;
  let commas = 0;
  let groupedComma = 0;
  let groupedDot = 0;
  let groupedOther: '' | ' ' | "'" = '';
  let either = 0;
  const commaRows: number[] = [];
  for (const { cells, line } of rows) {
    for (let index = 0; index < cells.length; index++) {
      if (timeColumns.has(index) || cells[index].length > 40) continue;
      const cell = cells[index].replace(/^[<>]?[-+−]?/, '');
      if (/^\d{1,3}(,\d{3})+\.\d+$|^\d{1,3}(,\d{3}){2,}$/.test(cell)) groupedComma += 1;
      else if (/^\d{1,3}(\.\d{3})+,\d+$|^\d{1,3}(\.\d{3}){2,}$/.test(cell)) groupedDot += 1;
      else if (/^\d{1,3}(['’]\d{3})+(\.\d+)?$/.test(cell)) groupedOther = "'";
      else if (/^\d{1,3}([ \u00a0\u202f]\d{3})+([.,]\d+)?$/.test(cell)) groupedOther = ' ';
      else if (/^[1-9]\d{0,2},\d{3}$/.test(cell)) either += 1;
      else if (/^\d*,\d+$/.test(cell)) commas += 1;
      else if (/^\d*\.\d+$/.test(cell)) dots += 1;
      else continue;
      if (cell.includes(',') && commaRows.length < 20) commaRows.push(line);
    }
  }
  const decimalMark = groupedDot > 0 || commas > dots || (either > 0 && dots === 0 && groupedComma === 0) ? ',' : '.';
  const groupMark =
    groupedOther !== '' ? groupedOther : decimalMark === ',' ? (groupedDot > 0 ? '.' : '') : groupedComma > 0 || either > 0 ? ',' : '';
  return {
    decimalMark,
    groupMark,
    isAmbiguous: either > 0 && commas === 0 && dots === 0 && groupedComma === 0 && groupedDot === 0,
    commaRows,
  };
}
