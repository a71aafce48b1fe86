import { type DistributionWithRange, type Forcing, type ReadingSource, type Receipt, type Station } from '../contract.js';
import { RillageError } from '../errors.js';
import { distributionAt } from './distribution.js';
import { fitFacts } from './fitFacts.js';
import { historyOf } from './history.js';
import { readingOf, type ReadingOptions } from './makeReading.js';
import { readMembers } from './members.js';
import { recentRows } from './recentRows.js';
import { seal } from './seal.js';

export interface StationInput extends Omit<ReadingOptions, 'at' | 'station' | 'history' | 'balance'> {
  /** File name and address of the station: letters, digits, `-`, `_`. */
  id: string;
  name: string;
  invented?: boolean;
  description?: string;
  latitude?: number;
  areaKm2?: number;
  /** The forcing that the runs went through. */
  forcing: Forcing;
  /** A run, or a fit's weighted runs, asked for with `READING_RUN_OPTIONS` and `distributionsAt` its last step. */
  source: ReadingSource;
  /** Summary of the fit that made the members: what `fitSummary` gives. The reading's confidence rests on it. */
  fit?: unknown;
  receipt?: Receipt;
  signedOff?: { by: string; at: string };
}

/**
 * One gauge as a file's content: description, running state of every member, history, the last step's distribution and reading, sealed.
 * @throws RillageError 'station-id', 'shape' where forcing and run differ, and what `makeReading` throws
 */
export function makeStation(input: StationInput): Station {
  if (!/^[A-Za-z0-9][A-Za-z0-9_-]{0,79}$/.test(input.id)) {
    throw new RillageError({ code: 'station-id', path: 'id', expected: '1 to 80 letters, digits, - or _', received: input.id });
  }
  const { forcing } = input;
  const members = readMembers(input.source, input.of);
  if (forcing.inflow.length !== members.steps || forcing.start !== members.start) {
    throw new RillageError({
      code: 'shape',
      path: 'forcing',
      expected: `the run's ${members.steps} steps from ${members.start}`,
      received: `${forcing.inflow.length} steps from ${forcing.start}`,
    });
  }
  const about = { id: input.id, name: input.name, ...(input.invented ? { invented: true } : {}) };
  const balance = addToBalance({ inflow: 0, outflow: 0 }, forcing);
  const history = historyOf(members);
  const { fit, receipt, samples, signedOff, description, latitude, areaKm2 } = input;
  return seal({
    kind: 'rillage-station',
    version: 1,
    ...about,
    ...(description === undefined ? {} : { description }),
    ...(latitude === undefined ? {} : { latitude }),
    ...(areaKm2 === undefined ? {} : { areaKm2 }),
    of: members.of,
    members: members.runs.map((run, i) => ({ weight: members.weights[i] as number, checkpoint: run.checkpoint() })),
    ...(fit === undefined ? {} : { fit }),
    history,
    recent: recentRows(forcing),
    balance,
    distribution: roundedDistribution(distributionAt(members, members.steps - 1)),
    reading: readingOf(members, {
      ...optionsOf(input),
      of: members.of,
      station: about,
      balance,
      history,
      sources: input.sources ?? sourcesOf(receipt),
    }),
    ...(receipt ? { receipt } : {}),
    ...(samples ? { samples } : {}),
    ...(signedOff ? { signedOff } : {}),
  });
}

/** Ages to 0.001 day and shares to 1e-6: finer than any picture, coarse enough for a small file. */
export function roundedDistribution(distribution: DistributionWithRange): DistributionWithRange {
  const round = (values: ArrayLike<number>, digits: number): Float64Array =>
    Float64Array.from(values, (value) => Number(value.toFixed(digits)));
  const { low, high } = distribution;
  return {
    ...distribution,
    ageDays: round(distribution.ageDays, 3),
    youngerShare: round(distribution.youngerShare, 6),
    low: low ? round(low, 6) : null,
    high: high ? round(high, 6) : null,
  };
}

function sourcesOf(receipt: Receipt | undefined): { name: string; sha256: string }[] {
  return (receipt?.sources ?? []).map(({ name, sha256 }) => ({ name, sha256 }));
}

/** Summed step by step, so that a record added in pieces gives the same bits as one added whole. */
export function addToBalance(before: { inflow: number; outflow: number }, forcing: Forcing): { inflow: number; outflow: number } {
  let { inflow, outflow } = before;
  const outflows = Object.keys(forcing.outflows)
    .sort()
    .map((name) => forcing.outflows[name] as Float64Array);
  for (let i = 0; i < forcing.inflow.length; i += 1) {
    inflow += (forcing.inflow[i] as number) * forcing.stepDays;
    for (const series of outflows) outflow += (series[i] as number) * forcing.stepDays;
  }
  return { inflow, outflow };
}

function optionsOf(input: StationInput): ReadingOptions {
  const { language, messages, samples, rules, judge } = input;
  return {
    ...(language === undefined ? {} : { language }),
    ...(messages ? { messages } : {}),
    ...(samples ? { samples } : {}),
    ...fitFacts(input.fit, input),
    ...(rules ? { rules } : {}),
    ...(judge ? { judge } : {}),
  };
}
