import { betaI, betaIComplement } from '../numeric/beta.js';
import { betaIInverse } from '../numeric/betaInverse.js';
import { logGamma } from '../numeric/logGamma.js';
import { normalCdf, normalQuantile } from '../numeric/normal.js';
import { logNormalCdf, logNormalDensity } from './normalTail.js';
import type { Prior } from './priors.js';

/**
 * log p(x) of a sound prior (see `checkPrior`), natural logarithm, per unit of x.
 * @returns −Infinity outside the prior's range
 */
export function priorLogDensity(prior: Prior, x: number): number {
  switch (prior.prior) {
    case 'uniform':
      return x >= prior.low && x <= prior.high ? -Math.log(prior.high - prior.low) : -Infinity;
    case 'logUniform':
      return x >= prior.low && x <= prior.high ? -Math.log(x) - Math.log(Math.log(prior.high / prior.low)) : -Infinity;
    case 'normal':
      return logNormalDensity((x - prior.mean) / prior.sd) - Math.log(prior.sd);
    case 'logNormal':
      return x > 0 ? logNormalDensity(Math.log(x / prior.median) / prior.logSd) - Math.log(prior.logSd * x) : -Infinity;
    case 'truncatedNormal': {
      const { from, to } = cut(prior);
      const z = (x - prior.mean) / prior.sd;
      return z >= from && z <= to ? logNormalDensity(z) - Math.log(prior.sd) - logNormalBetween(from, to) : -Infinity;
    }
    case 'beta': {
      if (!(x >= 0 && x <= 1)) return -Infinity;
      const { a, b } = prior;
      // 0 · log 0 is 0 here: a flat end stays finite
      const left = a === 1 ? 0 : (a - 1) * Math.log(x);
      const right = b === 1 ? 0 : (b - 1) * Math.log1p(-x);
      return left + right + logGamma(a + b) - logGamma(a) - logGamma(b);
    }
  }
}

/** P(X ≤ x) of a sound prior. */
export function priorCdf(prior: Prior, x: number): number {
  switch (prior.prior) {
    case 'uniform':
      return clamp((x - prior.low) / (prior.high - prior.low));
    case 'logUniform':
      return x <= prior.low ? 0 : clamp(Math.log(x / prior.low) / Math.log(prior.high / prior.low));
    case 'normal':
      return normalCdf((x - prior.mean) / prior.sd);
    case 'logNormal':
      return x > 0 ? normalCdf(Math.log(x / prior.median) / prior.logSd) : 0;
    case 'truncatedNormal': {
      const { from, to } = cut(prior);
      const z = (x - prior.mean) / prior.sd;
      if (z <= from) return 0;
      return z >= to ? 1 : Math.exp(logNormalBetween(from, z) - logNormalBetween(from, to));
    }
    case 'beta':
      return betaI(x, prior.a, prior.b);
  }
}

/** The x below which the share `probability` of a sound prior lies. */
export function priorQuantile(prior: Prior, probability: number): number {
  return probability <= 0.5 ? lowerQuantile(prior, probability) : upperQuantile(prior, 1 - probability);
}

/** Least and greatest possible value, ±Infinity where there is none. */
export function priorRange(prior: Prior): [number, number] {
  switch (prior.prior) {
    case 'uniform':
    case 'logUniform':
      return [prior.low, prior.high];
    case 'normal':
      return [-Infinity, Infinity];
    case 'logNormal':
      return [0, Infinity];
    case 'truncatedNormal':
      return [prior.low ?? -Infinity, prior.high ?? Infinity];
    case 'beta':
      return [0, 1];
  }
}

/** One draw of a sound prior. @param random seeded; its next standard normal is used, one a draw */
export function drawPrior(prior: Prior, random: { normal(): number }): number {
  return fromScore(prior, random.normal());
}

/**
 * Value at a normal score: x = F⁻¹(Φ(z)). On the scale of z **every prior is the standard normal**, unbounded and smooth, which is the
 * scale on which search and sampling run: log target(z) = log likelihood(x(z)) + log φ(z), and no further Jacobian is needed.
 * @param z  any real number; far tails round to the ends of the prior's range
 */
export function fromScore(prior: Prior, z: number): number {
  if (prior.prior === 'normal') return prior.mean + prior.sd * z;
  if (prior.prior === 'logNormal') return prior.median * Math.exp(prior.logSd * z);
  return z <= 0 ? lowerQuantile(prior, normalCdf(z)) : upperQuantile(prior, normalCdf(-z));
}

