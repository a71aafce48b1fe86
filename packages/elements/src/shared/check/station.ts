import type { Reading, Station, StationExcerpt } from '@rillage/sdk';
import { distributionCheck } from './distribution.js';
import { fields, firstUnfit, maybe, text, type Check } from './fields.js';
import { readingCheck } from './reading.js';

/** What a file turned out to be. `at` names the first field that does not hold, or the version. */
export type Checked =
  { station: Station | StationExcerpt | null; reading: Reading; problem: null } | { problem: { code: 'notStation' | 'newer'; at: string } };

/**
 * Whether parsed JSON is a station, its excerpt or a reading that this version can show. The seal is not checked here, that takes the engine; this keeps a
 * damaged or foreign file from being shown as a number.
 */
export function checkStation(value: unknown): Checked {
  const { kind, version } = (value ?? {}) as { kind?: unknown; version?: unknown };
  const single = kind === 'rillage-reading';
  const known = single || kind === 'rillage-station' || kind === 'rillage-excerpt';
  if (known && typeof version === 'number' && version > 1) return { problem: { code: 'newer', at: String(version) } };
  const unfit = !known ? 'kind' : version !== 1 ? 'version' : firstUnfit(single ? readingCheck : stationCheck, value);
  if (unfit) return { problem: { code: 'notStation', at: unfit } };
  if (single) return { station: null, reading: value as Reading, problem: null };
  const station = value as Station | StationExcerpt;
  return { station, reading: station.reading, problem: null };
}

const stationCheck: Check = fields({
  id: text,
  name: text,
  history: fields({}),
  distribution: maybe(distributionCheck),
  reading: readingCheck,
});
