import { createHash } from 'node:crypto';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { RillageError } from '../../../packages/sdk/src/errors.js';
import { canonicalJson } from '../../../packages/sdk/src/reading/canonicalJson.js';
import { makeStation } from '../../../packages/sdk/src/reading/makeStation.js';
import { readReading, readStation, writeReading, writeStation } from '../../../packages/sdk/src/reading/stationText.js';
import { handmadeForcing, handmadeRun } from './handmade.js';

const run = handmadeRun({ steps: 40 });
const station = makeStation({ id: 'made-up', name: 'Made-up Brook', invented: true, forcing: handmadeForcing(run), source: run });
const text = writeStation(station);

function codeOf(call: () => unknown): string {
  try {
    call();
  } catch (error) {
    if (error instanceof RillageError) return error.code;
    throw error;
  }
  return 'nothing thrown';
}

/** A station's text with something changed and a seal that fits it, as another program would write it. */
function resealed(change: (content: Record<string, unknown>) => void): string {
  const content = JSON.parse(text) as Record<string, unknown>;
  delete content['seal'];
  change(content);
  const seal = createHash('sha256').update(canonicalJson(content)).digest('hex');
  return JSON.stringify({ ...content, seal });
}

describe('writeStation(station)', () => {
  it('gives the same bytes for the same station, written, read and written again', () => {
    expect(writeStation(station)).toBe(text);
    expect(writeStation(readStation(text))).toBe(text);
  });

  it('seals with the sha-256 of the canonical content', () => {
    const { seal, ...content } = JSON.parse(text) as Record<string, unknown>;
    // Node's own digest is the reference.
    expect(seal).toBe(createHash('sha256').update(canonicalJson(content), 'utf8').digest('hex'));
  });

  it('keeps hostile names as plain text', () => {
    const name = '<img src=x onerror=alert(1)> \u202e "}';
    expect(readStation(writeStation({ ...station, name })).name).toBe(name);
  });
});

describe('readStation(text)', () => {
  it('gives the station back, distributions as typed arrays', () => {
    const read = readStation(text);
    expect(read).toEqual(station);
    expect(read.distribution.ageDays).toBeInstanceOf(Float64Array);
  });

  it('reads a text whose keys stand in another order', () => {
    expect(codeOf(() => readStation(resealed(() => undefined)))).toBe('nothing thrown');
  });

  it.each([
    ['empty-file', ''],
    ['empty-file', ' \n\t'],
    ['html-instead', '<!doctype html><title>404</title>'],
    ['html-instead', '\ufeff  <html>'],
    ['not-json', 'kind=rillage-station'],
    ['not-json', '{"a":1} trailing'],
    ['truncated', '{"kind":"rillage-station",'],
    ['not-a-station', '{}'],
    ['not-a-station', '[]'],
    ['not-a-station', 'null'],
    ['not-a-station', '{"kind":"rillage-reading","version":1}'],
    ['newer-version', '{"kind":"rillage-station","version":2}'],
    ['unknown-version', '{"kind":"rillage-station","version":"1"}'],
    ['unknown-version', '{"kind":"rillage-station"}'],
    ['seal-missing', '{"kind":"rillage-station","version":1}'],
    ['seal-broken', '{"kind":"rillage-station","version":1,"seal":"00"}'],
    ['forbidden-key', '{"kind":"rillage-station","version":1,"__proto__":{"polluted":1}}'],
    ['forbidden-key', '{"kind":"rillage-station","x":[{"constructor":{}}]}'],
    ['too-deep', `${'['.repeat(500)}${']'.repeat(500)}`],
  ])('refuses with %s: %j', (code, given) => {
    expect(codeOf(() => readStation(given))).toBe(code);
    expect(({} as Record<string, unknown>)['polluted']).toBeUndefined();
  });

  it('refuses what is no text', () => {
    expect(codeOf(() => readStation(undefined as unknown as string))).toBe('not-text');
  });

  it('refuses every cut of a file as truncated', () => {
    for (let length = 1; length < text.length - 1; length += 97) expect(codeOf(() => readStation(text.slice(0, length)))).toBe('truncated');
  });

  it('refuses any change as seal-broken', () => {
    expect(codeOf(() => readStation(text.replace('"share":0.3', '"share":0.4')))).toBe('seal-broken');
    expect(codeOf(() => readStation(text.replace('Made-up', 'Made up')))).toBe('seal-broken');
  });

  it('refuses a well sealed file of the wrong shape, every place in one batch', () => {
    const wrong = resealed((content) => {
      content['members'] = [];
      content['latitude'] = 95;
      delete content['history'];
    });
    try {
      readStation(wrong);
      expect.unreachable();
    } catch (error) {
      const issues = (error as RillageError).issues;
      expect(issues.map(({ code }) => code)).toEqual(['shape', 'shape', 'shape']);
      expect(issues.map(({ path }) => path).sort()).toEqual(['history', 'latitude', 'members']);
    }
    const uneven = resealed((content) => ((content['history'] as { medianDays: unknown[] }).medianDays = [1]));
    expect(codeOf(() => readStation(uneven))).toBe('shape');
  });

  it('refuses files above the cap unread, by bytes', () => {
    expect(codeOf(() => readStation('x'.repeat(20_000_001)))).toBe('too-large');
    expect(codeOf(() => readStation('é'.repeat(60), { maxBytes: 100 }))).toBe('too-large');
    expect(codeOf(() => readStation(text, { maxBytes: 1_000_000 }))).toBe('nothing thrown');
  });
});

