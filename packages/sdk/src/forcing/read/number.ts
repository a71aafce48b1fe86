import type { SettledColumn, SettledSource } from '../layout.js';

export type Mark = 'none' | 'absent' | 'trace' | 'accumulated' | 'below' | 'above' | 'unreadable';
export interface CellValue {
  /** NaN where absent or unreadable; the limit where censored; 0 where a trace. */
  value: number;
  mark: Mark;
}

/**
 * A reader of one column's cells under its layout: decimal and thousands marks, absent values, traces, accumulated totals, `<` and `>`.
 * Absent values match as text, without regard to case, and as numbers (`-9999` is also `-9999.00`).
 */
export function cellReader(column: SettledColumn, source: Pick<SettledSource, 'decimalMark' | 'groupMark'>): (text: string) => CellValue {
  const toNumber = numberReader(source);
  const absentTexts = new Set(column.absent.map((text) => text.trim().toLowerCase()));
  const absentNumbers = new Set(column.absent.map(toNumber).filter((value) => !Number.isNaN(value)));
  const traces = new Set(column.trace.map((text) => text.trim().toLowerCase()));
  const accumulated = column.accumulates === 'marked' ? column.accumulatedMark.trim() : '';
  return (raw) => {
    const text = raw.trim();
    if (text === '') return { value: NaN, mark: 'absent' };
    const value = toNumber(text);
    if (!Number.isNaN(value)) return absentNumbers.has(value) ? { value: NaN, mark: 'absent' } : { value, mark: 'none' };
    const lower = text.toLowerCase();
    if (absentTexts.has(lower)) return { value: NaN, mark: 'absent' };
    if (traces.has(lower)) return { value: 0, mark: 'trace' };
    if (text.startsWith('<') || text.startsWith('>')) {
      const limit = toNumber(text.slice(1).replace(/^=/, '').trim());
      if (!Number.isNaN(limit)) return { value: limit, mark: text.startsWith('<') ? 'below' : 'above' };
    }
    if (accumulated !== '' && text.endsWith(accumulated)) {
      const total = toNumber(text.slice(0, -accumulated.length).trim());
      if (!Number.isNaN(total)) return { value: total, mark: 'accumulated' };
    }
    return { value: NaN, mark: 'unreadable' };
  };
}

const PLAIN = /^[+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d{1,3})?$/;
const GROUPED: Readonly<Record<string, RegExp>> = {
  ',': /^[+-]?\d{1,3}(?:,\d{3})+(?:\.\d*)?$/,
  '.': /^[+-]?\d{1,3}(?:\.\d{3})+(?:,\d*)?$/,
  ' ': /^[+-]?\d{1,3}(?:[ \u00a0\u202f]\d{3})+(?:[.,]\d*)?$/,
  "'": /^[+-]?\d{1,3}(?:['’]\d{3})+(?:[.,]\d*)?$/,
};

/** A number under a decimal mark and a thousands mark; NaN for anything else, never a part of it. */
export function numberReader({ decimalMark, groupMark }: Pick<SettledSource, 'decimalMark' | 'groupMark'>): (text: string) => number {
  const grouped = groupMark === '' || groupMark === decimalMark ? undefined : GROUPED[groupMark];
  return (raw) => {
    if (raw.length > 40) return NaN;
    let text = raw.trim().replace(/^[−–]/, '-');
    if (grouped?.test(text))
      text = text.replace(groupMark === ' ' ? /[ \u00a0\u202f]/g : groupMark === "'" ? /['’]/g : groupMark === ',' ? /,/g : /\./g, '');
    if (decimalMark === ',') {
      if (text.includes('.')) return NaN;
      text = text.replace(',', '.');
    }
    if (!PLAIN.test(text)) return NaN;
    const value = Number(text);
    return Number.isFinite(value) ? value : NaN;
  };
}
