import { describe, expect, test } from 'vitest';
import { runColumn, type Catchment, type FitProblem } from '@rillage/sdk';
import { checkProblem } from '../../../packages/sdk/src/fit/problem.js';
import { substitute } from '../../../packages/sdk/src/fit/priorPaths.js';
import { priorQuantile } from '../../../packages/sdk/src/fit/priorMath.js';
import { asKind, fieldsOf, pathWords, priorsIn, withAt } from '../../../packages/elements/src/rillage-fit-panel/priors.js';
import { formNames, proposeCatchment, proposeChoices, tracersOf } from '../../../packages/elements/src/rillage-fit-panel/proposal.js';
import { checkPrior } from '../../../packages/sdk/src/fit/priors.js';
import { syntheticProblem } from '../../sdk/fit/synthetic.js';

const { problem } = syntheticProblem();
const record = { forcing: problem.forcing, samples: problem.samples, rainSamples: problem.rainSamples! };
const whole = (choices: object): FitProblem => ({ ...choices, ...record }) as FitProblem;

describe('proposeChoices(record)', () => {
  test('is a problem that the SDK takes, with two selections to weigh and the doubt about rain', () => {
    const { alternatives } = checkProblem(whole(proposeChoices(record)));
    expect(alternatives.map(({ name }) => name)).toEqual(['catchment, seasonalPlusResidual', 'gammaSteady, seasonalPlusResidual']);
  });

  test.each(formNames)('%s: a run is possible at the middle of every prior', (form) => {
    const catchment = proposeCatchment(record, form, ['d18O']);
    const { priors } = checkProblem(whole({ ...proposeChoices(record), otherCatchments: {}, catchment }));
    const middle = priors.map(({ prior }) => priorQuantile(prior, 0.5));
    const { catchment: settled } = substitute<{ catchment: Catchment }>({ catchment, errors: {} }, priors, middle);
    expect(runColumn(settled, record.forcing).closure.water).toBeLessThan(1e-10);
  });

  test('only tracers known in both rain and stream; isotopes leave with every water, salt stays when water evaporates', () => {
    const salt = { ...problem.samples[0]!, tracer: 'chloride', unit: 'mg/L' };
    expect(tracersOf({ ...record, samples: [...record.samples, salt] })).toEqual(['d18O']);
    const known = { ...record.forcing, inflowConcentration: { ...record.forcing.inflowConcentration, chloride: record.forcing.inflow } };
    const both = { forcing: known, samples: [...record.samples, salt] };
    const { tracers } = proposeCatchment(both, 'gammaSteady', tracersOf(both));
    expect(tracers!['d18O']).not.toHaveProperty('carriedShare');
    expect(tracers!['chloride']).toHaveProperty('carriedShare', { evapotranspiration: 0 });
  });
});

describe('priors in plain data', () => {
  test('are found with the paths that the SDK gives them', () => {
    const choices = proposeChoices(record);
    const own = [...priorsIn(choices.catchment, 'catchment'), ...priorsIn(choices.errors, 'errors')].map(({ path }) => path);
    expect(own.sort()).toEqual(
      checkProblem(whole(choices))
        .priors.map(({ path }) => path)
        .sort(),
    );
  });

  test('are replaced without changing what was given', () => {
    const data = { a: [{ b: 1 }] };
    expect(withAt(data, ['a', 0, 'b'], 2)).toEqual({ a: [{ b: 2 }] });
    expect(data).toEqual({ a: [{ b: 1 }] });
  });

  test('of every kind become every other kind, and stay sound', () => {
    const first = { prior: 'uniform', low: -3, high: 5 } as const;
    for (const one of Object.keys(fieldsOf) as (keyof typeof fieldsOf)[])
      for (const other of Object.keys(fieldsOf) as (keyof typeof fieldsOf)[]) {
        expect(checkPrior(asKind(asKind(first, one), other), 'p'), `${one} as ${other}`).toEqual([]);
      }
  });

  test('are called by the words of the data', () => {
    expect(pathWords('catchment.selection.discharge.scale.value[0]')).toBe('discharge · scale · 1');
    expect(pathWords('errors.d18O.constant')).toBe('errors · d18O · constant');
  });
});
