import { catchmentsOf, fitCatchment, runColumn } from '@rillage/sdk';
import { Random } from '../../packages/sdk/dist/numeric/random.js';
import { fromScore } from '../../packages/sdk/dist/fit/priorMath.js';
import { syntheticForcing } from '../bench/forcing.mjs';
import { rankOf } from './ranks.mjs';

/** Posterior draws that the truth is ranked among; with 0 … 99 there are a hundred ranks. */
export const DRAWS = 99;
export const QUANTITIES = ['shape', 'scale', 'pre-record concentration', 'error size', 'share younger than 30 days', 'median age'];

const SAMPLE_EVERY = 10;
const FIRST_SAMPLE = 60;
const priors = {
  shape: { prior: 'uniform', low: 0.3, high: 1.2 },
  scale: { prior: 'logUniform', low: 50, high: 800 },
  preRecord: { prior: 'normal', mean: -9, sd: 0.5 },
  error: { prior: 'logUniform', low: 0.05, high: 0.5 },
};

/**
 * Simulation-based calibration of the whole fit on a small column: two years, a bottle every ten days, four unknowns. The truth is drawn
 * from the priors, bottles are simulated from it, the fit is run through the public call, and the truth is ranked among its draws.
 * @param {number} repeat  which simulated data set; the same number gives the same data and draws
 */
export async function rankColumn(repeat) {
  const forcing = syntheticForcing({ years: 2, seed: 5 });
  const random = Random.fromSeed(repeat).split('calibration');
  const truth = Object.fromEntries(Object.entries(priors).map(([name, prior]) => [name, fromScore(prior, random.normal())]));
  const run = runColumn(catchmentWith(truth), forcing, statistics);
  const concentration = run.outflows.discharge.concentration.d18O;
  const samples = [];
  for (let k = FIRST_SAMPLE; k < concentration.length; k += SAMPLE_EVERY) {
    const at = new Date(Date.parse(forcing.start) + (k + 0.5) * 86_400_000).toISOString();
    samples.push({ tracer: 'd18O', from: at, to: at, value: concentration[k] + truth.error * random.normal(), unit: 'permil' });
  }
  const problem = {
    forcing,
    catchment: catchmentWith(priors),
    samples,
    errors: { d18O: { error: 'normal', constant: priors.error } },
  };
  const fit = await fitCatchment(problem, { seed: repeat, workers: 0, effectiveSize: 200, rHat: 1.02, draws: DRAWS });
  const column = (path) => {
    const index = fit.parameters.findIndex((one) => one.path === path);
    return fit.alternatives[0].draws.map((draw) => draw[index]);
  };
  const today = catchmentsOf(fit, problem, DRAWS).map((catchment) => todayOf(runColumn(catchment, forcing, statistics)));
  const [share, median] = todayOf(run);
  const ranks = [
    rankOf(truth.shape, column('catchment.selection.discharge.shape')),
    rankOf(truth.scale, column('catchment.selection.discharge.scale')),
    rankOf(truth.preRecord, column('catchment.tracers.d18O.preRecord')),
    rankOf(truth.error, column('errors.d18O.constant')),
    rankOf(
      share,
      today.map((one) => one[0]),
    ),
    rankOf(
      median,
      today.map((one) => one[1]),
    ),
  ];
  return { repeat, converged: fit.converged, evaluations: fit.evaluations, draws: today.length, ranks };
}

const statistics = { youngerThan: [30], quantiles: [0.5] };

function todayOf(run) {
  const { youngerShare, quantiles } = run.outflows.discharge;
  const last = run.steps - 1;
  return [youngerShare.get(30)[last], quantiles.get(0.5).days[last]];
}

function catchmentWith({ shape, scale, preRecord }) {
  return {
    initialStorage: 1500,
    selection: { discharge: { form: 'gamma', shape, scale }, evapotranspiration: { form: 'exponential', scale: 60 } },
    tracers: { d18O: { preRecord } },
  };
}
