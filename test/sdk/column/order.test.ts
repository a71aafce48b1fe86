import { describe, expect, test } from 'vitest';
import { runColumn, type Catchment, type Forcing, type Selection } from '@rillage/sdk';
import { worst } from './support/stormRecord.js';

/** Smooth weather: rates in mm/day and input as functions of time in days. Steps carry their mean over the step, by Simpson's rule. */
const DAYS = 48;
const inflow = (t: number): number => 4 + 3 * Math.sin((2 * Math.PI * t) / 16);
const stream = (t: number): number => 2 + 1.5 * Math.sin((2 * Math.PI * t) / 16 - 0.8);
const evap = (t: number): number => 1.6 + 1.2 * Math.cos((2 * Math.PI * t) / 24);
const input = (t: number): number => 20 + 10 * Math.sin((2 * Math.PI * t) / 12);

function record(stepDays: number): Forcing {
  const steps = DAYS / stepDays;
  const mean = (rate: (t: number) => number): Float64Array =>
    Float64Array.from({ length: steps }, (_, k) => (rate(k * stepDays) + 4 * rate((k + 0.5) * stepDays) + rate((k + 1) * stepDays)) / 6);
  const fallen = mean(inflow);
  return {
    start: '2001-03-01T00:00:00Z',
    stepDays,
    inflow: fallen,
    outflows: { stream: mean(stream), evap: mean(evap) },
    // as a bulk sample of the step would have it: weighted by what fell
    inflowConcentration: { tracer: mean((t) => inflow(t) * input(t)).map((mass, k) => mass / fallen[k]) },
  };
}

/** At the record's end: what a reading states. Shares and concentration are means over the last two days, whatever the step. */
function answers(selection: Record<string, Selection>, stepDays: number, ageResolution: number): number[] {
  const catchment: Catchment = { initialStorage: 150, selection, tracers: { tracer: { preRecord: 20 } } };
  const run = runColumn(catchment, record(stepDays), { ageResolution, snapshotsAt: [DAYS / stepDays - 1] });
  const { depth, oldestAge, concentration } = run.snapshots.get(DAYS / stepDays - 1)!;
  const younger = (age: number): number => depth.reduce((sum, mm, i) => (oldestAge[i] <= age + 1e-9 ? sum + mm : sum), 0) / 150;
  const mass = depth.reduce((sum, mm, i) => sum + mm * concentration.tracer[i], 0) / 150;
  const last = Math.round(2 / stepDays);
  const { flow, concentration: leaving, preRecordShare } = run.outflows.stream;
  const mean = (series: Float64Array): number => {
    let [sum, weight] = [0, 0];
    for (let k = flow.length - last; k < flow.length; k++) [sum, weight] = [sum + flow[k] * series[k], weight + flow[k]];
    return sum / weight;
  };
  return [younger(4), younger(16), younger(40), mean(preRecordShare), mass, mean(leaving.tracer)];
}

const names = ['storage younger than 4 d', '16 d', '40 d', 'pre-record share', 'stored tracer', 'stream concentration'];
const selections: [string, Record<string, Selection>][] = [
  ['gamma and exponential', { stream: { form: 'gamma', shape: 0.6, scale: 60 }, evap: { form: 'exponential', scale: 30 } }],
  ['beta and uniform', { stream: { form: 'beta', a: 0.7, b: 1.8 }, evap: { form: 'uniform' } }],
  [
    'driven by storage',
    { stream: { form: 'gamma', shape: 0.8, scale: { driver: 'storage', at: [100, 220], value: [90, 30] } }, evap: { form: 'uniform' } },
  ],
];

describe.each(selections)('runColumn, order of convergence when the step is halved: %s', (_name, selection) => {
  test('every age kept: at least 2', () => {
    const solved = [1 / 2, 1 / 4, 1 / 8, 1 / 16].map((step) => answers(selection, step, 0));
    names.forEach((name, i) => {
      // differences of successive solutions need no reference: their ratio is 2^order
      const [first, second, third] = [0, 1, 2].map((row) => Math.abs(solved[row][i] - solved[row + 1][i]));
      // order 2 is reached from below as the step goes to 0; a method of first order would show 1.0
      expect(Math.log2(first / second), `${name}, steps 1/2 to 1/8`).toBeGreaterThan(1.9);
      expect(Math.log2(second / third), `${name}, steps 1/4 to 1/16`).toBeGreaterThan(1.95);
    });
  });
});

// The default mode promises an error, not an order: it stays inside its tolerance whatever the step.
test.each(selections)('runColumn, default: every step stays within 1e-3 of every age kept: %s', (_name, selection) => {
  const catchment: Catchment = { initialStorage: 150, selection, tracers: { tracer: { preRecord: 20 } } };
  for (const step of [1, 1 / 2, 1 / 4, 1 / 8]) {
    const exact = runColumn(catchment, record(step), { ageResolution: 0, youngerThan: [4, 16, 40] }).outflows.stream;
    const quick = runColumn(catchment, record(step), { youngerThan: [4, 16, 40] }).outflows.stream;
    for (const age of [4, 16, 40]) expect(worst(quick.youngerShare.get(age)!, exact.youngerShare.get(age)!)).toBeLessThan(1e-3);
    expect(worst(quick.preRecordShare, exact.preRecordShare)).toBeLessThan(1e-3);
    expect(worst(quick.concentration.tracer, exact.concentration.tracer)).toBeLessThan(1e-3 * 20); // input spans 20
  }
});
