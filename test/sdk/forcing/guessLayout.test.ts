import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { guessLayout, readForcing, RillageError, type Layout } from '@rillage/sdk';
import { recordFiles, recordLayout } from '../../../demo-site/service/thessle-brook.mjs';

const texts = recordFiles.map((name: string) => ({
  name,
  text: readFileSync(new URL(`../../../demo-site/data/thessle-brook/${name}`, import.meta.url), 'utf8'),
}));

describe('guessLayout, on the invented agency’s files', () => {
  const { layout, findings } = guessLayout(texts);

  test('leaves open what the files do not say', () => {
    expect(layout.grid!.zone).toBeNull();
    expect(findings.map(({ code }) => code)).toEqual(expect.arrayContaining(['zone-open', 'area-open', 'interval-end-open']));
    expect(() => readForcing(texts, layout)).toThrow(RillageError);
  });

  test('finds the dialect of each', () => {
    expect(layout.sources.map(({ splitAt, decimalMark }) => `${splitAt} ${decimalMark}`)).toEqual([', .', ', .', ', .', '; ,']);
    expect(layout.sources.map(({ time }) => time.writtenAs)).toEqual(['iso', 'iso', 'iso', 'DD.MM.YYYY']);
    expect(layout.sources[0].columns.find(({ holds }) => holds === 'precipitation')).toMatchObject({ trace: ['T'], unit: 'mm' });
  });

  test('settled by the caller, it reads the fluxes that the hand-written layout reads', () => {
    const settled: Layout = {
      ...layout,
      grid: recordLayout.grid,
      areaKm2: recordLayout.areaKm2,
      latitude: recordLayout.latitude,
      gaps: recordLayout.gaps as never,
      evapotranspiration: recordLayout.evapotranspiration as never,
      rainConcentration: recordLayout.rainConcentration as never,
      sources: layout.sources.map((source) => ({
        ...source,
        time: { ...source.time, zone: 'UTC', ...(source.time.writtenAs === 'DD.MM.YYYY' ? { readAt: '12:00' } : {}) },
        columns: source.columns.map((column) =>
          column.as === 'chloride' && column.holds === 'rainTracer' ? { ...column, belowDetection: 'half' as const } : column,
        ),
      })),
    };
    const guessed = readForcing(texts, settled).forcing;
    const written = readForcing(texts, recordLayout as never).forcing;
    expect(guessed.start).toBe(written.start);
    expect(guessed.inflow).toEqual(written.inflow);
    // the unit of flow comes from its header here: m3s
    expect(guessed.outflows['discharge'].length).toBe(written.outflows['discharge'].length);
    guessed.outflows['discharge'].forEach((flow, k) => expect(flow).toBeCloseTo(written.outflows['discharge'][k], 12));
  });
});

test('guessLayout: an order of day and month that fits both ways is left open', () => {
  const { layout, findings } = guessLayout('date,rain (mm)\n01/02/2020,3\n02/02/2020,4\n03/02/2020,0\n');
  expect(layout.sources[0].time.writtenAs).toBeNull();
  expect(findings.some(({ code }) => code === 'date-order-open')).toBe(true);
});

test.each([
  ['', 'empty'],
  ['<!doctype html><html><body>404</body></html>', 'html'],
])('guessLayout refuses %j', (text) => expect(() => guessLayout(text)).toThrow(RillageError));

test('guessLayout and readForcing: whatever the text, only RillageError comes out', () => {
  const cell = fc.oneof(
    fc.string(),
    fc.constantFrom('2020-01-01', '1,5', '-9999', 'T', '"', '__proto__', '<0.05', '\u202e', '24:00', 'date', 'rain [mm]'),
  );
  const text = fc
    .array(fc.array(cell, { maxLength: 5 }), { maxLength: 12 })
    .chain((rows) => fc.constantFrom(',', ';', '\t').map((mark) => rows.map((row) => row.join(mark)).join('\n')));
  fc.assert(
    fc.property(text, (body) => {
      try {
        const { layout } = guessLayout(body);
        readForcing(body, layout);
      } catch (error) {
        expect(error).toBeInstanceOf(RillageError);
      }
    }),
    { seed: 11, numRuns: 600 },
  );
});

test('guessLayout: time grows with the size, not its square', () => {
  const text = (rows: number): string =>
    `date,rain (mm)\n${Array.from({ length: rows }, (_value, k) => `${new Date(1.2e12 + k * 864e5).toISOString().slice(0, 10)},${k % 7}`).join('\n')}\n`;
  const cost = (rows: number): number => {
    const body = text(rows);
    const times = Array.from({ length: 5 }, () => {
      const before = performance.now();
      guessLayout(body);
      return performance.now() - before;
    });
    return Math.min(...times);
  };
  cost(2000);
  // eight times the rows; a square would cost 64 times as much
  expect(cost(32_000) / cost(4000)).toBeLessThan(30);
});
