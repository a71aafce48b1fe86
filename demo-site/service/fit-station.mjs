/**
 * Fits the invented catchment to its own bottles: `npm run fit`. Writes data/thessle-brook/fit.json, from which fitted-station.mjs makes the
 * station with ranges. Takes a minute or two on two cores; the same seed gives the same draws.
 */
import { readFile, writeFile } from 'node:fs/promises';
import { pathToFileURL } from 'node:url';
import { fitCatchment, readForcing } from '@rillage/sdk';
import { recordFiles, recordLayout } from './thessle-brook.mjs';

const dataFolder = new URL('../data/thessle-brook/', import.meta.url);
const SEED = 20250331;
const DRAWS = 200;

/** The laboratory's files, as the fit reads them. */
export async function readRecord(folder = dataFolder) {
  const texts = await Promise.all(recordFiles.map(async (name) => ({ name, text: await readFile(new URL(name, folder)) })));
  return readForcing(texts, recordLayout);
}

/**
 * The problem: what a hydrologist would leave open. A selection that follows wetness and a steady one, three ways of filling the days between the rain's bulk samples.
 * @param read what `readForcing` gave
 */
export function problemOf(read) {
  const tracers = ['d18O', 'd2H'];
  const samples = read.samples.filter(({ tracer, of }) => of === 'discharge' && tracers.includes(tracer));
  const rainSamples = read.rainSamples.filter(({ tracer }) => tracers.includes(tracer));
  const scale = (low, high) => ({ prior: 'logUniform', low, high });
  const withWetness = (low, high) => ({ driver: 'storageAnomaly', at: [-150, 40], value: [scale(low, high), scale(low, high)] });
  const catchmentWith = (discharge) => ({
    initialStorage: scale(2000, 10_000),
    selection: { discharge, evapotranspiration: { form: 'exponential', scale: scale(20, 500) } },
    tracers: {
      d18O: { preRecord: { prior: 'normal', mean: -8.2, sd: 0.5 } },
      d2H: { preRecord: { prior: 'normal', mean: -56, sd: 4 } },
    },
  });
  const uncovered = 'amountWeightedMean';
  return {
    forcing: read.forcing,
    catchment: catchmentWith({ form: 'gamma', shape: { prior: 'uniform', low: 0.3, high: 1.2 }, scale: withWetness(100, 4000) }),
    otherCatchments: {
      steady: catchmentWith({ form: 'gamma', shape: { prior: 'uniform', low: 0.3, high: 1.2 }, scale: scale(100, 4000) }),
    },
    samples,
    rainSamples,
    fillings: [
      { rule: 'seasonalPlusResidual', uncovered },
      { rule: 'bulkConstant', uncovered },
      { rule: 'randomRedistribution', uncovered, seed: 1 },
    ],
    errors: {
      d18O: { error: 'normal', constant: { prior: 'logUniform', low: 0.01, high: 1 } },
      d2H: { error: 'normal', constant: { prior: 'logUniform', low: 0.1, high: 8 } },
    },
  };
}

export async function fitProblem() {
  const read = await readRecord();
  return { problem: problemOf(read), read };
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  const { problem } = await fitProblem();
  let shown = '';
  const fit = await fitCatchment(problem, {
    seed: SEED,
    draws: DRAWS,
    workers: 2,
    onProgress: ({ done, timeLeft, alternative, phase, evaluations, rHat }) => {
      const left = Number.isFinite(timeLeft) ? `, ${Math.ceil(timeLeft)} s left` : '';
      const line = `${(100 * done).toFixed(0)} %${left}: ${alternative}, ${phase}, ${evaluations} runs, R-hat ${rHat.toFixed(3)}`;
      if (line !== shown && evaluations % 800 < 4) console.log((shown = line));
    },
  });
  const rounded = {
    ...fit,
    alternatives: fit.alternatives.map((one) => ({ ...one, draws: one.draws.map((draw) => draw.map((x) => Number(x.toPrecision(7)))) })),
    tracers: withoutResiduals(fit.tracers),
  };
  await writeFile(new URL('fit.json', dataFolder), `${JSON.stringify(rounded)}\n`);
  console.log(fit.converged ? 'Converged.' : 'NOT converged.');
  for (const { name, weight, outcome, ages } of fit.alternatives)
    console.log(
      `  weight ${weight.toFixed(2)}: ${name}, ${outcome}, median age ${ages?.medianDays.map((days) => days.toFixed(0)).join(' … ')} days`,
    );
  for (const { path, after, words } of fit.parameters)
    console.log(`  ${path}: ${after.map((value) => value.toPrecision(3)).join(' … ')}, ${words}`);
}

/** The file keeps scores and coverage; the residuals are a run away. */
function withoutResiduals(tracers) {
  return Object.fromEntries(Object.entries(tracers).map(([name, diagnosis]) => [name, { ...diagnosis, residuals: [] }]));
}
