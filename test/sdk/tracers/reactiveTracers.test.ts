import { describe, expect, test } from 'vitest';
import { runColumn, type Catchment, type Forcing, type Selection, type TracerRule } from '@rillage/sdk';
import steady from '../../checks/steady.json';
import timeVarying from '../../checks/timeVarying.json';
import { INITIAL_CONCENTRATION, INITIAL_STORAGE, INPUT_RANGE, stormForcing, worst } from '../column/support/stormRecord.js';

const modes = [
  { mode: 'every age kept', options: { ageResolution: 0 } },
  { mode: 'default', options: {} },
];
/** 0.1 % of the input's range: the target of the default mode, and here also of every age kept where a tracer is not conservative. */
const CONCENTRATION = 1e-3 * INPUT_RANGE;
const CLOSURE = 1e-10;

const rules: Record<string, TracerRule> = {
  conservative: { preRecord: INITIAL_CONCENTRATION },
  'decay_k0.05': { preRecord: INITIAL_CONCENTRATION, decayPerDay: 0.05 },
  ET_excludes_solute: { preRecord: INITIAL_CONCENTRATION, carriedShare: { evap: 0 } },
  ET_half: { preRecord: INITIAL_CONCENTRATION, carriedShare: { evap: 0.5 } },
  'equilibrium_k0.2_Ceq10': { preRecord: INITIAL_CONCENTRATION, equilibrium: { concentration: 10, ratePerDay: 0.2 } },
};

const sameInput = (input: Float64Array): Record<string, Float64Array> =>
  Object.fromEntries(Object.keys(rules).map((name) => [name, input]));

describe.each(modes)('runColumn, $mode: tracers that react or stay behind, five in one run', ({ mode, options }) => {
  const smooth = timeVarying.cases.S_smooth_reactive.tracers as Record<string, { stream_conc_step_mean: number[] }>;
  const forcing = stormForcing();
  const selection: Record<string, Selection> = { stream: { form: 'exponential', scale: 60 }, evap: { form: 'gamma', shape: 2, scale: 25 } };
  const run = runColumn(
    { initialStorage: INITIAL_STORAGE, selection, tracers: rules },
    { ...forcing, inflowConcentration: sameInput(forcing.inflowConcentration.tracer) },
    options,
  );

  test('rules: all of the values’ tracers are run', () => expect(Object.keys(smooth).sort()).toEqual(Object.keys(rules).sort()));

  // Measured (every age / default): decay 2.4e-3 / 2.9e-3, ET excluded 1.2e-3 / 1.6e-3, half 4e-4 / 1.6e-3, equilibrium 1.1e-2 / 1.2e-2
  // of 39: a parcel of one step (or of its parts, on storms) is mixed within itself, while the values tell its hours apart.
  test.each(Object.keys(rules))('outflows.stream.concentration.%s', (name) => {
    const tolerance = mode !== 'default' && name === 'conservative' ? 1e-6 * INPUT_RANGE : CONCENTRATION;
    expect(worst(run.outflows.stream.concentration[name], smooth[name].stream_conc_step_mean)).toBeLessThan(tolerance);
  });

  test.each(Object.keys(rules))('closure.tracers.%s', (name) => expect(run.closure.tracers[name]).toBeLessThan(CLOSURE));
});

