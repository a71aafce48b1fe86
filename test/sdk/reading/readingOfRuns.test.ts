import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { runColumn } from '../../../packages/sdk/src/column/index.js';
import { type Catchment, type Forcing } from '../../../packages/sdk/src/contract.js';
import {
  makeReading,
  makeStation,
  READING_RUN_OPTIONS,
  readReading,
  readStation,
  writeReading,
  writeStation,
} from '../../../packages/sdk/src/reading/index.js';

/** mm/day as gauges give them. */
const hundredths = (most: number) => fc.integer({ min: 0, max: 100 * most }).map((value) => value / 100);

/** Any weather, with dry and flowless days, over any length of record from a day to two years. */
const forcings = fc
  .record({
    steps: fc.oneof(fc.integer({ min: 1, max: 12 }), fc.integer({ min: 13, max: 730 })),
    rain: fc.array(fc.oneof(fc.constant(0), hundredths(40)), { minLength: 3, maxLength: 12 }),
    flow: fc.array(fc.oneof(fc.constant(0), hundredths(3)), { minLength: 2, maxLength: 9 }),
    stepDays: fc.constantFrom(1, 1 / 24, 7),
  })
  .map(({ steps, rain, flow, stepDays }): Forcing => {
    const series = (pattern: number[]): Float64Array =>
      Float64Array.from({ length: steps }, (_, i) => pattern[i % pattern.length] as number);
    return {
      start: '2020-02-28T09:00:00Z',
      stepDays,
      inflow: series(rain),
      outflows: { discharge: series(flow) },
      inflowConcentration: {},
    };
  });
const catchments = fc.constantFrom<Catchment['selection'][string]>(
  { form: 'gamma', shape: 0.6, scale: 300 },
  { form: 'exponential', scale: 50 },
  { form: 'uniform' },
  { form: 'youngestFirst' },
  { form: 'oldestFirst' },
);

describe('makeReading(runColumn(any weather))', () => {
  it('never says NaN, never a share outside 0..1, never a number when withheld, and can be written and read', () => {
    const seen = new Set<string>();
    fc.assert(
      fc.property(forcings, catchments, fc.integer({ min: 20_000, max: 60_000 }), (forcing, selection, initialStorage) => {
        const last = forcing.inflow.length - 1;
        const run = runColumn({ initialStorage, selection: { discharge: selection } }, forcing, {
          ...READING_RUN_OPTIONS,
          distributionsAt: [last],
        });
        const station = makeStation({ id: 'any', name: 'Any', forcing, source: run });
        const { reading } = station;
        seen.add(reading.withheld[0]?.code ?? 'given');
        expect(reading.sentence).not.toMatch(/NaN|undefined|Infinity|null|[{}]/);
        for (const { share, unplaced } of reading.younger) {
          if (reading.status === 'withheld') expect(share).toBeNull();
          else expect(share !== null && share >= 0 && share + unplaced <= 1 + 1e-12).toBe(true);
        }
        if (reading.median)
          expect(reading.median.beyondRecord ? reading.sentence : 'older than the record').toMatch(/older than the record/);
        expect(makeReading(run).sentence).toBe(reading.sentence);
        expect(readStation(writeStation(station))).toEqual(station);
        expect(readReading(writeReading(reading))).toEqual(reading);
      }),
      { seed: 41, numRuns: 150 },
    );
    // The weather above reaches every kind of answer that a single run can have, but running down, for which there is too much storage.
    expect([...seen].sort()).toEqual(['given', 'noOutflow', 'preRecordDominates', 'recordTooShort']);
  });
});
