/**
 * Fits the invented catchment to its own bottles: `npm run fit`. Writes data/thessle-brook/fit.json, from which fitted-station.mjs makes the
 * station with ranges. Takes a minute or two on two cores; the same seed gives the same draws.
 */
import { readFile, writeFile } from 'node:fs/promises';
import { pathToFileURL } from 'node:url';
import { fitCatchment, readForcing } from '@rillage/sdk';
import { catchment, recordFiles, recordLayout } from './thessle-brook.mjs';

const dataFolder = new URL('../data/thessle-brook/', import.meta.url);
const SEED = 20250331;
const DRAWS = 200;

/** The problem: what a hydrologist would leave open. Initial storage is not among it; isotopes cannot tell it (and the readings need not). */
export async function fitProblem() {
  const texts = await Promise.all(recordFiles.map(async (name) => ({ name, text: await readFile(new URL(name, dataFolder)) })));
  const read = readForcing(texts, recordLayout);
  const tracers = ['d18O', 'd2H'];
  const samples = read.samples.filter(({ tracer, of }) => of === 'discharge' && tracers.includes(tracer));
  const scale = (low, high) => ({ prior: 'logUniform', low, high });
  const problem = {
    forcing: read.forcing,
    catchment: {
      initialStorage: catchment.initialStorage,
      selection: {
        discharge: {
          form: 'gamma',
          shape: { prior: 'uniform', low: 0.3, high: 1.2 },
          scale: { driver: 'storageAnomaly', at: [-150, 40], value: [scale(100, 4000), scale(100, 4000)] },
        },
        evapotranspiration: { form: 'exponential', scale: scale(20, 500) },
      },
      tracers: Object.fromEntries(tracers.map((name) => [name, catchment.tracers[name]])),
    },
    samples,
    errors: {
      d18O: { error: 'normal', constant: { prior: 'logUniform', low: 0.01, high: 1 } },
      d2H: { error: 'normal', constant: { prior: 'logUniform', low: 0.1, high: 8 } },
    },
  };
  return { problem, read };
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  const { problem } = await fitProblem();
  let shown = '';
  const fit = await fitCatchment(problem, {
    seed: SEED,
    draws: DRAWS,
    workers: 2,
    onProgress: ({ phase, evaluations, rHat }) => {
      const line = `${phase}, ${evaluations} runs${Number.isFinite(rHat) ? `, R-hat ${rHat.toFixed(3)}` : ''}`;
      if (line !== shown && evaluations % 200 < 4) console.log((shown = line));
    },
  });
  const rounded = {
    ...fit,
    draws: fit.draws.map((draw) => draw.map((value) => Number(value.toPrecision(7)))),
    tracers: withoutResiduals(fit.tracers),
  };
  await writeFile(new URL('fit.json', dataFolder), `${JSON.stringify(rounded)}\n`);
  console.log(fit.converged ? 'Converged.' : 'NOT converged.');
  for (const { path, after, words } of fit.parameters)
    console.log(`  ${path}: ${after.map((value) => value.toPrecision(3)).join(' … ')}, ${words}`);
}

/** The file keeps scores and coverage; the residuals are a run away. */
function withoutResiduals(tracers) {
  return Object.fromEntries(Object.entries(tracers).map(([name, diagnosis]) => [name, { ...diagnosis, residuals: [] }]));
}
