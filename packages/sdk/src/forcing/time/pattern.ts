import { RillageError } from '../../errors.js';

/** A moment as written: the wall clock in ms since 1970 as if it were UTC, and what the stamp said about its offset and clock. */
export interface WallTime {
  wallMs: number;
  /** Minutes east of UTC, where the stamp says so. */
  offsetMinutes: number | null;
  /** The stamp gave a clock. */
  hasClock: boolean;
  /** Written as 24:00. */
  midnightAs24: boolean;
}

export type StampReader = (text: string) => WallTime | null;

const MINUTE = 60_000;
const DAY = 86_400_000;
const MONTHS = ['jan', 'feb', 'mar', 'apr', 'may', 'jun', 'jul', 'aug', 'sep', 'oct', 'nov', 'dec'];

/**
 * A reader of stamps written by a pattern: `iso` (ISO 8601 date or date-time), `serial1900` / `serial1904` (days of a spreadsheet), or tokens
 * YYYY YY MM DD MON hh mm ss AP Z with anything else as it stands. Numbers may lack a leading zero where a mark stands beside them.
 * The reader returns null for what does not match or is no date.
 * @throws RillageError 'pattern-invalid'
 * @source ISO 8601-1:2019; serial 1 is 1 January 1900 with a 29 February 1900 that never was, serial 0 of the other kind is 1 January 1904 (common practice)
 */
export function stampReader(pattern: string): StampReader {
  if (pattern === 'iso') return readIso;
  if (pattern === 'serial1900') return (text) => readSerial(text, Date.UTC(1899, 11, 30));
  if (pattern === 'serial1904') return (text) => readSerial(text, Date.UTC(1904, 0, 1));
  const { expression, tokens } = compile(pattern);
  return (text) => {
    const match = text.length > 60 ? null : expression.exec(text);
    if (!match) return null;
    const part = (token: string): string | undefined => match[tokens.indexOf(token) + 1];
    const has = (token: string): boolean => tokens.includes(token);
    const year = has('YYYY') ? Number(part('YYYY')) : century(Number(part('YY')));
    const month = has('MON') ? MONTHS.indexOf(part('MON')!.slice(0, 3).toLowerCase()) + 1 : has('MM') ? Number(part('MM')) : 1;
    let hour = has('hh') ? Number(part('hh')) : 0;
    if (has('AP')) {
      if (hour < 1 || hour > 12) return null;
      hour = (hour % 12) + (part('AP')!.toLowerCase().startsWith('p') ? 12 : 0);
    }
    const clock = { hour, minute: has('mm') ? Number(part('mm')) : 0, second: has('ss') ? Number(part('ss')) : 0 };
    return assemble(year, month, has('DD') ? Number(part('DD')) : 1, clock, has('hh'), has('Z') ? part('Z') : undefined);
  };
}

/** Two digits: 00–69 are of this century (common practice). */
function century(year: number): number {
  return year + (year < 70 ? 2000 : 1900);
}

const TOKENS = /YYYY|YY|MON|MM|DD|hh|mm|ss|AP|Z/g;

function compile(pattern: string): { expression: RegExp; tokens: string[] } {
  const tokens: string[] = pattern.length <= 40 ? (pattern.match(TOKENS) ?? []) : [];
  const year = tokens.includes('YYYY') || tokens.includes('YY');
  const twice = tokens.some((token, index) => tokens.indexOf(token) !== index);
  if (!year || twice) {
    throw new RillageError({
      code: 'pattern-invalid',
      path: 'time.writtenAs',
      expected: 'iso, serial1900, serial1904, or a pattern with a year such as DD.MM.YYYY hh:mm',
      received: pattern,
    });
  }
  const literal = (text: string): string => text.replace(/[.*+?^${}()|[\]\\]/g, '\\$&').replace(/ +/g, ' +');
  let source = '';
  let at = 0;
  for (const match of pattern.matchAll(TOKENS)) {
    const between = pattern.slice(at, match.index);
    // AP and Z bring their own blanks, none or more
    source += literal(match[0] === 'AP' || match[0] === 'Z' ? between.trimEnd() : between);
    at = match.index + match[0].length;
    const besideToken = /^(YY|MM|DD|MON|hh|mm|ss)/.test(pattern.slice(at)) || /(YYYY|YY|MM|DD|hh|mm)$/.test(pattern.slice(0, match.index));
    source += tokenSource(match[0], besideToken);
  }
  source += literal(pattern.slice(at));
  return { expression: new RegExp(`^${source}$`, 'i'), tokens };
}

