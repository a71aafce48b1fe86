import { stepMiddleMs } from './readingTime.js';

const DAYS_PER_MONTH = 365.25 / 12;
const DAYS_PER_YEAR = 365.25;
/** Ages up to here are said in days, then in months up to the next, then in years. */
const MOST_DAYS = 60;
const MOST_MONTHS_IN_DAYS = 731;

type AgeUnit = 'day' | 'month' | 'year';

/** An age in the unit a person would use: "12 days", "7 months", "2.4 years". */
export function ageText(days: number, language: string): string {
  const unit = ageUnit(days);
  return unitText(inUnit(days, unit), unit, language);
}

/** Two ages in one unit, rounded outwards: `low` is the number alone, `high` carries the unit. */
export function ageRangeTexts(low: number, high: number, language: string): { low: string; high: string } {
  const unit = ageUnit(high);
  const scale = stepOfUnit(high, unit);
  // A hair less and more, so that 8 months computed as 8.0000001 stays 8.
  const down = Math.floor((inUnit(low, unit) + 1e-6) / scale) * scale;
  const up = Math.ceil((inUnit(high, unit) - 1e-6) / scale) * scale;
  return { low: new Intl.NumberFormat(language, { maximumFractionDigits: 1 }).format(down), high: unitText(up, unit, language) };
}

/** A whole number of days, as an age limit is said: "30 days". */
export function daysText(days: number, language: string): string {
  return unitText(days, 'day', language);
}

function ageUnit(days: number): AgeUnit {
  if (days < MOST_DAYS) return 'day';
  return days < MOST_MONTHS_IN_DAYS ? 'month' : 'year';
}

function inUnit(days: number, unit: AgeUnit): number {
  if (unit === 'day') return days;
  return unit === 'month' ? days / DAYS_PER_MONTH : days / DAYS_PER_YEAR;
}

/** Tenths below 3 days and below 10 years, whole numbers elsewhere. */
function stepOfUnit(days: number, unit: AgeUnit): number {
  if (unit === 'day') return days < 3 ? 0.1 : 1;
  return unit === 'year' && days < 10 * DAYS_PER_YEAR ? 0.1 : 1;
}

function unitText(value: number, unit: AgeUnit, language: string): string {
  const fine = (unit === 'day' && value < 3) || (unit === 'year' && value < 10);
  return new Intl.NumberFormat(language, { style: 'unit', unit, unitDisplay: 'long', maximumFractionDigits: fine ? 1 : 0 }).format(value);
}

/** The step's own day, with the time of its end in UTC where steps are shorter than a day. */
export function dateText(at: string, stepDays: number, language: string): string {
  if (stepDays >= 1 - 1e-9) return format(stepMiddleMs(at, stepDays), language, { day: 'numeric', month: 'long', year: 'numeric' });
  return format(Date.parse(at), language, {
    day: 'numeric',
    month: 'long',
    year: 'numeric',
    hour: '2-digit',
    minute: '2-digit',
    timeZoneName: 'short',
  });
}

export function monthText(instant: string, language: string): string {
  return format(Date.parse(instant), language, { month: 'long', year: 'numeric' });
}

function format(ms: number, language: string, options: Intl.DateTimeFormatOptions): string {
  return new Intl.DateTimeFormat(language, { ...options, timeZone: 'UTC' }).format(ms);
}

/** A share as litres of ten or of a hundred: whichever keeps it between 1 and all but 1. */
export type Litres = { kind: 'few' } | { kind: 'nearlyAll' } | { kind: 'about'; count: number; base: 10 | 100 };

/** Tens read best; shares near either end need hundreds, and so does a range that tens would swallow. */
export function litres(share: number, range: { low: number; high: number } | null = null): Litres {
  if (share < 0.01) return { kind: 'few' };
  if (share > 0.99) return { kind: 'nearlyAll' };
  const narrow = range !== null && range.high - range.low < 0.1;
  const base = share < 0.05 || share > 0.95 || narrow ? 100 : 10;
  return { kind: 'about', count: Math.round(share * base), base };
}

/** The range in the same litres, rounded outwards. */
export function litresRange(range: { low: number; high: number }, base: number): { low: number; high: number } {
  return { low: Math.max(0, Math.floor(range.low * base + 1e-9)), high: Math.min(base, Math.ceil(range.high * base - 1e-9)) };
}
