import { msPerDay } from '../shared/format.js';

/** Days after which data look stale unless the page says otherwise. */
export const usualPatienceDays = 3;

/**
 * Milliseconds meant by a `stale-after` attribute: days as a number (`2`, `0.5`), an ISO 8601 duration of days, hours and minutes (`P2D`, `PT36H`),
 * or `never`. Anything else counts as the usual three days, never as `never`.
 */
export function patience(attribute: string | null | undefined): number {
  const text = (attribute ?? '').trim();
  if (text.toLowerCase() === 'never') return Infinity;
  if (/^\d+(\.\d+)?$/.test(text)) return Number(text) * msPerDay;
  const [, weeks, days, hours, minutes] = /^P(?:(\d+)W)?(?:(\d+)D)?(?:T(?:(\d+)H)?(?:(\d+)M)?)?$/i.exec(text) ?? [];
  const total = Number(weeks ?? 0) * 7 + Number(days ?? 0) + Number(hours ?? 0) / 24 + Number(minutes ?? 0) / 1440;
  return (total || usualPatienceDays) * msPerDay;
}

export type Freshness = 'fresh' | 'stale' | 'future';

/** How the data's own time stands to the reader's clock. An hour ahead is forgiven: clocks differ. */
export function freshness(at: string, now: number, patienceMs: number): Freshness {
  const age = now - Date.parse(at);
  if (age > patienceMs) return 'stale';
  return age < -msPerDay / 24 ? 'future' : 'fresh';
}
