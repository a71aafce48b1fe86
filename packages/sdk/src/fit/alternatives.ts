import type { Catchment, Forcing, Sample } from '../contract.js';
import { fillRainConcentration } from '../forcing/rain/fillRainConcentration.js';
import type { PlacedPrior } from './priorPaths.js';
import type { Filling, FitProblem, WithPriors } from './problem.js';

/** One catchment under one filling of the rain's concentrations. */
export interface Alternative {
  /** `catchment`, or its name among the others, with the filling's rule behind it where there are several. */
  name: string;
  catchment: WithPriors<Catchment>;
  filling: Filling | null;
  forcing: Forcing;
  priors: PlacedPrior[];
}

/** Every catchment under every filling. @throws what `fillRainConcentration` throws */
export function expandAlternatives(
  problem: FitProblem,
  catchments: readonly [string, WithPriors<Catchment>][],
  priors: readonly PlacedPrior[][],
  samples: readonly Sample[],
): Alternative[] {
  const fillings: (Filling | null)[] = problem.fillings === undefined ? [null] : [...problem.fillings];
  const forcings = fillings.map((filling) => (filling === null ? problem.forcing : filled(problem, filling, samples)));
  return catchments.flatMap(([name, catchment], c) =>
    fillings.map((filling, k) => ({
      name: filling === null ? name : `${name}, ${filling.rule}${filling.seed === undefined ? '' : ` ${filling.seed}`}`,
      catchment,
      filling,
      forcing: forcings[k],
      priors: priors[c],
    })),
  );
}

/**
 * The forcing with the rain of every tracer that has rain samples filled anew, in the unit of its stream samples.
 * @param rainSamples  default the problem's own
 */
export function filled(
  problem: FitProblem,
  filling: Filling,
  samples: readonly Sample[],
  rainSamples: readonly Sample[] = problem.rainSamples ?? [],
): Forcing {
  const { forcing } = problem;
  const inflowConcentration = { ...forcing.inflowConcentration };
  for (const tracer of new Set(rainSamples.map((sample) => sample.tracer))) {
    if (!Object.hasOwn(inflowConcentration, tracer)) continue;
    const unit = samples.find((sample) => sample.tracer === tracer)?.unit;
    const options = { tracer, ...filling, ...(unit === undefined ? {} : { unit }) };
    inflowConcentration[tracer] = fillRainConcentration(forcing, rainSamples, options).concentration;
  }
  return { ...forcing, inflowConcentration };
}
