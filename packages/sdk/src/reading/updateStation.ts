import { type Forcing, type Reading, type Station, type StationMember, type WeightedRun } from '../contract.js';
import { resumeColumn } from '../column/index.js';
import { RillageError } from '../errors.js';
import { distributionAt } from './distribution.js';
import { fitFacts, type FitFacts } from './fitFacts.js';
import { historyOf, joinHistory } from './history.js';
import { readingOf, type ReadingOptions } from './makeReading.js';
import { addToBalance, roundedDistribution } from './makeStation.js';
import { type Members, readMembers } from './members.js';
import { instantMs, instantText } from './readingTime.js';
import { recentRows, rowsKnown } from './recentRows.js';
import { seal, withoutSeal } from './seal.js';

const DAY_MS = 86_400_000;

export type UpdateOptions = Pick<ReadingOptions, 'language' | 'messages' | 'samples' | 'sources' | 'rules' | 'judge' | keyof FitFacts>;

/**
 * One morning's work: the rows that the station does not have yet are added to every member, in time independent of the record's length, and
 * the reading is made anew. Rows it already has are skipped; where all are known, the same station comes back. Neither argument is changed.
 * @throws RillageError 'step-differs', 'off-grid', 'time-gap', 'contradicting-rows', 'no-run', and what the engine finds wrong with the new rows
 */
export function updateStation(station: Station, newForcing: Forcing, options: UpdateOptions = {}): { station: Station; reading: Reading } {
  const lead = station.members[0];
  if (!lead) throw new RillageError({ code: 'no-run', path: 'members', expected: 'at least one member', received: 'none' });
  const stationEnd = instantMs(lead.checkpoint.recordStart, 'recordStart') + lead.checkpoint.steps * lead.checkpoint.stepDays * DAY_MS;
  const known = rowsKnown(station, newForcing, stationEnd);
  if (known >= newForcing.inflow.length) return { station, reading: station.reading };
  const rows = known === 0 ? newForcing : rowsFrom(newForcing, known);

  const runOptions = {
    youngerThan: Object.keys(station.history.younger).map(Number),
    quantiles: [0.5],
    distributionsAt: [rows.inflow.length - 1],
  };
  const source = station.members.map(({ weight, checkpoint }): WeightedRun => ({
    weight,
    run: resumeColumn(checkpoint, rows, runOptions),
  }));
  // One member stays a single run, whose range is not assessed.
  const members = readMembers(source.length === 1 ? (source[0] as WeightedRun).run : source, station.of);

  const history = joinHistory(station.history, historyOf(members));
  const balance = station.balance && addToBalance(station.balance, rows);
  const samples = options.samples ?? station.samples;
  const facts = fitFacts(station.fit, options);
  const reading = readingOf(members, {
    ...options,
    language: options.language ?? station.reading.language,
    station: { id: station.id, name: station.name, ...(station.invented ? { invented: true } : {}) },
    sources: options.sources ?? station.reading.evidence.sources,
    ...facts,
    // A fit that had not settled has not settled overnight.
    converged: facts.converged ?? !station.reading.withheld.some(({ code }) => code === 'fitNotConverged'),
    history,
    ...(balance ? { balance } : {}),
    ...(samples ? { samples } : {}),
  });
  const next = seal({
    ...withoutSeal(station),
    members: membersAfter(station.members, members),
    history,
    recent: recentRows(rows, station.recent),
    ...(balance ? { balance } : {}),
    distribution: roundedDistribution(distributionAt(members, members.steps - 1)),
    reading,
    ...(samples ? { samples } : {}),
  });
  return { station: next, reading };
}

function rowsFrom(forcing: Forcing, first: number): Forcing {
  const cut = (series: Record<string, Float64Array>): Record<string, Float64Array> =>
    Object.fromEntries(Object.keys(series).map((name) => [name, (series[name] as Float64Array).slice(first)]));
  return {
    start: instantText(instantMs(forcing.start, 'start') + first * forcing.stepDays * DAY_MS),
    stepDays: forcing.stepDays,
    inflow: forcing.inflow.slice(first),
    outflows: cut(forcing.outflows),
    inflowConcentration: cut(forcing.inflowConcentration),
    ...(forcing.drivers ? { drivers: cut(forcing.drivers) } : {}),
  };
}

function membersAfter(before: readonly StationMember[], { runs }: Members): StationMember[] {
  return before.map(({ weight }, i) => ({ weight, checkpoint: (runs[i] as Members['runs'][number]).checkpoint() }));
}
