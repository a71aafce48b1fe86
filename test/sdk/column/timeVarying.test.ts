import { describe, expect, test } from 'vitest';
import { runColumn, type ColumnRun } from '@rillage/sdk';
import {
  everyStep,
  INITIAL_CONCENTRATION,
  INITIAL_STORAGE,
  INPUT_RANGE,
  shareAt,
  stormCases,
  stormForcing,
  worst,
  youngerThan,
} from './support/stormRecord.js';

// Values: test/checks/timeVarying.json, whose estimated error is 1e-11 or less. Tolerances: the accuracy table of the method.
const modes = [
  { mode: 'every age kept', options: { ageResolution: 0 }, smooth: 1e-6, cornered: 1e-5 },
  { mode: 'default', options: {}, smooth: 1e-3, cornered: 1e-3 },
];
/** 0.1 % of the input's range is the default mode's bound; every age kept stays far below it. */
const CONCENTRATION = { 'every age kept': 1e-6 * INPUT_RANGE, default: 1e-3 * INPUT_RANGE };
const CLOSURE = 1e-10;

for (const { mode, options, smooth, cornered } of modes) {
  describe.each(Object.entries(stormCases))(`runColumn, ${mode}: %s`, (_name, { values, stream, evap, smooth: isSmooth }) => {
    const forcing = stormForcing();
    const run: ColumnRun = runColumn(
      { initialStorage: INITIAL_STORAGE, selection: { stream, evap }, tracers: { tracer: { preRecord: INITIAL_CONCENTRATION } } },
      forcing,
      { ...options, snapshotsAt: everyStep, distributionsAt: everyStep },
    );
    const shareTolerance = isSmooth ? smooth : cornered;

    test('storage[k] is what the fluxes leave', () => {
      // sums of 90 numbers of at most 220 mm in double precision
      expect(worst(run.storage, values.storage_mm.slice(1))).toBeLessThan(1e-11);
    });

    test('outflows.stream.concentration is the flow-weighted mean over the step', () => {
      const tolerance = mode === 'default' ? CONCENTRATION.default : isSmooth ? CONCENTRATION['every age kept'] : 1e-5 * INPUT_RANGE;
      expect(worst(run.outflows.stream.concentration.tracer, values.stream_conc_step_mean)).toBeLessThan(tolerance);
    });

    test('closure of water and tracer', () => {
      expect(run.closure.water).toBeLessThan(CLOSURE);
      expect(run.closure.tracers.tracer).toBeLessThan(CLOSURE);
    });

    if (values.stream_volume_initial !== undefined)
      test('outflows.*.preRecordShare is the share of the initial storage', () => {
        for (const outflow of ['stream', 'evap'] as const) {
          const flow = forcing.outflows[outflow];
          const wet = everyStep.filter((k) => flow[k] > 0);
          const volumes = values[`${outflow}_volume_initial`] as number[];
          const expected = wet.map((k) => volumes[k] / flow[k]);
          const actual = wet.map((k) => run.outflows[outflow].preRecordShare[k]);
          expect(worst(actual, expected)).toBeLessThan(shareTolerance);
        }
      });

    if (values.younger_storage_mm !== undefined)
      test('snapshots: storage younger than each age at the end of each step', () => {
        const table = values.younger_storage_mm as number[][];
        for (const k of everyStep) {
          const snapshot = run.snapshots.get(k)!;
          const actual = everyStep.slice(0, k + 1).map((j) => youngerThan(snapshot, k + 1 - j, 'stream').storage / snapshot.storage);
          const expected = everyStep.slice(0, k + 1).map((j) => table[j][k - j] / snapshot.storage);
          expect(worst(actual, expected)).toBeLessThan(shareTolerance);
        }
      });

    if (values.stream_age_cdf_step_end !== undefined)
      test('snapshots: selection at each edge is the stream’s age at the end of the step', () => {
        const table = values.stream_age_cdf_step_end as number[][];
        for (const k of everyStep) {
          const snapshot = run.snapshots.get(k)!;
          const actual = everyStep.slice(0, k + 1).map((j) => youngerThan(snapshot, k + 1 - j, 'stream').share);
          const expected = everyStep.slice(0, k + 1).map((j) => table[j][k - j]);
          expect(worst(actual, expected)).toBeLessThan(shareTolerance);
        }
      });

    if (values.stream_volume_by_entry !== undefined)
      test('distributions: the whole table of entry × exit', () => {
        for (const outflow of ['stream', 'evap'] as const) {
          const table = values[`${outflow}_volume_by_entry`] as number[][];
          for (const k of everyStep) {
            const flow = forcing.outflows[outflow][k];
            if (flow === 0) continue;
            const distribution = run.outflows[outflow].distributions.get(k)!;
            const actual = everyStep.slice(0, k + 1).map((j) => shareAt(distribution, k + 1 - j) - shareAt(distribution, k - j));
            const expected = everyStep.slice(0, k + 1).map((j) => table[j][k - j] / flow);
            expect(worst(actual, expected)).toBeLessThan(shareTolerance);
          }
        }
      });
  });
}

test('runColumn: the driven scale of case C is the table of the values, step by step', () => {
  // scale_k was made from storage at mid-step, rounded to 6 digits: the selection at the step's end tells which scale was in use
  const { stream, evap } = stormCases.C_gamma_tv;
  const forcing = stormForcing();
  const run = runColumn({ initialStorage: INITIAL_STORAGE, selection: { stream, evap } }, { ...forcing, inflowConcentration: {} });
  const middle = everyStep.map((k) => 0.5 * ((k === 0 ? INITIAL_STORAGE : run.storage[k - 1]) + run.storage[k]));
  const expected = (stormCases.C_gamma_tv.values as unknown as { scale_k: number[] }).scale_k;
  expect(
    worst(
      middle.map((mm) => 60 - 0.8 * (mm - 160)),
      expected,
    ),
  ).toBeLessThan(1e-6);
});
