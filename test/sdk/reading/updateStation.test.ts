import { createHash } from 'node:crypto';
import fc from 'fast-check';
import { beforeAll, describe, expect, it } from 'vitest';
import { type Catchment, type Forcing, type Station } from '../../../packages/sdk/src/contract.js';
import { runColumn } from '../../../packages/sdk/src/column/index.js';
import { RillageError } from '../../../packages/sdk/src/errors.js';
import { makeStation, READING_RUN_OPTIONS, readStation, updateStation, writeStation } from '../../../packages/sdk/src/reading/index.js';

const DAY_MS = 86_400_000;
const START = '2019-10-01T00:00:00Z';

/** Made-up weather by a fixed rule, and flows that close its balance over the years. */
function forcing(days: number): Forcing {
  const inflow = Float64Array.from({ length: days }, (_, i) => (i % 7 < 3 ? 4 + 3 * Math.sin(i / 3) : 0));
  const season = (i: number): number => Math.cos((2 * Math.PI * i) / 365.25);
  return {
    start: START,
    stepDays: 1,
    inflow,
    outflows: {
      discharge: Float64Array.from({ length: days }, (_, i) => 1 + 0.6 * season(i)),
      evapotranspiration: Float64Array.from({ length: days }, (_, i) => 0.7 - 0.6 * season(i)),
    },
    inflowConcentration: { d18O: Float64Array.from({ length: days }, (_, i) => -8 - 3 * season(i)) },
  };
}

const instant = (ms: number): string => new Date(ms).toISOString().replace('.000Z', 'Z');

function part(whole: Forcing, from: number, to: number): Forcing {
  const cut = (series: Record<string, Float64Array>): Record<string, Float64Array> =>
    Object.fromEntries(Object.entries(series).map(([name, values]) => [name, values.slice(from, to)]));
  return {
    start: instant(Date.parse(whole.start) + from * DAY_MS),
    stepDays: 1,
    inflow: whole.inflow.slice(from, to),
    outflows: cut(whole.outflows),
    inflowConcentration: cut(whole.inflowConcentration),
  };
}

const catchment = (scale: number): Catchment => ({
  initialStorage: 900,
  selection: {
    discharge: { form: 'gamma', shape: 0.6, scale: { driver: 'storageAnomaly', at: [-50, 50], value: [scale, scale / 2] } },
    evapotranspiration: { form: 'exponential', scale: 80 },
  },
  tracers: { d18O: { preRecord: -8 } },
});

function station(given: Forcing, scales: readonly number[] = [400]): Station {
  const runs = scales.map((scale, i) => ({
    weight: 1 + i,
    run: runColumn(catchment(scale), given, { ...READING_RUN_OPTIONS, distributionsAt: [given.inflow.length - 1] }),
  }));
  const samples = { count: 20, last: '2022-06-01T00:00:00Z' };
  return makeStation({
    id: 'made-up',
    name: 'Made-up Brook',
    invented: true,
    forcing: given,
    source: runs.length === 1 ? (runs[0]?.run ?? []) : runs,
    samples,
  });
}

/** Of the file's bytes: a failing comparison of whole files would print them. */
const digest = (text: string): string => createHash('sha256').update(text).digest('hex');

function codeOf(call: () => unknown): string {
  try {
    call();
  } catch (error) {
    if (error instanceof RillageError) return error.code;
    throw error;
  }
  return 'nothing thrown';
}

const whole = forcing(1000);
let long: Station;
let short: Station;
beforeAll(() => {
  long = station(whole);
  short = station(part(whole, 0, 990));
});

