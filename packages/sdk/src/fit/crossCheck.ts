import type { Forcing, TracerRule } from '../contract.js';
import { RillageError } from '../errors.js';
import { quantileSorted } from '../numeric/quantile.js';
import type { Quantiles } from './fit.js';
import type { CheckedProblem } from './problem.js';
import { windowOf } from './sampleWindow.js';
import { fitSeasonalCycle, type SeasonalCycle } from './seasonalCycle.js';
import { seasonalYoungWater, youngThreshold, type SeasonalYoungWater } from './youngWater.js';

/** The young water fraction from a tracer's seasonal cycle beside the fitted share younger than its matching age. */
export interface CrossCheck {
  tracer: string;
  /** Age below which the water counts as young, matched to damping and lag of the cycle. */
  days: number;
  /** Weighted by flow: a share of the water. */
  byFlow: Comparison;
  /** Unweighted: a mean of the daily shares. */
  byTime: Comparison;
  agrees: boolean;
}

export interface Comparison {
  seasonal: number;
  /** Standard error. */
  seasonalError: number;
  fitted: Quantiles;
  agrees: boolean;
}

export interface YoungThreshold {
  tracer: string;
  days: number;
  byFlow: SeasonalYoungWater;
  byTime: SeasonalYoungWater;
}

/** Fewest samples and shortest span, days, for a cycle to be worth a second opinion. Judgement. */
const FEWEST = 20;
const SHORTEST = 500;
/** Rain is averaged over so many days, so that one bulk sample is not counted as many. */
const RAIN_DAYS = 14;
/** How far the method itself is off on catchments whose ages vary (Kirchner 2016, second paper; from memory). */
const METHOD_ERROR = 0.05;
const YEAR = 365.2425;

/** By tracer that rides on the water unchanged and shows a season in rain and stream: its fraction and threshold age. */
export function youngThresholds({ problem, samples, alternatives }: CheckedProblem): YoungThreshold[] {
  const { forcing } = alternatives[0];
  const rules = (problem.catchment.tracers ?? {}) as Record<string, TracerRule>;
  return [...new Set(samples.map(({ tracer }) => tracer))].flatMap((tracer) => {
    if (!ridesUnchanged(rules[tracer])) return [];
    const own = samples.filter((sample) => sample.tracer === tracer && sample.censored === undefined);
    const times = own.map(({ from, to }) => (Date.parse(from) + Date.parse(to)) / 2 / 86_400_000);
    if (own.length < FEWEST || times[times.length - 1] - times[0] < SHORTEST) return [];
    const flow = own.map((sample) => {
      const { first, weights } = windowOf(sample, forcing);
      return weights.reduce((sum, weight, k) => sum + weight * forcing.outflows[sample.of ?? 'discharge'][first + k], 0);
    });
    const values = own.map(({ value }) => value);
    const rain = rainCycle(forcing, tracer);
    const weighted = cycleOf(times, values, flow);
    const plain = cycleOf(times, values, undefined);
    if (rain === null || weighted === null || plain === null || rain.amplitude < 3 * rain.amplitudeError) return [];
    const byFlow = seasonalYoungWater(rain, weighted);
    const byTime = seasonalYoungWater(rain, plain);
    if (byFlow.verdict === 'ratioAboveOne') return [];
    return [{ tracer, days: byFlow.match?.threshold ?? youngThreshold(1) * YEAR, byFlow, byTime }];
  });
}

/**
 * @param fitted  by draw, in the order of `thresholds`: share younger than each, by flow and by time
 * @source the fraction and its threshold: Kirchner (2016), Hydrol. Earth Syst. Sci. 20:279–297. Agreement is judged here: within two
 *   joint standard errors plus 0.05
 */
export function crossChecks(
  thresholds: readonly YoungThreshold[],
  fitted: readonly { byFlow: number[]; byTime: number[] }[],
): CrossCheck[] {
  if (fitted.length === 0) return [];
  return thresholds.map(({ tracer, days, byFlow, byTime }, t) => {
    const flow = compare(
      byFlow,
      fitted.map((draw) => draw.byFlow[t]),
    );
    const time = compare(
      byTime,
      fitted.map((draw) => draw.byTime[t]),
    );
    return { tracer, days, byFlow: flow, byTime: time, agrees: flow.agrees && time.agrees };
  });
}

function compare({ fraction, fractionError }: SeasonalYoungWater, values: number[]): Comparison {
  const sorted = Float64Array.from(values).sort();
  const ends: Quantiles = [quantileSorted(sorted, 0.05), quantileSorted(sorted, 0.5), quantileSorted(sorted, 0.95)];
  const sd = (ends[2] - ends[0]) / 3.29;
  const agrees = Math.abs(fraction - ends[1]) <= 2 * Math.hypot(fractionError, sd) + METHOD_ERROR;
  return { seasonal: fraction, seasonalError: fractionError, fitted: ends, agrees };
}

/** No decay, no reaction, no outflow that leaves it behind: then its cycle is damped by ages alone. */
function ridesUnchanged(rule: TracerRule | undefined): boolean {
  if (rule === undefined || rule.equilibrium !== undefined || (rule.decayPerDay ?? 0) !== 0) return false;
  return Object.values(rule.carriedShare ?? {}).every((share) => share === 1);
}

function rainCycle(forcing: Forcing, tracer: string): SeasonalCycle | null {
  const { inflow, stepDays } = forcing;
  const input = forcing.inflowConcentration[tracer];
  const start = Date.parse(forcing.start) / 86_400_000;
  const together = Math.max(1, Math.round(RAIN_DAYS / stepDays));
  const times: number[] = [];
  const values: number[] = [];
  const amounts: number[] = [];
  for (let first = 0; first < inflow.length; first += together) {
    let amount = 0;
    let mass = 0;
    let moment = 0;
    for (let k = first; k < Math.min(first + together, inflow.length); k++) {
      if (!(inflow[k] > 0)) continue;
      amount += inflow[k];
      mass += inflow[k] * input[k];
      moment += inflow[k] * (k + 0.5) * stepDays;
    }
    if (!(amount > 0)) continue;
    times.push(start + moment / amount);
    values.push(mass / amount);
    amounts.push(amount);
  }
  return cycleOf(times, values, amounts);
}

function cycleOf(times: number[], values: number[], weights: number[] | undefined): SeasonalCycle | null {
  try {
    return fitSeasonalCycle(times, values, weights === undefined ? {} : { weights });
  } catch (error) {
    if (error instanceof RillageError) return null;
    throw error;
  }
}
