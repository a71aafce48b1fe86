import { describe, expect, test } from 'vitest';
import {
  distributionOver,
  forwardDistribution,
  residenceTimes,
  RillageError,
  runColumn,
  shareOver,
  type Catchment,
  type Forcing,
} from '@rillage/sdk';
import { syntheticForcing } from '../../bench/forcing.mjs';

const forcing = syntheticForcing({ years: 1 }) as Forcing;
const catchment: Catchment = {
  initialStorage: 400,
  selection: { discharge: { form: 'gamma', shape: 0.6, scale: 90 }, evapotranspiration: { form: 'exponential', scale: 40 } },
};
const steps = forcing.inflow.length;
const window = { from: 300, to: 330 };
const kept = Array.from({ length: 30 }, (_value, k) => 300 + k);
const wet = forcing.inflow.findIndex((mm, k) => k > 100 && mm > 8);
const run = runColumn(catchment, forcing, {
  ageResolution: 0,
  youngerThan: [30, 5000],
  distributionsAt: Array.from({ length: steps }, (_value, k) => k),
  snapshotsAt: [320],
  followInflowOf: [wet],
});

describe('shareOver', () => {
  test('weighted by flow it is the share of the volume', () => {
    let younger = 0;
    let all = 0;
    const { flow, youngerShare } = run.outflows['discharge'];
    for (let k = window.from; k < window.to; k++) {
      younger += flow[k] * youngerShare.get(30)![k];
      all += flow[k];
    }
    expect(shareOver(run, 'discharge', 30, window).younger).toBeCloseTo(younger / all, 14);
  });

  test('over an age longer than the record, younger and pre-record shares add up to 1', () => {
    const { younger, preRecord } = shareOver(run, 'discharge', 5000, window);
    expect(younger + preRecord).toBeCloseTo(1, 12);
  });

  test.each([
    ['discharge', 31, {}],
    ['seepage', 30, {}],
    ['discharge', 30, { from: 5, to: 5 }],
  ] as const)('refuses %s, %d days, %o', (outflow, days, options) => {
    expect(() => shareOver(run, outflow, days, options)).toThrow(RillageError);
  });
});

test('distributionOver agrees with shareOver at an age on step edges', () => {
  const mean = distributionOver(run, 'discharge', { ...window });
  const at = mean.ageDays.findIndex((age) => age >= 30);
  const below = mean.youngerShare[at - 1];
  const share = shareOver(run, 'discharge', 30, window).younger;
  expect(share).toBeGreaterThanOrEqual(below - 1e-12);
  expect(share).toBeLessThanOrEqual(mean.youngerShare[at] + 1e-12);
  expect(kept.every((k) => run.outflows['discharge'].distributions.has(k))).toBe(true);
});

test('residenceTimes: shares of storage rise to 1 − preRecordShare', () => {
  const ages = residenceTimes(run.snapshots.get(320)!);
  for (let i = 1; i < ages.ageDays.length; i++) {
    expect(ages.ageDays[i]).toBeGreaterThanOrEqual(ages.ageDays[i - 1]);
    expect(ages.youngerShare[i]).toBeGreaterThanOrEqual(ages.youngerShare[i - 1]);
  }
  expect(ages.youngerShare[ages.youngerShare.length - 1] + ages.preRecordShare).toBeCloseTo(1, 12);
});

describe('forwardDistribution', () => {
  const forward = forwardDistribution(run.followed.get(wet)!, 1);

  test('what left and what is stored add up to what entered', () => {
    forward.stored.forEach((stored, k) => {
      expect(stored + forward.left['discharge'][k] + forward.left['evapotranspiration'][k]).toBeCloseTo(1, 10);
    });
  });

  // Niemi 1977: J(t) · forward density = F(t + T) · backward density, both being the same water.
  test('is the backward distributions read along the diagonal', () => {
    for (const later of [3, 20, 90]) {
      const step = wet + later;
      const { ageDays, youngerShare } = run.outflows['discharge'].distributions.get(step)!;
      const at = (age: number): number => {
        let share = 0;
        for (let i = 0; i < ageDays.length && ageDays[i] <= age; i++) share = youngerShare[i];
        return share;
      };
      const backward = (at(later + 1) - at(later)) * run.outflows['discharge'].flow[step];
      const followed = run.followed.get(wet)!.left['discharge'];
      expect(followed[later] - followed[later - 1]).toBeCloseTo(backward, 10);
    }
  });
});
