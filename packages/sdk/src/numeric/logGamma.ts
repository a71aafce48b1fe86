const HALF_LOG_TWO_PI = 0.9189385332046727;

/** From here up seven terms of Stirling's series leave less than 1e-16. */
const SERIES_FROM = 10;

/**
 * Natural logarithm of the gamma function, ln Γ(x), for x > 0.
 *
 * Stirling's series at x ≥ 10; below that the argument is raised by Γ(x+1) = x·Γ(x). The error is about 3e-15 absolute or
 * 5e-16 relative, whichever is larger; near the zeros at 1 and 2 use {@link logGammaOnePlus} if the relative error matters.
 *
 * @param x dimensionless
 * @returns ln Γ(x); NaN unless x > 0
 * @source DLMF 5.11.1 and 5.5.1 (equation numbers from memory)
 */
export function logGamma(x: number): number {
  if (!(x > 0)) return NaN;
  if (x === Infinity) return Infinity;
  let product = 1;
  let z = x;
  while (z < SERIES_FROM) product *= z++;
  return (z - 0.5) * Math.log(z) - z + HALF_LOG_TWO_PI + stirlingSeries(z) - (product === 1 ? 0 : Math.log(product));
}

/**
 * ln Γ(1 + x) with a small relative error also as x → 0, where {@link logGamma} only has a small absolute one.
 *
 * @param x dimensionless, x > −1
 * @returns ln Γ(1 + x); NaN unless x > −1
 * @source DLMF 5.7.3: −γx + Σ ζ(k)(−x)^k / k (equation number from memory)
 */
export function logGammaOnePlus(x: number): number {
  if (Math.abs(x) > 0.01) return logGamma(1 + x);
  const zeta2 = (Math.PI * Math.PI) / 6;
  const zeta4 = 1.0823232337111382;
  const zeta6 = 1.0173430619844491;
  const tail = zeta4 / 4 - x * (1.03692775514337 / 5 - x * (zeta6 / 6 - x * (1.008349277381923 / 7)));
  return -x * (0.5772156649015329 - x * (zeta2 / 2 - x * (1.2020569031595942 / 3 - x * tail)));
}

/**
 * What Stirling's approximation leaves out: s(z) in Γ(z) = √(2π/z)·(z/e)^z·e^s(z).
 *
 * @param z dimensionless, z > 0
 * @returns s(z), between 0 and +∞, ≈ 1/(12z) for large z; NaN unless z > 0
 */
export function stirlingRemainder(z: number): number {
  return z >= SERIES_FROM ? stirlingSeries(z) : logGamma(z) - (z - 0.5) * Math.log(z) + z - HALF_LOG_TWO_PI;
}

/**
 * k·φ(m/k) with φ(λ) = λ − 1 − ln λ, that is m − k − k·ln(m/k): how unlikely m is where k is expected, without the cancellation
 * at m ≈ k.
 *
 * @param k dimensionless, k > 0
 * @param m same unit, m ≥ 0
 * @returns a number ≥ 0; +∞ at m = 0
 * @source C. Loader 2000, "Fast and accurate computation of binomial probabilities" (from memory)
 */
export function deviance(k: number, m: number): number {
  const difference = m - k;
  const s = difference / (m + k);
  if (Math.abs(s) > 0.2) return difference - k * Math.log(m / k);
  // φ = μ − 2·atanh(s) with s = μ/(2 + μ), and μ − 2s = μ·s exactly, so that only small terms are added.
  const square = s * s;
  let power = s * square;
  let sum = power / 3;
  for (let n = 5; n < 30; n += 2) {
    power *= square;
    const next = sum + power / n;
    if (next === sum) break;
    sum = next;
  }
  return difference * s - 2 * k * sum;
}

function stirlingSeries(z: number): number {
  const w = 1 / (z * z);
  return (1 / 12 - w * (1 / 360 - w * (1 / 1260 - w * (1 / 1680 - w * (1 / 1188 - w * (691 / 360360 - w / 156)))))) / z;
}
