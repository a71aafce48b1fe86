import type { Catchment, ColumnRun, Forcing, Sample } from '../contract.js';
import { runColumn } from '../column/index.js';
import { logLikelihood, type ErrorModel } from './likelihood.js';
import { isBeyondModel } from './beyondModel.js';
import { fromScore } from './priorMath.js';
import { substitute, type PlacedPrior } from './priorPaths.js';
import type { CheckedProblem } from './problem.js';
import { meanOver, windowOf, type SampleWindow } from './sampleWindow.js';

export interface Evaluation {
  /** Σ log likelihood − ½ Σ z², up to a constant; −Infinity where the run is impossible. */
  logDensity: number;
  /** [samples] NaN where there was no outflow. */
  simulated: Float64Array;
  /** [samples] 0 where there was no outflow. */
  pointwise: Float64Array;
}

/**
 * Log density of one alternative's unknowns on the scale z on which every prior is standard normal: log p(z | data) =
 * Σ log L(x(z)) − ½ Σ z² + constant. The simulated value of a sample is the flow-weighted mean concentration of its outflow over its own
 * interval.
 */
export class FitModel {
  readonly forcing: Forcing;
  readonly priors: readonly PlacedPrior[];
  readonly samples: readonly Sample[];
  readonly windows: readonly SampleWindow[];
  private readonly template: unknown;

  /** @param index  which of the problem's alternatives */
  constructor(
    readonly checked: CheckedProblem,
    readonly index = 0,
  ) {
    const { forcing, priors, catchment } = checked.alternatives[index];
    this.priors = priors;
    this.samples = checked.samples;
    this.forcing = forcing;
    this.windows = this.samples.map((sample) => windowOf(sample, forcing));
    this.template = { catchment, errors: checked.problem.errors };
  }

  /** Values of the unknowns at a point of the sampling scale. */
  values(z: ArrayLike<number>): number[] {
    return this.priors.map(({ prior }, j) => fromScore(prior, z[j]));
  }

  /** The catchment and error models with those values in place. */
  settled(values: ArrayLike<number>): { catchment: Catchment; errors: Record<string, ErrorModel> } {
    return substitute(this.template, this.priors, values);
  }

  evaluate(z: ArrayLike<number>): Evaluation {
    const count = this.samples.length;
    const simulated = new Float64Array(count).fill(NaN);
    const pointwise = new Float64Array(count);
    const { catchment, errors } = this.settled(this.values(z));
    const run = this.runOrNull(catchment);
    if (run === null) return { logDensity: -Infinity, simulated, pointwise };
    let logDensity = 0;
    for (let j = 0; j < this.priors.length; j++) logDensity -= 0.5 * z[j] * z[j];
    for (let s = 0; s < count; s++) {
      const { tracer, of, value, error, censored } = this.samples[s];
      const out = run.outflows[of ?? 'discharge'];
      simulated[s] = meanOver(this.windows[s], out.flow, out.concentration[tracer]);
      if (Number.isNaN(simulated[s])) continue;
      pointwise[s] = logLikelihood(errors[tracer], value, simulated[s], error ?? 0, censored);
      logDensity += pointwise[s];
    }
    return { logDensity: Number.isNaN(logDensity) ? -Infinity : logDensity, simulated, pointwise };
  }

  /** null where the prior reaches beyond the model: storage that runs out, a parameter driven out of its domain. */
  private runOrNull(catchment: Catchment): ColumnRun | null {
    try {
      return runColumn(catchment, this.forcing);
    } catch (error) {
      if (isBeyondModel(error)) return null;
      throw error;
    }
  }
}
