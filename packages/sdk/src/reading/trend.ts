import { type Reading, type StationHistory } from '../contract.js';
import { instantMs } from './readingTime.js';

const DAY_MS = 86_400_000;
const DAYS_PER_YEAR = 365.25;
const REACH_DAYS = 15;
const YOUNGEST_MONTH = 30;
const LEAST_YEARS = 2;

/**
 * The youngest-month share against the same season (± 15 days) of earlier years: `younger` above the upper quartile of those days, `older` below
 * the lower one, `usual` between. A year counts when at least half of its window has values.
 * @returns null where fewer than two earlier years count, or the share is not known
 * @source common practice (comparison with the season's interquartile range)
 */
export function trendAt(history: StationHistory, at: string, share: number | null): Reading['trend'] {
  const values = history.younger[String(YOUNGEST_MONTH)];
  if (!values || share === null) return null;
  const stepMs = history.stepDays * DAY_MS;
  const now = (instantMs(at, 'at') - instantMs(history.start, 'history.start')) / stepMs - 1;
  const reach = Math.floor(REACH_DAYS / history.stepDays);

  const pooled: number[] = [];
  let years = 0;
  for (let year = 1; ; year += 1) {
    const centre = Math.round(now - (year * DAYS_PER_YEAR) / history.stepDays);
    if (centre + reach < 0) break;
    const window = values.slice(Math.max(0, centre - reach), centre + reach + 1).filter((value) => value !== null);
    if (window.length < reach + 1) continue;
    years += 1;
    pooled.push(...window);
  }
  if (years < LEAST_YEARS) return null;

  pooled.sort((a, b) => a - b);
  const quartile = (p: number): number => pooled[Math.round(p * (pooled.length - 1))] as number;
  const direction = share > quartile(0.75) ? 'younger' : share < quartile(0.25) ? 'older' : 'usual';
  return { direction, days: YOUNGEST_MONTH, usualShare: quartile(0.5), years };
}
