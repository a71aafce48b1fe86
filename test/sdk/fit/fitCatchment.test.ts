import { beforeAll, describe, expect, test } from 'vitest';
import {
  catchmentsOf,
  fitCatchment,
  makeReading,
  READING_RUN_OPTIONS,
  RillageError,
  runColumn,
  runDraws,
  type Fit,
  type FitProblem,
  type Forcing,
  type Sample,
} from '@rillage/sdk';
import { Random } from '../../../packages/sdk/src/numeric/random.js';
import { directEvaluator, type Evaluator } from '../../../packages/sdk/src/fit/evaluator.js';
import { fitWith } from '../../../packages/sdk/src/fit/fitWith.js';
import { FitModel } from '../../../packages/sdk/src/fit/model.js';
import { checkProblem } from '../../../packages/sdk/src/fit/problem.js';
import { syntheticForcing } from '../../bench/forcing.mjs';

// A synthetic year and a half whose truth is known: bottles drawn from the truth's own stream, with normal errors of 0.15 permil.
const forcing = syntheticForcing({ years: 1.5, seed: 5 }) as Forcing;
const truth = { scale: 180, storage: 1200 };
const catchmentOf = (scale: number, initialStorage: number) => ({
  initialStorage,
  selection: { discharge: { form: 'gamma' as const, shape: 0.6, scale }, evapotranspiration: { form: 'exponential' as const, scale: 60 } },
  tracers: { d18O: { preRecord: -9 } },
});
const run = runColumn(catchmentOf(truth.scale, truth.storage), forcing, READING_RUN_OPTIONS);
const noise = Random.fromSeed(9);
const samples: Sample[] = [];
for (let k = 60; k < forcing.inflow.length; k += 10) {
  const at = new Date(Date.parse(forcing.start) + (k + 0.5) * 86_400_000).toISOString();
  const value = run.outflows['discharge'].concentration['d18O'][k] + 0.15 * noise.normal();
  samples.push({ tracer: 'd18O', from: at, to: at, value, unit: 'permil', error: 0.1 });
}
const problem: FitProblem = {
  forcing,
  catchment: {
    ...catchmentOf(0, 0),
    initialStorage: { prior: 'logUniform', low: 700, high: 6000 },
    selection: {
      discharge: { form: 'gamma', shape: 0.6, scale: { prior: 'logUniform', low: 20, high: 2000 } },
      evapotranspiration: { form: 'exponential', scale: 60 },
    },
  },
  samples,
  errors: { d18O: { error: 'normal', constant: { prior: 'logUniform', low: 0.02, high: 1 } } },
};
const codes = (work: () => unknown): string[] => {
  try {
    work();
  } catch (error) {
    if (error instanceof RillageError) return error.issues.map(({ code }) => code);
    throw error;
  }
  return [];
};

describe('fitCatchment, a synthetic case', () => {
  let fit: Fit;
  beforeAll(async () => {
    fit = await fitCatchment(problem, { seed: 1, workers: 0 });
  }, 120_000);

  test('converges, and the truth lies in the 5 to 95 % of its draws', () => {
    expect(fit.converged).toBe(true);
    const scale = fit.parameters.find(({ path }) => path.includes('scale'))!;
    expect(scale.after[0]).toBeLessThan(truth.scale);
    expect(scale.after[2]).toBeGreaterThan(truth.scale);
    expect(scale.verdict).toBe('informed');
  });

  test('total storage under preference for young water is not informed, in so many words', () => {
    const storage = fit.parameters.find(({ path }) => path.includes('initialStorage'))!;
    expect(storage.words).toBe('not informed by these data');
  });

  test('intervals hold as many samples as they claim, and the fit is plain data', () => {
    expect(fit.tracers['d18O'].coverage90.verdict).toBe('asStated');
    expect(fit.tracers['d18O'].nse).toBeGreaterThan(0.6);
    expect(fit.predictive!.worstShape).toBeLessThan(0.7);
    expect(JSON.parse(JSON.stringify(fit))).toEqual(fit);
  });

  test('runDraws gives a reading its ranges, with the truth inside', () => {
    const reading = makeReading(runDraws(fit, problem, READING_RUN_OPTIONS, 40), { converged: fit.converged });
    const month = reading.younger.find(({ days }) => days === 30)!;
    const share = run.outflows['discharge'].youngerShare.get(30)!;
    expect(month.range!.low).toBeLessThanOrEqual(share[share.length - 1]);
    expect(month.range!.high).toBeGreaterThanOrEqual(share[share.length - 1]);
  });

  test('catchmentsOf refuses a fit of another problem', () => {
    const other = { ...problem, catchment: { ...problem.catchment, initialStorage: 900 } };
    expect(codes(() => catchmentsOf(fit, other))).toEqual(['fit-mismatch']);
  });
});

