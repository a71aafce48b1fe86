/** A generalised Pareto distribution of the excess over a threshold: P(X > x) = (1 + k x/σ)^(−1/k). */
export interface ParetoTail {
  /** k: below 0.5 the variance is finite, below 1 the mean. */
  shape: number;
  /** σ, in the excess's unit. */
  scale: number;
}

/**
 * Generalised Pareto fit of excesses, by the posterior mean of Zhang and Stephens' profile likelihood, with the shape drawn weakly
 * towards 0.5 (as from ten further excesses).
 *
 * @param excesses  [n] increasing, ≥ 0, n ≥ 5
 * @returns shape NaN if the excesses are all equal or the fit is not finite
 * @source Zhang & Stephens (2009), Technometrics 51:316–325; the weak prior: Vehtari, Simpson, Gelman, Yao & Gabry (2024), Journal of
 *   Machine Learning Research 25(72), appendix C (from memory)
 */
export function fitParetoTail(excesses: ArrayLike<number>): ParetoTail {
  const count = excesses.length;
  const greatest = excesses[count - 1];
  const quartile = excesses[Math.floor(count / 4 + 0.5) - 1];
  if (!(greatest > excesses[0]) || !(quartile > 0)) return { shape: NaN, scale: NaN };
  const candidates = 30 + Math.floor(Math.sqrt(count));
  const theta = new Float64Array(candidates);
  const profile = new Float64Array(candidates);
  for (let j = 0; j < candidates; j++) {
    theta[j] = 1 / greatest + (1 - Math.sqrt(candidates / (j + 0.5))) / (3 * quartile);
    const shape = meanLog(excesses, theta[j]);
    profile[j] = count * (Math.log(-theta[j] / shape) - shape - 1);
  }
  const best = Math.max(...profile);
  let total = 0;
  let mean = 0;
  for (let j = 0; j < candidates; j++) {
    const weight = Math.exp(profile[j] - best);
    total += weight;
    mean += weight * theta[j];
  }
  mean /= total;
  const raw = meanLog(excesses, mean);
  const shape = (raw * count + 10 * 0.5) / (count + 10);
  const scale = -raw / mean;
  return Number.isFinite(shape) && scale > 0 ? { shape, scale } : { shape: NaN, scale: NaN };
}

/** The excess exceeded with probability 1 − p: σ ((1 − p)^(−k) − 1)/k, and −σ log(1 − p) at k = 0. */
export function paretoQuantile(tail: ParetoTail, probability: number): number {
  const log = -Math.log1p(-probability);
  return tail.shape === 0 ? tail.scale * log : (tail.scale * Math.expm1(tail.shape * log)) / tail.shape;
}

function meanLog(excesses: ArrayLike<number>, theta: number): number {
  let sum = 0;
  for (let i = 0; i < excesses.length; i++) sum += Math.log1p(-theta * excesses[i]);
  return sum / excesses.length;
}
