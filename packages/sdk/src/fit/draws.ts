import type { Catchment, RunOptions, WeightedRun } from '../contract.js';
import { runColumn } from '../column/index.js';
import { RillageError } from '../errors.js';
import type { Fit } from './fitWith.js';
import { collectPriors, substitute } from './priorPaths.js';
import type { FitProblem } from './problem.js';

/**
 * Runs of a fit's draws, evenly thinned: the ensemble that readings and stations are made from.
 * @param count   runs at most
 * @throws RillageError `fit-mismatch` if the fit is of another problem
 */
export function runDraws(fit: Fit, problem: FitProblem, options: RunOptions, count = 100): WeightedRun[] {
  return catchmentsOf(fit, problem, count).map((catchment) => ({ weight: 1, run: runColumn(catchment, problem.forcing, options) }));
}

/** The catchments of a fit's draws, evenly thinned. @throws RillageError `fit-mismatch` */
export function catchmentsOf(fit: Fit, problem: Pick<FitProblem, 'catchment' | 'errors'>, count = 100): Catchment[] {
  const { catchment, errors } = problem;
  const priors = collectPriors({ catchment, errors });
  const same = priors.length === fit.parameters.length && priors.every(({ path }, j) => path === fit.parameters[j].path);
  if (!same) {
    throw new RillageError({
      code: 'fit-mismatch',
      path: 'fit',
      expected: `the unknowns ${priors.map(({ path }) => path).join(', ')}`,
      received: fit.parameters.map(({ path }) => path).join(', '),
      hint: 'The fit belongs to another problem.',
    });
  }
  const used = Math.min(count, fit.draws.length);
  return Array.from({ length: used }, (_value, k) => {
    const draw = fit.draws[Math.floor(((k + 0.5) * fit.draws.length) / used)];
    return substitute<{ catchment: Catchment }>({ catchment, errors }, priors, draw).catchment;
  });
}
