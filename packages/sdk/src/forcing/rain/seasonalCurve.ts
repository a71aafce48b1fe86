/** c(t) = mean + cosine · cos ωt + sine · sin ωt, ω = 2π / 365.25 days. */
export interface SeasonalCurve {
  mean: number;
  cosine: number;
  sine: number;
}

const YEAR_DAYS = 365.25;

/**
 * The seasonal curve whose amount-weighted means over intervals fit the bulk values best: weighted least squares of bulk_k on the means of 1, cos, sin.
 * Falls back to the weighted mean (cosine and sine 0) where fewer than six samples or less than half a year leave the season open.
 * @param bulk    [K] concentrations
 * @param weights [K] mm, amounts; samples without rain have no weight
 * @param means   [K] pairs: amount-weighted means of cos ωt and sin ωt over each interval
 * @source weighted linear least squares by the normal equations; conditioning is fine for three bounded columns
 */
export function fitSeasonalCurve(
  bulk: readonly number[],
  weights: readonly number[],
  means: readonly (readonly [number, number])[],
  spanDays: number,
): SeasonalCurve {
  const used = bulk.map((_, index) => index).filter((index) => weights[index] > 0);
  const total = used.reduce((sum, index) => sum + weights[index], 0);
  const mean = total > 0 ? used.reduce((sum, index) => sum + weights[index] * bulk[index], 0) / total : NaN;
  const flat = { mean, cosine: 0, sine: 0 };
  if (used.length < 6 || spanDays < YEAR_DAYS / 2) return flat;
  // About the mean of the data, so that the digits of a small season on a large mean survive.
  const normal = [0, 1, 2].map(() => [0, 0, 0, 0]);
  for (const index of used) {
    const row = [1, means[index][0], means[index][1], bulk[index] - mean];
    for (let i = 0; i < 3; i++) for (let j = 0; j < 4; j++) normal[i][j] += (weights[index] / total) * row[i] * row[j];
  }
  const solved = solve3(normal);
  return solved ? { mean: mean + solved[0], cosine: solved[1], sine: solved[2] } : flat;
}

/** Value of the curve at an instant. */
export function curveAt(curve: SeasonalCurve, ms: number): number {
  const [cosine, sine] = seasonOf(ms);
  return curve.mean + curve.cosine * cosine + curve.sine * sine;
}

export function seasonOf(ms: number): [number, number] {
  const angle = ((2 * Math.PI) / YEAR_DAYS) * (ms / 86_400_000);
  return [Math.cos(angle), Math.sin(angle)];
}

/** Gaussian elimination with pivots of an augmented 3 × 4 system; null where it is singular. */
function solve3(system: number[][]): [number, number, number] | null {
  for (let pivot = 0; pivot < 3; pivot++) {
    let best = pivot;
    for (let row = pivot + 1; row < 3; row++) if (Math.abs(system[row][pivot]) > Math.abs(system[best][pivot])) best = row;
    [system[pivot], system[best]] = [system[best], system[pivot]];
    if (!(Math.abs(system[pivot][pivot]) > 1e-9)) return null;
    for (let row = 0; row < 3; row++) {
      if (row === pivot) continue;
      const factor = system[row][pivot] / system[pivot][pivot];
      for (let column = pivot; column < 4; column++) system[row][column] -= factor * system[pivot][column];
    }
  }
  return [system[0][3] / system[0][0], system[1][3] / system[1][1], system[2][3] / system[2][2]];
}
