/**
 * Effective sample size of several chains: how many independent draws would give the mean as closely.
 *
 *     ESS = m n / τ,  τ = −1 + 2 Σ ρ̂(t) over Geyer's initial monotone sequence,  ρ̂(t) = 1 − (W − γ̄(t)) / var⁺
 *
 * with γ̄(t) the chains' mean autocovariance (divisor n), W the mean variance within and var⁺ = W (n−1)/n + variance of the means.
 * Autocovariances are formed lag by lag and only as far as the sequence stays positive, so that the cost is draws × truncation lag.
 *
 * @param chains  m chains of n draws each (n ≥ 4), in the order drawn
 * @returns draws; NaN if a draw is not finite or if no chain moves. Never above m n log₁₀(m n), the bound for antithetic chains
 * @source Vehtari, Gelman, Simpson, Carpenter & Bürkner (2021), Bayesian Analysis 16:667–718, eqs. 10–13 (numbers from memory);
 *   Geyer (1992), Statistical Science 7:473–483. Reference values in test/checks/chainDiagnostics.json
 */
export function effectiveSize(chains: readonly ArrayLike<number>[]): number {
  const count = chains.length;
  const length = chains[0]?.length ?? 0;
  if (count === 0 || length < 4) return NaN;
  const centred = chains.map(centre);
  if (centred.some((chain) => chain === null)) return NaN;
  const deviations = centred as { mean: number; values: Float64Array }[];

  const covariance = (lag: number): number => {
    let sum = 0;
    for (const { values } of deviations) {
      let chainSum = 0;
      for (let i = 0; i + lag < length; i++) chainSum += values[i] * values[i + lag];
      sum += chainSum / length;
    }
    return sum / count;
  };

  const within = (covariance(0) * length) / (length - 1);
  if (!(within > 0)) return NaN;
  const pooled = (within * (length - 1)) / length + (count > 1 ? varianceOf(deviations.map((chain) => chain.mean)) : 0);
  const correlation = (lag: number): number => 1 - (within - covariance(lag)) / pooled;
  const total = count * length;
  return total / Math.max(correlationTime(correlation, length), 1 / Math.log10(total));
}

/** τ by the initial positive, then initial monotone, sequence of pair sums ρ(2k) + ρ(2k+1). */
function correlationTime(correlation: (lag: number) => number, length: number): number {
  const rho = new Float64Array(length);
  let even = 1;
  let odd = correlation(1);
  rho[0] = even;
  rho[1] = odd;
  let lag = 0;
  while (lag < length - 5 && even + odd > 0) {
    lag += 2;
    even = correlation(lag);
    odd = correlation(lag + 1);
    if (even + odd >= 0) {
      rho[lag] = even;
      rho[lag + 1] = odd;
    }
  }
  const last = lag;
  if (even > 0) rho[last] = even;
  for (let k = 2; k <= last - 2; k += 2) {
    const before = rho[k - 2] + rho[k - 1];
    if (rho[k] + rho[k + 1] > before) rho[k] = rho[k + 1] = before / 2;
  }
  let sum = 0;
  for (let k = 0; k < last; k++) sum += rho[k];
  return -1 + 2 * sum + rho[last];
}

function centre(chain: ArrayLike<number>): { mean: number; values: Float64Array } | null {
  const values = Float64Array.from(chain);
  let sum = 0;
  for (const value of values) sum += value;
  if (!Number.isFinite(sum)) return null;
  const mean = sum / values.length;
  for (let i = 0; i < values.length; i++) values[i] -= mean;
  return { mean, values };
}

/** Sample variance, divisor n − 1. */
export function varianceOf(values: ArrayLike<number>): number {
  const count = values.length;
  let mean = 0;
  for (let i = 0; i < count; i++) mean += values[i] / count;
  let sum = 0;
  for (let i = 0; i < count; i++) sum += (values[i] - mean) ** 2;
  return sum / (count - 1);
}
