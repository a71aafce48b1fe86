import type { Finding, Forcing, Sample } from '../../contract.js';
import { RillageError } from '../../errors.js';
import { Random } from '../../numeric/random.js';
import { convert } from '../../units/convert.js';
import type { RainConcentrationRule } from '../layout.js';
import { curveAt, fitSeasonalCurve, seasonOf, type SeasonalCurve } from './seasonalCurve.js';

export interface RainFillOptions extends Partial<RainConcentrationRule> {
  tracer: string;
  /** Unit of the result; default that of the first sample. */
  unit?: string;
}

export interface RainFill {
  /** [N] concentration of each step's rain; NaN on steps without rain that nothing covers. */
  concentration: Float64Array;
  /** [N] standard error of the same, for the fit: laboratory error and the day's scatter about its bulk sample. */
  error: Float64Array;
  unit: string;
  /** The season found in the samples; flat where they do not show one. */
  season: SeasonalCurve;
  findings: Finding[];
}

interface Interval {
  value: number;
  error: number;
  /** Steps whose middle lies in it: [first, end). */
  first: number;
  end: number;
  /** mm/day summed over them. */
  amount: number;
  /** (Σ J)² / Σ J²: how many equal days of rain it amounts to. */
  rainDays: number;
}

/**
 * Daily concentration of rain from bulk samples. Under every rule the amount-weighted mean over a sample's steps is the sample's value (to round-off).
 * `bulkConstant`: the sample's value on each of its steps.
 * `seasonalPlusResidual`: the seasonal curve plus the sample's difference from the curve's amount-weighted mean.
 * `randomRedistribution`: the same plus seeded normal scatter, of the size that the samples' scatter about the season implies for single days.
 * Steps that no sample covers follow `uncovered`. A step belongs to the sample in which its middle lies.
 * Scatter of a day: s² = mean of r_k² n_k over samples, r_k residual, n_k equal days of rain; the day's variance about its bulk value is s² (1 − 1/n_k).
 * @param forcing its `start`, `stepDays` and `inflow` [N] mm/day are used (hand over precipitation where snow holds it back)
 * @throws RillageError 'no-samples' | 'intervals-overlap' | 'concentration-missing' | 'unit-unknown' | 'unit-mismatch'
 * @source own derivation: the variance of an amount-weighted mean of independent days
 */
export function fillRainConcentration(
  forcing: Pick<Forcing, 'start' | 'stepDays' | 'inflow'>,
  samples: readonly Sample[],
  options: RainFillOptions,
): RainFill {
  const { tracer, rule = 'bulkConstant', uncovered = 'stop', seed = 1 } = options;
  const startMs = Date.parse(forcing.start);
  const stepMs = forcing.stepDays * 86_400_000;
  const middle = (step: number): number => startMs + (step + 0.5) * stepMs;
  const mine = samples.filter((sample) => sample.tracer === tracer && sample.censored !== 'above');
  if (mine.length === 0)
    throw new RillageError({ code: 'no-samples', path: tracer, expected: 'at least one bulk sample of rain', received: 'none' });
  const unit = options.unit ?? mine[0].unit;
  const intervals = intervalsOf(mine, unit, forcing.inflow, startMs, stepMs);
  const season = seasonOfSamples(intervals, forcing.inflow, middle, stepMs);
  const count = forcing.inflow.length;
  const concentration = new Float64Array(count).fill(NaN);
  const error = new Float64Array(count).fill(NaN);
  const random = rule === 'randomRedistribution' ? Random.fromSeed(seed) : null;
  for (const interval of intervals) {
    const spread = season.daily ** 2 * (1 - 1 / Math.max(1, interval.rainDays));
    fillOne(concentration, interval, forcing.inflow, rule, (step) => curveAt(season.curve, middle(step)), random, season.daily, unit);
    error.fill(Math.sqrt(interval.error ** 2 + (rule === 'randomRedistribution' ? 0 : spread)), interval.first, interval.end);
  }
  const findings = fillUncovered(concentration, error, forcing, uncovered, season, tracer, middle);
  if (mine.some(({ censored }) => censored === 'below')) {
    findings.push({
      code: 'below-detection',
      severity: 'warning',
      where: tracer,
      count: mine.filter(({ censored }) => censored === 'below').length,
      seen: 'rain samples below the detection limit',
      done: 'taken as half of it, with half of it as their error',
    });
  }
  return { concentration, error, unit, season: season.curve, findings };
}

function intervalsOf(samples: readonly Sample[], unit: string, inflow: Float64Array, startMs: number, stepMs: number): Interval[] {
  const stepAfter = (iso: string): number =>
    Math.min(inflow.length, Math.max(0, Math.ceil((Date.parse(iso) - startMs) / stepMs - 0.5 - 1e-9)));
  const sorted = [...samples].sort((a, b) => Date.parse(a.from) - Date.parse(b.from));
  return sorted.map((sample, index) => {
    if (index > 0 && Date.parse(sorted[index - 1].to) > Date.parse(sample.from)) {
      throw new RillageError({
        code: 'intervals-overlap',
        path: sample.tracer,
        expected: 'bulk samples one after the other',
        received: `${sample.from} before ${sorted[index - 1].to}`,
      });
    }
    const limit = convert(sample.value, sample.unit, unit);
    const value = sample.censored === 'below' ? limit / 2 : limit;
    const stated = sample.error === undefined ? 0 : Math.abs(convert(sample.error, sample.unit, unit) - convert(0, sample.unit, unit));
    const [first, end] = [stepAfter(sample.from), stepAfter(sample.to)];
    let amount = 0;
    let squares = 0;
    for (let step = first; step < end; step++) {
      amount += inflow[step];
      squares += inflow[step] ** 2;
    }
    return {
      value,
      error: sample.censored === 'below' ? Math.abs(limit) / 2 : stated,
      first,
      end,
      amount,
      rainDays: squares > 0 ? amount ** 2 / squares : 0,
    };
  });
}

