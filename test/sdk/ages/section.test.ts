import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { type RillageError, runColumn, type Catchment, type ColumnRun, type Forcing } from '@rillage/sdk';
import { makeSection, sectionSteps, type Section } from '../../../packages/sdk/src/ages/section.js';
import { anySelection, FEW, forcingOf, STORAGE, weather } from '../column/support/arbitraries.js';
import { syntheticForcing } from '../../bench/forcing.mjs';

/** Depths are kept to 0.001 mm and Ω to 1e-6; half a unit of each. */
const MM = 5.001e-4;
const SHARE = 5.001e-7;

const code = (call: () => unknown): string => {
  try {
    call();
  } catch (error) {
    return (error as RillageError).code;
  }
  return 'nothing thrown';
};

function year(): ColumnRun {
  const forcing: Forcing = syntheticForcing({ years: 2, seed: 4 });
  const catchment: Catchment = {
    initialStorage: 900,
    selection: Object.fromEntries(Object.keys(forcing.outflows).map((name) => [name, { form: 'exponential', scale: 150 }])),
  };
  return runColumn(catchment, forcing, { ageResolution: 0, snapshotsAt: sectionSteps(forcing.inflow.length, 40) });
}

describe('sectionSteps(steps, most)', () => {
  test('sectionSteps keeps the first and the last, each once, in order', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 5000 }), fc.integer({ min: 2, max: 1200 }), (steps, most) => {
        const kept = sectionSteps(steps, most);
        expect(kept.length).toBe(Math.min(steps, most));
        expect(kept[0]).toBe(0);
        expect(kept.at(-1)).toBe(steps - 1);
        expect(kept.every((step, index) => index === 0 || step > kept[index - 1])).toBe(true);
      }),
    );
  });

  test('sectionSteps of nothing is nothing, of one place is the last', () => {
    expect(sectionSteps(0, 600)).toEqual([]);
    expect(sectionSteps(50, 1)).toEqual([49]);
    expect(sectionSteps(50, 0)).toEqual([]);
  });
});

