import { type Reading, type Station, type StationExcerpt } from '../contract.js';
import { RillageError, throwIfAny } from '../errors.js';
import { canonicalJson } from './canonicalJson.js';
import { parseJson } from './parseJson.js';
import { checkSchema, type Schema } from './schemaCheck.js';
import { seal, sealOf, withoutSeal } from './seal.js';
import { excerptSchema, readingSchema, stationSchema } from './stationSchema.js';

const VERSION = 1;

export interface ReadTextOptions {
  /** Longer texts are refused unread; default 20,000,000. */
  maxBytes?: number;
}

/**
 * The station as text: canonical JSON, freshly sealed, one line. The same station gives the same bytes.
 * @throws RillageError 'not-json' where a value has no JSON form
 */
export function writeStation(station: Station): string {
  return `${canonicalJson(seal(withoutSeal(station)))}\n`;
}

/**
 * A station from text that may be anything: checked for size, form, version, seal and shape, in that order; linear in its length.
 * @throws RillageError 'not-text', 'too-large', 'empty-file', 'html-instead', 'truncated', 'not-json', 'too-deep', 'forbidden-key', 'not-a-station',
 *   'newer-version', 'unknown-version', 'seal-missing', 'seal-broken', 'shape'
 */
export function readStation(text: string, options: ReadTextOptions = {}): Station {
  const station = readSealed(text, 'a station', options, 'rillage-station', 'not-a-station', stationSchema) as unknown as Station;
  checkLengths(station);
  return { ...station, distribution: withTypedArrays(station.distribution) };
}

/** An excerpt as text: canonical JSON, freshly sealed, one line; errors as {@link writeStation}. */
export function writeExcerpt(excerpt: StationExcerpt): string {
  return `${canonicalJson(seal(withoutSeal(excerpt)))}\n`;
}

/** An excerpt from text that may be anything; errors as {@link readStation}, with 'not-an-excerpt'. */
export function readExcerpt(text: string, options: ReadTextOptions = {}): StationExcerpt {
  const excerpt = readSealed(text, 'an excerpt', options, 'rillage-excerpt', 'not-an-excerpt', excerptSchema) as unknown as StationExcerpt;
  checkLengths(excerpt);
  return { ...excerpt, distribution: withTypedArrays(excerpt.distribution) };
}

/** A reading as text: canonical JSON, one line. */
export function writeReading(reading: Reading): string {
  return `${canonicalJson(reading)}\n`;
}

/** A reading from text that may be anything; errors as {@link readStation}, with 'not-a-reading', without seals. */
export function readReading(text: string, options: ReadTextOptions = {}): Reading {
  const value = parseJson(text, { what: 'a reading', ...options });
  const record = expectKind(value, 'rillage-reading', 'not-a-reading');
  throwIfAny(checkSchema(record, readingSchema));
  return record as unknown as Reading;
}

function readSealed(
  text: string,
  what: string,
  options: ReadTextOptions,
  kind: string,
  code: string,
  schema: Schema,
): Record<string, unknown> {
  const record = expectKind(parseJson(text, { what, ...options }), kind, code);
  if (typeof record['seal'] !== 'string') {
    throw new RillageError({
      code: 'seal-missing',
      path: 'seal',
      expected: 'a seal',
      received: 'none',
      hint: 'Write stations with writeStation.',
    });
  }
  const expected = sealOf(record);
  if (record['seal'] !== expected) {
    throw new RillageError({
      code: 'seal-broken',
      path: 'seal',
      expected,
      received: record['seal'],
      hint: 'The file was changed after it was written. Go back to a copy, or make the station again.',
    });
  }
  throwIfAny(checkSchema(record, schema));
  return record;
}

function expectKind(value: unknown, kind: string, code: string): Record<string, unknown> {
  const record = typeof value === 'object' && value !== null && !Array.isArray(value) ? (value as Record<string, unknown>) : {};
  if (record['kind'] !== kind) {
    throw new RillageError({
      code,
      path: 'kind',
      expected: kind,
      received: typeof record['kind'] === 'string' ? record['kind'] : 'other data',
      ...(kind === 'rillage-station' && record['kind'] === 'rillage-excerpt'
        ? { hint: 'This is a station’s public excerpt, from which nothing can be continued; give the station file itself.' }
        : {}),
    });
  }
  const version = record['version'];
  if (version === VERSION) return record;
  if (typeof version === 'number' && version > VERSION) {
    throw new RillageError({
      code: 'newer-version',
      path: 'version',
      expected: `version ${VERSION}`,
      received: String(version),
      hint: 'The file was written by a newer version of this software; update before reading it. It was not changed.',
    });
  }
  throw new RillageError({ code: 'unknown-version', path: 'version', expected: `version ${VERSION}`, received: String(version) });
}

function checkLengths({ history, distribution, recent }: Pick<Station, 'history' | 'distribution' | 'recent'>): void {
  const steps = history.flow.length;
  const wrong: { path: string; expected: number; received: number }[] = [];
  const expectLength = (path: string, list: ArrayLike<unknown> | null | undefined, expected: number): void => {
    if (list && list.length !== expected) wrong.push({ path, expected, received: list.length });
  };
  const groups = {
    younger: history.younger,
    youngerLow: history.youngerLow,
    youngerHigh: history.youngerHigh,
    concentration: history.concentration,
  };
  for (const [name, group] of Object.entries(groups)) {
    for (const key of Object.keys(group ?? {})) expectLength(`history.${name}.${key}`, group?.[key], steps);
  }
  for (const name of ['medianDays', 'medianLow', 'medianHigh', 'medianBeyondRecord', 'preRecordShare'] as const) {
    expectLength(`history.${name}`, history[name], steps);
  }
  for (const name of ['youngerShare', 'low', 'high'] as const)
    expectLength(`distribution.${name}`, distribution[name], distribution.ageDays.length);
  if (recent)
    for (const key of Object.keys(recent.outflows)) expectLength(`recent.outflows.${key}`, recent.outflows[key], recent.inflow.length);
  throwIfAny(
    wrong
      .slice(0, 20)
      .map(({ path, expected, received }) => ({ code: 'shape', path, expected: `${expected} values`, received: String(received) })),
  );
}

function withTypedArrays(distribution: Station['distribution']): Station['distribution'] {
  const { low, high } = distribution;
  return {
    ...distribution,
    ageDays: Float64Array.from(distribution.ageDays),
    youngerShare: Float64Array.from(distribution.youngerShare),
    low: low ? Float64Array.from(low) : null,
    high: high ? Float64Array.from(high) : null,
  };
}
