import { betaI } from '../numeric/beta.js';
import { logGamma } from '../numeric/logGamma.js';
import type { Issue } from '../errors.js';
import { shorten } from '../errors.js';
import { logNormalCdf } from './normalTail.js';

/**
 * How a measured concentration may differ from the simulated one. Independent sources of error add in quadrature:
 *
 *     scale² = stated² + constant² + (proportional · simulated)²
 *
 * `stated` is the laboratory's standard error of the sample; `constant` and `proportional` stand for everything else (sampling, the model),
 * are given or, where a prior stands in the problem, estimated. `studentT` has heavier tails: a few wild samples then do not steer the fit.
 */
export type ErrorModel =
  | { error: 'normal'; constant: number; proportional?: number }
  | { error: 'studentT'; degrees: number; constant: number; proportional?: number };

/** `below`: the value is a detection limit and the truth is at or below it; `above`: the counterpart. */
export type Censoring = 'below' | 'above' | undefined;

const FIELDS: Record<ErrorModel['error'], readonly string[]> = {
  normal: ['error', 'constant', 'proportional'],
  studentT: ['error', 'degrees', 'constant', 'proportional'],
};

/**
 * Problems of an error model as plain data, none if it is sound. Nothing unknown is ignored.
 * @returns issues with codes 'type' | 'unknown-error-model' | 'unknown-field' | 'not-finite' | 'negative' | 'degrees'
 */
export function checkErrorModel(value: unknown, path = 'error'): Issue[] {
  if (typeof value !== 'object' || value === null || Array.isArray(value)) {
    return [{ code: 'type', path, expected: 'an error model such as { error: "normal", constant: 0.3 }', received: shorten(value) }];
  }
  const model = value as Record<string, unknown>;
  const fields = Object.hasOwn(FIELDS, String(model.error)) ? FIELDS[model.error as ErrorModel['error']] : undefined;
  if (!fields)
    return [
      { code: 'unknown-error-model', path: `${path}.error`, expected: Object.keys(FIELDS).join(' or '), received: shorten(model.error) },
    ];
  const issues: Issue[] = [];
  for (const key of Object.keys(model)) {
    if (!fields.includes(key)) issues.push({ code: 'unknown-field', path: `${path}.${key}`, expected: `one of ${fields.join(', ')}` });
  }
  for (const key of fields.slice(1)) {
    const number = model[key];
    const at = `${path}.${key}`;
    if (number === undefined && key === 'proportional') continue;
    if (typeof number !== 'number' || !Number.isFinite(number)) {
      issues.push({ code: 'not-finite', path: at, expected: 'a finite number', received: shorten(number) });
    } else if (key === 'degrees' ? !(number >= 1) : number < 0) {
      issues.push(
        key === 'degrees'
          ? { code: 'degrees', path: at, expected: '1 or more (2 to 10 is usual)', received: String(number) }
          : { code: 'negative', path: at, expected: '0 or more', received: String(number) },
      );
    }
  }
  return issues;
}

/**
 * Scale of the error of one sample, in the concentration's unit.
 * @param stated  the laboratory's standard error, 0 if none was given
 */
export function errorScale(model: ErrorModel, simulated: number, stated = 0): number {
  return Math.hypot(stated, model.constant, (model.proportional ?? 0) * simulated);
}

/**
 * Log-likelihood of one sample: log density of the residual over its scale, or, for a censored value, log probability of the side on
 * which the truth lies.
 *
 * @param measured   the value, or the limit if `censored`
 * @param simulated  flow-weighted mean over the sample's own interval, same unit
 * @param stated     laboratory's standard error, same unit, 0 if none
 * @returns −Infinity where `simulated` is not a number (nothing flowed: an impossible run) or the scale is 0
 * @source densities are the textbook ones; checked against closed values in test/sdk/fit/likelihood.test.ts
 */
export function logLikelihood(model: ErrorModel, measured: number, simulated: number, stated = 0, censored: Censoring = undefined): number {
  const scale = errorScale(model, simulated, stated);
  if (!(scale > 0) || !Number.isFinite(simulated)) return -Infinity;
  const z = (measured - simulated) / scale;
  if (model.error === 'normal') {
    if (censored === undefined) return -0.5 * z * z - Math.log(scale) - HALF_LOG_2PI;
    return logNormalCdf(censored === 'below' ? z : -z);
  }
  const { degrees } = model;
  if (censored !== undefined) return logStudentCdf(censored === 'below' ? z : -z, degrees);
  return studentConstant(degrees) - ((degrees + 1) / 2) * Math.log1p((z * z) / degrees) - Math.log(scale);
}

/** One sample as the likelihood needs it. */
export interface Measured {
  value: number;
  /** Standard error, same unit; 0 if none was stated. */
  stated: number;
  censored?: Censoring;
}

/**
 * Log-likelihood of every sample of one tracer.
 * @param simulated  [N] same order as `samples`
 * @param out        [N] filled and returned
 */
export function pointwiseLogLikelihood(
  model: ErrorModel,
  samples: readonly Measured[],
  simulated: ArrayLike<number>,
  out: Float64Array = new Float64Array(samples.length),
): Float64Array {
  for (let i = 0; i < samples.length; i++) {
    out[i] = logLikelihood(model, samples[i].value, simulated[i], samples[i].stated, samples[i].censored);
  }
  return out;
}

/**
 * One draw of what a laboratory would have measured, given the simulated value: for predictive intervals and simulated data.
 * @param random  a seeded generator: uniform of [0, 1), standard normal
 * @source Student-t by the polar method, T = √(ν (U^(−2/ν) − 1)) cos 2πV: Bailey (1994), Mathematics of Computation 62:779–781
 */
export function drawMeasured(
  model: ErrorModel,
  simulated: number,
  stated: number,
  random: { uniform(): number; normal(): number },
): number {
  const scale = errorScale(model, simulated, stated);
  if (model.error === 'normal') return simulated + scale * random.normal();
  const { degrees } = model;
  const radius = Math.sqrt(degrees * Math.expm1((-2 / degrees) * Math.log(1 - random.uniform())));
  return simulated + scale * radius * Math.cos(2 * Math.PI * random.uniform());
}

const HALF_LOG_2PI = 0.5 * Math.log(2 * Math.PI);

function studentConstant(degrees: number): number {
  return logGamma((degrees + 1) / 2) - logGamma(degrees / 2) - 0.5 * Math.log(degrees * Math.PI);
}

/** log P(T ≤ z) = log ½ I_{ν/(ν+z²)}(ν/2, ½) for z < 0. */
function logStudentCdf(z: number, degrees: number): number {
  const tail = 0.5 * betaI(degrees / (degrees + z * z), degrees / 2, 0.5);
  return z < 0 ? Math.log(tail) : Math.log1p(-tail);
}
