/** Small programs that run in a project with the packed packages, in Node and in Deno. */

/** Imports one public path and prints the sorted names of what it exports. */
export function importProbe(path) {
  const attributes = path.endsWith('.json') ? ", { with: { type: 'json' } }" : '';
  return `const module = await import('${path}'${attributes});\nconsole.log(JSON.stringify(Object.keys(module).sort()));\n`;
}

/** Runs a small catchment with every kind of number a run gives back, and prints them all. The weather is invented. */
export const numbersProbe = `
import { resumeColumn, runColumn } from '@rillage/sdk';

const steps = 400;
const series = (each) => Float64Array.from({ length: steps }, (_, step) => each(step));
const forcing = {
  start: '2020-01-01T00:00:00Z',
  stepDays: 1,
  inflow: series((step) => ((step * 7919) % 11 < 4 ? ((step * 104729) % 97) / 8 : 0)),
  outflows: {
    discharge: series((step) => 1 + ((step * 31) % 17) / 20),
    evapotranspiration: series((step) => ((step * 13) % 7) / 5),
  },
  inflowConcentration: { chloride: series((step) => 3 + (step % 365) / 100) },
};
const catchment = {
  initialStorage: 900,
  selection: {
    discharge: { form: 'gamma', shape: 0.6, scale: 400 },
    evapotranspiration: { form: 'exponential', scale: 120 },
  },
  tracers: { chloride: { preRecord: 5, carriedShare: { evapotranspiration: 0 } } },
};
const options = { youngerThan: [7, 30, 90], quantiles: [0.5] };
const run = runColumn(catchment, forcing, options);
const { youngerShare, quantiles, preRecordShare, concentration } = run.outflows.discharge;
const next = { ...forcing, start: new Date(Date.parse(forcing.start) + steps * 86400000).toISOString() };
const resumed = resumeColumn(JSON.parse(JSON.stringify(run.checkpoint())), next, options);
console.log(JSON.stringify({
  storage: [...run.storage],
  younger: [...youngerShare.values()].map((each) => [...each]),
  median: [...quantiles.values()].map(({ days }) => [...days]),
  preRecord: [...preRecordShare],
  chloride: [...concentration.chloride],
  resumed: [...resumed.outflows.discharge.preRecordShare],
}));
`;

/** A consumer in TypeScript that looks the packages up as Node does. */
export const typesProbe = `
import { RillageError, runColumn, type Catchment, type Forcing } from '@rillage/sdk';
import * as elements from '@rillage/elements';
import type { RillageElements } from '@rillage/elements/jsx';
import type { RillageComponents } from '@rillage/elements/vue';

const catchment: Catchment = { initialStorage: 900, selection: { discharge: { form: 'uniform' } } };
const forcing: Forcing = {
  start: '2020-01-01T00:00:00Z',
  stepDays: 1,
  inflow: new Float64Array(3),
  outflows: { discharge: new Float64Array(3) },
  inflowConcentration: {},
};
try {
  const storage: Float64Array = runColumn(catchment, forcing).storage;
  console.log(storage.length, elements);
} catch (error) {
  if (error instanceof RillageError) console.log(error.code satisfies string);
}
export const compact: RillageElements['rillage-reading'] = { form: 'compact', id: 'now' };
export const props: InstanceType<RillageComponents['rillage-station']>['$props'] = { src: 'station.json' };
// @ts-expect-error a form that the element does not have
export const large: RillageElements['rillage-reading'] = { form: 'large' };
// @ts-expect-error an unknown form is refused by the types
export const wrong: Catchment = { initialStorage: 1, selection: { discharge: { form: 'unknown' } } };
`;
