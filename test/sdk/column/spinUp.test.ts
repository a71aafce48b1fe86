import { describe, expect, test } from 'vitest';
import { runColumn, type Catchment } from '@rillage/sdk';
import { syntheticForcing } from '../../bench/forcing.mjs';

const forcing = syntheticForcing({ years: 1 });
const catchment: Catchment = {
  initialStorage: 1500,
  selection: { discharge: { form: 'gamma', shape: 0.6, scale: 400 }, evapotranspiration: { form: 'exponential', scale: 60 } },
  tracers: { d18O: { preRecord: -9 } },
};
const N = forcing.inflow.length;
const ask = { youngerThan: [90, 3650], quantiles: [0.25, 0.5], snapshotsAt: [0, N - 1] };

describe.each([
  { mode: 'every age kept', options: { ageResolution: 0 } },
  { mode: 'default', options: {} },
])('runColumn, $mode: spinUp', ({ options }) => {
  const bare = runColumn(catchment, forcing, { ...ask, ...options });
  const spun = runColumn(catchment, forcing, { ...ask, ...options, spinUp: { repeats: 3 } });

  test('storage is the same series, from initialStorage at the record’s start', () => {
    expect([...spun.storage]).toEqual([...bare.storage]);
    const first = forcing.inflow[0] - forcing.outflows.discharge[0] - forcing.outflows.evapotranspiration[0];
    expect(spun.storage[0]).toBeCloseTo(1500 + first, 9);
    // what is in the column adds up to it
    const { depth, preRecordDepth } = spun.snapshots.get(0)!;
    expect(depth.reduce((sum, mm) => sum + mm, preRecordDepth)).toBeCloseTo(spun.storage[0], 8);
  });

  test('assumedShare is the share of what spin-up added; record, assumed and pre-record water make up the outflow', () => {
    const { assumedShare, preRecordShare, youngerShare } = spun.outflows.discharge;
    const known = bare.outflows.discharge.preRecordShare;
    expect([...bare.outflows.discharge.assumedShare].every((share) => share === 0)).toBe(true);
    for (let k = 0; k < N; k++) {
      // what spin-up added was pre-record water without it; the record's own water is untouched
      expect(Math.abs(assumedShare[k] + preRecordShare[k] - known[k])).toBeLessThan(2e-3);
      expect(youngerShare.get(3650)![k] + preRecordShare[k]).toBeCloseTo(1, 9);
    }
    expect(assumedShare[0]).toBeGreaterThan(0.3);
    expect(assumedShare[N - 1]).toBeLessThan(assumedShare[0]);
  });

  test('quantiles that rest on spin-up water are marked 2, beyond it 1, on the record’s own water 0', () => {
    const { days, beyondRecord } = spun.outflows.discharge.quantiles.get(0.5)!;
    const seen = new Set<number>(beyondRecord);
    expect(seen.has(2)).toBe(true);
    beyondRecord.forEach((flag, k) => {
      if (flag === 0) expect(days[k]).toBeLessThanOrEqual(k + 1);
      if (flag === 2) expect(days[k]).toBeGreaterThan(k + 1);
    });
    const without = bare.outflows.discharge.quantiles.get(0.5)!;
    beyondRecord.forEach((flag, k) => {
      if (without.beyondRecord[k] === 1) expect(flag).not.toBe(0);
    });
  });

  test('snapshots mark the assumed parcels, all older than the record', () => {
    const { assumed, youngestAge, oldestAge } = spun.snapshots.get(N - 1)!;
    expect(assumed.includes(1)).toBe(true);
    assumed.forEach((mark, i) => {
      if (mark === 1) expect(youngestAge[i]).toBeGreaterThanOrEqual(N - 1e-9);
      else expect(oldestAge[i]).toBeLessThanOrEqual(N + 1e-9);
    });
  });

  test('closure holds over spin-up and record', () => {
    expect(spun.closure.water).toBeLessThan(1e-10);
    expect(spun.closure.tracers.d18O).toBeLessThan(1e-10);
  });
});