/** Normal score of a value, z = Φ⁻¹(F(x)): the inverse of {@link fromScore}; ±Infinity at the ends of the prior's range. */
export function toScore(prior: Prior, x: number): number {
  if (prior.prior === 'normal') return (x - prior.mean) / prior.sd;
  if (prior.prior === 'logNormal') return Math.log(x / prior.median) / prior.logSd;
  const below = priorCdf(prior, x);
  return below <= 0.5 ? normalQuantile(below) : -normalQuantile(priorComplement(prior, x));
}

/** log dx/dz of {@link fromScore} = log φ(z) − log p(x(z)): turns a density of x into one of z. */
export function scoreLogJacobian(prior: Prior, z: number): number {
  return logNormalDensity(z) - priorLogDensity(prior, fromScore(prior, z));
}

/** P(X > x), accurate where it is small. */
function priorComplement(prior: Prior, x: number): number {
  switch (prior.prior) {
    case 'uniform':
      return clamp((prior.high - x) / (prior.high - prior.low));
    case 'logUniform':
      return x <= 0 ? 1 : clamp(Math.log(prior.high / x) / Math.log(prior.high / prior.low));
    case 'beta':
      return betaIComplement(x, prior.a, prior.b);
    case 'truncatedNormal':
      return priorCdf(mirrored(prior), -x);
    default:
      return 1 - priorCdf(prior, x);
  }
}

function lowerQuantile(prior: Prior, below: number): number {
  switch (prior.prior) {
    case 'uniform':
      return prior.low + (prior.high - prior.low) * below;
    case 'logUniform':
      return prior.low * Math.exp(Math.log(prior.high / prior.low) * below);
    case 'normal':
      return prior.mean + prior.sd * normalQuantile(below);
    case 'logNormal':
      return prior.median * Math.exp(prior.logSd * normalQuantile(below));
    case 'truncatedNormal':
      return truncatedQuantile(prior, below);
    case 'beta':
      return betaIInverse(below, prior.a, prior.b);
  }
}

/** The x above which the share `above` lies; keeps its digits where 1 − above would have lost them. */
function upperQuantile(prior: Prior, above: number): number {
  switch (prior.prior) {
    case 'uniform':
      return prior.high - (prior.high - prior.low) * above;
    case 'logUniform':
      return prior.high * Math.exp(-Math.log(prior.high / prior.low) * above);
    case 'normal':
      return prior.mean - prior.sd * normalQuantile(above);
    case 'logNormal':
      return prior.median * Math.exp(-prior.logSd * normalQuantile(above));
    case 'truncatedNormal':
      return -truncatedQuantile(mirrored(prior), above);
    case 'beta':
      return 1 - betaIInverse(above, prior.b, prior.a);
  }
}

type Truncated = Extract<Prior, { prior: 'truncatedNormal' }>;

function cut(prior: Truncated): { from: number; to: number } {
  return {
    from: prior.low === undefined ? -Infinity : (prior.low - prior.mean) / prior.sd,
    to: prior.high === undefined ? Infinity : (prior.high - prior.mean) / prior.sd,
  };
}

/** The same prior of −x. */
function mirrored(prior: Truncated): Truncated {
  const { low, high, ...rest } = prior;
  return { ...rest, mean: -prior.mean, ...(high === undefined ? {} : { low: -high }), ...(low === undefined ? {} : { high: -low }) };
}

/** Bisection on the log of the distribution function: sure also where the range lies in the far tail of the normal. */
function truncatedQuantile(prior: Truncated, below: number): number {
  const { from, to } = cut(prior);
  if (below <= 0) return prior.low ?? -Infinity;
  const whole = logNormalBetween(from, to);
  const wanted = Math.log(below) + whole;
  let low = Math.max(from, -40);
  let high = Math.min(to, 40);
  if (from > 39) [low, high] = [from, Math.min(to, from + 40)];
  if (to < -39) [low, high] = [Math.max(from, to - 40), to];
  for (let round = 0; round < 200; round++) {
    const middle = (low + high) / 2;
    if (middle <= low || middle >= high) break;
    if (logNormalBetween(from, middle) < wanted) low = middle;
    else high = middle;
  }
  const x = prior.mean + (prior.sd * (low + high)) / 2;
  return Math.min(prior.high ?? Infinity, Math.max(prior.low ?? -Infinity, x));
}

/** log(Φ(to) − Φ(from)), from the side on which both are small. */
function logNormalBetween(from: number, to: number): number {
  if (from > 0) return logNormalBetween(-to, -from);
  if (from === -Infinity) return logNormalCdf(to);
  if (to > 0) return Math.log1p(-Math.exp(logNormalCdf(from)) - Math.exp(logNormalCdf(-to)));
  const upper = logNormalCdf(to);
  return upper + Math.log(-Math.expm1(logNormalCdf(from) - upper));
}

function clamp(share: number): number {
  return Math.min(1, Math.max(0, share));
}