interface Season {
  curve: SeasonalCurve;
  /** Standard deviation of single days about the curve. */
  daily: number;
  weightedMean: number;
}

function seasonOfSamples(intervals: readonly Interval[], inflow: Float64Array, middle: (step: number) => number, stepMs: number): Season {
  const means = intervals.map(({ first, end, amount }): [number, number] => {
    let cosine = 0;
    let sine = 0;
    for (let step = first; step < end && amount > 0; step++) {
      const [c, s] = seasonOf(middle(step));
      cosine += (c * inflow[step]) / amount;
      sine += (s * inflow[step]) / amount;
    }
    return [cosine, sine];
  });
  const bulk = intervals.map(({ value }) => value);
  const weights = intervals.map(({ amount }) => amount);
  const span = intervals.length > 0 ? ((intervals[intervals.length - 1].end - intervals[0].first) * stepMs) / 86_400_000 : 0;
  const fitted = fitSeasonalCurve(bulk, weights, means, span);
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  const plainMean = bulk.reduce((sum, value) => sum + value, 0) / bulk.length;
  const weightedMean = total > 0 ? bulk.reduce((sum, value, index) => sum + value * weights[index], 0) / total : plainMean;
  const curve = total > 0 ? fitted : { mean: plainMean, cosine: 0, sine: 0 };
  let squares = 0;
  let used = 0;
  intervals.forEach(({ value, amount, rainDays }, index) => {
    if (amount === 0) return;
    squares += (value - curve.mean - curve.cosine * means[index][0] - curve.sine * means[index][1]) ** 2 * rainDays;
    used += 1;
  });
  const fittedNumbers = curve.cosine === 0 && curve.sine === 0 ? 1 : 3;
  return { curve, daily: used > fittedNumbers ? Math.sqrt(squares / (used - fittedNumbers)) : 0, weightedMean };
}

function fillOne(
  concentration: Float64Array,
  { value, first, end, amount }: Interval,
  inflow: Float64Array,
  rule: RainConcentrationRule['rule'],
  seasonal: (step: number) => number,
  random: Random | null,
  daily: number,
  unit: string,
): void {
  concentration.fill(value, first, end);
  if (rule === 'bulkConstant' || amount === 0) return;
  const deviation = new Float64Array(end - first);
  let mean = 0;
  for (let step = first; step < end; step++) {
    deviation[step - first] = seasonal(step) + (random ? daily * random.normal() : 0);
    mean += (deviation[step - first] * inflow[step]) / amount;
  }
  // Nothing but a delta value may be negative: the deviations shrink together, which keeps their mean at zero.
  let shrink = 1;
  for (let step = first; step < end; step++) {
    deviation[step - first] -= mean;
    const lowest = value + deviation[step - first];
    if (!isDelta(unit) && inflow[step] > 0 && lowest < 0) shrink = Math.min(shrink, Math.max(0, value) / -deviation[step - first]);
  }
  for (let step = first; step < end; step++) concentration[step] = value + shrink * deviation[step - first];
}

function isDelta(unit: string): boolean {
  return /ppth|permil|per-mil|‰|o\/oo/i.test(unit);
}

function fillUncovered(
  concentration: Float64Array,
  error: Float64Array,
  forcing: Pick<Forcing, 'start' | 'inflow'>,
  uncovered: RainConcentrationRule['uncovered'],
  season: Season,
  tracer: string,
  middle: (step: number) => number,
): Finding[] {
  const open: number[] = [];
  for (let step = 0; step < concentration.length; step++)
    if (Number.isNaN(concentration[step]) && forcing.inflow[step] > 0) open.push(step);
  if (open.length === 0) return [];
  if (uncovered === 'stop') {
    throw new RillageError({
      code: 'concentration-missing',
      path: tracer,
      step: open[0],
      expected: 'a rain sample for every step with rain',
      received: `${open.length} steps with rain and without one, the first on ${new Date(middle(open[0])).toISOString().slice(0, 10)}`,
      hint: 'Set rainConcentration.uncovered to amountWeightedMean or seasonalCurve, or shorten the record.',
    });
  }
  for (const step of open) {
    concentration[step] = uncovered === 'seasonalCurve' ? curveAt(season.curve, middle(step)) : season.weightedMean;
    error[step] = season.daily;
  }
  return [
    {
      code: 'rain-uncovered',
      severity: 'warning',
      where: tracer,
      count: open.length,
      seen: `${open.length} steps with rain that no sample covers, the first on ${new Date(middle(open[0])).toISOString().slice(0, 10)}`,
      done: `filled by the rule ${uncovered}`,
      settle: 'Bring the samples, or choose another rule in rainConcentration.uncovered.',
    },
  ];
}
