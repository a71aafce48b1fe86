import { youngThresholds } from './crossCheck.js';
import type { DrawAges, Evaluator } from './evaluator.js';
import type { Predictive } from './fit.js';
import { carryInputDoubt } from './inputDoubt.js';
import { leaveOneOut } from './leaveOneOut.js';
import { errorScale } from './likelihood.js';
import type { Evaluation, FitModel } from './model.js';
import { keptDraws, summariseSampler, type SamplerSummary } from './sampler/run.js';
import type { Sampler } from './sampler/sampler.js';
import { stackingWeights } from './stackingWeights.js';

/** One alternative's draws with all that was worked out about them. */
export interface EvaluatedAlternative {
  model: FitModel;
  summary: SamplerSummary;
  /** [draws][unknowns] as published, the rain's doubt included. */
  points: number[][];
  /** [draws] at those points; empty for a partial fit. */
  evaluations: Evaluation[];
  /** [samples] log predictive density of each left out. */
  looPointwise: Float64Array | null;
  predictive: Predictive | null;
  widened: number[] | null;
  ages: DrawAges[];
}

/** Age limits of the table of alternatives, days. */
export const AGE_LIMITS = [7, 30, 90, 365];
/** Runs with ages for the table, per alternative. */
const AGE_DRAWS = 60;

/** Evaluates an alternative's kept draws: leave-one-out, the rain's doubt, ages. */
export async function evaluateDraws(
  model: FitModel,
  sampler: Sampler,
  evaluator: Evaluator,
  options: { seed: number; draws?: number; redistributions?: number },
): Promise<EvaluatedAlternative> {
  const summary = summariseSampler(sampler.state);
  const none = { model, summary, points: [], evaluations: [], looPointwise: null, predictive: null, widened: null, ages: [] };
  if (summary.outcome === 'noPossiblePoint') return none;
  const { points } = keptDraws(sampler.state, options.draws ?? 400);
  if (points.length === 0) return none;
  const own = await evaluator.evaluate(points, model.index);
  const loo = points.length >= 25 ? leaveOneOut(own.map(({ pointwise }) => pointwise)) : null;
  const carried = await withInputDoubt(model, points, own, evaluator, options);
  const spread = carried.points.filter((_point, d) => d % Math.ceil(carried.points.length / AGE_DRAWS) === 0);
  const limits = [...AGE_LIMITS, ...youngThresholds(model.checked).map(({ days }) => days)];
  return {
    model,
    summary,
    ...carried,
    looPointwise: loo?.pointwise ?? null,
    predictive:
      loo === null
        ? null
        : { density: loo.elpd, error: loo.standardError, worstShape: Math.max(...loo.shape), unreliable: loo.unreliable.length },
    ages: await evaluator.ages(spread, limits, model.index),
  };
}

async function withInputDoubt(
  model: FitModel,
  points: number[][],
  evaluations: Evaluation[],
  evaluator: Evaluator,
  { seed, redistributions = 100 }: { seed: number; redistributions?: number },
): Promise<Pick<EvaluatedAlternative, 'points' | 'evaluations' | 'widened'>> {
  const unchanged = { points, evaluations, widened: null };
  if ((model.checked.problem.rainSamples ?? []).length === 0 || redistributions === 0 || points.length < 25) return unchanged;
  const centre = points[0].map((_x, j) => points.reduce((sum, z) => sum + z[j], 0) / points.length);
  const [atCentre] = await evaluator.evaluate([centre], model.index);
  if (atCentre.logDensity === -Infinity) return unchanged;
  const seeds = Array.from({ length: redistributions }, (_value, m) => seed * 65_536 + m);
  const possible = await evaluator.redistribute(centre, seeds, model.index);
  const { errors } = model.settled(model.values(centre));
  const scale = model.samples.map(({ tracer, error, censored }, s) =>
    censored === undefined ? errorScale(errors[tracer], atCentre.simulated[s], error ?? 0) : NaN,
  );
  const simulated = evaluations.map((one) => one.simulated);
  const stated = model.samples.map(({ error }) => error ?? 0);
  const carried = carryInputDoubt(points, simulated, possible, atCentre.simulated, scale, stated);
  const found = await evaluator.evaluate(carried.points, model.index);
  // where the stretch leaves the model's domain the draw stays as it was
  const stays = found.map(({ logDensity }) => logDensity === -Infinity);
  return {
    points: carried.points.map((point, d) => (stays[d] ? points[d] : point)),
    evaluations: found.map((one, d) => (stays[d] ? evaluations[d] : one)),
    widened: carried.widened,
  };
}

/** Weights of the alternatives by stacking; equal among the possible ones where a left-out density is missing. */
export function weigh(evaluated: readonly EvaluatedAlternative[]): number[] {
  const possible = evaluated.filter(({ summary }) => summary.outcome !== 'noPossiblePoint');
  const densities = possible.flatMap(({ looPointwise }) => (looPointwise === null ? [] : [looPointwise]));
  const stacked = densities.length === possible.length ? stackingWeights(densities).weights : null;
  return evaluated.map((one) => {
    const place = possible.indexOf(one);
    return place < 0 ? 0 : stacked === null ? 1 / possible.length : stacked[place];
  });
}

/**
 * How many of `count` members each alternative gets, by largest remainder, so that shares follow the weights.
 * @param available  draws that each alternative has
 */
export function shareOut(weights: readonly number[], available: readonly number[], count: number): number[] {
  const exact = weights.map((weight) => weight * count);
  const whole = exact.map(Math.floor);
  let left = count - whole.reduce((a, b) => a + b, 0);
  for (const k of exact.map((_x, k) => k).sort((a, b) => exact[b] - whole[b] - (exact[a] - whole[a]) || a - b)) {
    if (left <= 0) break;
    whole[k]++;
    left--;
  }
  return whole.map((n, k) => Math.min(n, available[k]));
}

/** Indices of `count` of `available` draws, evenly spread. */
export function thinned(available: number, count: number): number[] {
  return Array.from({ length: count }, (_value, k) => Math.floor(((k + 0.5) * available) / count));
}
