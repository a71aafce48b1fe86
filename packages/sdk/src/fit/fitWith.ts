import type { Finding } from '../contract.js';
import { RillageError } from '../errors.js';
import { diagnoseParameters, diagnoseTracers, type ParameterDiagnosis, type TracerDiagnosis } from './diagnosis.js';
import { leaveOneOut } from './leaveOneOut.js';
import { FitModel, type Evaluation } from './model.js';
import { checkProblem, type FitProblem } from './problem.js';
import { keptDraws, runSampler, samplerProgress, summariseSampler, type RunSamplerOptions } from './sampler/run.js';
import { openSampler } from './sampler/sampler.js';
import type { SamplerState } from './sampler/state.js';

/** Draws that the samples support, with the diagnosis. Plain data. */
export interface Fit {
  kind: 'rillage-fit';
  version: 1;
  seed: number;
  /** Every unknown's R-hat and effective sizes reached their bounds. Numbers of a fit that did not converge are not to be published. */
  converged: boolean;
  /** Stopped by the caller before it had finished. */
  partial: boolean;
  evaluations: number;
  /** Share of points drawn from the prior for which no run is possible. */
  impossibleShare: number;
  parameters: ParameterDiagnosis[];
  tracers: Record<string, TracerDiagnosis>;
  /** [draws][unknowns] in the parameters' own units. */
  draws: number[][];
  /** Expected log predictive density by Pareto-smoothed leave-one-out, its standard error, and the worst Pareto shape. */
  predictive: { density: number; error: number; worstShape: number } | null;
  samples: { count: number; first: string; last: string };
  findings: Finding[];
  /** Of the sampler, for going on; null when finished. */
  state: SamplerState | null;
}

/** Where points are evaluated: in this thread or in any number of workers, with the same answer. */
export interface Evaluator {
  evaluate(points: number[][]): Promise<Evaluation[]>;
}

export interface FitOptions {
  seed: number;
  signal?: AbortSignal;
  onProgress?: (progress: { done: number; phase: string; evaluations: number; acceptance: number; rHat: number }) => void;
  /** Evaluations at most. Default 40,000. */
  evaluations?: number;
  /** Draws kept. Default 400. */
  draws?: number;
  /** State of a fit that was stopped, of the same problem and seed. */
  resume?: SamplerState;
}

/** The sampling itself, over any evaluator. @throws RillageError as `checkProblem`; `fit-impossible` where the prior allows no run */
export async function fitWith(problem: FitProblem, evaluator: Evaluator, options: FitOptions, pause?: () => Promise<void>): Promise<Fit> {
  const checked = checkProblem(problem);
  const model = new FitModel(checked);
  const sampler = openSampler(
    options.resume ?? {
      dimensions: checked.priors.length,
      seed: options.seed,
      ...(options.evaluations === undefined ? {} : { evaluations: options.evaluations }),
    },
  );
  const onProgress = options.onProgress;
  const call: RunSamplerOptions = {
    ...(options.signal === undefined ? {} : { signal: options.signal }),
    ...(pause === undefined ? {} : { pause }),
  };
  let partial = false;
  try {
    await runSampler(sampler, async (points) => (await evaluator.evaluate(points)).map(({ logDensity }) => logDensity), {
      ...call,
      ...(onProgress === undefined
        ? {}
        : {
            onProgress: () => {
              const { share, phase, evaluations, acceptance, rHat } = samplerProgress(sampler.state);
              onProgress({ done: share, phase, evaluations, acceptance, rHat });
            },
          }),
    });
  } catch (error) {
    if (!(error instanceof RillageError && error.code === 'aborted')) throw error;
    partial = true;
  }
  const summary = summariseSampler(sampler.state);
  if (summary.outcome === 'noPossiblePoint') {
    throw new RillageError({
      code: 'fit-impossible',
      path: 'catchment',
      expected: 'a prior that allows at least some runs',
      received: `${summary.prior.impossible} impossible of ${summary.prior.tried}`,
      hint: 'Most often initial storage is too small for the balance, or a driven parameter leaves its domain.',
    });
  }
  const { points } = keptDraws(sampler.state, options.draws ?? 400);
  const evaluations = partial ? [] : await evaluator.evaluate(points);
  const draws = points.map((z) => model.values(z));
  const loo = evaluations.length >= 25 ? leaveOneOut(evaluations.map(({ pointwise }) => pointwise)) : null;
  const { samples } = checked;
  return {
    kind: 'rillage-fit',
    version: 1,
    seed: options.seed,
    converged: summary.converged && !partial,
    partial,
    evaluations: summary.evaluations,
    impossibleShare: summary.prior.tried > 0 ? summary.prior.impossible / summary.prior.tried : 0,
    parameters: diagnoseParameters(model.priors, points, draws, summary.diagnosis),
    tracers: diagnoseTracers(model, points, evaluations, options.seed),
    draws,
    predictive: loo === null ? null : { density: loo.elpd, error: loo.standardError, worstShape: Math.max(...loo.shape) },
    samples: { count: samples.length, first: samples[0].from, last: samples[samples.length - 1].to },
    findings: checked.findings,
    state: partial ? sampler.state : null,
  };
}
