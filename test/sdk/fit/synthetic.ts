import { runColumn, type Catchment, type ColumnRun, type FitProblem, type Forcing, type Sample } from '@rillage/sdk';
import { Random } from '../../../packages/sdk/src/numeric/random.js';
import { syntheticForcing } from '../../bench/forcing.mjs';

export const TRUTH = { shape: 0.6, scale: 180 };

export function catchmentOf(scale: number, initialStorage = 1500): Catchment {
  return {
    initialStorage,
    selection: { discharge: { form: 'gamma', shape: TRUTH.shape, scale }, evapotranspiration: { form: 'exponential', scale: 60 } },
    tracers: { d18O: { preRecord: -9 } },
  };
}

export interface Synthetic {
  /** Daily rain concentrations that nobody measured. */
  forcing: Forcing;
  truth: ColumnRun;
  problem: FitProblem;
}

/** Two years whose truth is known: bottles every tenth day with normal errors of 0.15 permil, bulk samples of the rain every tenth day. */
export function syntheticProblem({ years = 2, seed = 9, every = 10 } = {}): Synthetic {
  const forcing = syntheticForcing({ years, seed: 5 }) as Forcing;
  const truth = runColumn(catchmentOf(TRUTH.scale), forcing, { youngerThan: [30], quantiles: [0.5] });
  const random = Random.fromSeed(seed);
  const at = (step: number): string => new Date(Date.parse(forcing.start) + step * 86_400_000).toISOString();
  const samples: Sample[] = [];
  const rainSamples: Sample[] = [];
  for (let k = 60; k < forcing.inflow.length; k += every) {
    const value = truth.outflows['discharge'].concentration['d18O'][k] + 0.15 * random.normal();
    samples.push({ tracer: 'd18O', from: at(k + 0.5), to: at(k + 0.5), value, unit: 'permil', error: 0.1 });
  }
  for (let k = 0; k < forcing.inflow.length; k += every) {
    const end = Math.min(k + every, forcing.inflow.length);
    let amount = 0;
    let mass = 0;
    for (let step = k; step < end; step++) {
      amount += forcing.inflow[step];
      mass += forcing.inflow[step] * forcing.inflowConcentration['d18O'][step];
    }
    if (amount > 0) rainSamples.push({ tracer: 'd18O', from: at(k), to: at(end), value: mass / amount, unit: 'permil', error: 0.1 });
  }
  const problem: FitProblem = {
    forcing,
    catchment: {
      ...catchmentOf(0),
      selection: {
        discharge: { form: 'gamma', shape: TRUTH.shape, scale: { prior: 'logUniform', low: 20, high: 2000 } },
        evapotranspiration: { form: 'exponential', scale: 60 },
      },
    },
    samples,
    errors: { d18O: { error: 'normal', constant: { prior: 'logUniform', low: 0.02, high: 1 } } },
  };
  return { forcing, truth, problem: { ...problem, rainSamples } };
}
