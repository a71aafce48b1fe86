import { describe, expect, test } from 'vitest';
import {
  fillRainConcentration,
  readForcing,
  RillageError,
  waterBalance,
  type ForcingRead,
  type Layout,
  type SourceLayout,
} from '@rillage/sdk';
import { DEFAULT_BYTES } from '../../../packages/sdk/src/forcing/text/sources.js';

// What agencies' files do (common practice; the list is design's), each with what must come of it.

const rainColumn = { position: 2, holds: 'precipitation', unit: 'mm' } as const;
const layoutOf = (source: Partial<SourceLayout> = {}, more: Partial<Layout> = {}): Layout => ({
  ...more,
  sources: [{ time: { columns: [1], zone: 'UTC' }, columns: [{ ...rainColumn }], ...source }],
});
const read = (text: string | Uint8Array, source: Partial<SourceLayout> = {}, more: Partial<Layout> = {}): ForcingRead =>
  readForcing(text, layoutOf(source, more));
const codes = ({ findings }: ForcingRead): string[] => findings.map(({ code }) => code);
const refused = (work: () => unknown): RillageError => {
  try {
    work();
  } catch (error) {
    expect(error).toBeInstanceOf(RillageError);
    return error as RillageError;
  }
  throw new Error('nothing was refused');
};
const issues = (work: () => unknown): string[] => refused(work).issues.map(({ code }) => code);
const rows = (values: readonly string[], first = 1, mark = ','): string =>
  `date${mark}rain\n${values.map((value, k) => `2020-01-${String(first + k).padStart(2, '0')}${mark}${value}`).join('\n')}\n`;

describe('dialects', () => {
  test('byte-order mark, semicolons, decimal comma, thousands mark', () => {
    const text = '\uFEFFdate;rain\n2020-01-01;1.234,5\n2020-01-02;,5\n';
    const result = read(text, { splitAt: ';', decimalMark: ',', groupMark: '.' });
    expect([...result.forcing.inflow]).toEqual([1234.5, 0.5]);
    expect(codes(result)).toContain('byte-order-mark');
  });
  test('remarks above the header and between rows, a unit row, a type row, a header said again', () => {
    const text = '# gauge 7\nd,p\n10d,8n\ndate,mm\n2020-01-01,1\n# changed the bucket\nd,p\n2020-01-02,2\n';
    const result = read(text, { namesRow: 1, typesRow: 2, unitsRow: 3, dataFrom: 4 });
    expect([...result.forcing.inflow]).toEqual([1, 2]);
    expect(codes(result)).toEqual(expect.arrayContaining(['remarks', 'repeated-header']));
  });
  test('ragged rows: a long one stops, a short one is a gap', () => {
    expect(issues(() => read('date,rain\n2020-01-01,1,7\n2020-01-02,2\n'))).toContain('long-row');
    expect(issues(() => read('date,rain\n2020-01-01,1\n2020-01-02\n2020-01-03,2\n'))).toContain('gap-too-long');
  });
  test('two equal column names and one called __proto__ keep their places', () => {
    const text = 'date,rain,rain,__proto__\n2020-01-01,1,5,9\n2020-01-02,2,6,8\n';
    const columns = [
      { ...rainColumn },
      { position: 3, holds: 'driver', as: 'second' } as const,
      { position: 4, holds: 'driver', as: 'proto' } as const,
    ];
    const { forcing } = read(text, { columns });
    expect([...forcing.inflow]).toEqual([1, 2]);
    expect([...forcing.drivers!['second']]).toEqual([5, 6]);
    expect([...forcing.drivers!['proto']]).toEqual([9, 8]);
    expect(issues(() => read(text, { columns: [{ position: 4, holds: 'driver', as: '__proto__' }] }))).toContain('name-reserved');
  });
  test('an unclosed quote, an empty file, a page of HTML, a file over the cap', () => {
    expect(issues(() => read('date,rain\n"2020-01-01,1\n'))).toContain('unclosed-quote');
    expect(issues(() => read(''))).toContain('empty-file');
    expect(issues(() => read('<!doctype html>\n<html><body>Not found</body></html>'))).toContain('html-instead');
    const error = refused(() => read(rows(['1', '2']), {}, { limits: { bytes: 10 } }));
    expect(error.code).toBe('too-large');
    expect(DEFAULT_BYTES).toBeLessThanOrEqual(100_000_000);
  });
  test('100 MB is refused at once, naming the cap', () => {
    const large = new Uint8Array(100_000_001).fill(49);
    const before = performance.now();
    expect(refused(() => read(large)).code).toBe('too-large');
    expect(performance.now() - before).toBeLessThan(1000);
  });
});

