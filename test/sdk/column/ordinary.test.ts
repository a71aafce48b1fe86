import { describe, expect, test } from 'vitest';
import { runColumn, type Catchment, type ColumnRun, type Forcing, type RunOptions, type Selection } from '@rillage/sdk';

const modes = [
  { mode: 'every age kept', options: { ageResolution: 0 } },
  { mode: 'default', options: {} },
];
const ask: RunOptions = { youngerThan: [2, 30], quantiles: [0.5] };

function forcing(inflow: number[], outflows: Record<string, number[]>, stepDays = 1): Forcing {
  return {
    start: '2001-11-15T00:00:00Z',
    stepDays,
    inflow: Float64Array.from(inflow),
    outflows: Object.fromEntries(Object.entries(outflows).map(([name, values]) => [name, Float64Array.from(values)])),
    inflowConcentration: { tracer: Float64Array.from(inflow, (mm, k) => (mm > 0 ? 5 + (k % 3) : NaN)) },
  };
}

const flat = (steps: number, value: number): number[] => new Array<number>(steps).fill(value);
const catchment = (initialStorage: number, selection: Record<string, Selection>): Catchment => ({
  initialStorage,
  selection,
  tracers: { tracer: { preRecord: 9 } },
});

/** Every step with flow has finite numbers in range, and parts that add up to 1; every other has NaN. */
function expectSound(run: ColumnRun): void {
  for (const out of Object.values(run.outflows)) {
    out.flow.forEach((flow, k) => {
      const numbers = [
        out.preRecordShare[k],
        out.concentration.tracer[k],
        out.quantiles.get(0.5)!.days[k],
        ...[...out.youngerShare.values()].map((list) => list[k]),
      ];
      if (flow === 0) return expect(numbers.every(Number.isNaN)).toBe(true);
      expect(numbers.every(Number.isFinite)).toBe(true);
      const ofRecord = out.youngerShare.get(1e6);
      if (ofRecord) expect(ofRecord[k] + out.preRecordShare[k]).toBeCloseTo(1, 9);
      expect(out.concentration.tracer[k]).toBeGreaterThanOrEqual(5 - 1e-9);
      expect(out.concentration.tracer[k]).toBeLessThanOrEqual(9 + 1e-9);
    });
  }
  expect(run.closure.water).toBeLessThan(1e-10);
}

