import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { runColumn, type Catchment, type Forcing, type Selection } from '@rillage/sdk';
import { anySelection, FEW, forcingOf, smoothSelection, STORAGE, weather } from './support/arbitraries.js';
import { worst } from './support/stormRecord.js';

const every = { ageResolution: 0 };
/** Every-age mode, absolute share: smooth forms, and those with a corner or a limit. */
const SMOOTH = 1e-6;
const CORNERED = 1e-5;
const AGES = [1, 2, 5, 9, 24];

const both = fc.record({ stream: anySelection, evap: anySelection });
const smoothBoth = fc.record({ stream: smoothSelection, evap: smoothSelection });
const modes = [
  { mode: 'every age kept', options: every },
  { mode: 'default', options: {} },
];

/** Greatest difference over steps with outflow. */
function worstWet(flow: Float64Array, actual: (k: number) => number, expected: (k: number) => number): number {
  const wet = [...flow.keys()].filter((k) => flow[k] > 0);
  return worst(wet.map(actual), wet.map(expected));
}

describe.each(modes)('runColumn, $mode: identities of any selection', ({ options }) => {
  test('constant input equal to the initial concentration comes out constant', () => {
    fc.assert(
      fc.property(weather(), both, fc.double({ min: -20, max: 40, noNaN: true }), (record, selection, concentration) => {
        const forcing = forcingOf({ ...record, concentration: record.concentration.map(() => concentration) });
        const { stream } = runColumn(
          { initialStorage: STORAGE, selection, tracers: { tracer: { preRecord: concentration } } },
          forcing,
          options,
        ).outflows;
        // sums of shares close to rounding: 1e-12 of the concentration
        expect(
          worstWet(
            stream.flow,
            (k) => stream.concentration.tracer[k],
            () => concentration,
          ),
        ).toBeLessThanOrEqual(1e-12 * (1 + Math.abs(concentration)));
      }),
      FEW,
    );
  });

  test('output is linear in input, also with decay and retention', () => {
    const rule = { carriedShare: { evap: 0.4 }, decayPerDay: 0.02 };
    fc.assert(
      fc.property(weather(), both, fc.double({ min: -3, max: 3, noNaN: true }), (record, selection, factor) => {
        const forcing = forcingOf(record);
        const a = forcing.inflowConcentration.tracer;
        const b = a.map((value, k) => 40 - value + (k % 5));
        const sum = a.map((value, k) => value + factor * b[k]);
        const tracers = { a: { preRecord: 12, ...rule }, b: { preRecord: -4, ...rule }, sum: { preRecord: 12 - 4 * factor, ...rule } };
        const { stream } = runColumn(
          { initialStorage: STORAGE, selection, tracers },
          { ...forcing, inflowConcentration: { a, b, sum } },
          options,
        ).outflows;
        const { concentration } = stream;
        // enrichment by evaporation can be large in a parcel that nearly dries out; 1e-9 of 160 units
        expect(
          worstWet(
            stream.flow,
            (k) => concentration.sum[k],
            (k) => concentration.a[k] + factor * concentration.b[k],
          ),
        ).toBeLessThan(1e-9 * 160);
      }),
      FEW,
    );
  });

  test('younger shares increase with age between 0 and 1 − preRecordShare; distributions never decrease', () => {
    const steps = Array.from({ length: 24 }, (_, k) => k);
    fc.assert(
      fc.property(weather(), both, (record, selection) => {
        const run = runColumn(
          { initialStorage: STORAGE, selection },
          { ...forcingOf(record), inflowConcentration: {} },
          { ...options, youngerThan: AGES, quantiles: [0.1, 0.5], distributionsAt: steps },
        );
        for (const out of Object.values(run.outflows)) {
          for (const k of steps.filter((step) => out.flow[step] > 0)) {
            const shares = [0, ...AGES.map((age) => out.youngerShare.get(age)![k]), 1 - out.preRecordShare[k]];
            for (let i = 1; i < shares.length; i++) expect(shares[i]).toBeGreaterThanOrEqual(shares[i - 1] - 1e-12);
            const { ageDays, youngerShare } = out.distributions.get(k)!;
            for (let i = 1; i < ageDays.length; i++) {
              expect(ageDays[i]).toBeGreaterThanOrEqual(ageDays[i - 1]);
              expect(youngerShare[i]).toBeGreaterThanOrEqual(youngerShare[i - 1]);
            }
            if (ageDays.length > 0) expect(youngerShare[youngerShare.length - 1]).toBeCloseTo(1 - out.preRecordShare[k], 12);
            expect(out.quantiles.get(0.1)!.days[k]).toBeLessThanOrEqual(out.quantiles.get(0.5)!.days[k]);
          }
        }
      }),
      FEW,
    );
  });
});

