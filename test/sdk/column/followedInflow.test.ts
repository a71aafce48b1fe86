import { describe, expect, test } from 'vitest';
import { runColumn, type Forcing } from '@rillage/sdk';
import timeVarying from '../../checks/timeVarying.json';
import { everyStep, INITIAL_STORAGE, shareAt, STEPS, stormCases, stormForcing, worst, youngerThan } from './support/stormRecord.js';

const { pulse_fate, exhaustion, age_mass_balance } = timeVarying;
type Fate = { rain_mm: number; out_stream: number; out_evap: number; left_at_end: number; cum_out_stream_by_step_end: number[] };

describe.each([
  { mode: 'every age kept', options: { ageResolution: 0 }, tolerance: 1e-6 },
  { mode: 'default', options: {}, tolerance: 1e-3 },
])('runColumn, $mode, followInflowOf', ({ options, tolerance }) => {
  const pulses = Object.entries(pulse_fate).flatMap(([name, byStep]) =>
    Object.entries(byStep as Record<string, Fate>).map(([step, fate]) => ({ name, step: Number(step), fate })),
  );
  test.each(pulses)('$name: where the inflow of step $step went', ({ name, step, fate }) => {
    const { stream, evap } = stormCases[name];
    const catchment = { initialStorage: INITIAL_STORAGE, selection: { stream, evap } };
    const run = runColumn(catchment, { ...stormForcing(), inflowConcentration: {} }, { ...options, followInflowOf: [2, 6, 16] });
    const followed = run.followed.get(step)!;
    expect(followed.entered).toBe(fate.rain_mm);
    // relative to what entered, as shares are
    const allowed = tolerance * fate.rain_mm;
    expect(worst(followed.left.stream, fate.cum_out_stream_by_step_end)).toBeLessThan(allowed);
    expect(Math.abs(followed.left.stream[STEPS - 1 - step] - fate.out_stream)).toBeLessThan(allowed);
    expect(Math.abs(followed.left.evap[STEPS - 1 - step] - fate.out_evap)).toBeLessThan(allowed);
    expect(Math.abs(followed.stored[STEPS - 1 - step] - fate.left_at_end)).toBeLessThan(allowed);
  });

  test('what left and what is stored add up to what entered, at every step', () => {
    const { stream, evap } = stormCases.B_gamma;
    const catchment = { initialStorage: INITIAL_STORAGE, selection: { stream, evap } };
    const run = runColumn(catchment, { ...stormForcing(), inflowConcentration: {} }, { ...options, followInflowOf: everyStep });
    for (const [step, { entered, left, stored }] of run.followed) {
      stored.forEach((mm, i) => expect(Math.abs(entered - left.stream[i] - left.evap[i] - mm)).toBeLessThan(1e-12 * INITIAL_STORAGE));
      expect(stored.length).toBe(STEPS - step);
    }
  });

  test('Niemi: what left in a step by entry is what the forward distributions gained in it', () => {
    const { stream, evap } = stormCases.B_gamma;
    const catchment = { initialStorage: INITIAL_STORAGE, selection: { stream, evap } };
    const forcing = { ...stormForcing(), inflowConcentration: {} };
    const run = runColumn(catchment, forcing, { ...options, followInflowOf: everyStep, distributionsAt: everyStep });
    for (const k of everyStep) {
      const distribution = run.outflows.stream.distributions.get(k)!;
      for (let j = 0; j <= k; j++) {
        const forward = run.followed.get(j)!.left.stream;
        const gained = forward[k - j] - (k > j ? forward[k - j - 1] : 0);
        const backward = (shareAt(distribution, k + 1 - j) - shareAt(distribution, k - j)) * forcing.outflows.stream[k];
        expect(Math.abs(gained - backward)).toBeLessThan(1e-11);
      }
    }
  });
});

test('runColumn: water younger than a mark is used up in finite time and stays so', () => {
  // A first step without outflow lays 25 mm over 75 mm: the mark is the older edge of that parcel.
  const stepDays = 2.5;
  const steps = 19; // to t = 45 d
  const discharge = new Float64Array(steps).fill(2);
  const inflow = new Float64Array(steps);
  [discharge[0], inflow[0]] = [0, 25 / stepDays];
  const forcing: Forcing = { start: '2001-01-01T00:00:00Z', stepDays, inflow, outflows: { discharge }, inflowConcentration: {} };
  const catchment = { initialStorage: 75, selection: { discharge: { form: 'power', exponent: 0.5 } as const } };
  const run = runColumn(catchment, forcing, {
    ageResolution: 0,
    snapshotsAt: everyStep.slice(0, steps),
    youngerThan: [60],
    quantiles: [0.5],
  });
  for (const { t, S, S_T } of exhaustion.rows) {
    const k = t / stepDays;
    const snapshot = run.snapshots.get(k)!;
    expect(Math.abs(snapshot.storage - S)).toBeLessThan(exhaustion.tol_abs);
    // 1e-6 of storage; at t = 37.5 d it ends as the square of what is left, so that it is reached from above
    expect(Math.abs(youngerThan(snapshot, t + stepDays, 'discharge').storage - S_T)).toBeLessThan(1e-6 * S);
  }
  expect(run.outflows.discharge.youngerShare.get(60)![16]).toBeLessThan(1e-6); // the step that begins at the very end of it
  expect(run.outflows.discharge.youngerShare.get(60)![steps - 1]).toBe(0);
  expect(run.outflows.discharge.preRecordShare[steps - 1]).toBe(1);
  expect(run.outflows.discharge.quantiles.get(0.5)!.beyondRecord[steps - 1]).toBe(1);
});

test('runColumn: A(t) = ∫ (S − S_T) dT and the mean age of the outflow, case F', () => {
  // Both are integrals over entry time within each step. Steps cut into 40 parts give them by the trapezium rule with its end correction.
  const parts = 40;
  const storm = stormForcing();
  const fine = (series: Float64Array): Float64Array =>
    Float64Array.from({ length: STEPS * parts }, (_, i) => series[Math.floor(i / parts)]);
  const forcing: Forcing = {
    start: storm.start,
    stepDays: 1 / parts,
    inflow: fine(storm.inflow),
    outflows: { stream: fine(storm.outflows.stream), evap: fine(storm.outflows.evap) },
    inflowConcentration: {},
  };
  const { stream, evap } = stormCases.F_exponential;
  const ends = [4, 9, 19, 29];
  const run = runColumn({ initialStorage: INITIAL_STORAGE, selection: { stream, evap } }, forcing, {
    ageResolution: 0,
    snapshotsAt: ends.map((k) => (k + 1) * parts - 1),
  });
  for (const k of ends) {
    const snapshot = run.snapshots.get((k + 1) * parts - 1)!;
    let mass = 0;
    let meanAge = 0;
    let before = { storage: 0, share: 0 };
    for (let age = 1; age <= (k + 1) * parts; age++) {
      const here = youngerThan(snapshot, age / parts, 'stream');
      mass += snapshot.storage - (before.storage + here.storage) / 2;
      meanAge += 1 - (before.share + here.share) / 2;
      before = here;
    }
    // the trapezium rule errs by h² / 12 × the jump of dS_T/dT over the range, at most 60 mm/day at a storm and 0.03 per mm of Ω
    expect(Math.abs(mass / parts - age_mass_balance.case_F_A_end_of_step[k])).toBeLessThan((60 / 12 / parts ** 2) * 2);
    expect(Math.abs(meanAge / parts - age_mass_balance.case_F_mean_outflow_age_end_of_step[k])).toBeLessThan((60 / 12 / parts ** 2) * 0.03);
  }
});
