/**
 * From the invented agency's CSV files to a station file, all of it by the SDK: `node demo-site/service/build-station.mjs [FOLDER]`.
 * Writes FOLDER/thessle-brook.json (default: the demo site's data).
 */
import { mkdir, readFile, writeFile } from 'node:fs/promises';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { makeStation, READING_RUN_OPTIONS, readForcing, runColumn, writeStation } from '@rillage/sdk';
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

/** @returns the file's URL */
export async function writeStationFile(folder = publicFolder) {
  const { station: made } = await buildStation();
  await mkdir(folder, { recursive: true });
  const file = new URL(`${made.id}.json`, folder);
  await writeFile(file, writeStation(made));
  return file;
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  const file = await writeStationFile(process.argv[2] ? pathToFileURL(`${process.argv[2]}/`) : undefined);
  console.log(`Written: ${fileURLToPath(file)}`);
}
