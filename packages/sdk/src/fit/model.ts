import type { Catchment, Forcing, Sample } from '../contract.js';
import { RillageError } from '../errors.js';
import { runColumn } from '../column/index.js';
import { logLikelihood, type ErrorModel } from './likelihood.js';
import { fromScore } from './priorMath.js';
import { substitute, type PlacedPrior } from './priorPaths.js';
import type { CheckedProblem } from './problem.js';

export interface Evaluation {
  /** Σ log likelihood − ½ Σ z², up to a constant; −Infinity where the run is impossible. */
  logDensity: number;
  /** [samples] NaN where there was no outflow. */
  simulated: Float64Array;
  /** [samples] 0 where there was no outflow. */
  pointwise: Float64Array;
}

/** Steps of a sample's interval with the share of each that lies in it. */
interface Window {
  first: number;
  weights: number[];
}

/**
 * Log density of a problem's unknowns on the scale z on which every prior is standard normal: log p(z | data) = Σ log L(x(z)) − ½ Σ z² +
 * constant. The simulated value of a sample is the flow-weighted mean concentration of its outflow over its own interval.
 */
export class FitModel {
  private readonly windows: Window[];
  private readonly forcing: Forcing;
  readonly priors: readonly PlacedPrior[];
  readonly samples: readonly Sample[];

  constructor(private readonly checked: CheckedProblem) {
    this.priors = checked.priors;
    this.samples = checked.samples;
    this.forcing = checked.problem.forcing;
    this.windows = this.samples.map((sample) => windowOf(sample, this.forcing));
  }

  /** Values of the unknowns at a point of the sampling scale. */
  values(z: ArrayLike<number>): number[] {
    return this.priors.map(({ prior }, j) => fromScore(prior, z[j]));
  }

  /** The catchment and error models with those values in place. */
  settled(values: ArrayLike<number>): { catchment: Catchment; errors: Record<string, ErrorModel> } {
    const { catchment, errors } = this.checked.problem;
    return substitute({ catchment, errors }, this.priors, values);
  }

  evaluate(z: ArrayLike<number>): Evaluation {
    const count = this.samples.length;
    const simulated = new Float64Array(count).fill(NaN);
    const pointwise = new Float64Array(count);
    const { catchment, errors } = this.settled(this.values(z));
    let run;
    try {
      run = runColumn(catchment, this.forcing);
    } catch (error) {
      // storage that runs out, a parameter driven out of its domain: the prior reaches where the model does not
      if (error instanceof RillageError) return { logDensity: -Infinity, simulated, pointwise };
      throw error;
    }
    let logDensity = 0;
    for (let j = 0; j < this.priors.length; j++) logDensity -= 0.5 * z[j] * z[j];
    for (let s = 0; s < count; s++) {
      const sample = this.samples[s];
      const out = run.outflows[sample.of ?? 'discharge'];
      const { first, weights } = this.windows[s];
      let mass = 0;
      let water = 0;
      weights.forEach((weight, k) => {
        const flow = out.flow[first + k];
        if (!(flow > 0)) return;
        mass += weight * flow * out.concentration[sample.tracer][first + k];
        water += weight * flow;
      });
      if (!(water > 0)) continue;
      simulated[s] = mass / water;
      pointwise[s] = logLikelihood(errors[sample.tracer], sample.value, simulated[s], sample.error ?? 0, sample.censored);
      logDensity += pointwise[s];
    }
    return { logDensity: Number.isNaN(logDensity) ? -Infinity : logDensity, simulated, pointwise };
  }
}

function windowOf(sample: Sample, forcing: Forcing): Window {
  const step = forcing.stepDays * 86_400_000;
  const start = Date.parse(forcing.start);
  const from = (Date.parse(sample.from) - start) / step;
  const to = (Date.parse(sample.to) - start) / step;
  const last = forcing.inflow.length - 1;
  const first = Math.min(last, Math.max(0, Math.floor(from)));
  if (to - from < 1e-9) return { first, weights: [1] };
  const end = Math.min(last, Math.ceil(to) - 1);
  const weights: number[] = [];
  for (let k = first; k <= end; k++) weights.push(Math.max(0, Math.min(k + 1, to) - Math.max(k, from)));
  return { first, weights };
}
