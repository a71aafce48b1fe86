import type { Catchment, RunOptions, WeightedRun } from '../contract.js';
import { runColumn } from '../column/index.js';
import { shareOut, thinned } from './evaluateDraws.js';
import type { Fit } from './fit.js';
import type { ErrorModel } from './likelihood.js';
import { substitute } from './priorPaths.js';
import { checkProblem, refuseOther, type FitProblem } from './problem.js';

/** A member of the published mixture. */
export interface FitMember {
  /** Adds up to 1 over the members. */
  weight: number;
  catchment: Catchment;
  errors: Record<string, ErrorModel>;
  /** Which of the fit's alternatives it is of. */
  alternative: number;
}

/**
 * Runs of a fit's draws: the ensemble that readings and stations are made from. Every alternative is there by its weight.
 * @param count   runs at most
 * @throws RillageError `fit-mismatch` if the fit is of another problem
 */
export function runDraws(fit: Fit, problem: FitProblem, options: RunOptions, count = 100): WeightedRun[] {
  const { alternatives } = checkProblem(problem);
  return fitMembers(fit, problem, count).map(({ weight, catchment, alternative }) => ({
    weight,
    run: runColumn(catchment, alternatives[alternative].forcing, options),
  }));
}

/** The catchments of a fit's draws with their weights, evenly thinned. @throws RillageError `fit-mismatch` */
export function fitMembers(fit: Fit, problem: FitProblem, count = 100): FitMember[] {
  const { alternatives } = checkProblem(problem);
  const textOf = (list: { name: string; paths: string[] }[]): string =>
    list.map(({ name, paths }) => `${name}: ${paths.join(', ')}`).join('; ');
  const paths = (own: readonly { path: string }[]): string[] => own.map(({ path }) => path);
  refuseOther(
    textOf(alternatives.map(({ name }, k) => ({ name, paths: paths(fit.alternatives[k]?.draws.length ? alternatives[k].priors : []) }))),
    textOf(fit.alternatives.map(({ name, parameters }) => ({ name, paths: paths(parameters) }))),
    'The fit belongs to another problem.',
  );
  const available = fit.alternatives.map(({ draws }) => draws.length);
  const total = available.reduce((a, b) => a + b, 0);
  const counts = shareOut(
    fit.alternatives.map(({ weight }) => weight),
    available,
    Math.min(count, total),
  );
  const used = fit.alternatives.reduce((sum, { weight }, k) => (counts[k] > 0 ? sum + weight : sum), 0);
  return fit.alternatives.flatMap(({ weight, draws }, k) =>
    thinned(draws.length, counts[k]).map((d) => {
      const { catchment, priors } = alternatives[k];
      const settled = substitute<Pick<FitMember, 'catchment' | 'errors'>>({ catchment, errors: problem.errors }, priors, draws[d]);
      return { weight: weight / used / counts[k], ...settled, alternative: k };
    }),
  );
}

/** The catchments of {@link fitMembers}. */
export function catchmentsOf(fit: Fit, problem: FitProblem, count = 100): Catchment[] {
  return fitMembers(fit, problem, count).map(({ catchment }) => catchment);
}
