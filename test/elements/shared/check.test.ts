import fc from 'fast-check';
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { asDistribution } from '../../../packages/elements/src/shared/check/distribution.js';
import { asReading } from '../../../packages/elements/src/shared/check/reading.js';
import { checkStation } from '../../../packages/elements/src/shared/check/station.js';
import { cleanText } from '../../../packages/elements/src/shared/text.js';

const fixture = readFileSync(new URL('../../fixtures/station.json', import.meta.url), 'utf8');
interface Loose {
  [key: string]: Loose;
}
const station = (): Loose => JSON.parse(fixture) as Loose;

describe('checkStation()', () => {
  it('checkStation() takes a station, and a reading alone', () => {
    expect(checkStation(station()).problem).toBe(null);
    expect(checkStation(station()['reading']).problem).toBe(null);
  });

  const damage: [string, (file: Loose) => void, string][] = [
    ['a foreign kind', (file) => Object.assign(file, { kind: 'x' }), 'kind'],
    ['no name', (file) => void delete file['name'], 'name'],
    ['a date that is none', (file) => Object.assign(file['reading']!, { at: 'soon' }), 'reading.at'],
    ['a share above one', (file) => Object.assign(file['reading']!['younger']![2]!, { share: 1.2 }), 'reading.younger[2].share'],
    [
      'a range upside down',
      (file) => Object.assign(file['reading']!['olderThanRecord']!, { range: { low: 0.4, high: 0.3 } }),
      'reading.olderThanRecord.range',
    ],
    ['no evidence', (file) => void delete file['reading']!['evidence'], 'reading.evidence'],
    [
      'a distribution that falls',
      (file) => Object.assign(file['distribution']!['youngerShare']!, { 9: 0 }),
      'distribution.youngerShare[9]',
    ],
    [
      'ages that stand still',
      (file) => Object.assign(file['distribution']!['ageDays']!, { 9: file['distribution']!['ageDays']![8] }),
      'distribution.ageDays[9]',
    ],
    ['half a band', (file) => Object.assign(file['distribution']!, { low: null }), 'distribution.low'],
    ['a number as text', (file) => Object.assign(file['reading']!['median']!, { days: '12' }), 'reading.median.days'],
  ];
  for (const [what, spoil, at] of damage) {
    it(`checkStation() refuses ${what} and names ${at}`, () => {
      const file = station();
      spoil(file);
      expect(checkStation(file)).toEqual({ problem: { code: 'notStation', at } });
    });
  }

  it('checkStation() tells a newer version from a broken file', () => {
    expect(checkStation({ kind: 'rillage-station', version: 2 })).toEqual({ problem: { code: 'newer', at: '2' } });
    expect(checkStation({ kind: 'rillage-station', version: '2' })).toEqual({ problem: { code: 'notStation', at: 'version' } });
  });

  it('checkStation() never throws, whatever JSON it is given', () => {
    fc.assert(fc.property(fc.jsonValue(), (value) => void checkStation(value)));
  });

  it('checkStation() never throws and never passes a non-number where one field of a good file is replaced', () => {
    const paths = leaves(station()['reading']!);
    fc.assert(
      fc.property(fc.constantFrom(...paths), fc.jsonValue(), (path, value) => {
        const file = station()['reading']!;
        let here = file;
        for (const step of path.slice(0, -1)) here = here[step]!;
        (here as Record<string, unknown>)[path.at(-1)!] = value;
        const reading = asReading(file);
        if (reading) for (const { share } of reading.younger) expect(share === null || (share >= -1e-6 && share <= 1 + 1e-6)).toBe(true);
      }),
      { numRuns: 500 },
    );
  });
});

describe('asDistribution()', () => {
  it('asDistribution() takes typed arrays, and gives null for a step without outflow', () => {
    const { distribution } = station();
    const typed = { ...distribution, ageDays: Float64Array.from(distribution!['ageDays'] as unknown as number[]) };
    expect(asDistribution(typed)).toBe(typed);
    expect(asDistribution({ ...distribution, ageDays: [], youngerShare: [], low: [], high: [] })).toBe(null);
    expect(asDistribution(null)).toBe(null);
  });
});

describe('cleanText()', () => {
  it('cleanText() keeps letters, marks and markup as characters, and takes out controls and turns of direction', () => {
    expect(cleanText('<b>Größe</b> نهر\u202Etxet\u2066\u0000')).toBe('<b>Größe</b> نهرtxet');
    expect(cleanText('a\n\t b')).toBe('a b');
    expect(cleanText(42)).toBe('');
  });

  it('cleanText() cuts without splitting a character', () => {
    expect(cleanText('a😀', 2)).toBe('a…');
    expect(cleanText('x'.repeat(10), 5)).toBe('xxxxx…');
  });
});

function leaves(value: unknown, path: string[] = []): string[][] {
  if (typeof value !== 'object' || value === null) return [path];
  return Object.entries(value).flatMap(([key, child]) => leaves(child, [...path, key]));
}
