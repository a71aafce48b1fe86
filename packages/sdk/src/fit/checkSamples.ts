import type { Finding, Sample } from '../contract.js';
import { RillageError, shorten, throwIfAny, type Issue } from '../errors.js';
import type { FitProblem } from './problem.js';
import { windowOf } from './sampleWindow.js';

/**
 * Samples that the record covers, in time order, and what is odd about them.
 * @param issues  what was found so far; all of it is thrown together
 * @throws RillageError, a batch: `no-samples`, `sample-invalid`, `samples-outside`, `sample-units`, `all-censored`
 */
export function checkSamples(problem: FitProblem, issues: Issue[]): { samples: Sample[]; findings: Finding[] } {
  const { forcing } = problem;
  const findings: Finding[] = [];
  if (!Array.isArray(problem.samples) || problem.samples.length === 0) {
    throw new RillageError([...issues, { code: 'no-samples', path: 'samples', expected: 'at least one sample', received: 'none' }]);
  }
  const start = Date.parse(forcing.start);
  const end = start + forcing.inflow.length * forcing.stepDays * 86_400_000;
  const kept: Sample[] = [];
  let outside = 0;
  let broken = false;
  problem.samples.forEach((sample: Sample, index) => {
    const found = describeSample(sample, index, problem);
    issues.push(...found);
    broken ||= found.length > 0;
    if (found.length > 0) return;
    if (Date.parse(sample.from) < start || Date.parse(sample.to) > end || Date.parse(sample.from) >= end) outside += 1;
    else kept.push(sample);
  });
  if (broken) throwIfAny(issues);
  if (outside > 0)
    findings.push(finding('samples-outside', `${outside} of ${problem.samples.length} samples outside the record`, 'Left out.', outside));
  if (kept.length === 0) {
    throw new RillageError([
      ...issues,
      { code: 'samples-outside', path: 'samples', expected: 'samples inside the record', received: 'none of them' },
    ]);
  }
  const dry = kept.filter((sample) => {
    const { first, weights } = windowOf(sample, forcing);
    return weights.every((_weight, k) => !(forcing.outflows[sample.of ?? 'discharge'][first + k] > 0));
  }).length;
  if (dry > 0) findings.push(finding('samples-without-flow', `${dry} samples taken while nothing flowed`, 'They say nothing.', dry));
  for (const [tracer, own] of byTracer(kept)) {
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
    findings.push(...oddities(tracer, own));
  }
  kept.sort((a, b) => Date.parse(a.to) - Date.parse(b.to));
  return { samples: kept, findings };
}

export function byTracer(samples: readonly Sample[]): Map<string, Sample[]> {
  const groups = new Map<string, Sample[]>();
  for (const sample of samples) groups.set(sample.tracer, [...(groups.get(sample.tracer) ?? []), sample]);
  return groups;
}

function oddities(tracer: string, own: readonly Sample[]): Finding[] {
  const found: Finding[] = [];
  if (own.length === 1) found.push(finding('one-sample', `one sample of ${tracer}`, 'Used; it can inform next to nothing.', 1));
  if (own.length > 2 && own.every(({ value }) => value === own[0].value)) {
    found.push(
      finding('constant-tracer', `every sample of ${tracer} has one value`, 'Used; a constant tracer carries no ages.', own.length),
    );
  }
  const times = own.map(({ from, to, of }) => `${from} ${to} ${of ?? ''}`);
  const twice = times.length - new Set(times).size;
  if (twice > 0) found.push(finding('samples-twice', `${twice} samples of ${tracer} at the time of another`, 'All used.', twice));
  return found;
}

const FIELDS = ['tracer', 'of', 'from', 'to', 'value', 'unit', 'error', 'censored'];

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
  need(typeof sample.unit === 'string' && sample.unit !== '', 'unit', 'a unit', sample.unit);
  need(sample.error === undefined || sample.error >= 0, 'error', 'a standard error of 0 or more', sample.error);
  need([undefined, 'below', 'above'].includes(sample.censored), 'censored', 'below, above or nothing', sample.censored);
  const catchments = [problem.catchment, ...Object.values(problem.otherCatchments ?? {})];
  const known = catchments.every(({ tracers }) => Object.hasOwn((tracers ?? {}) as Record<string, unknown>, sample.tracer));
  need(known, 'tracer', 'a tracer of every catchment', sample.tracer);
  need(Object.hasOwn(problem.forcing.outflows, sample.of ?? 'discharge'), 'of', 'an outflow of the forcing', sample.of ?? 'discharge');
  for (const key of Object.keys(sample)) need(FIELDS.includes(key), key, `one of ${FIELDS.join(', ')}`, 'a field of that name');
  return issues;
}

function finding(code: string, seen: string, done: string, count: number): Finding {
  return { code, severity: 'warning', where: 'samples', seen, done, count };
}
