import { findUnit } from '../../units/parseUnit.js';
import type { Row } from '../text/tokenize.js';

export interface RowsGuess {
  /** From 1; 0 where there is none. */
  namesRow: number;
  unitsRow: number;
  typesRow: number;
  dataFrom: number;
}

/** Reads upward from the first row of values: a row of types, a row of units, the names; what stands above is description. */
export function guessRows(rows: readonly Row[], firstRow: number): RowsGuess {
  const guess: RowsGuess = { namesRow: 0, unitsRow: 0, typesRow: 0, dataFrom: firstRow + 1 };
  let at = firstRow - 1;
  if (at >= 0 && isTypesRow(rows[at])) guess.typesRow = at-- + 1;
  if (at >= 1 && isUnitsRow(rows[at]) && rows[at - 1].cells.length > 1) guess.unitsRow = at-- + 1;
  if (guess.typesRow === 0 && at >= 1 && isTypesRow(rows[at])) guess.typesRow = at-- + 1;
  if (at >= 0) guess.namesRow = at + 1;
  return guess;
}

/** `5s 15s 20d`: widths and kinds. */
function isTypesRow({ cells }: Row): boolean {
  return cells.every((cell) => /^\d{1,3}[sdnfg]$/i.test(cell));
}

function isUnitsRow({ cells }: Row): boolean {
  const filled = cells.map(unitText).filter((cell) => cell !== '');
  const units = filled.filter((cell) => findUnit(cell) !== null);
  return units.length > 0 && units.length >= 0.6 * filled.filter((cell) => !/^(yyyy|dd|date|datum|utc|iso)/i.test(cell)).length;
}

/** A unit cell or the unit inside a header: `[mm]`, `(m³/s)`, `mm`. */
export function unitText(cell: string): string {
  return cell.trim().replace(/^[([{]\s*(.*?)\s*[)\]}]$/, '$1');
}

/** The unit that a header carries: in brackets, or after the last blank or underscore. */
export function unitInHeader(header: string): string | null {
  const bracketed = /[([{]([^)\]}]{1,30})[)\]}]\s*$/.exec(header)?.[1];
  if (bracketed !== undefined && findUnit(bracketed.trim()) !== null) return bracketed.trim();
  const parts = header.split(/[_ ]+/);
  for (let from = 1; from < Math.min(parts.length, 12); from++) {
    for (const mark of ['/', ' ']) {
      const tail = parts.slice(from).join(mark);
      if (tail !== '' && tail.length <= 20 && findUnit(tail) !== null) return tail;
    }
  }
  return null;
}
