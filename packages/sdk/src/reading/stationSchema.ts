import { type Schema } from './schemaCheck.js';

/*
 * The published schemas (JSON Schema 2020-12). station.schema.json and excerpt.schema.json beside this file are the same in JSON; a test holds
 * them equal.
 * Fields may be added without a new version, so readers pass over what they do not know.
 */

const text = (maxLength = 2000): Schema => ({ type: 'string', maxLength });
const instant: Schema = { type: 'string', pattern: '^\\d{4}-\\d{2}-\\d{2}T\\d{2}:\\d{2}(:\\d{2}(\\.\\d+)?)?(Z|[+-]\\d{2}:\\d{2})$' };
const share: Schema = { type: 'number', minimum: 0, maximum: 1 };
const hash: Schema = { type: 'string', pattern: '^[0-9a-f]{64}$' };
const orNull = (type: 'number' | 'string'): Schema => ({ type: [type, 'null'] });
const shareOrNull: Schema = { type: ['number', 'null'], minimum: 0, maximum: 1 };
const object = (required: string[], properties: Record<string, Schema>): Schema => ({ type: 'object', required, properties });
const MOST_STEPS = 3660;
const series = (items: Schema): Schema => ({ type: 'array', items, maxItems: MOST_STEPS });
const named = (of: Schema): Schema => ({ type: 'object', additionalProperties: of });

const $defs: Record<string, Schema> = {
  range: { type: ['object', 'null'], required: ['low', 'high'], properties: { low: { type: 'number' }, high: { type: 'number' } } },
  younger: object(['days', 'share', 'unplaced', 'range'], {
    days: { type: 'number', exclusiveMinimum: 0 },
    share: shareOrNull,
    unplaced: share,
    range: { $ref: '#/$defs/range' },
  }),
  median: {
    type: ['object', 'null'],
    required: ['days', 'beyondRecord', 'range'],
    properties: { days: { type: 'number', minimum: 0 }, beyondRecord: { type: 'boolean' }, range: { $ref: '#/$defs/range' } },
  },
  source: object(['name', 'sha256'], { name: text(), sha256: hash }),
  reading: object(
    [
      'kind',
      'version',
      'of',
      'at',
      'stepDays',
      'status',
      'withheld',
      'confidence',
      'younger',
      'median',
      'olderThanRecord',
      'language',
      'sentence',
      'caution',
      'evidence',
    ],
    {
      kind: { const: 'rillage-reading' },
      version: { const: 1 },
      station: object(['id', 'name'], { id: text(80), name: text(), invented: { type: 'boolean' } }),
      of: text(200),
      at: instant,
      stepDays: { type: 'number', exclusiveMinimum: 0 },
      status: { enum: ['given', 'withheld'] },
      withheld: { type: 'array', items: object(['code', 'because'], { code: text(200), because: text() }) },
      confidence: { enum: ['firm', 'tentative', 'withheld', 'notAssessed'] },
      confidenceBecause: { type: 'array', items: text() },
      younger: { type: 'array', items: { $ref: '#/$defs/younger' }, maxItems: 100 },
      median: { $ref: '#/$defs/median' },
      olderThanRecord: object(['share', 'range'], { share: shareOrNull, range: { $ref: '#/$defs/range' } }),
      assumedShare: share,
      trend: {
        type: ['object', 'null'],
        required: ['direction', 'days', 'usualShare', 'years'],
        properties: {
          direction: { enum: ['younger', 'older', 'usual'] },
          days: { type: 'number' },
          usualShare: share,
          years: { type: 'integer', minimum: 1 },
        },
      },
      language: text(80),
      sentence: text(),
      sentences: { type: 'array', items: text() },
      caution: text(),
      evidence: object(['recordFrom', 'recordTo', 'samples', 'lastSample', 'method', 'version', 'sources'], {
        recordFrom: text(80),
        recordTo: instant,
        samples: orNull('number'),
        lastSample: orNull('string'),
        method: text(),
        version: text(80),
        sources: { type: 'array', items: { $ref: '#/$defs/source' }, maxItems: 1000 },
      }),
    },
  ),
  checkpoint: object(['kind', 'version', 'steps', 'recordStart', 'stepDays', 'catchment', 'ageResolution', 'state'], {
    kind: { const: 'rillage-checkpoint' },
    version: { const: 1 },
    steps: { type: 'integer', minimum: 0 },
    recordStart: text(80),
    stepDays: { type: 'number', exclusiveMinimum: 0 },
    catchment: object(['initialStorage', 'selection'], {
      initialStorage: { type: 'number', minimum: 0 },
      selection: named(object(['form'], { form: text(80) })),
    }),
    ageResolution: { type: 'number', minimum: 0 },
    state: { type: 'object' },
  }),
  history: object(['start', 'stepDays', 'flow', 'younger', 'medianDays', 'medianBeyondRecord', 'preRecordShare', 'concentration'], {
    start: instant,
    stepDays: { type: 'number', exclusiveMinimum: 0 },
    flow: series(orNull('number')),
    younger: named(series(shareOrNull)),
    youngerLow: named(series(shareOrNull)),
    youngerHigh: named(series(shareOrNull)),
    medianDays: series(orNull('number')),
    medianLow: series(orNull('number')),
    medianHigh: series(orNull('number')),
    medianBeyondRecord: series({ enum: [0, 1] }),
    preRecordShare: series(shareOrNull),
    concentration: named(series(orNull('number'))),
  }),
  distribution: object(['of', 'at', 'ageDays', 'youngerShare', 'low', 'high', 'preRecordShare', 'preRecordRange', 'recordDays'], {
    of: text(200),
    at: instant,
    ageDays: series({ type: 'number', minimum: 0 }),
    youngerShare: series(share),
    low: { type: ['array', 'null'], items: share, maxItems: MOST_STEPS },
    high: { type: ['array', 'null'], items: share, maxItems: MOST_STEPS },
    preRecordShare: share,
    preRecordRange: { $ref: '#/$defs/range' },
    recordDays: { type: 'number', minimum: 0 },
  }),
  recent: object(['start', 'inflow', 'outflows'], {
    start: instant,
    inflow: { type: 'array', items: { type: 'number' }, maxItems: 400 },
    outflows: named({ type: 'array', items: { type: 'number' }, maxItems: 400 }),
  }),
};

