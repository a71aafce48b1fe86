import { readFileSync } from 'node:fs';
import { Ajv2020 } from 'ajv/dist/2020.js';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { makeExcerpt } from '../../../packages/sdk/src/reading/makeExcerpt.js';
import { makeStation } from '../../../packages/sdk/src/reading/makeStation.js';
import { checkSchema } from '../../../packages/sdk/src/reading/schemaCheck.js';
import { excerptSchema, readingSchema, stationSchema } from '../../../packages/sdk/src/reading/stationSchema.js';
import { writeExcerpt, writeStation } from '../../../packages/sdk/src/reading/stationText.js';
import { SDK_VERSION } from '../../../packages/sdk/src/reading/version.js';
import { handmadeForcing, handmadeRun } from './handmade.js';

const published = JSON.parse(
  readFileSync(new URL('../../../packages/sdk/src/reading/station.schema.json', import.meta.url), 'utf8'),
) as object;
// ajv is the general validator the schema is held against; strictTypes is off since unions with null are meant.
const validate = new Ajv2020({ strict: true, strictTypes: false }).compile(published);

const single = handmadeRun({ steps: 30 });
const many = [0.9, 1, 1.1].map((factor, i) => ({ weight: i + 1, run: handmadeRun({ steps: 30, median: 300 * factor }) }));
const stations = {
  single: makeStation({ id: 'one', name: 'One', forcing: handmadeForcing(single), source: single }),
  ensemble: makeStation({
    id: 'many',
    name: 'Many',
    forcing: handmadeForcing(single),
    source: many,
    samples: { count: 3, last: '2021-04-01T00:00:00Z' },
  }),
  withheld: (() => {
    const dry = handmadeRun({ steps: 30, flow: 0 });
    return makeStation({ id: 'dry', name: 'Dry', forcing: handmadeForcing(dry), source: dry });
  })(),
};
const plain = (name: keyof typeof stations): Record<string, unknown> => JSON.parse(writeStation(stations[name])) as Record<string, unknown>;

describe('station.schema.json', () => {
  it('is the schema of the code', () => {
    expect(published).toEqual(JSON.parse(JSON.stringify(stationSchema)));
  });

  it.each(['single', 'ensemble', 'withheld'] as const)('takes a station as written: %s', (name) => {
    expect(validate(plain(name)), JSON.stringify(validate.errors)).toBe(true);
    expect(checkSchema(plain(name), stationSchema)).toEqual([]);
  });
});

describe('excerpt.schema.json', () => {
  const excerptPublished = JSON.parse(
    readFileSync(new URL('../../../packages/sdk/src/reading/excerpt.schema.json', import.meta.url), 'utf8'),
  ) as object;
  const fits = new Ajv2020({ strict: true, strictTypes: false }).compile(excerptPublished);

  it('is the schema of the code', () => {
    expect(excerptPublished).toEqual(JSON.parse(JSON.stringify(excerptSchema)));
  });

  it.each(['single', 'ensemble', 'withheld'] as const)('takes an excerpt as written, and no station: %s', (name) => {
    const excerpt = JSON.parse(writeExcerpt(makeExcerpt(stations[name]))) as Record<string, unknown>;
    expect(fits(excerpt), JSON.stringify(fits.errors)).toBe(true);
    expect(checkSchema(excerpt, excerptSchema)).toEqual([]);
    expect(fits(plain(name))).toBe(false);
    expect(validate(excerpt)).toBe(false);
  });
});

describe('checkSchema(value, schema)', () => {
  it('agrees with a general validator on stations with any field replaced or taken away', () => {
    const paths = [
      ['id'],
      ['latitude'],
      ['members'],
      ['members', '0', 'weight'],
      ['history', 'flow'],
      ['history', 'younger', '30'],
      ['reading', 'median'],
      ['reading', 'status'],
      ['seal'],
      ['distribution', 'low'],
    ];
    fc.assert(
      fc.property(
        fc.constantFrom(...paths),
        fc.option(fc.jsonValue(), { nil: undefined }),
        fc.constantFrom('single' as const, 'ensemble' as const),
        (path, value, name) => {
          const station = { ...plain(name), latitude: 51 };
          let parent = station as Record<string, unknown>;
          for (const key of path.slice(0, -1)) parent = parent[key] as Record<string, unknown>;
          const last = path[path.length - 1] as string;
          if (value === undefined) delete parent[last];
          else parent[last] = value;
          expect(checkSchema(station, stationSchema).length === 0).toBe(validate(station));
        },
      ),
      { seed: 21, numRuns: 300 },
    );
  });

  it('checks readings by the same definitions', () => {
    expect(checkSchema(plain('ensemble')['reading'], readingSchema)).toEqual([]);
    expect(checkSchema({ kind: 'rillage-reading' }, readingSchema).length).toBeGreaterThan(3);
  });
});

describe('SDK_VERSION', () => {
  it('is the package’s version', () => {
    const manifest = JSON.parse(readFileSync(new URL('../../../packages/sdk/package.json', import.meta.url), 'utf8')) as {
      version: string;
    };
    expect(SDK_VERSION).toBe(manifest.version);
  });
});
