import { throwIfAborted } from '../errors.js';
import { fitWith, type Evaluator, type Fit, type FitOptions } from '../fit/fitWith.js';
import { FitModel, type Evaluation } from '../fit/model.js';
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
  const pool = workers > 0 ? await openPool(workers, { worker }) : null;
  if (pool === null) return fitWith(problem, onThisThread(new FitModel(checked), options.signal), rest, pause);
  try {
    await pool.broadcast('fitPrepare', { id: 1, problem: plain(problem) });
    return await fitWith(problem, inPool(pool), rest);
  } finally {
    pool.close();
  }
}

function onThisThread(model: FitModel, signal: AbortSignal | undefined): Evaluator {
  let since = performance.now();
  return {
    async evaluate(points) {
      const found: Evaluation[] = [];
      for (const point of points) {
        if (performance.now() - since > SLICE_MILLISECONDS) {
          await pause();
          throwIfAborted(signal);
          since = performance.now();
        }
        found.push(model.evaluate(point));
      }
      return found;
    },
  };
}

/** Each worker takes every n-th point; answers go back to their places. */
function inPool(pool: Pool): Evaluator {
  return {
    async evaluate(points) {
      const shares = Array.from({ length: Math.min(pool.size, points.length) }, (_value, w) =>
        points.filter((_point, k) => k % pool.size === w),
      );
      const answers = (await Promise.all(shares.map((share) => pool.call('fitEvaluate', { id: 1, points: share })))) as Evaluation[][];
      return points.map((_point, k) => answers[k % pool.size][Math.floor(k / pool.size)]);
    },
  };
}

/** Without null prototypes and the like: what a structured clone keeps. */
function plain(problem: FitProblem): FitProblem {
  return { ...problem, samples: [...problem.samples] };
}
