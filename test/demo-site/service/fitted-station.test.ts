import { readFileSync } from 'node:fs';
import { beforeAll, describe, expect, test } from 'vitest';
import { readStation, writeStation, type Station } from '@rillage/sdk';
import { buildFittedStation } from '../../../demo-site/service/fitted-station.mjs';

const truth = JSON.parse(readFileSync(new URL('../../../demo-site/data/thessle-brook/truth.json', import.meta.url), 'utf8'));

describe('the station from the stored fit', () => {
  let station: Station;
  beforeAll(async () => {
    station = (await buildFittedStation())!;
  }, 60_000);

  test('gives every share a range, within 0.01 of the truth that the data were made with', () => {
    const today = truth.younger[7].length - 1 - truth.daysAfter;
    expect(station.reading.status).toBe('given');
    for (const { days, share, range } of station.reading.younger) {
      expect(range).not.toBeNull();
      expect(range!.low).toBeLessThanOrEqual(share!);
      expect(range!.high).toBeGreaterThanOrEqual(share!);
      expect(Math.abs(share! - truth.younger[days][today])).toBeLessThan(0.01);
    }
    expect(station.reading.confidence).not.toBe('notAssessed');
  });

  test('is a file that reads back, below 2 MB', () => {
    const text = writeStation(station);
    expect(text.length).toBeLessThan(2_000_000);
    expect(writeStation(readStation(text))).toBe(text);
  });
});
