import { logLikelihood } from '../../../packages/sdk/src/fit/likelihood.js';
import { fromScore } from '../../../packages/sdk/src/fit/priorMath.js';
import type { Prior } from '../../../packages/sdk/src/fit/priors.js';
import { keptDraws, runSampler } from '../../../packages/sdk/src/fit/sampler/run.js';
import { openSampler } from '../../../packages/sdk/src/fit/sampler/sampler.js';
import { Random } from '../../../packages/sdk/src/numeric/random.js';
import { rankOf } from '../../calibration/ranks.mjs';

/** Level, slope and error size of a line. */
const PRIORS: Prior[] = [
  { prior: 'normal', mean: 1, sd: 2 },
  { prior: 'uniform', low: -1, high: 3 },
  { prior: 'logUniform', low: 0.2, high: 2 },
];
const TIMES = [-1.5, -1, -0.5, 0, 0.4, 0.8, 1.2, 1.6];
const DETECTION_LIMIT = -0.5;

/**
 * Simulation-based calibration of priors, likelihood and sampler together on a problem that costs nothing: a line through eight values,
 * those below a detection limit censored.
 * @returns ranks of the truth among `draws` posterior draws, [unknown][repeat], and how many runs met their stopping rule
 */
export async function calibrateLine(repeats: number, draws: number, seed: number): Promise<{ ranks: number[][]; converged: number }> {
  const random = Random.fromSeed(seed);
  const ranks: number[][] = PRIORS.map(() => []);
  let converged = 0;
  for (let repeat = 0; repeat < repeats; repeat++) {
    const truth = PRIORS.map((prior) => fromScore(prior, random.normal()));
    const measured = TIMES.map((t) => truth[0] + truth[1] * t + truth[2] * random.normal());
    const sampler = openSampler({ dimensions: PRIORS.length, seed: repeat, effectiveSize: 150, rHat: 1.03 });
    await runSampler(sampler, (points) => points.map((scores) => logDensity(scores, measured)));
    if (sampler.state.outcome === 'converged') converged++;
    const kept = keptDraws(sampler.state, draws).points;
    PRIORS.forEach((prior, j) => {
      ranks[j].push(
        rankOf(
          truth[j],
          kept.map((scores) => fromScore(prior, scores[j])),
        ),
      );
    });
  }
  return { ranks, converged };
}

function logDensity(scores: readonly number[], measured: readonly number[]): number {
  const [level, slope, constant] = PRIORS.map((prior, j) => fromScore(prior, scores[j]));
  let sum = scores.reduce((total, z) => total - 0.5 * z * z, 0);
  measured.forEach((value, i) => {
    const below = value < DETECTION_LIMIT;
    sum += logLikelihood(
      { error: 'normal', constant },
      below ? DETECTION_LIMIT : value,
      level + slope * TIMES[i],
      0,
      below ? 'below' : undefined,
    );
  });
  return sum;
}