describe('updateStation(station, newForcing)', () => {
  it('gives the same bytes as a station made from the whole record', () => {
    expect(digest(writeStation(updateStation(short, part(whole, 990, 1000)).station))).toBe(digest(writeStation(long)));
  });

  it('gives the same bytes day by day, through the file each day', () => {
    let text = writeStation(short);
    for (let day = 990; day < 1000; day += 1) text = writeStation(updateStation(readStation(text), part(whole, day, day + 1)).station);
    expect(digest(text)).toBe(digest(writeStation(long)));
  });

  it('gives the same bytes however the new rows are cut and overlap', () => {
    fc.assert(
      fc.property(fc.array(fc.tuple(fc.integer({ min: 0, max: 10 }), fc.integer({ min: 0, max: 30 })), { maxLength: 4 }), (pieces) => {
        let current = short;
        let known = 990;
        for (const [added, overlap] of [...pieces, [10, 3] as const]) {
          const to = Math.min(1000, known + added);
          const from = known - overlap;
          if (to <= from) continue;
          current = updateStation(current, part(whole, from, to)).station;
          known = Math.max(known, to);
        }
        expect(digest(writeStation(current))).toBe(digest(writeStation(long)));
      }),
      { seed: 31, numRuns: 8 },
    );
  });

  it('carries every member of an ensemble', () => {
    const scales = [300, 400, 550];
    const updated = updateStation(station(part(whole, 0, 990), scales), part(whole, 990, 1000)).station;
    expect(digest(writeStation(updated))).toBe(digest(writeStation(station(whole, scales))));
    expect(updated.reading.younger[1]?.range?.high).toBeGreaterThan(updated.reading.younger[1]?.range?.low as number);
  });

  it('changes nothing for rows it already has: the same station comes back', () => {
    expect(updateStation(long, part(whole, 980, 1000)).station).toBe(long);
    expect(updateStation(long, part(whole, 700, 760)).station).toBe(long);
  });

  it('changes neither argument', () => {
    const rows = part(whole, 985, 1000);
    const [stationBefore, rowsBefore] = [writeStation(short), structuredClone(rows)];
    updateStation(short, rows);
    expect(digest(writeStation(short))).toBe(digest(stationBefore));
    expect(rows).toEqual(rowsBefore);
  });

  it.each([
    ['time-gap', (): Forcing => part(whole, 992, 1000)],
    ['off-grid', (): Forcing => ({ ...part(whole, 990, 1000), start: '2022-06-17T06:00:00Z' })],
    ['step-differs', (): Forcing => ({ ...part(whole, 990, 1000), stepDays: 1 / 24 })],
    [
      'contradicting-rows',
      (): Forcing => {
        const rows = part(whole, 980, 1000);
        rows.inflow[3] = (rows.inflow[3] as number) + 0.5;
        return rows;
      },
    ],
  ])('refuses with %s', (code, rows) => {
    expect(codeOf(() => updateStation(short, rows()))).toBe(code);
  });

  it('says which rows contradict, all in one batch', () => {
    const rows = part(whole, 980, 1000);
    rows.inflow[3] = 77;
    (rows.outflows['discharge'] as Float64Array)[5] = 88;
    try {
      updateStation(short, rows);
      expect.unreachable();
    } catch (error) {
      expect((error as RillageError).issues.map(({ path, step }) => [path, step])).toEqual([
        ['inflow[3]', 3],
        ['outflows.discharge[5]', 5],
      ]);
    }
  });

  it('keeps at most 3,660 steps of history and 400 of rows, the last ones', () => {
    const old = forcing(3655);
    const updated = updateStation(station(old), part(forcing(3670), 3655, 3670)).station;
    expect(updated.history.flow).toHaveLength(3660);
    expect(updated.history.start).toBe(instant(Date.parse(START) + 10 * DAY_MS));
    expect(updated.recent?.inflow).toHaveLength(400);
  });

  it('takes time independent of the length of the record', () => {
    const time = (days: number): number => {
      const made = station(forcing(days));
      const rows = part(forcing(days + 1), days, days + 1);
      let best = Infinity;
      for (let i = 0; i < 25; i += 1) {
        const begun = performance.now();
        updateStation(made, rows);
        best = Math.min(best, performance.now() - begun);
      }
      return best;
    };
    time(3660);
    // Both histories are full, so only the record's length differs; twice leaves room for a busy machine.
    expect(time(4 * 3660)).toBeLessThan(2 * time(3660) + 2);
  });
});