describe('runColumn, every age kept: what must not change the answer', () => {
  test('a step cut in two with the same fluxes', () => {
    fc.assert(
      fc.property(weather(), smoothBoth, (record, selection) => {
        const whole = forcingOf(record);
        const twice = (series: Float64Array): Float64Array => Float64Array.from({ length: 2 * series.length }, (_, i) => series[i >> 1]);
        const halves: Forcing = {
          ...whole,
          stepDays: 0.5,
          inflow: twice(whole.inflow),
          outflows: { stream: twice(whole.outflows.stream), evap: twice(whole.outflows.evap) },
          inflowConcentration: { tracer: twice(whole.inflowConcentration.tracer) },
        };
        const catchment: Catchment = { initialStorage: STORAGE, selection, tracers: { tracer: { preRecord: 20 } } };
        const a = runColumn(catchment, whole, { ...every, youngerThan: [4], snapshotsAt: [23] });
        const b = runColumn(catchment, halves, { ...every, youngerThan: [4], snapshotsAt: [47] });
        const { flow } = a.outflows.stream;
        const mean = (series: Float64Array, k: number): number => (series[2 * k] + series[2 * k + 1]) / 2;
        const old = b.outflows.stream.preRecordShare;
        expect(
          worstWet(
            flow,
            (k) => a.outflows.stream.preRecordShare[k],
            (k) => mean(old, k),
          ),
        ).toBeLessThan(SMOOTH);
        const { concentration } = a.outflows.stream;
        expect(
          worstWet(
            flow,
            (k) => concentration.tracer[k],
            (k) => mean(b.outflows.stream.concentration.tracer, k),
          ),
        ).toBeLessThan(SMOOTH * 40);
        const younger = (run: typeof a, step: number): number => {
          const { depth, oldestAge } = run.snapshots.get(step)!;
          return depth.reduce((sum, mm, i) => (oldestAge[i] <= 10 + 1e-9 ? sum + mm : sum), 0);
        };
        expect(Math.abs(younger(a, 23) - younger(b, 47))).toBeLessThan(SMOOTH * STORAGE);
      }),
      FEW,
    );
  });

  const UNIT = 10;
  /** The same selection with depths in another unit. */
  function rescaled(selection: Selection): Selection {
    const times = (amount: unknown): number => (amount as number) * UNIT;
    switch (selection.form) {
      case 'uniform':
        return selection.depth === undefined ? selection : { ...selection, depth: times(selection.depth) };
      case 'exponential':
        return { ...selection, scale: times(selection.scale) };
      case 'gamma':
        return { ...selection, scale: times(selection.scale), ...(selection.from === undefined ? {} : { from: times(selection.from) }) };
      case 'piecewise':
        return { ...selection, storage: selection.storage.map(times) };
      case 'mixture':
        return { ...selection, parts: selection.parts.map((part) => ({ ...part, selection: rescaled(part.selection) })) };
      default:
        return selection;
    }
  }

  test('depths in another unit', () => {
    fc.assert(
      fc.property(weather(), both, (record, selection) => {
        const forcing = forcingOf(record);
        const times = (series: Float64Array): Float64Array => series.map((mm) => UNIT * mm);
        const larger = {
          ...forcing,
          inflow: times(forcing.inflow),
          outflows: { stream: times(forcing.outflows.stream), evap: times(forcing.outflows.evap) },
        };
        const tracers = { tracer: { preRecord: 20 } };
        const options = { ...every, youngerThan: AGES };
        const a = runColumn({ initialStorage: STORAGE, selection, tracers }, forcing, options).outflows.stream;
        const scaled = { stream: rescaled(selection.stream), evap: rescaled(selection.evap) };
        const b = runColumn({ initialStorage: UNIT * STORAGE, selection: scaled, tracers }, larger, options).outflows.stream;
        for (const age of AGES)
          expect(
            worstWet(
              a.flow,
              (k) => b.youngerShare.get(age)![k],
              (k) => a.youngerShare.get(age)![k],
            ),
          ).toBeLessThan(SMOOTH);
        expect(
          worstWet(
            a.flow,
            (k) => b.concentration.tracer[k],
            (k) => a.concentration.tracer[k],
          ),
        ).toBeLessThan(SMOOTH * 40);
      }),
      FEW,
    );
  });

  test('one outflow with a mixture is two outflows with its parts', () => {
    fc.assert(
      fc.property(
        weather(),
        smoothSelection,
        anySelection,
        smoothSelection,
        fc.constantFrom(0.2, 0.5, 0.8),
        (record, a, b, evap, weight) => {
          const forcing = { ...forcingOf(record), inflowConcentration: {} };
          const { stream, evap: loss } = forcing.outflows;
          const options = { ...every, youngerThan: AGES };
          const mixture: Selection = {
            form: 'mixture',
            parts: [
              { weight, selection: a },
              { weight: 1 - weight, selection: b },
            ],
          };
          const one = runColumn({ initialStorage: STORAGE, selection: { stream: mixture, evap } }, forcing, options);
          const split = { first: stream.map((mm) => weight * mm), second: stream.map((mm) => (1 - weight) * mm), evap: loss };
          const two = runColumn(
            { initialStorage: STORAGE, selection: { first: a, second: b, evap } },
            { ...forcing, outflows: split },
            options,
          ).outflows;
          for (const age of AGES) {
            const [mixed, first, second] = [one.outflows.stream, two.first, two.second].map((out) => out.youngerShare.get(age)!);
            expect(
              worstWet(
                stream,
                (k) => mixed[k],
                (k) => weight * first[k] + (1 - weight) * second[k],
              ),
            ).toBeLessThan(CORNERED);
          }
        },
      ),
      FEW,
    );
  });
});
