import { normalQuantile } from '../numeric/normal.js';
import { quantileSorted } from '../numeric/quantile.js';
import { effectiveSize, varianceOf } from './effectiveSize.js';

/** What several chains of one quantity say about each other. */
export interface ChainDiagnosis {
  /** Rank-normalised split R-hat, the greater of the plain and the folded one. 1 when the chains agree. */
  rHat: number;
  /** Effective draws for the centre of the distribution. */
  bulkSize: number;
  /** Effective draws for its 5 and 95 % quantiles, the smaller. */
  tailSize: number;
  mean: number;
  sd: number;
  /** Monte-Carlo standard error of the mean and of the standard deviation, in the quantity's own unit. */
  meanError: number;
  sdError: number;
}

/**
 * All of the below for one quantity.
 * @param chains  m chains of n draws each, in the order drawn
 * @returns every field NaN if a draw is not finite or no chain moves
 */
export function diagnoseChains(chains: readonly ArrayLike<number>[]): ChainDiagnosis {
  const all = flatten(chains);
  const mean = meanOf(all);
  const squares = chains.map((chain) => Float64Array.from(chain, (x) => (x - mean) ** 2));
  const variance = meanOf(flatten(squares));
  const fourth = meanOf(flatten(squares).map((x) => x * x));
  return {
    rHat: rankNormalisedRHat(chains),
    bulkSize: bulkSize(chains),
    tailSize: tailSize(chains),
    mean,
    sd: Math.sqrt(varianceOf(all)),
    meanError: Math.sqrt(varianceOf(all) / effectiveSize(splitChains(chains))),
    sdError: Math.sqrt((fourth - variance * variance) / effectiveSize(splitChains(squares)) / variance / 4),
  };
}

/**
 * Rank-normalised split R-hat: max of the R-hat of the normal scores and of the normal scores of |x − median|, so that chains that
 * differ in place or in spread both show, whatever the tails of the distribution.
 * @param chains  m chains of n draws each (n ≥ 4)
 * @returns dimensionless, near 1 when converged (≤ 1.01 is the usual bar); NaN if a draw is not finite or all are equal
 * @source Vehtari et al. (2021), Bayesian Analysis 16:667–718, section 4; reference values in test/checks/chainDiagnostics.json
 */
export function rankNormalisedRHat(chains: readonly ArrayLike<number>[]): number {
  const halves = splitChains(chains);
  const sorted = flatten(halves).sort();
  const median = quantileSorted(sorted, 0.5);
  const folded = halves.map((chain) => chain.map((x) => Math.abs(x - median)));
  const plain = rHat(normalScores(halves));
  const spread = rHat(normalScores(folded));
  return Number.isNaN(plain) || Number.isNaN(spread) ? NaN : Math.max(plain, spread);
}

/**
 * R̂ = √( ((n−1)/n · W + B/n) / W ) of chains as they are, W the mean variance within, B/n the variance of their means.
 * @source Gelman & Rubin (1992), Statistical Science 7:457–472, without the degrees-of-freedom factor
 */
export function rHat(chains: readonly ArrayLike<number>[]): number {
  const length = chains[0]?.length ?? 0;
  if (chains.length < 2 || length < 2) return NaN;
  let within = 0;
  for (const chain of chains) within += varianceOf(chain) / chains.length;
  const between = varianceOf(chains.map(meanOf));
  return within > 0 ? Math.sqrt((((length - 1) / length) * within + between) / within) : NaN;
}

/** Effective draws for the centre: of the normal scores of the split chains. Source as {@link rankNormalisedRHat}. */
export function bulkSize(chains: readonly ArrayLike<number>[]): number {
  return effectiveSize(normalScores(splitChains(chains)));
}

/** Effective draws for the tails: the smaller of those of the indicators x ≤ q05 and x ≤ q95. Source as {@link rankNormalisedRHat}. */
export function tailSize(chains: readonly ArrayLike<number>[]): number {
  const sorted = flatten(chains).sort();
  const sizes = [0.05, 0.95].map((probability) => {
    const limit = quantileSorted(sorted, probability);
    return effectiveSize(splitChains(chains).map((chain) => chain.map((x) => (x <= limit ? 1 : 0))));
  });
  return Number.isNaN(sizes[0]) || Number.isNaN(sizes[1]) ? NaN : Math.min(sizes[0], sizes[1]);
}

/** First and last halves of every chain as chains of their own; the middle draw of an odd number is left out. */
export function splitChains(chains: readonly ArrayLike<number>[]): Float64Array[] {
  return chains.flatMap((chain) => {
    const values = Float64Array.from(chain);
    const half = values.length >> 1;
    return [values.slice(0, half), values.slice(values.length - half)];
  });
}

/** Ranks over all chains (ties averaged) turned into normal scores Φ⁻¹((r − 3/8)/(S + 1/4)). */
function normalScores(chains: readonly Float64Array[]): Float64Array[] {
  const all = flatten(chains);
  const order = Array.from(all.keys()).sort((i, j) => all[i] - all[j]);
  const scores = new Float64Array(all.length);
  for (let first = 0; first < order.length;) {
    let last = first;
    while (last + 1 < order.length && all[order[last + 1]] === all[order[first]]) last++;
    const rank = (first + last) / 2 + 1;
    const score = normalQuantile((rank - 0.375) / (all.length + 0.25));
    for (let k = first; k <= last; k++) scores[order[k]] = Number.isFinite(all[order[k]]) ? score : NaN;
    first = last + 1;
  }
  let start = 0;
  return chains.map((chain) => scores.slice(start, (start += chain.length)));
}

function flatten(chains: readonly ArrayLike<number>[]): Float64Array {
  const all = new Float64Array(chains.reduce((sum, chain) => sum + chain.length, 0));
  let at = 0;
  for (const chain of chains) {
    all.set(chain, at);
    at += chain.length;
  }
  return all;
}

function meanOf(values: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < values.length; i++) sum += values[i];
  return sum / values.length;
}
