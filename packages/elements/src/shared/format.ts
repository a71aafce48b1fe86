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
export function age(speech: Speech, days: number): string {
  const { value, unit } = people(days);
  return number(speech.tag, {
    style: 'unit',
    unit,
    unitDisplay: 'long',
    maximumFractionDigits: value < 10 && unit === 'year' ? 1 : 0,
  }).format(value);
}

/** Two ages as one phrase: the unit is said once where both share it. */
export function ageSpan(speech: Speech, low: number, high: number, highBeyondRecord = false): string {
  const older = (text: string): string => (highBeyondRecord ? speech.say('amount.older', { age: text }) : text);
  const unit = people(high).unit;
  const inUnit = low / lengths[unit];
  const sayUnit = people(low).unit === unit || (inUnit >= 1 && unit !== 'year');
  if (sayUnit && age(speech, low) === age(speech, high)) return older(age(speech, high));
  const first =
    sayUnit && !highBeyondRecord
      ? number(speech.tag, { maximumFractionDigits: inUnit < 10 && unit === 'year' ? 1 : 0 }).format(inUnit)
      : age(speech, low);
  return speech.say('amount.span', { low: first, high: older(age(speech, high)) });
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
  try {
    return new Intl.DateTimeFormat(language, { ...options, timeZone }).format(value);
  } catch {
    return new Intl.DateTimeFormat(language, { ...options, timeZone: 'UTC' }).format(value);
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

const tiny = 1e-9;
const formats = new Map<string, Intl.NumberFormat>();
// Mean Gregorian month and year.
const lengths = { day: 1, month: 30.436875, year: 365.2425 };

function people(days: number): { value: number; unit: 'day' | 'month' | 'year' } {
  const unit = days < 60 ? 'day' : days < 730 ? 'month' : 'year';
  const value = days / lengths[unit];
  return { value: unit === 'year' && value < 10 ? Math.round(value * 10) / 10 : Math.round(value), unit };
}
