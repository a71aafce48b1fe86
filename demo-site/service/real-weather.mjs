/**
 * Real weather, simple water: four years of daily rain and temperature at two places in the United States (U.S. government work, from the npm
 * package vega-datasets 3.2.1), snow by degree days, evapotranspiration by Hargreaves, and, since no flow was measured there, flow from
 * a single store. The ages that follow are those of an imagined stream under real weather: `node demo-site/service/real-weather.mjs`.
 */
import { readFile } from 'node:fs/promises';
import { pathToFileURL } from 'node:url';
import { makeReading, READING_RUN_OPTIONS, readForcing, runColumn } from '@rillage/sdk';

/** Latitudes to a tenth of a degree, from memory. */
export const PLACES = { 'New York': 40.7, Seattle: 47.6 };

export async function realWeather(place) {
  // The package hides its data folder from imports; its entry is in build/.
  const file = new URL('../data/weather.csv', import.meta.resolve('vega-datasets'));
  const [names, ...rows] = (await readFile(file, 'utf8')).trimEnd().split(/\r?\n/);
  return [names, ...rows.filter((row) => row.startsWith(`${place},`))].join('\n');
}

export function realForcing(text, place) {
  const { forcing, findings } = readForcing(text, {
    grid: { stepDays: 1, dayBegins: '00:00', zone: 'UTC' },
    latitude: PLACES[place],
    snow: { meltFactor: 3, meltAbove: 0, snowBelow: 0, rainAbove: 2 },
    evapotranspiration: {
      method: 'hargreaves',
      as: 'evapotranspiration',
      factor: 1,
      limit: { capacity: 120, stressBegins: 0.5, initialDepletion: 0 },
    },
    sources: [
      {
        name: 'weather.csv',
        splitAt: ',',
        namesRow: 1,
        dataFrom: 2,
        time: { columns: [2], writtenAs: 'iso', zone: 'UTC' },
        everyDays: 1,
        columns: [
          { position: 1, holds: 'ignored' },
          { position: 3, holds: 'precipitation', unit: 'mm', standsFor: 'totalFollowing' },
          { position: 4, holds: 'tmax', unit: 'Cel', standsFor: 'meanFollowing' },
          { position: 5, holds: 'tmin', unit: 'Cel', standsFor: 'meanFollowing' },
          { position: 6, holds: 'ignored' },
          { position: 7, holds: 'ignored' },
        ],
      },
    ],
  });
  return { forcing: { ...forcing, outflows: { ...forcing.outflows, discharge: storeFlow(forcing) } }, findings };
}

/** Flow from one store whose drainage grows with the square of its depth, mm/day; it never gives more than it has. */
function storeFlow({ inflow, outflows: { evapotranspiration } }) {
  const discharge = new Float64Array(inflow.length);
  let depth = 150;
  for (let day = 0; day < inflow.length; day += 1) {
    discharge[day] = Math.min(0.5 * depth, 1.5 * (depth / 150) ** 2);
    depth = Math.max(0, depth + inflow[day] - evapotranspiration[day] - discharge[day]);
  }
  return discharge;
}

export const realCatchment = {
  initialStorage: 1200,
  selection: { discharge: { form: 'gamma', shape: 0.6, scale: 500 }, evapotranspiration: { form: 'exponential', scale: 100 } },
};

async function main() {
  for (const place of Object.keys(PLACES)) {
    const { forcing } = realForcing(await realWeather(place), place);
    const run = runColumn(realCatchment, forcing, READING_RUN_OPTIONS);
    console.log(`An imagined stream under the weather of ${place}\n  ${makeReading(run, { language: 'en-GB' }).sentence}\n`);
  }
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) await main();
