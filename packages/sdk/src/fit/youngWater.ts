import { gammaP } from '../numeric/gamma.js';
import { gammaPInverse } from '../numeric/gammaInverse.js';
import type { SeasonalCycle } from './seasonalCycle.js';

/** Share of young water from two seasonal cycles, and the age below which water counts as young. */
export interface SeasonalYoungWater {
  /** Amplitude ratio stream / rain: the young water fraction, 0..1 when the cycles are sound. */
  fraction: number;
  fractionError: number;
  /** How far the stream's cycle lags the rain's, radians, [0, 2π). */
  lag: number;
  lagError: number;
  /** Matching gamma age distribution; null when ratio and lag fit none. */
  match: GammaMatch | null;
  /** `fine`; `ratioAboveOne`: the stream swings more than the rain; `noGamma`: the lag is out of a gamma distribution's reach. */
  verdict: 'fine' | 'ratioAboveOne' | 'noGamma';
}

/**
 * Young water fraction from the seasonal cycles of rain and stream.
 *
 * The ratio's error adds the two relative errors in quadrature (independent fits); the lag's error likewise.
 * @param rain    cycle of the inflow, amount-weighted
 * @param stream  cycle of the stream, flow-weighted for the share of the water, unweighted for the share of the time
 * @param period  of both cycles, in the unit in which ages are wanted; default 365.2425 days
 * @source Kirchner (2016), Hydrol. Earth Syst. Sci. 20:279–297
 */
export function seasonalYoungWater(rain: SeasonalCycle, stream: SeasonalCycle, period = 365.2425): SeasonalYoungWater {
  const fraction = stream.amplitude / rain.amplitude;
  const fractionError = fraction * Math.hypot(stream.amplitudeError / stream.amplitude, rain.amplitudeError / rain.amplitude);
  const lag = (stream.phase - rain.phase + 2 * Math.PI) % (2 * Math.PI);
  const match = matchGamma(fraction, lag, period);
  const verdict = fraction >= 1 ? 'ratioAboveOne' : match === null ? 'noGamma' : 'fine';
  return { fraction, fractionError, lag, lagError: Math.hypot(rain.phaseError, stream.phaseError), match, verdict };
}

/** A gamma age distribution that damps and delays a yearly cycle as observed. */
export interface GammaMatch {
  /** α, dimensionless. */
  shape: number;
  /** β, in the unit of the period; the mean age is α β. */
  scale: number;
  /** Age below which water counts as young, by the published curve 0.0949 + 0.1065 α − 0.0126 α² (in periods). */
  threshold: number;
  /** α lies in the curve's own range, 0.2 to 2. Outside, `threshold` is taken at the nearer end. */
  withinCurve: boolean;
  /** Age younger than which exactly the share `ratio` is, under the matched distribution. */
  exactThreshold: number;
  /** Share younger than `threshold` under the matched distribution. */
  shareAtThreshold: number;
}

/**
 * Gamma distribution with amplitude ratio A = (1 + (ωβ)²)^(−α/2) and lag φ = α atan ωβ.
 *
 * Given A, φ increases with α from 0, so that one α answers; found by bisection to rounding.
 * @param ratio  A, 0 < A < 1
 * @param lag    φ, radians, > 0
 * @returns null if no α between 0.01 and 10 answers
 * @source Kirchner (2016), Hydrol. Earth Syst. Sci. 20:279–297, eqs. 8–11 and 14 (numbers from memory)
 */
export function matchGamma(ratio: number, lag: number, period = 365.2425): GammaMatch | null {
  if (!(ratio > 0 && ratio < 1 && lag > 0)) return null;
  const turn = (shape: number): number => Math.sqrt(Math.expm1((-2 / shape) * Math.log(ratio)));
  const lagOf = (logShape: number): number => Math.exp(logShape) * Math.atan(turn(Math.exp(logShape)));
  let low = Math.log(0.01);
  let high = Math.log(10);
  if (!(lagOf(low) <= lag && lag <= lagOf(high))) return null;
  for (let round = 0; round < 80; round++) {
    const middle = (low + high) / 2;
    if (lagOf(middle) < lag) low = middle;
    else high = middle;
  }
  const shape = Math.exp((low + high) / 2);
  const scale = (turn(shape) / (2 * Math.PI)) * period;
  const threshold = youngThreshold(shape) * period;
  return {
    shape,
    scale,
    threshold,
    // bisection leaves a shape of exactly 0.2 or 2 a rounding away
    withinCurve: shape >= 0.2 - 1e-9 && shape <= 2 + 1e-9,
    exactThreshold: scale * gammaPInverse(shape, ratio),
    shareAtThreshold: gammaP(shape, threshold / scale),
  };
}

/** Threshold age in periods for a gamma shape, held beyond 0.2..2. Source as {@link matchGamma}. */
export function youngThreshold(shape: number): number {
  const held = Math.min(2, Math.max(0.2, shape));
  return 0.0949 + 0.1065 * held - 0.0126 * held * held;
}

/** What an age distribution does to a cycle. */
export interface CycleResponse {
  /** Amplitude out over amplitude in. */
  ratio: number;
  /** Delay, radians, [0, 2π). */
  lag: number;
}

/** Response of a gamma age distribution; `scale` and `period` in the same unit. Source as {@link matchGamma}; the lag is not wrapped. */
export function gammaCycleResponse(shape: number, scale: number, period = 365.2425): CycleResponse {
  const turn = (2 * Math.PI * scale) / period;
  return { ratio: Math.exp((-shape / 2) * Math.log1p(turn * turn)), lag: shape * Math.atan(turn) };
}

/**
 * Response of any age distribution given as a table, ∫ e^(−iωT) dF(T), exact for ages spread evenly between the table's entries.
 *
 * Water beyond the last entry (the pre-record share) counts as wholly damped.
 * @param ageDays       [K] increasing; the first may be above 0, all water below it is then spread evenly from 0
 * @param youngerShare  [K] cumulative share, increasing, ≤ 1
 */
export function cycleResponse(ageDays: ArrayLike<number>, youngerShare: ArrayLike<number>, period = 365.2425): CycleResponse {
  const omega = (2 * Math.PI) / period;
  let real = 0;
  let imaginary = 0;
  for (let k = 0; k < ageDays.length; k++) {
    const from = k === 0 ? 0 : ageDays[k - 1];
    const share = youngerShare[k] - (k === 0 ? 0 : youngerShare[k - 1]);
    const half = (omega * (ageDays[k] - from)) / 2;
    const damped = share * (half === 0 ? 1 : Math.sin(half) / half);
    const middle = omega * (from + (ageDays[k] - from) / 2);
    real += damped * Math.cos(middle);
    imaginary += damped * Math.sin(middle);
  }
  return { ratio: Math.hypot(real, imaginary), lag: (Math.atan2(imaginary, real) + 2 * Math.PI) % (2 * Math.PI) };
}
