import { RillageError } from '../errors.js';

/** How a simulated series compares with an observed one. Fields are those of the functions below. */
export interface Scores {
  count: number;
  rmse: number;
  mae: number;
  bias: number;
  nse: number;
  logNse: number;
  kge2009: number;
  kge2012: number;
}

/** All of the below at once. @throws RillageError 'shape' if the lengths differ */
export function scoreSeries(observed: ArrayLike<number>, simulated: ArrayLike<number>): Scores {
  return {
    count: observed.length,
    rmse: rootMeanSquareError(observed, simulated),
    mae: meanAbsoluteError(observed, simulated),
    bias: bias(observed, simulated),
    nse: nashSutcliffe(observed, simulated),
    logNse: logNashSutcliffe(observed, simulated),
    kge2009: klingGupta2009(observed, simulated),
    kge2012: klingGupta2012(observed, simulated),
  };
}

/** √mean((s − o)²), in the series' unit; NaN if a value is NaN or there are none. @throws RillageError 'shape' */
export function rootMeanSquareError(observed: ArrayLike<number>, simulated: ArrayLike<number>): number {
  return Math.sqrt(meanOfPairs(observed, simulated, (o, s) => (s - o) ** 2));
}

/** mean(|s − o|), in the series' unit; NaN if a value is NaN or there are none. @throws RillageError 'shape' */
export function meanAbsoluteError(observed: ArrayLike<number>, simulated: ArrayLike<number>): number {
  return meanOfPairs(observed, simulated, (o, s) => Math.abs(s - o));
}

/** mean(s − o), in the series' unit: positive when the simulation is too high. @throws RillageError 'shape' */
export function bias(observed: ArrayLike<number>, simulated: ArrayLike<number>): number {
  return meanOfPairs(observed, simulated, (o, s) => s - o);
}

/**
 * NSE = 1 − Σ(s − o)² / Σ(o − ō)²
 * @returns dimensionless, ≤ 1; 0 is as good as the observed mean; NaN when the observations are constant, absent or NaN
 * @throws RillageError 'shape' if the lengths differ
 * @source Nash & Sutcliffe (1970), Journal of Hydrology 10:282–290
 */
export function nashSutcliffe(observed: ArrayLike<number>, simulated: ArrayLike<number>): number {
  const { observedMean, observedVariance } = moments(observed, simulated);
  return observedVariance > spreadFloor(observedMean)
    ? 1 - meanOfPairs(observed, simulated, (o, s) => (s - o) ** 2) / observedVariance
    : NaN;
}

/** NSE of the logarithms; NaN where a value is not positive (isotope deltas, for one). Otherwise as {@link nashSutcliffe}. */
export function logNashSutcliffe(observed: ArrayLike<number>, simulated: ArrayLike<number>): number {
  sameLength(observed, simulated);
  const log = (x: number): number => (x > 0 ? Math.log(x) : NaN);
  return nashSutcliffe(Float64Array.from(observed, log), Float64Array.from(simulated, log));
}

/**
 * KGE = 1 − √((r − 1)² + (α − 1)² + (β − 1)²),  α = σ_s/σ_o,  β = s̄/ō
 *
 * r of a constant simulation is taken as 0 (its covariance), which gives the observed mean the value 1 − √2. Means near 0 make β, and
 * so the score, meaningless: isotope deltas need care.
 * @returns dimensionless, ≤ 1; NaN when the observations are constant, have mean 0, are absent or NaN
 * @throws RillageError 'shape' if the lengths differ
 * @source Gupta, Kling, Yilmaz & Martinez (2009), Journal of Hydrology 377:80–91
 */
export function klingGupta2009(observed: ArrayLike<number>, simulated: ArrayLike<number>): number {
  const m = moments(observed, simulated);
  return efficiency(m, Math.sqrt(m.simulatedVariance / m.observedVariance));
}

/**
 * As {@link klingGupta2009} with γ = (σ_s/s̄)/(σ_o/ō) in place of α, so that a bias does not count twice.
 * @source Kling, Fuchs & Paulin (2012), Journal of Hydrology 424–425:264–277
 */
export function klingGupta2012(observed: ArrayLike<number>, simulated: ArrayLike<number>): number {
  const m = moments(observed, simulated);
  return efficiency(m, Math.sqrt(m.simulatedVariance / m.observedVariance) * (m.observedMean / m.simulatedMean));
}

function efficiency(m: Moments, spreadRatio: number): number {
  if (!(m.observedVariance > spreadFloor(m.observedMean)) || m.observedMean === 0) return NaN;
  const correlation =
    m.simulatedVariance > spreadFloor(m.simulatedMean) ? m.covariance / Math.sqrt(m.observedVariance * m.simulatedVariance) : 0;
  return 1 - Math.hypot(correlation - 1, spreadRatio - 1, m.simulatedMean / m.observedMean - 1);
}

/** A variance below this is rounding of a constant series: (4 ε · mean)². */
function spreadFloor(mean: number): number {
  return (4 * Number.EPSILON * mean) ** 2;
}

interface Moments {
  observedMean: number;
  simulatedMean: number;
  observedVariance: number;
  simulatedVariance: number;
  covariance: number;
}

function moments(observed: ArrayLike<number>, simulated: ArrayLike<number>): Moments {
  const observedMean = meanOfPairs(observed, simulated, (o) => o);
  const simulatedMean = meanOfPairs(observed, simulated, (_, s) => s);
  return {
    observedMean,
    simulatedMean,
    observedVariance: meanOfPairs(observed, simulated, (o) => (o - observedMean) ** 2),
    simulatedVariance: meanOfPairs(observed, simulated, (_, s) => (s - simulatedMean) ** 2),
    covariance: meanOfPairs(observed, simulated, (o, s) => (o - observedMean) * (s - simulatedMean)),
  };
}

function meanOfPairs(observed: ArrayLike<number>, simulated: ArrayLike<number>, term: (o: number, s: number) => number): number {
  sameLength(observed, simulated);
  let sum = 0;
  for (let i = 0; i < observed.length; i++) sum += term(observed[i], simulated[i]);
  return sum / observed.length;
}

function sameLength(observed: ArrayLike<number>, simulated: ArrayLike<number>): void {
  if (observed.length === simulated.length) return;
  throw new RillageError({ code: 'shape', path: 'simulated', expected: `${observed.length} values`, received: String(simulated.length) });
}
