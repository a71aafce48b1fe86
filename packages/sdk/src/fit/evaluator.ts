import { runColumn } from '../column/index.js';
import { Random } from '../numeric/random.js';
import { filled } from './alternatives.js';
import type { Evaluation, FitModel } from './model.js';
import { meanOver } from './sampleWindow.js';

/** Ages of one draw's run: today's (the last step with flow), and over the record. */
export interface DrawAges {
  /** By age limit: share of today's discharge known to be younger. */
  younger: number[];
  /** Flow-weighted over the record, and the plain mean over its steps. */
  youngerByFlow: number[];
  youngerByTime: number[];
  medianDays: number;
  beyondRecord: boolean;
  preRecordShare: number;
}

/** Where points are evaluated: in this thread or in any number of workers, with the same answers in the same order. */
export interface Evaluator {
  evaluate(points: number[][], alternative: number): Promise<Evaluation[]>;
  /** See {@link redistributed}. */
  redistribute(point: number[], seeds: number[], alternative: number): Promise<Float64Array[]>;
  /** See {@link agesOf}. */
  ages(points: number[][], limits: number[], alternative: number): Promise<DrawAges[]>;
}

/** Everything at once on this thread. */
export function directEvaluator(models: readonly FitModel[]): Evaluator {
  return {
    evaluate: async (points, alternative) => points.map((point) => models[alternative].evaluate(point)),
    redistribute: async (point, seeds, alternative) => seeds.map((seed) => redistributed(models[alternative], point, seed)),
    ages: async (points, limits, alternative) => points.map((point) => agesOf(models[alternative], point, limits)),
  };
}

/**
 * What the stream samples would have been under another possible rain: each bulk value moved by its laboratory's error, and each bulk
 * sample's rain shared out at random over its days, the same way for every tracer, as events mark them all.
 * @returns [samples] without the stream's own laboratory errors; NaN where nothing flowed
 */
export function redistributed(model: FitModel, point: ArrayLike<number>, seed: number): Float64Array {
  const { problem, alternatives } = model.checked;
  const random = Random.fromSeed(seed).split('rain');
  const rain = (problem.rainSamples ?? []).map((sample) => ({ ...sample, value: sample.value + (sample.error ?? 0) * random.normal() }));
  const uncovered = alternatives[model.index].filling?.uncovered ?? 'amountWeightedMean';
  const forcing = filled(problem, { rule: 'randomRedistribution', uncovered, seed }, model.samples, rain);
  const run = runColumn(model.settled(model.values(point)).catchment, forcing);
  return Float64Array.from(model.samples, ({ tracer, of }, s) => {
    const out = run.outflows[of ?? 'discharge'];
    return meanOver(model.windows[s], out.flow, out.concentration[tracer]);
  });
}

/** Ages under one draw, of `discharge` or the outflow that was sampled. */
export function agesOf(model: FitModel, point: ArrayLike<number>, limits: readonly number[]): DrawAges {
  const run = runColumn(model.settled(model.values(point)).catchment, model.forcing, {
    youngerThan: [...limits],
    quantiles: [0.5],
  });
  const out = run.outflows[model.samples[0].of ?? 'discharge'];
  let today = run.steps - 1;
  while (today > 0 && !(out.flow[today] > 0)) today--;
  const series = limits.map((limit) => out.youngerShare.get(limit)!);
  const mean = (values: Float64Array, weight: (step: number) => number): number => {
    let sum = 0;
    let total = 0;
    for (let k = 0; k < values.length; k++) {
      if (!(out.flow[k] > 0)) continue;
      sum += weight(k) * values[k];
      total += weight(k);
    }
    return sum / total;
  };
  const median = out.quantiles.get(0.5)!;
  return {
    younger: series.map((values) => values[today]),
    youngerByFlow: series.map((values) => mean(values, (step) => out.flow[step])),
    youngerByTime: series.map((values) => mean(values, () => 1)),
    medianDays: median.days[today],
    beyondRecord: median.beyondRecord[today] === 1,
    preRecordShare: out.preRecordShare[today],
  };
}
