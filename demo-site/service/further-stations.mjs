/**
 * The agency's other invented stations, from files in memory to station files: `node demo-site/service/further-stations.mjs [FOLDER]`. Nobody has
 * taken bottles there and nothing is fitted, so their ranges are not assessed, which their readings say. Each model is the one an agency would
 * assume for such ground; see data/generator/further-stations.mjs.
 */
import { mkdir, writeFile } from 'node:fs/promises';
import { pathToFileURL } from 'node:url';
import { makeStation, READING_RUN_OPTIONS, readForcing, runColumn, writeStation } from '@rillage/sdk';
import { agencyFiles, makeWater, makeWeather } from '../data/generate.mjs';
import { FURTHER_STATIONS } from '../data/generator/further-stations.mjs';
import { publishStation } from './publish.mjs';
import { recordLayout } from './thessle-brook.mjs';

const publicFolder = new URL('../public/data/', import.meta.url);
const DAY_MS = 86_400_000;
const DESCRIPTION =
  'An invented catchment. No such stream, place or agency exists; its records come from a seeded script, its model is assumed and not fitted.';

/** @returns {import('@rillage/sdk').Station[]} */
export const buildFurtherStations = () => FURTHER_STATIONS.map(buildOne);

function buildOne(invented) {
  const { id, name, latitude, areaKm2, truth } = invented;
  const { forcing, receipt } = readForcing(filesOf(invented), layoutOf(invented));
  const { initialStorage, selection } = truth;
  const options = { ...READING_RUN_OPTIONS, distributionsAt: [forcing.inflow.length - 1] };
  return makeStation({
    ...{ id, name, latitude, areaKm2, invented: true, description: DESCRIPTION, language: 'en-GB', forcing, receipt },
    source: runColumn({ initialStorage, selection }, forcing, options),
  });
}

/** Weather and flow as the agency's files give them, habits and all; no bottles. */
function filesOf(invented) {
  const weather = makeWeather(invented);
  const files = agencyFiles(invented, { weather, water: makeWater(invented, weather), samples: { stream: [], rain: [] } });
  return ['weather.csv', 'flow.csv'].map((name) => ({ name, text: files[name] }));
}

/** Every station's files are written alike, so Thessle Brook's layout serves. */
function layoutOf({ firstDay, lastDay, areaKm2, latitude, water: { cropFactor } }) {
  const { rainConcentration, ...layout } = recordLayout;
  const to = new Date(Date.parse(lastDay) + DAY_MS).toISOString().slice(0, 10);
  return {
    ...layout,
    ...{ areaKm2, latitude, grid: { ...layout.grid, from: firstDay, to } },
    evapotranspiration: { ...layout.evapotranspiration, factor: cropFactor },
    sources: layout.sources.filter(({ name }) => name === 'weather.csv' || name === 'flow.csv'),
  };
}

/** Writes every station's file and what the public is given of it. */
export async function writeFurtherStationFiles(folder = publicFolder) {
  await mkdir(folder, { recursive: true });
  for (const made of buildFurtherStations()) {
    await writeFile(new URL(`${made.id}.json`, folder), writeStation(made));
    await publishStation(made, folder);
  }
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  await writeFurtherStationFiles(process.argv[2] ? pathToFileURL(`${process.argv[2]}/`) : undefined);
}
