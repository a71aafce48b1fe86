import { existsSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import {
  agencyFiles,
  makeSamples,
  makeStationTruth,
  makeWater,
  makeWeather,
  refineAges,
  STATIONS,
} from '../../../demo-site/data/generate.mjs';
import { hargreaves } from '../../../demo-site/data/generator/water.mjs';

const station = STATIONS['thessle-brook'];
const folder = new URL('../../../demo-site/data/thessle-brook/', import.meta.url);
const committed = (name: string): string => readFileSync(new URL(name, folder), 'utf8');
const truth = JSON.parse(committed('truth.json')) as {
  firstDay: string;
  concentration: Record<'d18O' | 'd2H' | 'chloride', number[]>;
  younger: Record<string, number[]>;
  preRecordShare: number[];
  medianDays: (number | null)[];
  largestDifferenceOfTheTwo: Record<string, number>;
};
const sum = (list: readonly number[]): number => list.reduce((total, value) => total + value, 0);
const dayOf = (date: string): number => Math.round((Date.parse(date) - Date.parse(truth.firstDay)) / 86_400_000);

describe('makeWeather(station), makeWater(station, weather)', () => {
  const weather = makeWeather(station);
  const water = makeWater(station, weather);

  it('make the committed files again, byte for byte', () => {
    const nothing = { stream: [], rain: [] };
    const files = agencyFiles(station, { weather, water, samples: nothing }) as Record<string, string>;
    for (const name of ['weather.csv', 'flow.csv', 'next-days.csv']) expect(files[name], name).toBe(committed(name));
  });

  it('close the balance with the truth’s own storage within a year’s swing', () => {
    const change = sum(water.inflow) - sum(water.discharge) - sum(water.evapotranspiration);
    expect(Math.abs(change)).toBeLessThan(100);
    expect(Math.min(...water.discharge)).toBeGreaterThan(0);
  });

  it('take reference evapotranspiration from FAO-56’s own example', () => {
    // FAO-56, example 20 (Lyon, July, 26.6 and 14.8 °C, 45.72° N): 5.0 mm/day (from memory).
    expect(Math.abs(hargreaves(14.8, 26.6, 45 + 43 / 60, '2019-07-15') - 5)).toBeLessThan(0.05);
  });
});

describe('refineAges(station, water)', () => {
  it('meets the closed form of an exponential selection under constant fluxes', () => {
    // dS/dT = J exp(−S/s) from S(0) = 0 gives S = s ln(1 + JT/s); a day's share younger than T is the mean of 1 − 1/(1 + Jτ/s) over its last day.
    const inflow = 2;
    const scale = 150;
    const days = 400;
    const flat = (value: number): number[] => new Array<number>(days).fill(value);
    const water = { inflow: flat(inflow), discharge: flat(inflow), evapotranspiration: flat(0), inflowTracers: { salt: flat(3) } };
    const simple = {
      ...station,
      truth: {
        initialStorage: 3000,
        selection: { discharge: { form: 'gamma', shape: 1, scale }, evapotranspiration: { form: 'exponential', scale: 100 } },
        tracers: { salt: { preRecord: 3 } },
        noise: {},
      },
    };
    const found = refineAges(simple, water, { subSteps: 24 }) as unknown as {
      younger: Record<string, number[]>;
      concentration: { salt: number[] };
    };
    for (const age of [7, 30, 90, 365]) {
      const expected = 1 - (scale / inflow) * Math.log((scale + inflow * age) / (scale + inflow * (age - 1)));
      expect(found.younger[String(age)]?.[days - 1]).toBeCloseTo(expected, 5);
    }
    // Constant input equal to the initial concentration comes out constant.
    for (const value of found.concentration.salt) expect(value).toBeCloseTo(3, 10);
  });
});

describe('makeSamples(station, made, noiseSeed)', () => {
  const short = { ...station, lastDay: '2016-03-31', subSteps: 8 };
  const made = makeStationTruth(short);

  it('changes the laboratory’s errors alone', () => {
    const first = agencyFiles(short, { ...made, samples: makeSamples(short, made, 1) }) as Record<string, string>;
    const second = agencyFiles(short, { ...made, samples: makeSamples(short, made, 2) }) as Record<string, string>;
    expect(agencyFiles(short, { ...made, samples: makeSamples(short, made, 1) })).toEqual(first);
    for (const name of Object.keys(first)) expect(first[name] === second[name], name).toBe(!/samples/.test(name));
  });
});

describe('demo-site/data/thessle-brook', () => {
  const rows = committed('stream-samples.csv')
    .split('\n')
    .filter((line) => /^S\d/.test(line))
    .map((line) => line.split(';'))
    .filter((cells) => cells[2] !== '');

  it.each([
    ['d18O', 2, 0.1, 0],
    ['d2H', 3, 0.8, 0],
    ['chloride', 4, 0.08, 0.03],
  ] as const)('has stream samples of %s that scatter around the truth as stated', (tracer, column, error, share) => {
    const scaled = rows.map((cells) => {
      const [day, month, year] = (cells[1] as string).split('.');
      const value = truth.concentration[tracer][dayOf(`${year}-${month}-${day}`)] as number;
      return (Number((cells[column] as string).replace(',', '.')) - value) / Math.hypot(error, share * value);
    });
    const mean = sum(scaled) / scaled.length;
    const spread = Math.sqrt(sum(scaled.map((each) => (each - mean) ** 2)) / (scaled.length - 1));
    // Four standard errors of a mean and of a standard deviation.
    expect(Math.abs(mean)).toBeLessThan(4 / Math.sqrt(scaled.length));
    expect(Math.abs(spread - 1)).toBeLessThan(4 / Math.sqrt(2 * scaled.length));
  });

  it('states a truth whose shares grow with age and whose own error is small', () => {
    truth.preRecordShare.forEach((preRecord, day) => {
      const shares = ['7', '30', '90', '365'].map((age) => truth.younger[age]?.[day] as number);
      for (let i = 1; i < 4; i += 1) expect(shares[i] as number).toBeGreaterThanOrEqual((shares[i - 1] as number) - 1e-3);
      expect(shares[3] as number).toBeLessThanOrEqual(1 - preRecord + 1e-3);
    });
    expect(Math.max(...['7', '30', '90', '365'].map((age) => truth.largestDifferenceOfTheTwo[`younger.${age}`] as number))).toBeLessThan(
      0.002,
    );
  });

  it('has an agency’s habits, is said to be invented, and stays below 1 MB', () => {
    expect(committed('weather.csv')).toMatch(/,T,/);
    expect(committed('weather.csv')).toMatch(/,-9999,/);
    expect(committed('rain-samples.csv')).toMatch(/,<0\.8/);
    expect(committed('stream-samples.csv')).toMatch(/;-?\d+,\d+;/);
    const days = committed('flow.csv').match(/^\d{4}-\d\d-\d\d/gm) as string[];
    expect(new Set(days).size).toBe(days.length - 1);
    expect(new Set(days).size).toBe(3653 - 3);
    let bytes = 0;
    for (const name of ['weather.csv', 'flow.csv', 'rain-samples.csv', 'stream-samples.csv', 'next-days.csv', 'truth.json']) {
      expect(existsSync(new URL(name, folder))).toBe(true);
      expect(committed(name)).toMatch(/invented/i);
      bytes += Buffer.byteLength(committed(name));
    }
    expect(bytes).toBeLessThan(1_000_000);
  });
});
