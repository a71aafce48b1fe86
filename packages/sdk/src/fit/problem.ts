import type { Catchment, Finding, Forcing, Sample } from '../contract.js';
import { RillageError, shorten, throwIfAny, type Issue } from '../errors.js';
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

/** What is to be fitted to what. */
export interface FitProblem {
  forcing: Forcing;
  catchment: WithPriors<Catchment>;
  samples: readonly Sample[];
  /** By tracer: how measurements may differ from the simulation. */
  errors: Record<string, WithPriors<ErrorModel>>;
}

/** A problem that holds together: its unknowns, and what is odd about it. */
export interface CheckedProblem {
  problem: FitProblem;
  priors: PlacedPrior[];
  /** Samples inside the record, in time order. */
  samples: Sample[];
  findings: Finding[];
}

/**
 * Checks a problem as a whole. The unknowns are the priors of catchment and errors together, in the order of their keys.
 * @throws RillageError, a batch: `no-samples`, `no-unknowns`, `sample-…`, `errors-missing`, `all-censored`, and whatever priors and error
 *   models are refused for
 */
export function checkProblem(problem: FitProblem): CheckedProblem {
  const { forcing, catchment, errors } = problem;
  const priors = collectPriors({ catchment, errors });
  const issues: Issue[] = [];
  const findings: Finding[] = [];
  for (const key of Object.keys(problem)) {
    if (!['forcing', 'catchment', 'samples', 'errors'].includes(key)) {
      issues.push({ code: 'unknown-field', path: key, expected: 'forcing, catchment, samples and errors only', received: shorten(key) });
    }
  }
  if (priors.length === 0)
    issues.push({ code: 'no-unknowns', path: 'catchment', expected: 'at least one prior in place of a number', received: 'none' });
  if (!Array.isArray(problem.samples) || problem.samples.length === 0) {
    throw new RillageError([...issues, { code: 'no-samples', path: 'samples', expected: 'at least one sample', received: 'none' }]);
  }
  const start = Date.parse(forcing.start);
  const end = start + forcing.inflow.length * forcing.stepDays * 86_400_000;
  const kept: Sample[] = [];
  let outside = 0;
  problem.samples.forEach((sample, index) => {
    const found = describeSample(sample, index, problem);
    issues.push(...found);
    if (found.length > 0) return;
    if (Date.parse(sample.from) < start || Date.parse(sample.to) > end || Date.parse(sample.from) >= end) outside += 1;
    else kept.push(sample);
  });
  throwIfAny(issues);
  if (outside > 0)
    findings.push(finding('samples-outside', `${outside} of ${problem.samples.length} samples outside the record`, 'Left out.', outside));
  if (kept.length === 0)
    throw new RillageError({ code: 'samples-outside', path: 'samples', expected: 'samples inside the record', received: 'none of them' });
  const middle = substitute<{ errors: Record<string, unknown> }>(
    { catchment, errors },
    priors,
    priors.map(({ prior }) => priorQuantile(prior, 0.5)),
  );
  for (const [tracer, own] of byTracer(kept)) {
    if (errors[tracer] === undefined)
      issues.push({
        code: 'errors-missing',
        path: `errors.${tracer}`,
        expected: 'an error model for every tracer with samples',
        received: 'none',
      });
    else issues.push(...checkErrorModel(middle.errors[tracer], `errors.${tracer}`));
    const units = new Set(own.map(({ unit }) => unit));
    if (units.size > 1)
      issues.push({ code: 'sample-units', path: 'samples', expected: `one unit for ${shorten(tracer)}`, received: [...units].join(', ') });
    if (own.every(({ censored }) => censored !== undefined)) {
      issues.push({
        code: 'all-censored',
        path: 'samples',
        expected: `a value of ${shorten(tracer)} that is not censored`,
        received: 'limits only',
      });
    }
    if (own.length === 1) findings.push(finding('one-sample', `one sample of ${tracer}`, 'Used; it can inform next to nothing.', 1));
    if (own.length > 2 && own.every(({ value }) => value === own[0].value)) {
      findings.push(
        finding('constant-tracer', `every sample of ${tracer} has one value`, 'Used; a constant tracer carries no ages.', own.length),
      );
    }
    const times = own.map(({ from, to, of }) => `${from} ${to} ${of ?? ''}`);
    const twice = times.length - new Set(times).size;
    if (twice > 0) findings.push(finding('samples-twice', `${twice} samples of ${tracer} at the time of another`, 'All used.', twice));
  }
  throwIfAny(issues);
  kept.sort((a, b) => Date.parse(a.to) - Date.parse(b.to));
  return { problem, priors, samples: kept, findings };
}

function describeSample(sample: Sample, index: number, problem: FitProblem): Issue[] {
  const path = `samples[${index}]`;
  const issues: Issue[] = [];
  const need = (good: boolean, field: string, expected: string, received: unknown): void => {
    if (!good) issues.push({ code: 'sample-invalid', path: `${path}.${field}`, expected, received: shorten(received ?? 'nothing') });
  };
  const from = Date.parse(sample.from);
  const to = Date.parse(sample.to);
  need(Number.isFinite(from), 'from', 'an ISO 8601 instant', sample.from);
  need(Number.isFinite(to) && !(to < from), 'to', 'an ISO 8601 instant, not before from', sample.to);
  need(Number.isFinite(sample.value), 'value', 'a finite concentration', sample.value);
  need(sample.error === undefined || sample.error >= 0, 'error', 'a standard error of 0 or more', sample.error);
  const tracers = (problem.catchment.tracers ?? {}) as Record<string, unknown>;
  need(Object.hasOwn(tracers, sample.tracer), 'tracer', 'a tracer of the catchment', sample.tracer);
  need(Object.hasOwn(problem.forcing.outflows, sample.of ?? 'discharge'), 'of', 'an outflow of the forcing', sample.of ?? 'discharge');
  return issues;
}

export function byTracer(samples: readonly Sample[]): Map<string, Sample[]> {
  const groups = new Map<string, Sample[]>();
  for (const sample of samples) groups.set(sample.tracer, [...(groups.get(sample.tracer) ?? []), sample]);
  return groups;
}

function finding(code: string, seen: string, done: string, count: number): Finding {
  return { code, severity: 'warning', where: 'samples', seen, done, count };
}