test('fitWith: the same seed gives the same draws however points are shared out', async () => {
  const whole = directEvaluator([new FitModel(checkProblem(problem))]);
  const parts: Evaluator = {
    ...whole,
    evaluate: async (points, k) => (await Promise.all(points.map((point) => whole.evaluate([point], k)))).flat(),
  };
  const options = { seed: 3, evaluations: 120 };
  const first = await fitWith(problem, whole, options);
  expect((await fitWith(problem, parts, options)).alternatives[0].draws).toEqual(first.alternatives[0].draws);
  expect(first.converged).toBe(false);
});

test('fitCatchment: a signal ends it within 50 ms with what there is, marked partial', async () => {
  const controller = new AbortController();
  let raised = 0;
  setTimeout(() => {
    raised = performance.now();
    controller.abort();
  }, 400);
  const fit = await fitCatchment(problem, { seed: 2, workers: 0, signal: controller.signal });
  expect(performance.now() - raised).toBeLessThan(50);
  expect(fit).toMatchObject({ partial: true, converged: false });
  expect(fit.state).not.toBeNull();
});

describe('fitCatchment refuses', () => {
  const with_ = (change: Partial<FitProblem>) => () => checkProblem({ ...problem, ...change });
  const moved = (years: number): Sample[] =>
    samples.map((s) => ({ ...s, from: s.from.replace('2000', String(2000 + years)), to: s.to.replace('2000', String(2000 + years)) }));
  test.each([
    ['no samples', { samples: [] }, 'no-samples'],
    ['samples outside the record', { samples: moved(30).filter(({ from }) => from.startsWith('2030')) }, 'samples-outside'],
    ['limits only', { samples: samples.map((s) => ({ ...s, censored: 'below' as const })) }, 'all-censored'],
    ['contradictory units', { samples: samples.map((s, k) => ({ ...s, unit: k > 3 ? 'mg/L' : 'permil' })) }, 'sample-units'],
    ['a tracer without an error model', { errors: {} }, 'errors-missing'],
    ['an unknown tracer', { samples: [{ ...samples[0], tracer: 'd2H' }] }, 'sample-invalid'],
    ['nothing unknown', { catchment: catchmentOf(100, 900), errors: { d18O: { error: 'normal' as const, constant: 0.1 } } }, 'no-unknowns'],
  ])('%s', (_what, change, code) => expect(codes(with_(change as Partial<FitProblem>))).toContain(code));

  test('a prior that excludes every run', async () => {
    const empty: FitProblem = {
      ...problem,
      catchment: { ...problem.catchment, initialStorage: { prior: 'uniform', low: 0.001, high: 0.01 } },
    };
    await expect(fitCatchment(empty, { seed: 1, workers: 0 })).rejects.toMatchObject({ code: 'fit-impossible' });
  });

  test('a single sample, a constant tracer and samples twice are findings', () => {
    const found = (list: Sample[]): string[] => checkProblem({ ...problem, samples: list }).findings.map(({ code }) => code);
    expect(found([samples[0]])).toContain('one-sample');
    expect(found(samples.map((s) => ({ ...s, value: -9 })))).toContain('constant-tracer');
    expect(found([...samples, samples[2]])).toContain('samples-twice');
  });
});
