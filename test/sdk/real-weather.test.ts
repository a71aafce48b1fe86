import { beforeAll, describe, expect, it } from 'vitest';
import { makeReading, READING_RUN_OPTIONS, runColumn, type ColumnRun, type Forcing } from '@rillage/sdk';
import { PLACES, realCatchment, realForcing, realWeather } from '../../demo-site/service/real-weather.mjs';

/*
 * Real daily weather, 2012–2015, U.S. government work from the npm package vega-datasets 3.2.1 (1461 rows a place, no gaps).
 */
describe.each(Object.keys(PLACES) as (keyof typeof PLACES)[])('runColumn over the weather of %s', (place) => {
  let text = '';
  let forcing: Forcing;
  let run: ColumnRun;
  beforeAll(async () => {
    text = (await realWeather(place)) as string;
    ({ forcing } = realForcing(text, place) as { forcing: Forcing });
    run = runColumn(realCatchment as Parameters<typeof runColumn>[0], forcing, READING_RUN_OPTIONS);
  });
  /** The columns as text splits them: the file has no quotes and no empty cells. */
  const column = (name: string): number[] => {
    const [names, ...rows] = text.split('\n').map((line) => line.split(','));
    const position = (names as string[]).indexOf(name);
    return rows.map((cells) => Number(cells[position]));
  };
  const sum = (list: ArrayLike<number>): number => Array.from(list).reduce((total, value) => total + value, 0);

  it('reads every day of the record', () => {
    expect(forcing.inflow).toHaveLength(1461);
    expect(Date.parse(forcing.start)).toBe(Date.UTC(2012, 0, 1));
  });

  it('lets no water appear or vanish on its way through the snow', () => {
    const fallen = column('precipitation');
    const released = sum(forcing.inflow);
    expect(released).toBeLessThanOrEqual(sum(fallen) + 1e-6);
    // What is left in the snow on 31 December 2015 is at most what fell that month.
    expect(sum(fallen) - released).toBeLessThanOrEqual(sum(fallen.slice(-31)) + 1e-6);
  });

  it('holds snow back where winters are cold: New York has days of precipitation without inflow', () => {
    const [least, greatest] = [column('temp_min'), column('temp_max')];
    const held = column('precipitation').flatMap((amount, i) => (amount > 0.1 && (forcing.inflow[i] as number) < 0.01 ? [i] : []));
    if (place === 'New York') expect(held.length).toBeGreaterThan(10);
    for (const i of held) expect(((least[i] as number) + (greatest[i] as number)) / 2).toBeLessThan(2);
  });

  it('gives evapotranspiration of the size the place is known for', () => {
    // 300 to 1,000 mm a year in a temperate climate (common practice).
    const yearly = sum(forcing.outflows['evapotranspiration'] as Float64Array) / 4;
    expect(yearly).toBeGreaterThan(300);
    expect(yearly).toBeLessThan(1000);
  });

  it('closes the balance and gives ages in order', () => {
    expect(run.closure.water).toBeLessThan(1e-10);
    const { youngerShare, preRecordShare } = run.outflows['discharge'] as ColumnRun['outflows'][string];
    for (let day = 0; day < run.steps; day += 1) {
      const shares = [7, 30, 90, 365].map((age) => youngerShare.get(age)?.[day] as number);
      for (let i = 1; i < 4; i += 1) expect(shares[i] as number).toBeGreaterThanOrEqual((shares[i - 1] as number) - 1e-12);
      expect((shares[3] as number) + (preRecordShare[day] as number)).toBeLessThanOrEqual(1 + 1e-9);
    }
  });

  it('can be read out', () => {
    const reading = makeReading(run, { language: 'en-GB' });
    expect(reading.status).toBe('given');
    expect(reading.sentence).toMatch(/of the stream on 31 December 2015 fell as rain within the last 30 days/);
    expect(reading.sentence).not.toMatch(/NaN|undefined/);
  });
});