describe.each(modes)('runColumn, $mode: one well-mixed store, its first water reacting too', ({ mode, options }) => {
  // The values let the initial storage decay and be enriched. Here it enters on a step of its own, before the thirty.
  const { tracers } = timeVarying.cases.W_well_mixed;
  const storm = stormForcing();
  const before = (first: number, rest: Float64Array): Float64Array => Float64Array.of(first, ...rest);
  const decay = 0.05;
  /** Concentration that a step of steady input of 1 ends with: (1 − e^(−k)) / k. */
  const endOfFirst = -Math.expm1(-decay) / decay;
  const input = storm.inflowConcentration.tracer;
  const forcing: Forcing = {
    start: '2001-02-28T00:00:00Z',
    stepDays: 1,
    inflow: before(INITIAL_STORAGE, storm.inflow),
    outflows: { stream: before(0, storm.outflows.stream), evap: before(0, storm.outflows.evap) },
    inflowConcentration: {
      conservative: before(INITIAL_CONCENTRATION, input),
      ET_excludes_solute: before(INITIAL_CONCENTRATION, input),
      'decay_k0.05': before(INITIAL_CONCENTRATION / endOfFirst, input),
    },
  };
  const catchment: Catchment = {
    initialStorage: 1e-9, // mm; storage must be above 0
    selection: { stream: { form: 'uniform' }, evap: { form: 'uniform' } },
    tracers: {
      conservative: rules.conservative,
      ET_excludes_solute: rules.ET_excludes_solute,
      'decay_k0.05': rules['decay_k0.05'],
    },
  };
  const run = runColumn(catchment, forcing, options);

  test.each(Object.keys(tracers) as (keyof typeof tracers)[])('outflows.stream.concentration.%s', (name) => {
    const tolerance = mode !== 'default' && name === 'conservative' ? 1e-6 * INPUT_RANGE : CONCENTRATION;
    const actual = run.outflows.stream.concentration[name].subarray(1);
    expect(worst(actual, tracers[name].stream_conc_step_mean)).toBeLessThan(tolerance);
  });

  test('closure.tracers', () => {
    for (const name of Object.keys(tracers)) expect(run.closure.tracers[name]).toBeLessThan(CLOSURE);
  });
});

describe('runColumn: tritium through steady storage', () => {
  const { lambda_per_yr, rows } = steady.decay_through_ttd;
  const YEAR = 365.25;
  const flow = 2;
  /** Steady output over input of a decaying tracer; the record is long enough to forget how it began. */
  function ratio(meanYears: number, selection: Selection, stepsPerMean: number, means: number): number {
    const stepDays = (meanYears * YEAR) / stepsPerMean;
    const steps = stepsPerMean * means;
    const flat = (value: number): Float64Array => new Float64Array(steps).fill(value);
    const run = runColumn(
      {
        initialStorage: flow * meanYears * YEAR,
        selection: { stream: selection },
        tracers: { tritium: { preRecord: 0.5, decayPerDay: lambda_per_yr / YEAR } },
      },
      {
        start: '1900-01-01T00:00:00Z',
        stepDays,
        inflow: flat(flow),
        outflows: { stream: flat(flow) },
        inflowConcentration: { tritium: flat(1) },
      },
      { ageResolution: 0 },
    );
    expect(run.closure.tracers.tritium).toBeLessThan(CLOSURE);
    return run.outflows.stream.concentration.tritium[steps - 1];
  }

  /** Ages within the step of entry and within the step of exit are not told apart: each misplaces up to (λΔ)²/24 of the tracer. */
  const within = (meanYears: number, stepsPerMean: number): number => ((lambda_per_yr * meanYears) / stepsPerMean) ** 2 / 12;

  // After 12 means e^(−12) = 6e-6 of the water is pre-record, at 0.5.
  test.each(rows)('exponential transit times, mean $mean_yr years', ({ mean_yr, exponential }) => {
    expect(Math.abs(ratio(mean_yr, { form: 'uniform' }, 40, 12) - exponential)).toBeLessThan(within(mean_yr, 40) + 3e-6);
  });

  test.each(rows)('piston flow, mean $mean_yr years', ({ mean_yr, piston }) => {
    expect(Math.abs(ratio(mean_yr, { form: 'oldestFirst' }, 100, 2) - piston)).toBeLessThan(within(mean_yr, 100) + 1e-8);
  });

  test.each(rows)('exponential piston flow of ratio 1.5, mean $mean_yr years', ({ mean_yr, 'epm_eta1.5': expected }) => {
    const total = flow * mean_yr * YEAR;
    // the corner lies within a parcel, whose older part alone is drawn: a third spread of ages
    const selection: Selection = { form: 'piecewise', storage: [total / 3, total], share: [0, 1] };
    expect(Math.abs(ratio(mean_yr, selection, 40, 9) - expected)).toBeLessThan(1.5 * within(mean_yr, 40) + 3e-6);
  });
});
