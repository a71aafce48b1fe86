import { describe, expect, test } from 'vitest';
import { runColumn, type Catchment, type Selection } from '@rillage/sdk';
import { benchCatchment, syntheticForcing } from '../../bench/forcing.mjs';
import { worst } from './support/stormRecord.js';

// Targets of the method's accuracy table, over three invented years.
const SHARE = 1e-3;
const CONCENTRATION = 1e-3; // of the input's range
const CLOSURE = 1e-10;

const forcing = syntheticForcing({ years: 3 });
const input = forcing.inflowConcentration.d18O;
const RANGE = Math.max(...input) - Math.min(...input);
const AGES = [7, 30, 90, 365];

const gamma: Selection = { form: 'gamma', shape: 0.6, scale: 400 };
const exponential: Selection = { form: 'exponential', scale: 60 };
const pairs: [string, number, Selection, Selection][] = [['gamma reaching the bottom, pre-record water used up', 300, gamma, exponential]];

describe.each(pairs)(
  'runColumn, default against every age kept, at the bottom of storage: %s',
  (_name, initialStorage, discharge, evapotranspiration) => {
    const catchment: Catchment = { initialStorage, selection: { discharge, evapotranspiration }, tracers: benchCatchment.tracers };
    const exact = runColumn(catchment, forcing, { youngerThan: AGES, ageResolution: 0 });
    const quick = runColumn(catchment, forcing, { youngerThan: AGES });

    test.each(['discharge', 'evapotranspiration'])('outflows.%s: shares and concentration', (name) => {
      const [a, b] = [exact.outflows[name], quick.outflows[name]];
      for (const age of AGES)
        expect(worst(b.youngerShare.get(age)!, a.youngerShare.get(age)!), `younger than ${age} d`).toBeLessThan(SHARE);
      expect(worst(b.preRecordShare, a.preRecordShare)).toBeLessThan(SHARE);
      if (name === 'discharge') expect(worst(b.concentration.d18O, a.concentration.d18O)).toBeLessThan(CONCENTRATION * RANGE);
    });

    test('closure of both modes', () => {
      for (const run of [exact, quick]) {
        expect(run.closure.water).toBeLessThan(CLOSURE);
        expect(run.closure.tracers.d18O).toBeLessThan(CLOSURE);
      }
    });

    test('storage is the same in both', () => expect(worst(quick.storage, exact.storage)).toBe(0));
  },
);
