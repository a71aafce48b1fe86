import type { Language } from './language.js';

/** Keys that the wording of amounts needs in every element that states one. */
export const amountMessages = {
  'amount.span': '{low} to {high}',
  'amount.older': 'more than {age}',
  'amount.unassessed': 'range not assessed',
  'amount.unknown': 'not known',
} as const;
export type AmountKey = keyof typeof amountMessages;
type Speech = Pick<Language<AmountKey>, 'tag' | 'say'>;

/** A share 0..1 as whole per cent; below 1 % and above 99 % it says so rather than 0 or 100. */
export function percent(speech: Speech, share: number | null): string {
  if (share === null || !Number.isFinite(share)) return speech.say('amount.unknown');
  const format = number(speech.tag, { style: 'percent', maximumFractionDigits: 0 });
  if (share > 0 && share < 0.01) return `< ${format.format(0.01)}`;
  if (share < 1 && share > 0.99) return `> ${format.format(0.99)}`;
  return format.format(share);
}

/** A range of shares in per cent, rounded outwards so that it is never narrower than it is. */
export function percentSpan(speech: Speech, range: { low: number; high: number } | null): string {
  if (!range) return speech.say('amount.unassessed');
  const low = Math.floor(range.low * 100 + tiny) / 100;
  const high = Math.ceil(range.high * 100 - tiny) / 100;
  return speech.say('amount.span', {
    low: number(speech.tag, {}).format(Math.round(low * 100)),
    high: number(speech.tag, { style: 'percent' }).format(high),
  });
}

/** An age in the unit people would use: days up to two months, months up to two years, years beyond. */
export function age(speech: Speech, days: number, round: (value: number) => number = Math.round): string {
  const unit = unitFor(days);
  const step = stepFor(days, unit);
  return amountIn(speech.tag, round(days / lengths[unit] / step) * step, unit);
}

/** "More than" an age, which only rounding down keeps true. Ten calendar years may be a day short of ten mean ones: a twentieth of a step is forgiven. */
export const olderThan = (speech: Speech, days: number): string =>
  speech.say('amount.older', { age: age(speech, days, (value) => Math.floor(value + 0.05)) });

/** A limit as whole days, however many. */
export const dayCount = (speech: Speech, days: number): string => amountIn(speech.tag, days, 'day');

/** Two ages as one phrase in one unit, rounded outwards so that the range is never narrower than it is. */
export function ageSpan(speech: Speech, low: number, high: number, highBeyondRecord = false): string {
  const unit = unitFor(high);
  const step = stepFor(high, unit);
  const floor = (value: number): number => Math.floor(value + tiny);
  const down = floor(low / lengths[unit] / step) * step;
  if (highBeyondRecord) return speech.say('amount.span', { low: age(speech, low, floor), high: olderThan(speech, high) });
  const up = Math.ceil(high / lengths[unit] / step - tiny) * step;
  const last = amountIn(speech.tag, up, unit);
  if (down === up) return last;
  // A lower end that would be nothing in the upper one's unit keeps its own.
  const first = down > 0 || low <= 0 ? number(speech.tag, { maximumFractionDigits: 1 }).format(down) : age(speech, low, floor);
  return speech.say('amount.span', { low: first, high: last });
}

/** The day (or, below daily steps, the moment) a step stands for, from the instant at its end. */
export function moment(language: string, endOfStep: string, stepDays: number, timeZone = 'UTC'): string {
  const daily = stepDays >= 1;
  // A step of a day or more is named by the day its middle lies in: its end is already the next day's first instant.
  const time = Date.parse(endOfStep) - (daily ? Math.min(stepDays, 1) * 0.5 * msPerDay : 0);
  return date(language, time, { dateStyle: 'long', ...(daily ? {} : { timeStyle: 'short' }) }, timeZone);
}

/** An instant as a date, in a zone that may be misspelt by the page. */
export function date(language: string, time: number | string, options: Intl.DateTimeFormatOptions, timeZone = 'UTC'): string {
  const value = new Date(time);
  if (Number.isNaN(value.getTime())) return '';
  const key = `${language} ${timeZone} ${JSON.stringify(options)}`;
  let format = dateFormats.get(key);
  if (!format) dateFormats.set(key, (format = dateFormat(language, options, timeZone)));
  return format.format(value);
}

function dateFormat(language: string, options: Intl.DateTimeFormatOptions, timeZone: string): Intl.DateTimeFormat {
  try {
    return new Intl.DateTimeFormat(language, { ...options, timeZone });
  } catch {
    return new Intl.DateTimeFormat(language, { ...options, timeZone: 'UTC' });
  }
}

/** A cached `Intl.NumberFormat`; building one costs more than a hundred formats. */
export function number(language: string, options: Intl.NumberFormatOptions): Intl.NumberFormat {
  const key = language + JSON.stringify(options);
  let format = formats.get(key);
  if (!format) formats.set(key, (format = new Intl.NumberFormat(language, options)));
  return format;
}

export const msPerDay = 86_400_000;

// So that eight months computed as 8.0000001 stay eight.
const tiny = 1e-6;
const formats = new Map<string, Intl.NumberFormat>();
const dateFormats = new Map<string, Intl.DateTimeFormat>();
// A year of 365.25 days and its twelfth, as the reading's own sentence counts them.
export const lengths = { day: 1, month: 30.4375, year: 365.25 };

type AgeUnit = 'day' | 'month' | 'year';

const unitFor = (days: number): AgeUnit => (days < 60 ? 'day' : days < 731 ? 'month' : 'year');

/** Tenths below three days and below ten years, whole numbers elsewhere. */
const stepFor = (days: number, unit: AgeUnit): number =>
  (unit === 'day' && days < 3) || (unit === 'year' && days < 10 * lengths.year) ? 0.1 : 1;

/** A number with its unit, as the language writes it. */
export const amountIn = (language: string, value: number, unit: AgeUnit): string =>
  number(language, { style: 'unit', unit, unitDisplay: 'long', maximumFractionDigits: 1 }).format(value);
