import type { CallOptions } from '../contract.js';
import { RillageError, throwIfAborted } from '../errors.js';
import { fitMembers } from '../fit/draws.js';
import type { Fit } from '../fit/fit.js';
import { checkProblem, type FitProblem } from '../fit/problem.js';
import { samplingPlans } from '../fit/samplingPlan.js';
import { helpOf, todayOf, type Help, type HelpMember } from '../fit/whatWouldHelp.js';
import { Random } from '../numeric/random.js';
import { runColumnInBackground } from './runColumnInBackground.js';
import { pause } from './slices.js';

export interface HelpOptions extends CallOptions {
  /** How many samples a plan may have. Default 6, 12, 26, 52. */
  counts?: number[];
  /** Age limit of the young share, days. Default 30. */
  youngDays?: number;
  /** Length of the coming campaign, for which the record's last days stand. Default 365. */
  days?: number;
  /** Draws used, 25 or more. Default 100. */
  members?: number;
  seed?: number;
}

/**
 * Which further samples (which tracer, at low, any or high flow, how many) would narrow the range of today's median age and young share
 * most: draws reweighted over simulated samples, without another fit. In slices of this thread: about a run for each member, then a few
 * milliseconds for each plan.
 * @returns plans, the most helpful first
 * @throws RillageError `fit-mismatch` for another problem; `too-few-draws` below 25; `aborted`
 */
export async function whatWouldHelp(fit: Fit, problem: FitProblem, options: HelpOptions = {}): Promise<Help[]> {
  const { counts = [6, 12, 26, 52], youngDays = 30, days = 365, seed = 1, signal, onProgress } = options;
  const { alternatives, samples } = checkProblem(problem);
  const chosen = fitMembers(fit, problem, options.members ?? 100);
  if (chosen.length < 25) {
    throw new RillageError({ code: 'too-few-draws', path: 'fit', expected: '25 draws or more', received: String(chosen.length) });
  }
  const of = samples[0].of ?? 'discharge';
  const plans = samplingPlans(problem.forcing, samples, counts, days);
  const runOptions = { youngerThan: [youngDays], quantiles: [0.5] };
  const members: HelpMember[] = [];
  for (const { weight, catchment, errors, alternative } of chosen) {
    const call = { worker: false as const, ...(signal === undefined ? {} : { signal }) };
    const run = await runColumnInBackground(catchment, alternatives[alternative].forcing, runOptions, call);
    members.push({ weight, errors, run, ...todayOf(run, of, youngDays) });
    onProgress?.({ done: members.length / (chosen.length + plans.length) });
  }
  const random = Random.fromSeed(seed).split('help');
  const found: Help[] = [];
  for (const plan of plans) {
    await pause();
    throwIfAborted(signal);
    const errors = samples
      .flatMap(({ tracer, error }) => (tracer === plan.tracer && error !== undefined ? [error] : []))
      .sort((a, b) => a - b);
    found.push(helpOf(plan, members, errors[errors.length >> 1] ?? 0, random.split(`${plan.tracer} ${plan.when} ${plan.count}`)));
    onProgress?.({ done: (members.length + found.length) / (chosen.length + plans.length) });
  }
  return found.sort((a, b) => b.narrowed - a.narrowed);
}
