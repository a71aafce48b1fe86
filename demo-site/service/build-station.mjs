/**
 * From the invented agency's CSV files to a station file, all of it by the SDK: `node demo-site/service/build-station.mjs [FOLDER]`.
 * Writes FOLDER/thessle-brook.json (default: the demo site's data).
 */
import { mkdir, readFile, writeFile } from 'node:fs/promises';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { makeStation, READING_RUN_OPTIONS, readForcing, runColumn, runDraws, writeStation } from '@rillage/sdk';
import { fitProblem } from './fit-station.mjs';
import { catchment, recordFiles, recordLayout, station } from './thessle-brook.mjs';

const dataFolder = new URL('../data/thessle-brook/', import.meta.url);
const publicFolder = new URL('../public/data/', import.meta.url);

export async function buildStation() {
  const texts = await Promise.all(recordFiles.map(async (name) => ({ name, text: await readFile(new URL(name, dataFolder)) })));
  const { forcing, findings, receipt, samples } = readForcing(texts, recordLayout);
  // Three tracers from one bottle are one sample.
  const bottles = [...new Set(samples.filter((sample) => sample.of === 'discharge').map((sample) => sample.to))].sort();
  const run = runColumn(catchment, forcing, { ...READING_RUN_OPTIONS, distributionsAt: [forcing.inflow.length - 1] });
  const made = makeStation({
    ...station,
    forcing,
    source: run,
    receipt,
    language: 'en-GB',
    samples: { count: bottles.length, last: bottles.at(-1) ?? null },
  });
  return { station: made, findings, run, forcing };
}

/** Runs of the stored fit: a file of this many stays below 2 MB, and its 5 to 95 % are those of all draws within a percent or two. */
const MEMBERS = 40;

/** The same station from the fit stored with the data: its readings have ranges. null where none is stored (`npm run fit` makes it). */
export async function buildFittedStation() {
  const stored = await readFile(new URL('fit.json', dataFolder), 'utf8').catch(() => null);
  if (stored === null) return null;
  const fit = JSON.parse(stored);
  const { problem, read } = await fitProblem();
  const last = problem.forcing.inflow.length - 1;
  const bottles = [...new Set(problem.samples.map((sample) => sample.to))].sort();
  return makeStation({
    ...station,
    forcing: problem.forcing,
    source: runDraws(fit, problem, { ...READING_RUN_OPTIONS, distributionsAt: [last] }, MEMBERS),
    receipt: read.receipt,
    language: 'en-GB',
    converged: fit.converged,
    samples: { count: bottles.length, last: bottles.at(-1) ?? null },
  });
}

/** @returns the file's URL */
export async function writeStationFile(folder = publicFolder) {
  const made = (await buildFittedStation()) ?? (await buildStation()).station;
  await mkdir(folder, { recursive: true });
  const file = new URL(`${made.id}.json`, folder);
  await writeFile(file, writeStation(made));
  return file;
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  const file = await writeStationFile(process.argv[2] ? pathToFileURL(`${process.argv[2]}/`) : undefined);
  console.log(`Written: ${fileURLToPath(file)}`);
}