describe('times', () => {
  test('24:00 is the next midnight; hours become a day', () => {
    const text = `time,rain\n${Array.from({ length: 24 }, (_value, k) => `01.01.2020 ${String(k + 1).padStart(2, '0')}:00,1`).join('\n')}\n`;
    const result = read(text, {
      time: { columns: [1], writtenAs: 'DD.MM.YYYY hh:mm', zone: 'UTC' },
      everyDays: 1 / 24,
      columns: [{ ...rainColumn, standsFor: 'totalPreceding' }],
    });
    expect([...result.forcing.inflow]).toEqual([24]);
    expect(codes(result)).toContain('time-24');
  });
  test('spreadsheet day numbers: 43831 is 1 January 2020', () => {
    const { forcing } = read('date,rain\n43831,3\n43832,4\n', { time: { columns: [1], writtenAs: 'serial1900', zone: 'UTC' } });
    expect(forcing.start).toBe('2020-01-01T00:00:00.000Z');
  });
  test('stamps without a zone are refused until it is stated', () => {
    expect(issues(() => read(rows(['1', '2']), { time: { columns: [1] } }))).toContain('layout-unsettled');
  });
  test('unsorted rows are sorted and said; one time twice is refused, or settled by a rule', () => {
    const unsorted = read('date,rain\n2020-01-02,2\n2020-01-01,1\n2020-01-03,3\n');
    expect([...unsorted.forcing.inflow]).toEqual([1, 2, 3]);
    expect(codes(unsorted)).toContain('unsorted-times');
    const twice = 'date,rain\n2020-01-01,1\n2020-01-02,2\n2020-01-02,5\n2020-01-03,3\n';
    expect(issues(() => read(twice))).toContain('duplicate-times');
    expect([...read(twice, { repeatedTime: 'last' }).forcing.inflow]).toEqual([1, 5, 3]);
  });
  test('the hour that does not exist when daylight saving begins is refused', () => {
    const hours = Array.from({ length: 24 }, (_value, k) => `2020-03-29 ${String(k).padStart(2, '0')}:00,1`);
    const layout: Partial<SourceLayout> = { time: { columns: [1], zone: 'Europe/Berlin' }, everyDays: 1 / 24 };
    expect(
      issues(() => read(`time,rain\n${hours.join('\n')}\n`, layout)).some(
        (code) => code === 'missing-hour' || code === 'time-does-not-exist',
      ),
    ).toBe(true);
  });
});

