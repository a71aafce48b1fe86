import { RillageError } from '../errors.js';

/** Weights of alternatives with what they achieve. */
export interface Stacking {
  /** [K] ≥ 0, sum 1. */
  weights: Float64Array;
  /** Σ_i log Σ_k w_k p_k(y_i): leave-one-out log score of the mixture. */
  elpd: number;
  iterations: number;
  /** Proven bound on how far `elpd` lies below the greatest possible. */
  shortfall: number;
}

/**
 * Stacking of predictive distributions: the weights that maximise Σ_i log Σ_k w_k exp(elpd_ki).
 *
 * The expectation–maximisation step w_k ← w_k g_k, g_k = mean_i p_ki / Σ_j w_j p_ji, never lowers the score. By Jensen's inequality the
 * greatest score exceeds the present one by at most N log max_k g_k, which ends the iteration and is returned.
 *
 * @param pointwise  [K alternatives][N samples] log predictive densities of left-out samples, in the same order and unit
 * @param options.tolerance  allowed `shortfall`, default 1e-6
 * @returns equal alternatives share their weight equally. After 100 000 iterations the shortfall may be above the tolerance: look at it
 * @throws RillageError 'shape' | 'not-finite'
 * @source Yao, Vehtari, Simpson & Gelman (2018), Bayesian Analysis 13:917–1007, section 2.2 (from memory)
 */
export function stackingWeights(pointwise: readonly ArrayLike<number>[], options: { tolerance?: number } = {}): Stacking {
  const alternatives = pointwise.length;
  const samples = pointwise[0]?.length ?? 0;
  check(pointwise, samples);
  const tolerance = options.tolerance ?? 1e-6;
  const best = new Float64Array(samples).fill(-Infinity);
  for (const row of pointwise) for (let i = 0; i < samples; i++) best[i] = Math.max(best[i], row[i]);
  const density = pointwise.map((row) => Float64Array.from(row, (x, i) => Math.exp(x - best[i])));
  const weights = new Float64Array(alternatives).fill(1 / alternatives);
  const mixture = new Float64Array(samples);
  let shortfall = Infinity;
  let iterations = 0;
  for (;;) {
    mixture.fill(0);
    for (let k = 0; k < alternatives; k++) for (let i = 0; i < samples; i++) mixture[i] += weights[k] * density[k][i];
    const gains = density.map((row) => row.reduce((sum, p, i) => sum + p / mixture[i], 0) / samples);
    shortfall = Math.max(0, samples * Math.log(Math.max(...gains)));
    if (shortfall <= tolerance || iterations >= 100_000) break;
    for (let k = 0; k < alternatives; k++) weights[k] *= gains[k];
    iterations++;
  }
  const elpd = mixture.reduce((sum, p, i) => sum + Math.log(p) + best[i], 0);
  return { weights, elpd, iterations, shortfall };
}

function check(pointwise: readonly ArrayLike<number>[], samples: number): void {
  if (pointwise.length === 0 || samples === 0)
    throw new RillageError({ code: 'shape', path: 'pointwise', expected: 'at least one alternative and one sample' });
  pointwise.forEach((row, k) => {
    if (row.length !== samples)
      throw new RillageError({ code: 'shape', path: `pointwise[${k}]`, expected: `${samples} samples`, received: String(row.length) });
    for (let i = 0; i < samples; i++) {
      if (!Number.isFinite(row[i]))
        throw new RillageError({
          code: 'not-finite',
          path: `pointwise[${k}][${i}]`,
          expected: 'a finite number',
          received: String(row[i]),
        });
    }
  });
}
