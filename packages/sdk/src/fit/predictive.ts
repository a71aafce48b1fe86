import { normalCdf } from '../numeric/normal.js';
import { RillageError } from '../errors.js';

/** How many observations fell into their predictive intervals, beside how many should have. */
export interface Coverage {
  inside: number;
  of: number;
  share: number;
  nominal: number;
  /** [low, high] of `inside` with which intervals that mean what they say are compatible, 95 % of the time and independent errors. */
  expected: [number, number];
  verdict: 'asStated' | 'tooNarrow' | 'tooWide';
}

/**
 * Coverage of predictive intervals.
 * @param observed  [N]
 * @param low       [N] lower end of each interval (inclusive)
 * @param high      [N] upper end
 * @param nominal   what the intervals claim, 0..1
 * @returns the count with the range that chance allows; errors that persist from sample to sample widen that range, so that a verdict
 *   other than `asStated` is firm only where the residuals' autocorrelation is small
 * @throws RillageError 'shape' if lengths differ
 */
export function intervalCoverage(observed: ArrayLike<number>, low: ArrayLike<number>, high: ArrayLike<number>, nominal: number): Coverage {
  const count = observed.length;
  if (low.length !== count || high.length !== count) {
    throw new RillageError({ code: 'shape', expected: `${count} interval ends`, received: `${low.length} and ${high.length}` });
  }
  let inside = 0;
  for (let i = 0; i < count; i++) if (observed[i] >= low[i] && observed[i] <= high[i]) inside++;
  const expected = binomialRange(count, nominal);
  const verdict = inside < expected[0] ? 'tooNarrow' : inside > expected[1] ? 'tooWide' : 'asStated';
  return { inside, of: count, share: inside / count, nominal, expected, verdict };
}

/**
 * Central range of a binomial count: the smallest k with P(K ≤ k) ≥ (1 − level)/2, and with P(K ≤ k) ≥ (1 + level)/2.
 * @param count        trials, a whole number
 * @param probability  0..1
 * @returns counts; cost ∝ count. Checked against a general library, test/checks/metrics.json
 */
export function binomialRange(count: number, probability: number, level = 0.95): [number, number] {
  if (probability <= 0) return [0, 0];
  if (probability >= 1) return [count, count];
  const ends: [number, number] = [count, count];
  const tails = [(1 - level) / 2, (1 + level) / 2];
  const odds = Math.log(probability) - Math.log1p(-probability);
  let logMass = count * Math.log1p(-probability);
  let cumulative = 0;
  let found = 0;
  for (let k = 0; k <= count && found < 2; k++) {
    cumulative += Math.exp(logMass);
    while (found < 2 && cumulative >= tails[found]) ends[found++] = k;
    logMass += Math.log((count - k) / (k + 1)) + odds;
  }
  return ends;
}

/**
 * Continuous ranked probability score of a normal prediction, σ [ z (2Φ(z) − 1) + 2φ(z) − 1/√π ], z = (y − μ)/σ.
 * @returns in the observation's unit, ≥ 0, smaller is better; |y − μ| when sd is 0
 * @source Gneiting & Raftery (2007), Journal of the American Statistical Association 102:359–378, eq. 21 (number from memory)
 */
export function crpsNormal(observed: number, mean: number, sd: number): number {
  if (sd === 0) return Math.abs(observed - mean);
  const z = (observed - mean) / sd;
  const density = Math.exp(-0.5 * z * z) / Math.sqrt(2 * Math.PI);
  return sd * (z * (2 * normalCdf(z) - 1) + 2 * density - 1 / Math.sqrt(Math.PI));
}

/**
 * Continuous ranked probability score of an ensemble, mean|x_i − y| − ½ mean|x_i − x_j|.
 *
 * With `fair` the second mean leaves out i = j (divisor m(m − 1)), so that ensembles of different size can be compared.
 * @param members  [m] in any order; cost m log m
 * @returns in the observation's unit; NaN without members, or of one member when `fair`
 * @source Gneiting & Raftery (2007), eq. 21 ff.; fair form: Ferro (2014), Q. J. R. Meteorol. Soc. 140:1917–1923 (from memory)
 */
export function crpsEnsemble(observed: number, members: ArrayLike<number>, options: { fair?: boolean } = {}): number {
  const sorted = Float64Array.from(members).sort();
  const count = sorted.length;
  let distance = 0;
  let spread = 0;
  for (let i = 0; i < count; i++) {
    distance += Math.abs(sorted[i] - observed);
    spread += (2 * i + 1 - count) * sorted[i];
  }
  // Σ_ij |x_i − x_j| = 2 Σ_i (2i + 1 − m) x_(i) with i from 0
  return distance / count - spread / (count * (options.fair ? count - 1 : count));
}

/**
 * Autocorrelation r(k) = Σ (x_i − x̄)(x_{i+k} − x̄) / Σ (x_i − x̄)², the lag counted in samples, not days.
 * @returns [maxLag + 1], the first being 1; NaN throughout for a constant series
 */
export function autocorrelation(values: ArrayLike<number>, maxLag: number): Float64Array {
  const count = values.length;
  let mean = 0;
  for (let i = 0; i < count; i++) mean += values[i] / count;
  const result = new Float64Array(maxLag + 1);
  for (let lag = 0; lag <= maxLag; lag++) {
    for (let i = 0; i + lag < count; i++) result[lag] += (values[i] - mean) * (values[i + lag] - mean);
  }
  const total = result[0];
  return result.map((sum) => (total > 0 ? sum / total : NaN));
}
