import { describe, expect, test } from 'vitest';
import { resumeColumn, runColumn, type Catchment, type Checkpoint, type ColumnRun, type Forcing, type RunOptions } from '@rillage/sdk';
import { syntheticForcing } from '../../bench/forcing.mjs';

const DAY_MS = 86_400_000;
const YEARS = 1;

function longRecord(): Forcing {
  const forcing = syntheticForcing({ years: YEARS }) as Forcing;
  const { d18O } = forcing.inflowConcentration;
  forcing.outflows.discharge.fill(0, 150, 153); // a dry river across a cut
  return {
    ...forcing,
    start: new Date(forcing.start).toISOString(),
    inflowConcentration: { d18O, nitrate: d18O.map((value) => 20 + value), chloride: d18O.map((value) => 12 + value) },
    drivers: { moisture: forcing.inflow.map((_, k) => Math.sin(k / 40)) },
  };
}

function part(forcing: Forcing, from: number, to: number): Forcing {
  const cut = (series: Record<string, Float64Array>): Record<string, Float64Array> =>
    Object.fromEntries(Object.entries(series).map(([name, values]) => [name, values.slice(from, to)]));
  return {
    start: new Date(Date.parse(forcing.start) + from * forcing.stepDays * DAY_MS).toISOString(),
    stepDays: forcing.stepDays,
    inflow: forcing.inflow.slice(from, to),
    outflows: cut(forcing.outflows),
    inflowConcentration: cut(forcing.inflowConcentration),
    ...(forcing.drivers ? { drivers: cut(forcing.drivers) } : {}),
  };
}

const catchment: Catchment = {
  initialStorage: 900,
  wetnessRange: [700, 1100], // otherwise that of the first forcing, which a cut makes shorter
  selection: {
    discharge: { form: 'gamma', shape: 0.6, scale: { driver: 'storageAnomaly', at: [-200, 200], value: [500, 150] } },
    evapotranspiration: { form: 'exponential', scale: { driver: 'season', at: [0, 0.5, 1], value: [30, 80, 30] } },
  },
  tracers: {
    d18O: { preRecord: -9 },
    nitrate: { preRecord: 11, decayPerDay: 0.004 },
    chloride: { preRecord: 4, carriedShare: { evapotranspiration: 0.1 }, equilibrium: { concentration: 6, ratePerDay: 0.002 } },
  },
};
const byWetness: Catchment = {
  ...catchment,
  selection: {
    discharge: { form: 'beta', a: { driver: 'wetness', at: [0, 1], value: [0.9, 0.5] }, b: 1.5 },
    evapotranspiration: { form: 'exponential', scale: { driver: 'moisture', at: [-1, 1], value: [20, 90] } },
  },
};
const steady: Catchment = {
  ...catchment,
  selection: { discharge: { form: 'gamma', shape: 0.6, scale: 400 }, evapotranspiration: { form: 'uniform' } },
};

const asked: RunOptions = { youngerThan: [7, 30, 365], quantiles: [0.1, 0.5] };

/** Every series of a run that a cut must not change, by name. */
function series(run: ColumnRun): Map<string, ArrayLike<number>> {
  const all = new Map<string, ArrayLike<number>>([['storage', run.storage]]);
  for (const [name, out] of Object.entries(run.outflows)) {
    for (const [age, values] of out.youngerShare) all.set(`${name} younger than ${age}`, values);
    for (const [p, values] of out.quantiles) all.set(`${name} quantile ${p}`, values.days).set(`${name} beyond ${p}`, values.beyondRecord);
    for (const [tracer, values] of Object.entries(out.concentration)) all.set(`${name} ${tracer}`, values);
    all.set(`${name} pre-record`, out.preRecordShare).set(`${name} assumed`, out.assumedShare).set(`${name} flow`, out.flow);
  }
  return all;
}

/** Names of series that differ in any bit from the long run's, with the first step that does. */
function differences(long: ColumnRun, parts: { from: number; run: ColumnRun }[]): string[] {
  const expected = series(long);
  const found: string[] = [];
  for (const { from, run } of parts) {
    for (const [name, values] of series(run)) {
      const whole = expected.get(name)!;
      for (let k = 0; k < values.length; k++) {
        if (Object.is(values[k], whole[from + k])) continue;
        found.push(`${name} at step ${from + k}: ${values[k]} for ${whole[from + k]}`);
        break;
      }
    }
  }
  return found;
}

function cutAt(forcing: Forcing, given: Catchment, cuts: number[], options: RunOptions, text: boolean): { from: number; run: ColumnRun }[] {
  const edges = [0, ...cuts, forcing.inflow.length];
  const parts: { from: number; run: ColumnRun }[] = [];
  let checkpoint: Checkpoint | undefined;
  for (let i = 0; i + 1 < edges.length; i++) {
    const piece = part(forcing, edges[i], edges[i + 1]);
    const { spinUp: _first, ageResolution: _set, ...rest } = options;
    const run: ColumnRun = checkpoint === undefined ? runColumn(given, piece, options) : resumeColumn(checkpoint, piece, rest);
    parts.push({ from: edges[i], run });
    checkpoint = text ? (JSON.parse(JSON.stringify(run.checkpoint())) as Checkpoint) : run.checkpoint();
  }
  return parts;
}

