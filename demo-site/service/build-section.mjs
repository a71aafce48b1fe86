/**
 * What the column page computes from: the invented station's record as it was used, its model and its samples of one tracer, in one file of
 * plain numbers: `node demo-site/service/build-section.mjs [FOLDER]` writes FOLDER/thessle-brook-record.json (default: the demo site's data).
 */
import { mkdir, readFile, writeFile } from 'node:fs/promises';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { readForcing } from '@rillage/sdk';
import { catchment, recordFiles, recordLayout, station } from './thessle-brook.mjs';

const dataFolder = new URL('../data/thessle-brook/', import.meta.url);
const publicFolder = new URL('../public/data/', import.meta.url);
const tracer = 'd18O';

export async function buildRecord() {
  const texts = await Promise.all(recordFiles.map(async (name) => ({ name, text: await readFile(new URL(name, dataFolder)) })));
  const { forcing, samples } = readForcing(texts, recordLayout);
  const rounded = (series) => Array.from(series, (value) => Math.round(value * 1e4) / 1e4);
  return {
    invented: station.invented,
    name: station.name,
    tracer,
    unit: '‰',
    forcing: {
      start: forcing.start,
      stepDays: forcing.stepDays,
      inflow: rounded(forcing.inflow),
      outflows: Object.fromEntries(Object.entries(forcing.outflows).map(([name, series]) => [name, rounded(series)])),
      inflowConcentration: { [tracer]: rounded(forcing.inflowConcentration[tracer]) },
    },
    catchment: { ...catchment, tracers: { [tracer]: catchment.tracers[tracer] } },
    samples: samples.filter((sample) => sample.tracer === tracer && (sample.of ?? 'discharge') === 'discharge'),
  };
}

/** @returns the file's URL */
export async function writeRecordFile(folder = publicFolder) {
  await mkdir(folder, { recursive: true });
  const file = new URL(`${station.id}-record.json`, folder);
  await writeFile(file, JSON.stringify(await buildRecord()));
  return file;
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  const file = await writeRecordFile(process.argv[2] ? pathToFileURL(`${process.argv[2]}/`) : undefined);
  console.log(`Written: ${fileURLToPath(file)}`);
}