describe('readStation(anything)', () => {
  const onlyRillageErrors = (given: string): void => {
    try {
      readStation(given);
    } catch (error) {
      if (!(error instanceof RillageError)) throw error;
    }
  };

  it('throws nothing but RillageError for any text', () => {
    fc.assert(fc.property(fc.string({ unit: 'binary', maxLength: 300 }), onlyRillageErrors), { seed: 11, numRuns: 500 });
    fc.assert(fc.property(fc.json(), onlyRillageErrors), { seed: 12, numRuns: 500 });
  });

  it('throws nothing but RillageError for a station with any part replaced, sealed or not', () => {
    const keys = fc.constantFrom(...Object.keys(JSON.parse(text) as object));
    fc.assert(
      fc.property(keys, fc.jsonValue(), fc.boolean(), (key, value, sealed) => {
        if (sealed) onlyRillageErrors(resealed((content) => (content[key] = value)));
        else onlyRillageErrors(JSON.stringify({ ...(JSON.parse(text) as object), [key]: value }));
      }),
      { seed: 13, numRuns: 200 },
    );
  });

  it('throws nothing but RillageError for a station with any bytes overwritten', () => {
    fc.assert(
      fc.property(fc.nat(text.length - 1), fc.string({ unit: 'binary', minLength: 1, maxLength: 4 }), (at, patch) =>
        onlyRillageErrors(text.slice(0, at) + patch + text.slice(at + patch.length)),
      ),
      { seed: 14, numRuns: 300 },
    );
  });

  it('takes time linear in the size: eight times the text, less than thirty-two times the time', () => {
    const hostile = (size: number): string => `{"kind":"rillage-station","x":"${'\\"'.repeat(size)}`;
    // Not of many small objects: the platform's own JSON.parse takes 35 times as long for 8 times as many, from collecting garbage.
    const numbers = (size: number): string => `[${'1,'.repeat(size)}`;
    const openers = (size: number): string => '['.repeat(size);
    const best = (call: (given: string) => void, given: string): number => {
      let least = Infinity;
      for (let i = 0; i < 5; i += 1) {
        const begun = performance.now();
        call(given);
        least = Math.min(least, performance.now() - begun);
      }
      return least;
    };
    // What the platform's own parser takes is not ours to bound: on 800,000 open brackets it grows faster than the text.
    const platform = (given: string): void => {
      try {
        JSON.parse(given);
      } catch {
        // as expected
      }
    };
    for (const make of [hostile, numbers, openers]) {
      best(onlyRillageErrors, make(100_000));
      const small = best(onlyRillageErrors, make(100_000));
      expect(best(onlyRillageErrors, make(800_000))).toBeLessThan(32 * Math.max(0.5, small) + 2 * best(platform, make(800_000)));
    }
  });
});

describe('readReading(writeReading(reading))', () => {
  it('gives the reading back', () => {
    expect(readReading(writeReading(station.reading))).toEqual(station.reading);
  });

  it.each([
    ['not-a-reading', text],
    ['newer-version', '{"kind":"rillage-reading","version":7}'],
    ['shape', '{"kind":"rillage-reading","version":1}'],
    ['html-instead', '<p>'],
  ])('refuses with %s', (code, given) => expect(codeOf(() => readReading(given))).toBe(code));
});