const forcing = longRecord();
const N = forcing.inflow.length;
const cuts: [string, number[]][] = [
  ['one cut', [200]],
  ['two cuts, one in a dry river', [151, 152]],
  ['three cuts, one after a single step', [1, 233, N - 1]],
  ['many cuts', Array.from({ length: 40 }, (_, i) => 7 + 8 * i)],
];

describe.each([
  { mode: 'default', options: asked },
  { mode: 'every age kept', options: { ...asked, ageResolution: 0 } },
])('resumeColumn, $mode: bit for bit the long run', ({ options }) => {
  test.each([
    ['driven by storage and season', catchment],
    ['driven by wetness and a series', byWetness],
    ['constant', steady],
  ])('%s, in 2, 3, 4 and 41 parts, from data and from text', (_name, given) => {
    const long = runColumn(given, forcing, options);
    for (const [name, at] of cuts) {
      const parts = cutAt(forcing, given, at, options, true);
      expect(differences(long, parts), name).toEqual([]);
      const last = parts[parts.length - 1].run;
      expect(last.checkpoint(), name).toEqual(long.checkpoint());
      expect(last.closure, name).toEqual(long.closure);
    }
    expect(differences(long, cutAt(forcing, given, [250], options, false))).toEqual([]);
  });

  test('snapshots and distributions at the last step', () => {
    const long = runColumn(catchment, forcing, { ...options, snapshotsAt: [N - 1], distributionsAt: [N - 1] });
    const { checkpoint } = runColumn(catchment, part(forcing, 0, 250), options);
    const run = resumeColumn(checkpoint(), part(forcing, 250, N), { ...asked, snapshotsAt: [N - 251], distributionsAt: [N - 251] });
    const [a, b] = [long.snapshots.get(N - 1)!, run.snapshots.get(N - 251)!];
    expect({ ...b, step: N - 1 }).toEqual(a);
    for (const name of ['discharge', 'evapotranspiration']) {
      expect(run.outflows[name].distributions.get(N - 251)).toEqual(long.outflows[name].distributions.get(N - 1));
    }
  });

  test('after spin-up', () => {
    // spin-up repeats the forcing it is given, so that the long run is the one that spun up over the first part
    const first = part(forcing, 0, 150);
    const spun = runColumn(catchment, first, { ...options, spinUp: { repeats: 2 } });
    const rest = resumeColumn(spun.checkpoint(), part(forcing, 150, N), asked);
    const half = resumeColumn(JSON.parse(JSON.stringify(spun.checkpoint())) as Checkpoint, part(forcing, 150, 250), asked);
    const other = resumeColumn(JSON.parse(JSON.stringify(half.checkpoint())) as Checkpoint, part(forcing, 250, N), asked);
    expect(
      differences(rest, [
        { from: 0, run: half },
        { from: 100, run: other },
      ]),
    ).toEqual([]);
    expect(rest.outflows.discharge.assumedShare[N - 151]).toBeGreaterThan(0);
  });

  test('with followed parcels', () => {
    const follow = { ...options, followInflowOf: [40, 90] };
    const long = runColumn(catchment, forcing, follow);
    const start = runColumn(catchment, part(forcing, 0, 200), follow);
    const rest = resumeColumn(JSON.parse(JSON.stringify(start.checkpoint())) as Checkpoint, part(forcing, 200, N), asked);
    expect(
      differences(long, [
        { from: 0, run: start },
        { from: 200, run: rest },
      ]),
    ).toEqual([]);
    for (const step of [40, 90]) {
      const [whole, begun] = [long.followed.get(step)!, start.followed.get(step)!];
      expect(Array.from(begun.stored)).toEqual(Array.from(whole.stored.subarray(0, begun.stored.length)));
    }
  });
});

test('resumeColumn: the checkpoint is data of its own; neither it nor the forcing is changed by the run that goes on', () => {
  const run = runColumn(catchment, part(forcing, 0, 150), asked);
  const checkpoint = run.checkpoint();
  const before = JSON.stringify(checkpoint);
  const piece = part(forcing, 150, 250);
  const copy = part(forcing, 150, 250);
  resumeColumn(checkpoint, piece, asked);
  expect(JSON.stringify(checkpoint)).toBe(before);
  expect(piece).toEqual(copy);
  expect(JSON.stringify(run.checkpoint())).toBe(before);
});

test('resumeColumn: one day added takes the same work however long the record was', () => {
  const size = (years: number): number => {
    const whole = syntheticForcing({ years }) as Forcing;
    return runColumn(steady.tracers === undefined ? steady : { ...steady, tracers: { d18O: { preRecord: -9 } } }, whole).parcels.atEnd;
  };
  // parcels carried a day: the work of a step
  expect(size(12)).toBeLessThan(1.6 * size(3));
});