describe('values', () => {
  test('a sentinel and a word are gaps; a short gap is filled by the rule named, a long one stops', () => {
    const gap: Partial<Layout> = { gaps: [{ of: 'precipitation', fill: 'zero', upToSteps: 2 }] };
    const columns = [{ ...rainColumn, absent: ['-9999', 'm'] }];
    const result = read(rows(['1', '-9999', 'm', '2']), { columns }, gap);
    expect([...result.forcing.inflow]).toEqual([1, 0, 0, 2]);
    expect(codes(result)).toEqual(expect.arrayContaining(['absent-values', 'gap-filled']));
    expect(issues(() => read(rows(['1', '-9999', 'm', 'm', '2']), { columns }, gap))).toContain('gap-too-long');
    expect(issues(() => read(rows(['1', '-9999', '2'])))).toContain('negative-flux');
  });
  test('trace rain is zero with a flag, not a gap', () => {
    const result = read(rows(['1', 'T', '2']), { columns: [{ ...rainColumn, trace: ['T'] }] });
    expect([...result.forcing.inflow]).toEqual([1, 0, 2]);
    expect(codes(result)).toContain('trace');
  });
  test('a running total becomes increments, a reset is said', () => {
    const text = rows(['10', '12', '12', '1', '4']);
    const result = read(text, { columns: [{ ...rainColumn, standsFor: 'runningTotal' }] });
    expect([...result.forcing.inflow].slice(-3)).toEqual([0, 1, 3]);
    expect(codes(result)).toContain('running-total-reset');
  });
  test('a total over several days is spread over them and said', () => {
    const result = read(rows(['1', '', '', '9', '2']), { columns: [{ ...rainColumn, accumulates: 'afterGap' }] });
    expect([...result.forcing.inflow]).toEqual([1, 3, 3, 3, 2]);
    expect(codes(result)).toContain('accumulated');
  });
  test('a text where a number should be is refused with its row', () => {
    const error = refused(() => read(rows(['1', 'wet', '2'])));
    expect(error.code).toBe('not-a-number');
    expect(error.row).toBe(3);
  });
  test('<0.05 in a stream sample stays censored', () => {
    const { samples } = read('date,rain,no3\n2020-01-01,1,<0.05\n2020-01-02,2,0.4\n', {
      columns: [{ ...rainColumn }, { position: 3, holds: 'streamTracer', as: 'nitrate', unit: 'mg/L', standsFor: 'instant' }],
    });
    expect(samples![0]).toMatchObject({ value: 0.05, censored: 'below' });
    expect(samples![1].censored).toBeUndefined();
  });
  test('wide tables: a month a row, days side by side', () => {
    const days = Array.from({ length: 31 }, (_value, k) => String(k));
    const text = `year,month,${days.map((day) => `d${Number(day) + 1}`).join(',')}\n2020,1,${days.join(',')}\n`;
    const { forcing } = read(text, {
      table: 'months',
      time: { columns: [1, 2], writtenAs: 'YYYY MM', zone: 'UTC' },
      columns: [{ position: 3, holds: 'precipitation', unit: 'mm', daysAcross: 31 }],
    });
    expect([...forcing.inflow]).toEqual(days.map(Number));
  });
  test('rain in inches taken for mm, and flow in the wrong unit, raise an alarm by the year’s total and the runoff ratio', () => {
    const steps = 800;
    const day = (k: number): string => new Date(Date.UTC(2018, 0, 1) + k * 864e5).toISOString().slice(0, 10);
    const text = (rain: number, flow: number): string =>
      `date,rain,flow\n${Array.from({ length: steps }, (_value, k) => `${day(k)},${k % 3 === 0 ? rain : 0},${flow}`).join('\n')}\n`;
    const columns = [{ ...rainColumn }, { position: 3, holds: 'outflow', as: 'discharge', unit: 'mm/d' } as const];
    const alarm = (result: ForcingRead): string[] =>
      result.findings.filter(({ severity }) => severity === 'warning').map(({ code }) => code);
    expect(alarm(read(text(0.25, 0.01), { columns }))).toContain('inflow-unit');
    expect(alarm(read(text(7, 90), { columns }))).toContain('balance');
    expect(alarm(read(text(8, 1.2), { columns }))).not.toContain('inflow-unit');
  });
});

describe('rain samples over an interval', () => {
  const inflow = Float64Array.of(4, 0, 6, 1, 0, 9, 2, 2);
  const forcing = { start: '2020-01-01T00:00:00Z', stepDays: 1, inflow, outflows: {}, inflowConcentration: {} };
  const bulk = (from: number, to: number, value: number) => ({
    tracer: 'd18O',
    of: 'rain',
    from: `2020-01-0${from}T00:00:00Z`,
    to: `2020-01-0${to}T00:00:00Z`,
    value,
    unit: 'permil',
  });
  const samples = [bulk(1, 5, -8), bulk(5, 9, -11)];

  test.each(['bulkConstant', 'seasonalPlusResidual', 'randomRedistribution'] as const)(
    '%s keeps every bulk value as the amount-weighted mean',
    (rule) => {
      const filled = fillRainConcentration(forcing, samples, { tracer: 'd18O', rule, seed: 3 }).concentration;
      for (const [low, high, value] of [
        [0, 4, -8],
        [4, 8, -11],
      ]) {
        let mass = 0;
        let amount = 0;
        for (let k = low; k < high; k++) {
          if (inflow[k] > 0) mass += inflow[k] * filled[k];
          amount += inflow[k];
        }
        expect(mass / amount).toBeCloseTo(value, 10);
      }
    },
  );
});

test('waterBalance says what would close it', () => {
  const steps = 730;
  const forcing = {
    start: '2020-01-01T00:00:00Z',
    stepDays: 1,
    inflow: new Float64Array(steps).fill(3),
    outflows: { discharge: new Float64Array(steps).fill(1), evapotranspiration: new Float64Array(steps).fill(1.5) },
    inflowConcentration: {},
  };
  const balance = waterBalance(forcing) as unknown as Record<string, number>;
  expect(Object.values(balance).some((value) => Math.abs(value - 0.5 * steps) < 1e-6)).toBe(true);
});