describe.each(modes)('runColumn, $mode: ordinary cases', ({ options }) => {
  const all = { ...ask, ...options, youngerThan: [2, 30, 1e6] };
  const gamma: Selection = { form: 'gamma', shape: 0.6, scale: 30 };

  test('zero flow gives NaN on those steps, and numbers on the others', () => {
    const run = runColumn(catchment(100, { stream: gamma }), forcing([4, 0, 3, 0, 5], { stream: [1, 0, 0, 2, 1] }), all);
    expectSound(run);
    expect([...run.outflows.stream.preRecordShare].map(Number.isNaN)).toEqual([false, true, true, false, false]);
    expect(run.outflows.stream.distributions.size).toBe(0);
  });

  test('no outflow at all fills the storage', () => {
    const run = runColumn(catchment(100, { stream: gamma }), forcing([4, 0, 3], { stream: [0, 0, 0] }), { ...all, snapshotsAt: [2] });
    expectSound(run);
    expect([...run.storage]).toEqual([104, 104, 107]);
    expect([...run.snapshots.get(2)!.depth]).toEqual([3, 4]);
  });

  test('zero rain for ever: all water is of unknown age', () => {
    const run = runColumn(catchment(100, { stream: gamma }), forcing(flat(40, 0), { stream: flat(40, 2) }), all);
    expectSound(run);
    for (let k = 0; k < 40; k++) {
      expect(run.outflows.stream.preRecordShare[k]).toBe(1);
      expect(run.outflows.stream.youngerShare.get(30)![k]).toBe(0);
      expect(run.outflows.stream.quantiles.get(0.5)!.beyondRecord[k]).toBe(1);
      expect(run.outflows.stream.quantiles.get(0.5)!.days[k]).toBe(k + 1);
    }
    expect(run.parcels).toEqual({ atEnd: 0, most: 0 });
  });

  test('a first step without rain adds no parcel', () => {
    const run = runColumn(catchment(100, { stream: gamma }), forcing([0, 6, 0], { stream: [1, 1, 1] }), { ...all, snapshotsAt: [0, 1, 2] });
    expectSound(run);
    expect([0, 1, 2].map((k) => run.snapshots.get(k)!.depth.length)).toEqual([0, 1, 1]);
    expect([...run.snapshots.get(2)!.oldestAge]).toEqual([2]);
    expect([...run.snapshots.get(2)!.youngestAge]).toEqual([1]);
  });

  test('one step only', () => {
    const run = runColumn(catchment(100, { stream: { form: 'uniform' } }), forcing([10], { stream: [2] }), {
      ...all,
      distributionsAt: [0],
    });
    expectSound(run);
    expect(run.storage[0]).toBe(108);
    // uniform over 100 + 8t: ∫ (1 − 100/R) dt with old water R falling as R′ = −2R/(100 + 8t): R = 100 (1 + 0.08t)^(−1/4)
    const left = 100 * 1.08 ** -0.25;
    expect(Math.abs(run.outflows.stream.preRecordShare[0] - (100 - left) / 2)).toBeLessThan('ageResolution' in options ? 1e-6 : 1e-3);
    expect([...run.outflows.stream.distributions.get(0)!.ageDays]).toEqual([0, 1]);
  });

  test('hourly steps and one daily step with the same fluxes agree', () => {
    const hourly = runColumn(catchment(100, { stream: gamma }), forcing(flat(24, 12), { stream: flat(24, 6) }, 1 / 24), {
      ...all,
      snapshotsAt: [23],
    });
    const daily = runColumn(catchment(100, { stream: gamma }), forcing([12], { stream: [6] }), { ...all, snapshotsAt: [0] });
    expectSound(hourly);
    const old = (run: ColumnRun, k: number): number => run.snapshots.get(k)!.preRecordDepth / 106;
    expect(Math.abs(old(hourly, 23) - old(daily, 0))).toBeLessThan('ageResolution' in options ? 1e-6 : 1e-3);
  });

  test('three outflows, each with its own selection', () => {
    const selection: Record<string, Selection> = {
      stream: gamma,
      evap: { form: 'exponential', scale: 20 },
      pumped: { form: 'oldestFirst' },
    };
    const run = runColumn(
      catchment(100, selection),
      forcing([4, 0, 9, 2, 0, 0], { stream: flat(6, 1), evap: flat(6, 2), pumped: [0, 1, 0, 1, 1, 1] }),
      all,
    );
    expectSound(run);
    expect(run.outflows.pumped.preRecordShare[5]).toBeCloseTo(1, 9);
    expect(Object.keys(run.outflows)).toEqual(['stream', 'evap', 'pumped']);
  });

  test('youngestFirst takes the step’s own rain, then what is next; oldestFirst takes old water while it lasts', () => {
    const rain = [5, 0, 0, 8];
    const youngest = runColumn(catchment(50, { stream: { form: 'youngestFirst' } }), forcing(rain, { stream: [2, 2, 2, 2] }), all);
    expectSound(youngest);
    // 5 mm fell: 2 + 2 + 1 mm of them leave, then 1 mm of old water; then 2 of the fresh 8
    [0, 0, 0.5, 0].forEach((share, k) => expect(youngest.outflows.stream.preRecordShare[k]).toBeCloseTo(share, 8));
    const oldest = runColumn(catchment(5, { stream: { form: 'oldestFirst' } }), forcing(rain, { stream: [2, 2, 2, 2] }), all);
    expectSound(oldest);
    [1, 1, 0.5, 0].forEach((share, k) => expect(oldest.outflows.stream.preRecordShare[k]).toBeCloseTo(share, 6));
  });

  test.each<Selection>([
    gamma,
    { form: 'uniform' },
    { form: 'power', exponent: 3 },
    { form: 'beta', a: 2, b: 0.6 },
    { form: 'oldestFirst' },
    { form: 'uniform', depth: 30 },
    { form: 'exponential', scale: 500 },
  ])('pre-record water used up under %o leaves no NaN behind', (stream) => {
    const steps = 60;
    const rain = Array.from({ length: steps }, (_, k) => (k % 4 === 0 ? 9 : 0));
    const run = runColumn(catchment(12, { stream }), forcing(rain, { stream: flat(steps, 2) }), all);
    expectSound(run);
  });
});

test('runColumn: the caller’s arrays and options are unchanged, also when frozen', () => {
  const record = forcing([4, 0, 3, 0, 5], { stream: [1, 0, 0, 2, 1] });
  const copy = structuredClone(record);
  const selection: Record<string, Selection> = { stream: Object.freeze({ form: 'uniform' } as const) };
  const frozen = Object.freeze({ ...ask, youngerThan: Object.freeze([2, 30]) as number[], spinUp: Object.freeze({ repeats: 2 }) });
  runColumn(Object.freeze(catchment(100, Object.freeze(selection))), Object.freeze(record), frozen);
  expect(record).toEqual(copy);
});
