/**
 * The station from the fit stored with the data: its readings have ranges. `npm run fit` makes the fit; where none is stored, the station is
 * that of build-station.mjs, a single run.
 */
import { mkdir, readFile, writeFile } from 'node:fs/promises';
import { fitSummary, makeStation, READING_RUN_OPTIONS, runDraws, writeStation } from '@rillage/sdk';
import { buildStation } from './build-station.mjs';
import { fitProblem } from './fit-station.mjs';
import { station } from './thessle-brook.mjs';

const dataFolder = new URL('../data/thessle-brook/', import.meta.url);
const publicFolder = new URL('../public/data/', import.meta.url);
/** Runs of the stored fit: few enough for a file that a page can load, and 5 to 95 % still within a percent or two of those of all draws. */
const MEMBERS = 24;

/** null where no fit is stored */
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
    fit: fitSummary(fit),
    samples: { count: bottles.length, last: bottles.at(-1) ?? null },
  });
}

/** @returns the file's URL */
export async function writeFittedStationFile(folder = publicFolder) {
  const made = (await buildFittedStation()) ?? (await buildStation()).station;
  await mkdir(folder, { recursive: true });
  const file = new URL(`${made.id}.json`, folder);
  await writeFile(file, writeStation(made));
  return file;
}
