import { type Station, type StationExcerpt } from '../contract.js';
import { RillageError } from '../errors.js';
import { lastOfHistory } from './history.js';
import { seal } from './seal.js';

export interface ExcerptOptions {
  /** Days of history to keep, counted back from the reading; 0 keeps none. Default: all that the station has. */
  historyDays?: number;
}

/**
 * The public's part of a station: description, history, distribution and reading, without the members' running state, the fit, the rows and the
 * receipt. Sealed anew, with the station's own seal beside it, so that either can be traced to the other. The station is not changed.
 * @throws RillageError 'parameter-domain' where `historyDays` is negative or no number
 */
export function makeExcerpt(station: Station, { historyDays = Infinity }: ExcerptOptions = {}): StationExcerpt {
  if (!(historyDays >= 0)) {
    throw new RillageError({
      code: 'parameter-domain',
      path: 'historyDays',
      expected: 'a number of days, 0 or more',
      received: String(historyDays),
    });
  }
  const { version, id, name, of, distribution, reading, history, seal: stationSeal } = station;
  const { invented, description, latitude, areaKm2, samples, signedOff } = station;
  // Named one by one: a field that a later version adds to stations does not become public by itself.
  return seal({
    kind: 'rillage-excerpt' as const,
    ...{ version, id, name, of, distribution, reading, stationSeal },
    ...(invented === undefined ? {} : { invented }),
    ...(description === undefined ? {} : { description }),
    ...(latitude === undefined ? {} : { latitude }),
    ...(areaKm2 === undefined ? {} : { areaKm2 }),
    ...(samples ? { samples } : {}),
    ...(signedOff ? { signedOff } : {}),
    history: lastOfHistory(history, Math.round(historyDays / history.stepDays)),
  });
}
