/**
 * Makes the invented catchments' files beside this script, always the same bytes: `node demo-site/data/generate.mjs`.
 *   --station ID     one station only
 *   --noise-seed N   other laboratory errors on the same water: only the two sample files change; with --out, written elsewhere
 *   --out FOLDER     instead of this folder
 */
import { mkdir, writeFile } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { parseArgs } from 'node:util';
import { trackAges } from './generator/ages.mjs';
import { agencyFiles } from './generator/files.mjs';
import { refineAges } from './generator/refine.mjs';
import { makeSamples } from './generator/samples.mjs';
import { STATIONS } from './generator/stations.mjs';
import { truthFile } from './generator/truth.mjs';
import { makeWater } from './generator/water.mjs';
import { makeWeather } from './generator/weather.mjs';

export { STATIONS, agencyFiles, makeSamples, makeWater, makeWeather, refineAges, trackAges, truthFile };

const SAMPLE_FILES = ['stream-samples.csv', 'rain-samples.csv'];

/** Everything of one station but its laboratory errors; the slow part. */
export function makeStationTruth(station, options) {
  const weather = makeWeather(station);
  const water = makeWater(station, weather);
  return { weather, water, truth: refineAges(station, water, options) };
}

/** The text of every file, by name. With `noiseSeed`, other laboratory errors on the same water. */
export function makeStationFiles(station, made = makeStationTruth(station), noiseSeed = station.noiseSeed) {
  const files = agencyFiles(station, { ...made, samples: makeSamples(station, made, noiseSeed) });
  return { ...files, 'truth.json': truthFile(station, made) };
}

async function main() {
  const { values } = parseArgs({ options: { station: { type: 'string' }, 'noise-seed': { type: 'string' }, out: { type: 'string' } } });
  const here = dirname(fileURLToPath(import.meta.url));
  for (const station of Object.values(STATIONS)) {
    if (values.station && values.station !== station.id) continue;
    const noiseSeed = values['noise-seed'] === undefined ? station.noiseSeed : Number(values['noise-seed']);
    const files = makeStationFiles(station, makeStationTruth(station), noiseSeed);
    const folder = join(values.out ?? here, station.id);
    await mkdir(folder, { recursive: true });
    for (const [name, text] of Object.entries(files)) {
      if (values['noise-seed'] !== undefined && !SAMPLE_FILES.includes(name)) continue;
      await writeFile(join(folder, name), text);
    }
    console.log(
      `${station.name} (invented): ${Object.keys(files).length} files, ${Math.round(Object.values(files).join('').length / 1000)} kB`,
    );
  }
}

if (process.argv[1] && fileURLToPath(import.meta.url) === process.argv[1]) await main();
