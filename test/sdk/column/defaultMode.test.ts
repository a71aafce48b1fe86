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
const pairs: [string, Selection, Selection][] = [
  ['gamma, exponential', gamma, exponential],
  ['uniform, uniform', { form: 'uniform' }, { form: 'uniform' }],
  ['beta, exponential', { form: 'beta', a: 0.6, b: 1.2 }, exponential],
  ['old water by beta, exponential', { form: 'beta', a: 2, b: 0.5 }, exponential],
  ['kumaraswamy, uniform', { form: 'kumaraswamy', a: 0.5, b: 0.5 }, { form: 'uniform' }],
  ['power below and above 1', { form: 'power', exponent: 0.4 }, { form: 'power', exponent: 2 }],
  ['gamma below 20 mm, uniform over 100 mm', { form: 'gamma', shape: 0.8, scale: 300, from: 20 }, { form: 'uniform', depth: 100 }],
  ['piecewise, exponential', { form: 'piecewise', storage: [0, 50, 100, 800], share: [0, 0.3, 0.35, 1] }, exponential],
  [
    'driven by storage, exponential',
    { form: 'gamma', shape: 0.6, scale: { driver: 'storageAnomaly', at: [-200, 200], value: [600, 200] } },
    exponential,
  ],
  [
    'driven shape and season',
    { form: 'gamma', shape: { driver: 'wetness', at: [0, 1], value: [0.9, 0.5] }, scale: 300 },
    { form: 'exponential', scale: { driver: 'season', at: [0, 0.5, 1], value: [40, 90, 40] } },
  ],
  [
    'mixture with old water, exponential',
    {
      form: 'mixture',
      parts: [
        { weight: 0.3, selection: exponential },
        { weight: 0.7, selection: { form: 'power', exponent: 0.7 } },
      ],
    },
    exponential,
  ],
];

describe.each(pairs)('runColumn, default against every age kept: %s', (_name, discharge, evapotranspiration) => {
  const catchment: Catchment = { ...benchCatchment, selection: { discharge, evapotranspiration }, tracers: benchCatchment.tracers };
  const exact = runColumn(catchment, forcing, { youngerThan: AGES, ageResolution: 0 });
  const quick = runColumn(catchment, forcing, { youngerThan: AGES });

  test.each(['discharge', 'evapotranspiration'])('outflows.%s: shares and concentration', (name) => {
    const [a, b] = [exact.outflows[name], quick.outflows[name]];
    for (const age of AGES) expect(worst(b.youngerShare.get(age)!, a.youngerShare.get(age)!), `younger than ${age} d`).toBeLessThan(SHARE);
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
});
