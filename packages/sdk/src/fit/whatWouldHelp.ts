import type { ColumnRun } from '../contract.js';
import type { Random } from '../numeric/random.js';
import { weightedQuantile } from '../numeric/weightedQuantile.js';
import { smoothWeights } from './leaveOneOut.js';
import { drawMeasured, logLikelihood, type ErrorModel } from './likelihood.js';
import type { SamplingPlan } from './samplingPlan.js';

/** What a plan of further samples is expected to do to the 5 to 95 % ranges of today's ages. */
export interface Help extends Omit<SamplingPlan, 'steps'> {
  /** Width of the range now, and expected afterwards, days. NaN where draws lie beyond the record. */
  medianDays: { before: number; after: number };
  /** The same of today's share younger than `youngDays`. */
  younger: { before: number; after: number };
  /** By how much the two ranges narrow, on average: 0 not at all, 1 to nothing. Plans come in its order. */
  narrowed: number;
  /** Draws that carry the estimate, on average; below ten or so it is rough. */
  effectiveDraws: number;
}

/** A draw's run as the plans need it. */
export interface HelpMember {
  weight: number;
  errors: Record<string, ErrorModel>;
  run: ColumnRun;
  medianDays: number;
  younger: number;
}

/** Possible truths that each plan is tried on. */
const TRUTHS = 40;

/**
 * Expected effect of a plan. Each of some draws is taken for the truth in turn; samples are simulated from it with its errors, and all other
 * draws reweighted by their likelihood, the weights Pareto-smoothed: an average over what the samples might turn out to be.
 * @param members  25 or more
 * @param stated   the laboratory's standard error for the tracer
 * @source preposterior analysis, Raiffa & Schlaifer (1961), Applied Statistical Decision Theory, by importance weights
 */
export function helpOf(plan: SamplingPlan, members: readonly HelpMember[], stated: number, random: Random): Help {
  const { tracer, of, when, count, steps } = plan;
  const simulated = members.map(({ run }) => steps.map((step) => run.outflows[of].concentration[tracer][step]));
  const every = Math.max(1, members.length / TRUTHS);
  const sums = { medianBefore: 0, medianAfter: 0, youngBefore: 0, youngAfter: 0, effective: 0, weight: 0 };
  for (let place = 0; place < members.length; place += every) {
    const truth = Math.floor(place);
    const others = members.map((_member, d) => d).filter((d) => d !== truth);
    const measured = simulated[truth].map((value) => drawMeasured(members[truth].errors[tracer], value, stated, random));
    const logs = others.map((d) =>
      measured.reduce((sum, value, k) => sum + logLikelihood(members[d].errors[tracer], value, simulated[d][k], stated), 0),
    );
    const { logWeights } = smoothWeights(logs);
    const before = others.map((d) => members[d].weight);
    const after = others.map((d, i) => members[d].weight * Math.exp(logWeights[i]));
    const own = members[truth].weight;
    const medians = others.map((d) => members[d].medianDays);
    const young = others.map((d) => members[d].younger);
    sums.weight += own;
    sums.medianBefore += own * width(medians, before);
    sums.medianAfter += own * width(medians, after);
    sums.youngBefore += own * width(young, before);
    sums.youngAfter += own * width(young, after);
    sums.effective += own * effective(after);
  }
  const medianDays = { before: sums.medianBefore / sums.weight, after: sums.medianAfter / sums.weight };
  const younger = { before: sums.youngBefore / sums.weight, after: sums.youngAfter / sums.weight };
  const gains = [medianDays, younger].map(({ before, after }) => 1 - after / before).filter(Number.isFinite);
  const narrowed = gains.reduce((a, b) => a + b, 0) / Math.max(1, gains.length);
  return { tracer, of, when, count, medianDays, younger, narrowed, effectiveDraws: sums.effective / sums.weight };
}

/** Today's median age and young share of a run, at its last step with flow; NaN where the median is older than the record. */
export function todayOf(run: ColumnRun, of: string, youngDays: number): { medianDays: number; younger: number } {
  const out = run.outflows[of];
  let today = run.steps - 1;
  while (today > 0 && !(out.flow[today] > 0)) today--;
  const median = out.quantiles.get(0.5)!;
  return {
    medianDays: median.beyondRecord[today] === 1 ? NaN : median.days[today],
    younger: out.youngerShare.get(youngDays)![today],
  };
}

function width(values: readonly number[], weights: readonly number[]): number {
  return weightedQuantile(values, weights, 0.95) - weightedQuantile(values, weights, 0.05);
}

function effective(weights: readonly number[]): number {
  const sum = weights.reduce((a, b) => a + b, 0);
  return sum ** 2 / weights.reduce((total, w) => total + w * w, 0);
}