describe('makeSection(run)', () => {
  // By hand: 10 mm fall on day 1 and 20 mm on day 3, nothing leaves; storage was 100 mm. On day 3's end the layers are 20 mm of age 0–1
  // and 10 mm of age 2–3, above 100 mm from before. Uniform selection takes in proportion to depth: Ω = 20/130, 30/130.
  test('makeSection of a column reckoned by hand', () => {
    const run = runColumn(
      { initialStorage: 100, selection: { stream: { form: 'uniform' } }, tracers: { salt: { preRecord: 1 } } },
      {
        start: '2020-01-01T00:00:00Z',
        stepDays: 1,
        inflow: Float64Array.of(10, 0, 20),
        outflows: { stream: new Float64Array(3) },
        inflowConcentration: { salt: Float64Array.of(4, 0, 7) },
      },
      { snapshotsAt: [0, 2] },
    );
    const section = makeSection(run, { units: { salt: 'mg/L' } });
    expect(section).toMatchObject({ kind: 'rillage-section', version: 1, stepDays: 1, steps: 3, storageInformed: true });
    expect(section.units).toEqual({ salt: 'mg/L' });
    expect(section.columns.map(({ step }) => step)).toEqual([0, 2]);
    expect(section.columns[1]).toEqual({
      step: 2,
      storage: 130,
      preRecordDepth: 100,
      bottom: [20, 30],
      youngest: [0, 2],
      oldest: [1, 3],
      concentration: { salt: [7, 4] },
      selection: { stream: [0.153846, 0.230769] },
      flow: { stream: 0 },
    });
  });

  test('makeSection: layers add up to the storage, Ω does not fall and the rest of it is pre-record water', () => {
    fc.assert(
      fc.property(weather(), anySelection, fc.integer({ min: 8, max: 30 }), (record, selection, rows) => {
        const forcing = forcingOf(record);
        const catchment = { initialStorage: STORAGE, selection: { stream: selection, evap: selection } };
        const run = runColumn(catchment, forcing, { ageResolution: 0, snapshotsAt: sectionSteps(24) });
        for (const column of makeSection(run, { rows }).columns) {
          const { bottom, youngest, oldest } = column;
          expect(bottom.length).toBeLessThanOrEqual(rows);
          expect(Math.abs((bottom.at(-1) ?? 0) + column.preRecordDepth - column.storage)).toBeLessThan(3 * MM);
          for (let row = 1; row < bottom.length; row++) {
            expect(bottom[row]).toBeGreaterThanOrEqual(bottom[row - 1]);
            expect(youngest[row]).toBeGreaterThanOrEqual(oldest[row - 1] - 1e-9);
            expect(column.selection.stream[row]).toBeGreaterThanOrEqual(column.selection.stream[row - 1] - SHARE);
          }
        }
      }),
      FEW,
    );
  });

  test('makeSection with few rows keeps every edge it keeps where it was', () => {
    const run = year();
    const [all, few] = [makeSection(run, { rows: 400 }), makeSection(run, { rows: 20 })];
    few.columns.forEach((column, index) => {
      const whole = all.columns[index]!;
      column.bottom.forEach((depth, row) => {
        const place = whole.bottom.findIndex((edge, at) => edge === depth && whole.oldest[at] === column.oldest[row]);
        expect(place).toBeGreaterThanOrEqual(row);
        for (const name of Object.keys(column.selection)) expect(column.selection[name]![row]).toBe(whole.selection[name]![place]);
      });
      expect(column.bottom.at(-1)).toBe(whole.bottom.at(-1));
    });
  });

  test('makeSection with few rows keeps the solute: Σ c·d is that of every layer', () => {
    const forcing = forcingOf({ ...fc.sample(weather(), { numRuns: 1, seed: 12 })[0]! });
    const run = runColumn(
      {
        initialStorage: STORAGE,
        selection: { stream: { form: 'uniform' }, evap: { form: 'uniform' } },
        tracers: { tracer: { preRecord: 3 } },
      },
      forcing,
      { ageResolution: 0, snapshotsAt: [23] },
    );
    const mass = ({ columns: [column] }: Section): number =>
      column!.bottom.reduce((sum, edge, row) => sum + (edge - (column!.bottom[row - 1] ?? 0)) * column!.concentration.tracer![row]!, 0);
    const { depth, concentration } = run.snapshots.get(23)!;
    const exact = depth.reduce((sum, mm, row) => sum + mm * concentration.tracer![row]!, 0);
    // 0.001 mm a layer at concentrations up to 40
    expect(Math.abs(mass(makeSection(run, { rows: 8 })) - exact)).toBeLessThan(0.04 * 8);
  });

  test('makeSection survives JSON, keeps its bounds and leaves the run as it was', () => {
    const run = year();
    const before = structuredClone([...run.snapshots]);
    const section = makeSection(run, { columns: 30, rows: 24 });
    expect(JSON.parse(JSON.stringify(section))).toEqual(section);
    expect(section.columns.length).toBe(30);
    expect(Math.max(...section.columns.map(({ bottom }) => bottom.length))).toBeLessThanOrEqual(24);
    expect([...run.snapshots]).toEqual(before);
  });

  test('makeSection: flows of a long record are means that keep the total', () => {
    const steps = 9001;
    const run = runColumn(
      { initialStorage: 500, selection: { stream: { form: 'uniform' } } },
      {
        start: '2020-01-01T00:00:00Z',
        stepDays: 1 / 24,
        inflow: new Float64Array(steps).fill(2),
        outflows: { stream: Float64Array.from({ length: steps }, (_, k) => 2 + Math.sin(k)) },
        inflowConcentration: {},
      },
      { snapshotsAt: [steps - 1] },
    );
    const { flow } = makeSection(run);
    expect(flow.stepDays).toBeCloseTo(3 / 24, 12);
    expect(flow.outflows.stream!.length).toBe(3001);
    const total = flow.outflows.stream!.reduce((sum, value, bin) => sum + value * (bin < 3000 ? 3 : 1), 0);
    const exact = run.outflows.stream!.flow.reduce((sum, value) => sum + value, 0);
    // rates are kept to 0.0001
    expect(Math.abs(total - exact)).toBeLessThan(5e-5 * steps);
  });

  test('makeSection refuses a run without snapshots and bounds out of range', () => {
    const run = year();
    expect(code(() => makeSection({ ...run, snapshots: new Map() }))).toBe('section-empty');
    for (const options of [{ columns: 1 }, { columns: 1201 }, { rows: 7 }, { rows: 9.5 }, { rows: NaN }])
      expect(code(() => makeSection(run, options))).toBe('section-size');
  });
});