/** A reading on its own, as the morning job writes it. */
export const readingSchema: Schema = { $ref: '#/$defs/reading', $defs };

/** What a station and its public excerpt have in common. */
const about: Record<string, Schema> = {
  id: { type: 'string', pattern: '^[A-Za-z0-9][A-Za-z0-9_-]{0,79}$' },
  name: text(),
  invented: { type: 'boolean' },
  description: text(20_000),
  latitude: { type: 'number', minimum: -90, maximum: 90 },
  areaKm2: { type: 'number', exclusiveMinimum: 0 },
  of: text(200),
  history: { $ref: '#/$defs/history' },
  distribution: { $ref: '#/$defs/distribution' },
  reading: { $ref: '#/$defs/reading' },
  samples: object(['count', 'last'], { count: { type: 'integer', minimum: 0 }, last: orNull('string') }),
  signedOff: object(['by', 'at'], { by: text(), at: text(80) }),
  seal: hash,
};

/** A station file. */
export const stationSchema: Schema = {
  $schema: 'https://json-schema.org/draft/2020-12/schema',
  $id: 'urn:rillage:station:1',
  title: 'Rillage station, version 1',
  description:
    'One gauge as a file. The seal is the sha-256, in hex, of the canonical JSON (keys sorted, no white space) of everything else.',
  ...object(['kind', 'version', 'id', 'name', 'of', 'members', 'history', 'distribution', 'reading', 'seal'], {
    kind: { const: 'rillage-station' },
    version: { const: 1 },
    ...about,
    members: {
      type: 'array',
      minItems: 1,
      maxItems: 2000,
      items: object(['weight', 'checkpoint'], { weight: { type: 'number', minimum: 0 }, checkpoint: { $ref: '#/$defs/checkpoint' } }),
    },
    recent: { $ref: '#/$defs/recent' },
    balance: object(['inflow', 'outflow'], { inflow: { type: 'number' }, outflow: { type: 'number' } }),
    receipt: { type: 'object' },
  }),
  $defs,
};

/** The public excerpt of a station file, without what a morning's work continues from. */
export const excerptSchema: Schema = {
  $schema: 'https://json-schema.org/draft/2020-12/schema',
  $id: 'urn:rillage:excerpt:1',
  title: 'Rillage station excerpt, version 1',
  description:
    'What of a station the public is shown. The seal is made as a station’s; stationSeal is the seal of the station it was taken from.',
  ...object(['kind', 'version', 'id', 'name', 'of', 'history', 'distribution', 'reading', 'stationSeal', 'seal'], {
    kind: { const: 'rillage-excerpt' },
    version: { const: 1 },
    ...about,
    stationSeal: hash,
  }),
  $defs,
};