function tokenSource(token: string, fixed: boolean): string {
  if (token === 'YYYY') return '(\\d{4})';
  if (token === 'YY') return '(\\d{2})';
  if (token === 'MON') return `(${MONTHS.join('|')})[a-z]{0,6}\\.?`;
  if (token === 'AP') return ' *([ap])\\.?m\\.?';
  if (token === 'Z') return ' *(Z|UTC|[+-]\\d{2}:?\\d{2}|[+-]\\d{2})';
  if (token === 'ss') return '(\\d{2}(?:[.,]\\d{1,9})?)';
  return fixed ? '(\\d{2})' : '(\\d{1,2})';
}

const ISO = /^(\d{4})-?(\d{2})-?(\d{2})(?:[T ]+(\d{2}):?(\d{2})(?::?(\d{2}(?:[.,]\d{1,9})?))? *(Z|UTC|[+-]\d{2}:?\d{2}|[+-]\d{2})?)?$/i;

function readIso(text: string): WallTime | null {
  const match = text.length > 60 ? null : ISO.exec(text);
  if (!match) return null;
  const clock = { hour: Number(match[4] ?? 0), minute: Number(match[5] ?? 0), second: Number((match[6] ?? '0').replace(',', '.')) };
  return assemble(Number(match[1]), Number(match[2]), Number(match[3]), clock, match[4] !== undefined, match[7]);
}

/** Serials are days with a fraction for the clock; taken to the nearest minute, which is more than their digits carry. */
function readSerial(text: string, epoch: number): WallTime | null {
  if (!/^\d{1,6}(?:[.,]\d{1,12})?$/.test(text)) return null;
  const days = Number(text.replace(',', '.'));
  const wallMs = epoch + Math.round((days * DAY) / MINUTE) * MINUTE;
  return inRange(wallMs) ? { wallMs, offsetMinutes: null, hasClock: !Number.isInteger(days), midnightAs24: false } : null;
}

interface Clock {
  hour: number;
  minute: number;
  second: number;
}

function assemble(year: number, month: number, day: number, clock: Clock, hasClock: boolean, zone: string | undefined): WallTime | null {
  const midnightAs24 = clock.hour === 24 && clock.minute === 0 && clock.second === 0;
  if (month < 1 || month > 12 || day < 1 || day > daysInMonth(year, month)) return null;
  if ((clock.hour > 23 && !midnightAs24) || clock.minute > 59 || clock.second >= 60 || Number.isNaN(clock.second)) return null;
  const wallMs = Date.UTC(year, month - 1, day) + clock.hour * 60 * MINUTE + clock.minute * MINUTE + Math.round(clock.second * 1000);
  return inRange(wallMs) ? { wallMs, offsetMinutes: zone === undefined ? null : offsetOf(zone), hasClock, midnightAs24 } : null;
}

/** Years that a record may have; outside, a stamp is a slip of the pen. */
function inRange(wallMs: number): boolean {
  return wallMs >= Date.UTC(1700, 0, 1) && wallMs < Date.UTC(2300, 0, 1);
}

export function daysInMonth(year: number, month: number): number {
  return new Date(Date.UTC(year, month, 0)).getUTCDate();
}

/** Minutes east of UTC of `Z`, `UTC`, `+01:00`, `-0330`, `+02`. */
export function offsetOf(zone: string): number {
  const match = /^([+-])(\d{2}):?(\d{2})?$/.exec(zone.trim());
  if (!match) return 0;
  return (match[1] === '-' ? -1 : 1) * (Number(match[2]) * 60 + Number(match[3] ?? 0));
}
