import { throwIfAborted } from '../errors.js';
import { agesOf, redistributed, type Evaluator } from '../fit/evaluator.js';
import type { Fit } from '../fit/fit.js';
import { fitWith, type FitOptions } from '../fit/fitWith.js';
import { FitModel } from '../fit/model.js';
import { checkProblem, type FitProblem } from '../fit/problem.js';
import { openPool, type Pool } from './pool.js';
import { pause } from './slices.js';
import type { WorkerSource } from './threads.js';

export interface FitCatchmentOptions extends FitOptions {
  /** Workers to use; 0 for slices of this thread. Default 2. The draws are the same whatever the number. */
  workers?: number;
  /** The caller's own Worker or its address. */
  worker?: WorkerSource;
}

const SLICE_MILLISECONDS = 8;

/**
 * Fits a catchment's unknowns to samples: search, then a population Markov chain with past states (ter Braak & Vrugt 2008), ended by
 * rank-normalised R-hat and effective sizes (Vehtari et al. 2021). The same seed gives the same draws on any number of workers or none.
 * On an abort it returns within 50 ms what there is, marked `partial`, with the state to go on from.
 * @throws RillageError as `checkProblem` for a problem that does not hold together; `fit-impossible` where its prior allows no run
 */
export async function fitCatchment(problem: FitProblem, options: FitCatchmentOptions): Promise<Fit> {
  const { workers = 2, worker, ...rest } = options;
  const checked = checkProblem(problem);
  throwIfAborted(options.signal);
  const call = withTimeLeft(rest);
  const pool = workers > 0 ? await openPool(workers, { worker }) : null;
  if (pool === null) {
    const models = checked.alternatives.map((_alternative, k) => new FitModel(checked, k));
    return fitWith(problem, onThisThread(models, options.signal), call, pause);
  }
  try {
    await pool.broadcast('fitPrepare', { id: 1, problem: { ...problem, samples: [...problem.samples] } });
    return await fitWith(problem, inPool(pool), call);
  } finally {
    pool.close();
  }
}

function withTimeLeft(options: FitOptions): FitOptions {
  const { onProgress } = options;
  if (onProgress === undefined) return options;
  const began = performance.now();
  let first = NaN;
  return {
    ...options,
    onProgress: (progress) => {
      // a resumed fit begins with some of it done
      if (Number.isNaN(first)) first = progress.done;
      const gained = progress.done - first;
      const seconds = (performance.now() - began) / 1000;
      onProgress({ ...progress, timeLeft: gained > 0.02 ? (seconds * (1 - progress.done)) / gained : NaN });
    },
  };
}

function onThisThread(models: readonly FitModel[], signal: AbortSignal | undefined): Evaluator {
  let since = performance.now();
  async function each<T, R>(list: readonly T[], work: (item: T) => R): Promise<R[]> {
    const found: R[] = [];
    for (const item of list) {
      if (performance.now() - since > SLICE_MILLISECONDS) {
        await pause();
        throwIfAborted(signal);
        since = performance.now();
      }
      found.push(work(item));
    }
    return found;
  }
  return {
    evaluate: (points, k) => each(points, (point) => models[k].evaluate(point)),
    redistribute: (point, seeds, k) => each(seeds, (seed) => redistributed(models[k], point, seed)),
    ages: (points, limits, k) => each(points, (point) => agesOf(models[k], point, limits)),
  };
}

/** Each worker takes every n-th item; answers go back to their places. */
function inPool(pool: Pool): Evaluator {
  async function shared<T, R>(items: readonly T[], call: (share: T[]) => Promise<unknown>): Promise<R[]> {
    const shares = Array.from({ length: Math.min(pool.size, items.length) }, (_value, w) =>
      items.filter((_item, k) => k % pool.size === w),
    );
    const answers = (await Promise.all(shares.map(call))) as R[][];
    return items.map((_item, k) => answers[k % pool.size][Math.floor(k / pool.size)]);
  }
  return {
    evaluate: (points, alternative) => shared(points, (share) => pool.call('fitEvaluate', { id: 1, alternative, points: share })),
    redistribute: (point, seeds, alternative) =>
      shared(seeds, (share) => pool.call('fitRedistribute', { id: 1, alternative, point, seeds: share })),
    ages: (points, limits, alternative) => shared(points, (share) => pool.call('fitAges', { id: 1, alternative, points: share, limits })),
  };
}
