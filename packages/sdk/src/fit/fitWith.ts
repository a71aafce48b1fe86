import { RillageError } from '../errors.js';
import { sha256Hex } from '../numeric/hash.js';
import { evaluateDraws, type EvaluatedAlternative } from './evaluateDraws.js';
import type { Evaluator } from './evaluator.js';
import type { Fit, FitState } from './fit.js';
import { FitModel } from './model.js';
import { checkProblem, problemText, refuseOther, type CheckedProblem, type FitProblem } from './problem.js';
import { publish } from './publish.js';
import { keptDraws, runSampler, samplerProgress, summariseSampler, unlessAborted } from './sampler/run.js';
import { openSampler, type Sampler } from './sampler/sampler.js';

export interface FitOptions {
  /** Whole number, 0 or more; the same seed gives the same draws. */
  seed: number;
  signal?: AbortSignal;
  /** `done` is a share 0..1 of the whole; `timeLeft` in seconds, a guess, NaN at first. */
  onProgress?: (progress: {
    done: number;
    timeLeft: number;
    phase: string;
    alternative: string;
    evaluations: number;
    acceptance: number;
    rHat: number;
  }) => void;
  /** Evaluations at most, for each alternative. Default 40,000. */
  evaluations?: number;
  /** Draws kept of each alternative. Default 400. */
  draws?: number;
  /** Converged when R-hat is at or below this. Default 1.01. */
  rHat?: number;
  /** … and bulk and tail effective sizes at or above this. Default 400. */
  effectiveSize?: number;
  /** Redistributions of the rain that carry its doubt, where the problem has `rainSamples`. Default 100; 0 leaves it out. */
  redistributions?: number;
  /** State of a fit that was stopped, of the same problem and seed. */
  resume?: FitState;
}

/**
 * Searches, samples and weighs every alternative of a problem, over any evaluator.
 * @throws RillageError as `checkProblem`; `fit-impossible` where no prior allows a run; `fit-mismatch` where `resume` is of another fit
 */
export async function fitWith(problem: FitProblem, given: Evaluator, options: FitOptions, pause?: () => Promise<void>): Promise<Fit> {
  const evaluator = abortable(given, options.signal);
  const checked = checkProblem(problem);
  const models = checked.alternatives.map((_alternative, k) => new FitModel(checked, k));
  const fingerprint = sha256Hex(new TextEncoder().encode(problemText(problem)));
  if (options.resume !== undefined) {
    refuseOther(fingerprint, options.resume.problem, 'The saved state belongs to another problem.');
    refuseOther(`seed ${options.seed}`, `seed ${options.resume.seed}`, 'The saved state belongs to another seed.');
  }
  const samplers: Sampler[] = [];
  const evaluated: EvaluatedAlternative[] = [];
  let partial = false;
  try {
    for (let k = 0; k < models.length; k++) {
      const sampler = samplerOf(k, models[k].priors.length, options);
      samplers.push(sampler);
      await sampleOne(sampler, k, checked, evaluator, options, pause);
      evaluated.push(await evaluateDraws(models[k], sampler, evaluator, options));
    }
  } catch (error) {
    if (!(error instanceof RillageError && error.code === 'aborted')) throw error;
    partial = true;
  }
  const state: FitState = {
    kind: 'rillage-fit-state',
    version: 1,
    problem: fingerprint,
    seed: options.seed,
    samplers: samplers.map((sampler) => sampler.state),
  };
  for (let k = evaluated.length; k < samplers.length; k++) evaluated.push(unfinished(models[k], samplers[k], options.draws));
  refuseImpossible(evaluated);
  return publish(checked, evaluated, options.seed, partial ? state : null);
}

function samplerOf(index: number, dimensions: number, { resume, seed, evaluations, rHat, effectiveSize }: FitOptions): Sampler {
  const saved = resume?.samplers[index];
  return openSampler(
    saved ?? {
      dimensions,
      seed: seed + index,
      ...(evaluations === undefined ? {} : { evaluations }),
      ...(rHat === undefined ? {} : { rHat }),
      ...(effectiveSize === undefined ? {} : { effectiveSize }),
    },
  );
}

async function sampleOne(
  sampler: Sampler,
  index: number,
  { alternatives }: CheckedProblem,
  evaluator: Evaluator,
  { signal, onProgress }: FitOptions,
  pause: (() => Promise<void>) | undefined,
): Promise<void> {
  const report = (): void => {
    const { share, phase, evaluations, acceptance, rHat } = samplerProgress(sampler.state);
    const done = (index + share) / alternatives.length;
    onProgress?.({ done, timeLeft: NaN, phase, alternative: alternatives[index].name, evaluations, acceptance, rHat });
  };
  await runSampler(sampler, async (points) => (await evaluator.evaluate(points, index)).map(({ logDensity }) => logDensity), {
    ...(signal === undefined ? {} : { signal }),
    ...(pause === undefined ? {} : { pause }),
    ...(onProgress === undefined ? {} : { onProgress: report }),
  });
}

/** What there is of an alternative that was stopped: draws, and nothing worked out about them. */
function unfinished(model: FitModel, sampler: Sampler, count = 400): EvaluatedAlternative {
  const { points } = keptDraws(sampler.state, count);
  const summary = summariseSampler(sampler.state);
  return { model, summary, points, evaluations: [], looPointwise: null, predictive: null, widened: null, ages: [] };
}

/** Every answer, or an error as soon as the signal is raised. */
function abortable(evaluator: Evaluator, signal: AbortSignal | undefined): Evaluator {
  return {
    evaluate: (...call) => unlessAborted(evaluator.evaluate(...call), signal),
    redistribute: (...call) => unlessAborted(evaluator.redistribute(...call), signal),
    ages: (...call) => unlessAborted(evaluator.ages(...call), signal),
  };
}

function refuseImpossible(evaluated: readonly EvaluatedAlternative[]): void {
  const impossible = evaluated.filter(({ summary }) => summary.outcome === 'noPossiblePoint');
  if (impossible.length < evaluated.length || impossible.length === 0) return;
  const { prior } = impossible[0].summary;
  throw new RillageError({
    code: 'fit-impossible',
    path: 'catchment',
    expected: 'a prior that allows at least some runs',
    received: `${prior.impossible} impossible of ${prior.tried}`,
    hint: 'Most often initial storage is too small for the balance, or a driven parameter leaves its domain.',
  });
}
