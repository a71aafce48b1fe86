import { beforeAll, describe, expect, it } from 'vitest';
import { type Station, readStation, writeStation } from '@rillage/sdk';
import { buildFurtherStations } from '../../../demo-site/service/further-stations.mjs';

describe('buildFurtherStations()', () => {
  const stations = new Map<string, Station>();
  let milliseconds = 0;
  beforeAll(() => {
    const began = performance.now();
    for (const station of buildFurtherStations() as Station[]) stations.set(station.id, station);
    milliseconds = performance.now() - began;
  });
  const of = (id: string): Station => stations.get(id)!;

  it('takes seconds, not minutes', () => {
    // About 1.1 s on an idle core; the bound leaves room for a crowded machine and for none of ten times the work.
    expect(milliseconds).toBeLessThan(10_000);
  });

  it('has young water in the clay: half of it younger than a month', () => {
    const { reading } = of('ottering-beck');
    expect(reading.status).toBe('given');
    expect(reading.median!.days).toBeLessThan(30);
    expect(reading.median!.beyondRecord).toBe(false);
  });

  it('has old water in the chalk: a median beyond the record, said as such and never as a number', () => {
    const { reading } = of('ambrel-spring');
    expect(reading.status).toBe('given');
    expect(reading.median!.beyondRecord).toBe(true);
    expect(reading.olderThanRecord.share).toBeGreaterThan(0.5);
    expect(reading.sentence).toMatch(/Half of the water or more is older than the record, which goes back 6 years/);
  });

  it('withholds the dry stream’s reading with its reason, and has given one on other days', () => {
    const { reading, history } = of('tessen-sike');
    expect(reading).toMatchObject({ status: 'withheld', withheld: [{ code: 'noOutflow' }], median: null });
    expect(reading.sentence).toMatch(/No age is given for 31 March 2025: there was no outflow/);
    expect(history.flow.at(-1)).toBe(0);
    expect(history.younger['30']!.at(-1)).toBeNull();
    const flowing = history.flow.filter((flow) => flow! > 0).length / history.flow.length;
    expect(flowing).toBeGreaterThan(0.3);
    expect(flowing).toBeLessThan(0.8);
  });

  it('claims no range for any, says that each is invented, and gives files that read back', () => {
    for (const station of stations.values()) {
      expect(station).toMatchObject({ invented: true, reading: { station: { invented: true }, at: '2025-04-01T00:00:00Z' } });
      expect(station.description).toMatch(/invented/i);
      expect(station.reading.younger.every(({ range }) => range === null)).toBe(true);
      if (station.reading.status === 'given') expect(station.reading.confidence).toBe('notAssessed');
      const text = writeStation(station);
      expect(text.length).toBeLessThan(200_000);
      expect(writeStation(readStation(text))).toBe(text);
    }
  });
});
