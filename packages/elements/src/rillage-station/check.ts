import type { DistributionWithRange, Reading, Station } from '@rillage/sdk';

/** What a file turned out to be. `problem` names the first field that does not hold. */
export type Checked =
  { station: Station | null; reading: Reading; problem: null } | { problem: { code: 'notStation' | 'newer'; at: string } };

/**
 * Whether parsed JSON is a station or a reading this version can show. The seal is not checked here, that takes the engine; this keeps a
 * damaged or foreign file from being shown as a number.
 */
export function checkStation(value: unknown): Checked {
  try {
    const file = record(value, 'file');
    const kind = file['kind'];
    need(kind === 'rillage-station' || kind === 'rillage-reading', 'kind');
    if (typeof file['version'] === 'number' && file['version'] > 1) return { problem: { code: 'newer', at: String(file['version']) } };
    need(file['version'] === 1, 'version');
    if (kind === 'rillage-reading') return { station: null, reading: reading(file, 'reading'), problem: null };
    text(file['id'], 'id');
    text(file['name'], 'name');
    record(file['history'], 'history');
    if (file['distribution'] !== undefined && file['distribution'] !== null) distribution(file['distribution'], 'distribution');
    return { station: file as unknown as Station, reading: reading(file['reading'], 'reading'), problem: null };
  } catch (error) {
    if (error instanceof Unfit) return { problem: { code: 'notStation', at: error.message } };
    throw error;
  }
}

/** A distribution that can be drawn, or null (a step without outflow has none): increasing ages, shares between 0 and 1 that do not fall, a range around them. */
export function checkDistribution(value: unknown): DistributionWithRange | null {
  try {
    const found = value ? distribution(value, 'distribution') : null;
    return found?.ageDays.length ? found : null;
  } catch {
    return null;
  }
}

/** A reading that can be shown, or null. */
export function checkReading(value: unknown): Reading | null {
  const checked = checkStation(value);
  return checked.problem || checked.station ? null : checked.reading;
}

function reading(value: unknown, at: string): Reading {
  const it = record(value, at);
  need(it['kind'] === 'rillage-reading' && it['version'] === 1, `${at}.kind`);
  text(it['of'], `${at}.of`);
  instant(it['at'], `${at}.at`);
  need(finite(it['stepDays']) && it['stepDays'] > 0, `${at}.stepDays`);
  need(it['status'] === 'given' || it['status'] === 'withheld', `${at}.status`);
  need(typeof it['confidence'] === 'string', `${at}.confidence`);
  for (const [index, reason] of list(it['withheld'], `${at}.withheld`).entries()) {
    text(record(reason, `${at}.withheld[${index}]`)['code'], `${at}.withheld[${index}].code`);
  }
  for (const because of list(it['confidenceBecause'], `${at}.confidenceBecause`)) text(because, `${at}.confidenceBecause`);
  for (const [index, entry] of list(it['younger'], `${at}.younger`).entries()) {
    const here = `${at}.younger[${index}]`;
    const younger = record(entry, here);
    need(finite(younger['days']) && younger['days'] > 0, `${here}.days`);
    need(younger['share'] === null || share(younger['share']), `${here}.share`);
    need(share(younger['unplaced']), `${here}.unplaced`);
    range(younger['range'], `${here}.range`, 1);
  }
  if (it['median'] !== null) {
    const median = record(it['median'], `${at}.median`);
    need(finite(median['days']) && median['days'] >= 0, `${at}.median.days`);
    need(typeof median['beyondRecord'] === 'boolean', `${at}.median.beyondRecord`);
    range(median['range'], `${at}.median.range`, Infinity);
  }
  const older = record(it['olderThanRecord'], `${at}.olderThanRecord`);
  need(older['share'] === null || share(older['share']), `${at}.olderThanRecord.share`);
  range(older['range'], `${at}.olderThanRecord.range`, 1);
  need(share(it['assumedShare']), `${at}.assumedShare`);
  if (it['trend'] !== null) {
    const trend = record(it['trend'], `${at}.trend`);
    need(share(trend['usualShare']) && finite(trend['years']) && finite(trend['days']), `${at}.trend`);
    need(['younger', 'older', 'usual'].includes(trend['direction'] as string), `${at}.trend.direction`);
  }
  for (const field of ['sentence', 'caution', 'language']) text(it[field], `${at}.${field}`);
  if (it['sentences'] !== undefined) for (const one of list(it['sentences'], `${at}.sentences`)) text(one, `${at}.sentences`);
  const evidence = record(it['evidence'], `${at}.evidence`);
  instant(evidence['recordFrom'], `${at}.evidence.recordFrom`);
  instant(evidence['recordTo'], `${at}.evidence.recordTo`);
  return it as unknown as Reading;
}

function distribution(value: unknown, at: string): DistributionWithRange {
  const it = record(value, at);
  const ages = numbers(it['ageDays'], `${at}.ageDays`);
  increasing(ages, `${at}.ageDays`, 0, Infinity, true);
  for (const field of ['youngerShare', 'low', 'high']) {
    if (field !== 'youngerShare' && it[field] === null) continue;
    const shares = numbers(it[field], `${at}.${field}`);
    need(shares.length === ages.length, `${at}.${field}`);
    increasing(shares, `${at}.${field}`, 0, 1, false);
  }
  need((it['low'] === null) === (it['high'] === null), `${at}.low`);
  text(it['of'], `${at}.of`);
  instant(it['at'], `${at}.at`);
  need(share(it['preRecordShare']), `${at}.preRecordShare`);
  range(it['preRecordRange'], `${at}.preRecordRange`, 1);
  need(finite(it['recordDays']) && it['recordDays'] > 0, `${at}.recordDays`);
  return it as unknown as DistributionWithRange;
}

class Unfit extends Error {}

function need(holds: boolean, at: string): asserts holds {
  if (!holds) throw new Unfit(at);
}

const finite = (value: unknown): value is number => typeof value === 'number' && Number.isFinite(value);
const share = (value: unknown): value is number => finite(value) && value >= -slack && value <= 1 + slack;
// Shares are sums of thousands of parcels.
const slack = 1e-6;
const mostValues = 200_000;

function record(value: unknown, at: string): Record<string, unknown> {
  need(typeof value === 'object' && value !== null && !Array.isArray(value), at);
  return value as Record<string, unknown>;
}

function text(value: unknown, at: string): void {
  need(typeof value === 'string', at);
}

function instant(value: unknown, at: string): void {
  need(typeof value === 'string' && value.length < 40 && Number.isFinite(Date.parse(value)), at);
}

function list(value: unknown, at: string): unknown[] {
  need(Array.isArray(value) && value.length <= 100, at);
  return value;
}

function numbers(value: unknown, at: string): ArrayLike<number> {
  need((Array.isArray(value) || value instanceof Float64Array) && value.length <= mostValues, at);
  return value;
}

function increasing(values: ArrayLike<number>, at: string, least: number, most: number, strictly: boolean): void {
  let before = least - slack;
  for (let index = 0; index < values.length; index++) {
    const value = values[index];
    need(finite(value) && value <= most + slack && (strictly && index ? value > before : value >= before - slack), `${at}[${index}]`);
    before = value;
  }
}

function range(value: unknown, at: string, most: number): void {
  if (value === null) return;
  const { low, high } = record(value, at);
  need(finite(low) && finite(high) && low >= -slack && low <= high && high <= most + slack, at);
}
