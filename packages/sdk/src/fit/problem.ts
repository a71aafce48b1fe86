import type { Catchment, Finding, Forcing, Sample } from '../contract.js';
import { RillageError, shorten, throwIfAny, type Issue } from '../errors.js';
import { startColumn } from '../column/index.js';
import { expandAlternatives, type Alternative } from './alternatives.js';
import { isBeyondModel } from './beyondModel.js';
import { checkSamples } from './checkSamples.js';
import { checkErrorModel, type ErrorModel } from './likelihood.js';
import { collectPriors, substitute, type PlacedPrior } from './priorPaths.js';
import { priorQuantile } from './priorMath.js';
import type { Prior } from './priors.js';

/** Plain data in which a prior may stand wherever a number does. */
export type WithPriors<T> = T extends number
  ? T | Prior
  : T extends readonly (infer U)[]
    ? WithPriors<U>[]
    : T extends object
      ? { [K in keyof T]: WithPriors<T[K]> }
      : T;

/** A way of filling daily concentrations of rain from bulk samples, as `fillRainConcentration` knows them. */
export interface Filling {
  rule: 'bulkConstant' | 'seasonalPlusResidual' | 'randomRedistribution';
  /** Steps with inflow that no sample covers. Default `stop`. */
  uncovered?: 'stop' | 'amountWeightedMean' | 'seasonalCurve';
  /** For `randomRedistribution`. Default 1. */
  seed?: number;
}

/** What is to be fitted to what. */
export interface FitProblem {
  forcing: Forcing;
  catchment: WithPriors<Catchment>;
  samples: readonly Sample[];
  /** By tracer: how measurements may differ from the simulation. */
  errors: Record<string, WithPriors<ErrorModel>>;
  /** By name: catchments to be weighed against `catchment`, with other selection forms or other rules. */
  otherCatchments?: Record<string, WithPriors<Catchment>>;
  /**
   * Bulk samples behind the forcing's rain concentrations. With them the doubt about single days of rain goes into the draws, and
   * `fillings` may be compared.
   */
  rainSamples?: readonly Sample[];
  /** Ways of filling daily concentrations anew from `rainSamples`, weighed against each other. Default: only the forcing as it is. */
  fillings?: readonly Filling[];
}

/** A problem that holds together: what is to be tried, and what is odd about it. */
export interface CheckedProblem {
  problem: FitProblem;
  /** Unknowns of the first alternative. */
  priors: PlacedPrior[];
  /** Every catchment under every filling; the first is `catchment` under the first filling. */
  alternatives: Alternative[];
  /** Samples inside the record, in time order. */
  samples: Sample[];
  findings: Finding[];
}

const FIELDS = ['forcing', 'catchment', 'samples', 'errors', 'otherCatchments', 'rainSamples', 'fillings'];

/**
 * Checks a problem as a whole. The unknowns are the priors of catchment and errors together, in the order of their keys.
 * @throws RillageError, a batch: `unknown-field`, `no-samples`, `samples-outside`, `no-unknowns`, `sample-…`, `errors-missing`,
 *   `all-censored`, `fillings-without-samples`, whatever priors and error models are refused for, and what `fillRainConcentration` throws
 */
export function checkProblem(problem: FitProblem): CheckedProblem {
  const { catchment, errors } = problem;
  const catchments: [string, WithPriors<Catchment>][] = [['catchment', catchment], ...Object.entries(problem.otherCatchments ?? {})];
  const priors = catchments.map(([, own]) => collectPriors({ catchment: own, errors }));
  const issues: Issue[] = [];
  for (const key of Object.keys(problem)) {
    if (!FIELDS.includes(key))
      issues.push({ code: 'unknown-field', path: key, expected: `${FIELDS.join(', ')} only`, received: shorten(key) });
  }
  catchments.forEach(([name], k) => {
    const path = k === 0 ? 'catchment' : `otherCatchments.${name}`;
    if (priors[k].length === 0)
      issues.push({ code: 'no-unknowns', path, expected: 'at least one prior in place of a number', received: 'none' });
  });
  issues.push(...checkFillings(problem));
  const { samples, findings } = checkSamples(problem, issues);
  const middle = substitute<{ errors: Record<string, unknown> }>(
    { catchment, errors },
    priors[0],
    priors[0].map(({ prior }) => priorQuantile(prior, 0.5)),
  );
  for (const tracer of new Set(samples.map((sample) => sample.tracer))) {
    const path = `errors.${tracer}`;
    if (Object.hasOwn(errors, tracer)) issues.push(...checkErrorModel(middle.errors[tracer], path));
    else issues.push({ code: 'errors-missing', path, expected: 'an error model for every tracer with samples', received: 'none' });
  }
  throwIfAny(issues);
  const alternatives = expandAlternatives(problem, catchments, priors, samples);
  alternatives.forEach((alternative) => refuseBroken(alternative, errors));
  return { problem, priors: priors[0], alternatives, samples, findings };
}

/** A form or a field that does not exist is an error at once, not a run that is impossible wherever it is tried. */
function refuseBroken({ catchment, priors, forcing }: Alternative, errors: FitProblem['errors']): void {
  const medians = priors.map(({ prior }) => priorQuantile(prior, 0.5));
  try {
    startColumn(substitute<{ catchment: Catchment }>({ catchment, errors }, priors, medians).catchment, forcing);
  } catch (error) {
    if (!isBeyondModel(error)) throw error;
  }
}

function checkFillings({ fillings, rainSamples }: FitProblem): Issue[] {
  if (fillings === undefined) return [];
  if (!Array.isArray(fillings) || fillings.length === 0)
    return [{ code: 'no-fillings', path: 'fillings', expected: 'at least one filling, or no field', received: shorten(fillings) }];
  if (rainSamples === undefined || rainSamples.length === 0)
    return [{ code: 'fillings-without-samples', path: 'rainSamples', expected: 'the bulk samples to fill from', received: 'none' }];
  return (fillings as readonly Filling[]).flatMap((filling, k) =>
    Object.keys(filling)
      .filter((key) => !['rule', 'uncovered', 'seed'].includes(key))
      .map((key) => ({ code: 'unknown-field', path: `fillings[${k}].${key}`, expected: 'rule, uncovered or seed', received: key })),
  );
}

/** The fit's problem as far as a saved state has to be of the same one. @returns text that differs where a problem does */
export function problemText(problem: FitProblem): string {
  const { forcing } = problem;
  const sums = (series: Record<string, Float64Array>): [string, number][] =>
    Object.entries(series).map(([name, values]) => [
      name,
      values.reduce((sum, value, k) => (value === value ? sum + value * (1 + k) : sum), 0),
    ]);
  return JSON.stringify({
    ...problem,
    forcing: [
      forcing.start,
      forcing.stepDays,
      forcing.inflow.length,
      sums({ inflow: forcing.inflow }),
      sums(forcing.outflows),
      sums(forcing.inflowConcentration),
    ],
  });
}

/** @throws RillageError `fit-mismatch` where a state, a fit or a seed belongs to something else */
export function refuseOther(expected: string, received: string, hint: string): void {
  if (expected === received) return;
  throw new RillageError({ code: 'fit-mismatch', path: 'fit', expected: shorten(expected), received: shorten(received), hint });
}
