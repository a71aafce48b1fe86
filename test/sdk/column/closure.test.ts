import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { runColumn, type Catchment } from '@rillage/sdk';
import { syntheticForcing } from '../../bench/forcing.mjs';
import { anySelection, FEW, forcingOf, STORAGE, weather } from './support/arbitraries.js';

const CLOSURE = 1e-10;
const both = fc.record({ stream: anySelection, evap: anySelection });
const modes = [
  { mode: 'every age kept', options: { ageResolution: 0 } },
  { mode: 'default', options: {} },
];

describe.each(modes)('runColumn, $mode: closure', ({ options }) => {
  test('closure: in = out + stored, water and tracers with all rules', () => {
    const tracers: Catchment['tracers'] = {
      tracer: { preRecord: 7 },
      chloride: { preRecord: 5, carriedShare: { evap: 0 } },
      nitrate: { preRecord: 3, carriedShare: { evap: 0.3 }, decayPerDay: 0.03 },
      silica: { preRecord: 2, equilibrium: { concentration: 9, ratePerDay: 0.1 } },
    };
    fc.assert(
      fc.property(weather(), both, (record, selection) => {
        const forcing = forcingOf(record);
        const input = forcing.inflowConcentration.tracer;
        const run = runColumn(
          { initialStorage: STORAGE, selection, tracers },
          { ...forcing, inflowConcentration: { tracer: input, chloride: input, nitrate: input, silica: input } },
          options,
        );
        expect(run.closure.water).toBeLessThan(CLOSURE);
        for (const name of Object.keys(tracers)) expect(run.closure.tracers[name]).toBeLessThan(CLOSURE);
      }),
      FEW,
    );
  });

  // Evapotranspiration that leaves the solute behind and all but dries a parcel out: its concentration must not run away.
  test.each([
    { form: 'youngestFirst' } as const,
    { form: 'gamma', shape: 0.35, scale: 10 } as const,
    { form: 'power', exponent: 0.4 } as const,
  ])('solute left behind in parcels that dry out under %o', (evap) => {
    fc.assert(
      fc.property(weather(), (record) => {
        const forcing = forcingOf(record);
        const catchment: Catchment = {
          initialStorage: STORAGE,
          selection: { stream: { form: 'exponential', scale: 30 }, evap },
          tracers: { tracer: { preRecord: 5, carriedShare: { evap: 0 } } },
        };
        const run = runColumn(catchment, forcing, { ...options, snapshotsAt: [23] });
        expect(run.closure.tracers.tracer).toBeLessThan(CLOSURE);
        const { concentration } = run.outflows.stream;
        // all solute that ever fell, in one mm of water: 24 steps of 60 mm at 40
        for (const value of concentration.tracer) if (!Number.isNaN(value)) expect(Math.abs(value)).toBeLessThan(24 * 60 * 40);
        // and no parcel holds more solute than fell
        const { depth, concentration: stored } = run.snapshots.get(23)!;
        depth.forEach((mm, i) => expect(Math.abs(mm * stored.tracer[i])).toBeLessThan(24 * 60 * 40));
      }),
      FEW,
    );
  });

  // Three years over 300 mm: the pre-record water is used up and the oldest parcels become the bottom of storage.
  test.each([
    { form: 'oldestFirst' } as const,
    { form: 'beta', a: 2, b: 0.5 } as const,
    { form: 'gamma', shape: 0.6, scale: 400 } as const,
    {
      form: 'mixture',
      parts: [
        { weight: 0.5, selection: { form: 'oldestFirst' } },
        { weight: 0.5, selection: { form: 'exponential', scale: 60 } },
      ],
    } as const,
  ])('pre-record water used up under %o: mass closes and outflows take what they were asked', (discharge) => {
    const forcing = syntheticForcing({ years: 3 });
    const catchment = {
      initialStorage: 300,
      selection: { discharge, evapotranspiration: { form: 'exponential', scale: 60 } },
      tracers: { d18O: { preRecord: -9 } },
    } as unknown as Catchment;
    const run = runColumn(catchment, forcing, { ...options, youngerThan: [3000] });
    expect(run.closure.water).toBeLessThan(CLOSURE);
    expect(run.closure.tracers.d18O).toBeLessThan(CLOSURE);
    for (const { flow, youngerShare, preRecordShare } of Object.values(run.outflows)) {
      const whole = flow.map((_, k) => youngerShare.get(3000)![k] + preRecordShare[k]);
      for (const sum of whole) expect(Math.abs(sum - 1)).toBeLessThan(1e-9);
    }
  });
});
