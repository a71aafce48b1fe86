import type { Finding } from '../contract.js';
import type { CrossCheck } from './crossCheck.js';
import type { ParameterDiagnosis, TracerDiagnosis } from './diagnosis.js';
import type { Filling } from './problem.js';
import type { SamplerState } from './sampler/state.js';

/** Draws that the samples support, with the diagnosis. Plain data. */
export interface Fit {
  kind: 'rillage-fit';
  version: 1;
  seed: number;
  /** Every alternative that counts has R-hat and effective sizes within bounds. Numbers of a fit that did not converge are not to be published. */
  converged: boolean;
  /** Stopped by the caller before it had finished. */
  partial: boolean;
  evaluations: number;
  /** Share of points drawn from the prior for which no run is possible, over all alternatives. */
  impossibleShare: number;
  /** Of the alternative that counts most. */
  parameters: ParameterDiagnosis[];
  /** Of the mixture of all alternatives by weight; empty for a partial fit. */
  tracers: Record<string, TracerDiagnosis>;
  /** Of the alternative that counts most. */
  predictive: Predictive | null;
  /** The young water fraction from the seasonal cycle, beside the fitted one; by tracer with a cycle. */
  crossCheck: CrossCheck[];
  /** Every catchment under every filling, in the problem's order, with weights that add up to 1. */
  alternatives: FittedAlternative[];
  samples: { count: number; first: string; last: string };
  findings: Finding[];
  /** Whether the doubt about daily rain went into the draws. */
  inputDoubtInRange: boolean;
  /** For going on; null when finished. */
  state: FitState | null;
}

/** Expected log predictive density by Pareto-smoothed leave-one-out, its standard error, and the worst Pareto shape. */
export interface Predictive {
  density: number;
  error: number;
  worstShape: number;
  /** Samples whose shape is above the limit: one of them alone moves the fit. */
  unreliable: number;
}

export interface FittedAlternative {
  name: string;
  filling: Filling | null;
  /** By stacking of predictive distributions (Yao et al. 2018); equal where a density is missing. */
  weight: number;
  /** `impossible`: the prior allows too few runs. */
  outcome: 'converged' | 'notConverged' | 'impossible';
  evaluations: number;
  impossibleShare: number;
  parameters: ParameterDiagnosis[];
  /** [draws][unknowns] in the parameters' own units. */
  draws: number[][];
  predictive: Predictive | null;
  /** Of today's outflow (the last step with flow) over some of its draws; null for a partial fit. */
  ages: AlternativeAges | null;
  /** By unknown: spread with the doubt about daily rain over that without; null where it was not assessed. */
  widened: number[] | null;
}

/** [5, 50, 95 %] */
export type Quantiles = [number, number, number];

export interface AlternativeAges {
  /** By age limit in days: share of today's outflow. */
  younger: Record<string, Quantiles>;
  medianDays: Quantiles;
  /** Share of the draws whose median is older than the record: their days are lower bounds. */
  medianBeyondRecord: number;
  preRecordShare: Quantiles;
}

/** A fit stopped half way: JSON-safe. */
export interface FitState {
  kind: 'rillage-fit-state';
  version: 1;
  /** sha-256 of the problem it belongs to. */
  problem: string;
  seed: number;
  /** Of the alternatives begun so far. */
  samplers: SamplerState[];
}
