import type { Catchment, ColumnRun, DistributionWithRange, StationHistory } from '@rillage/sdk';
import { makeSection, sectionSteps, type Section } from '../../../packages/sdk/src/ages/section.js';
import { runColumn } from '../../../packages/sdk/src/column/index.js';
import { syntheticForcing } from '../../bench/forcing.mjs';

export const catchment: Catchment = {
  initialStorage: 1500,
  selection: {
    discharge: { form: 'gamma', shape: 0.6, scale: { driver: 'storageAnomaly', at: [-100, 100], value: [700, 300] } },
    evapotranspiration: { form: 'exponential', scale: 110 },
  },
  tracers: { isotope: { preRecord: -8 } },
};

export interface Trial {
  run: ColumnRun;
  section: Section;
  history: StationHistory;
  distribution: DistributionWithRange;
}

/** A seeded synthetic record of some years, run and read as the elements take it. Nothing of it is data. */
export function trial(years = 10, model = catchment, columns = 600): Trial {
  const made = syntheticForcing({ years, seed: 11 });
  const forcing = { ...made, inflowConcentration: { isotope: Object.values(made.inflowConcentration)[0]! } };
  const last = forcing.inflow.length - 1;
  const ages = [7, 30, 90, 365];
  const run = runColumn(model, forcing, {
    snapshotsAt: sectionSteps(last + 1, columns),
    youngerThan: ages,
    quantiles: [0.5],
    distributionsAt: [last],
  });
  const { discharge } = run.outflows;
  const list = (series: ArrayLike<number>): (number | null)[] => Array.from(series, (value) => (Number.isNaN(value) ? null : value));
  const median = discharge!.quantiles.get(0.5)!;
  return {
    run,
    section: makeSection(run, { units: { isotope: '‰' } }),
    history: {
      start: run.start,
      stepDays: 1,
      flow: list(discharge!.flow),
      younger: Object.fromEntries(ages.map((days) => [String(days), list(discharge!.youngerShare.get(days)!)])),
      medianDays: list(median.days),
      medianBeyondRecord: Array.from(median.beyondRecord, (mark) => (mark === 1 ? 1 : 0)),
      preRecordShare: list(discharge!.preRecordShare),
      concentration: { isotope: list(discharge!.concentration['isotope']!) },
    },
    distribution: {
      ...discharge!.distributions.get(last)!,
      of: 'discharge',
      at: new Date(Date.parse(run.start) + (last + 1) * 86_400_000).toISOString(),
      low: null,
      high: null,
      preRecordShare: discharge!.preRecordShare[last]!,
      preRecordRange: null,
      recordDays: last + 1,
    },
  };
}
