import type { CallOptions, RunOptions, WeightedRun } from '../contract.js';
import { fitMembers } from '../fit/draws.js';
import type { Fit } from '../fit/fit.js';
import { checkProblem, type FitProblem } from '../fit/problem.js';
import { runColumnInBackground } from './runColumnInBackground.js';

export interface DrawsOptions extends CallOptions {
  /** Runs at most. Default 100. */
  count?: number;
}

/**
 * `runDraws` in slices of a few milliseconds on this thread, for a page that must not freeze while it makes a station. The same runs.
 * @throws RillageError `fit-mismatch` if the fit is of another problem; `aborted` within 50 ms of the signal
 */
export async function runDrawsInBackground(
  fit: Fit,
  problem: FitProblem,
  options: RunOptions,
  { count = 100, signal, onProgress }: DrawsOptions = {},
): Promise<WeightedRun[]> {
  const { alternatives } = checkProblem(problem);
  const members = fitMembers(fit, problem, count);
  const runs: WeightedRun[] = [];
  for (const { weight, catchment, alternative } of members) {
    const call = { worker: false as const, ...(signal === undefined ? {} : { signal }) };
    runs.push({ weight, run: await runColumnInBackground(catchment, alternatives[alternative].forcing, options, call) });
    onProgress?.({ done: runs.length / members.length });
  }
  return runs;
}
