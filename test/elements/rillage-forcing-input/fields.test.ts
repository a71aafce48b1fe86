import { describe, expect, it } from 'vitest';
import {
  columnFields,
  mergeLayouts,
  recordFields,
  setAt,
  sourceFields,
  type Field,
} from '../../../packages/elements/src/rillage-forcing-input/fields.js';
import { fileOf } from '../../../packages/elements/src/rillage-forcing-input/findings-view.js';
import { positionOf, withEdit, withoutEdit } from '../../../packages/elements/src/rillage-forcing-input/edit-view.js';
import type { Layout } from '../../../packages/sdk/src/forcing/layout.js';
import { HOLDS } from '../../../packages/sdk/src/forcing/settleSource.js';
import { settleLayout } from '../../../packages/sdk/src/forcing/settleLayout.js';
import { findUnit } from '../../../packages/sdk/src/units/parseUnit.js';

const time = { columns: [1] };
const layout: Layout = {
  evapotranspiration: { method: 'hargreaves' },
  sources: [
    {
      name: 'day.csv',
      time: { columns: [1], writtenAs: null },
      columns: [
        { position: 2, name: 'rain', holds: 'precipitation', unit: null },
        { position: 3, name: 'flow', holds: 'outflow', unit: 'm3/s' },
        { position: 4, name: 'remark', holds: 'ignored' },
      ],
    },
    {
      name: 'rain.csv',
      time: { columns: [2], from: [1] },
      everyDays: null,
      columns: [{ position: 3, holds: 'rainTracer', unit: 'permil' }],
    },
  ],
};
const open = (fields: Field[]): string[] => fields.filter((field) => field.open).map(({ label }) => label.slice(8));
const named = (fields: Field[], label: string): Field => fields.find((field) => field.label === `forcing.${label}`)!;

describe('fields of a layout', () => {
  it('are open where the SDK would refuse to read', () => {
    expect(open(recordFields(layout))).toEqual(['zone', 'areaKm2', 'latitude']);
    expect(open(sourceFields(layout, 0))).toEqual(['writtenAs']);
    expect(open(columnFields(layout, 0, 0))).toEqual(['unit']);
    expect(open(columnFields(layout, 0, 1))).toEqual([]);
    expect(open(columnFields(layout, 0, 2))).toEqual([]);
    expect(open(columnFields(layout, 1, 0))).toEqual(['as']);
    const zoned = setAt(layout, ['sources', 1, 'time', 'zone'], 'UTC');
    expect(open(recordFields(zoned))).toEqual(['areaKm2', 'latitude']);
  });

  it('offer every kind of column that the SDK knows, and units it can parse', () => {
    expect([...named(columnFields(layout, 0, 0), 'holds').options!].sort()).toEqual([...HOLDS].sort());
    for (const unit of named(columnFields(layout, 0, 0), 'unit').usual!) expect(findUnit(unit), unit).not.toBe(null);
  });

  it('give a layout with each of their options that the SDK accepts', () => {
    const settled = setAt(setAt(layout, ['sources', 1, 'columns', 0, 'as'], 'd18O'), ['sources', 0, 'time', 'writtenAs'], 'iso');
    const all = [
      ...recordFields(settled),
      ...sourceFields(settled, 0),
      ...sourceFields(settled, 1),
      ...columnFields(settled, 0, 0),
      ...columnFields(settled, 0, 1),
    ];
    let tried = 0;
    for (const field of all.filter(({ label }) => label !== 'forcing.holds')) {
      for (const option of field.options ?? [undefined]) {
        expect(
          () => settleLayout(JSON.parse(JSON.stringify(field.with(field.kind === 'list' ? ['1'] : option))) as Layout),
          field.label,
        ).not.toThrow();
        tried += 1;
      }
    }
    expect(tried).toBeGreaterThan(40);
  });

  it('change nothing of the layout they are of', () => {
    const before = JSON.stringify(layout);
    named(columnFields(layout, 0, 0), 'unit').with('mm');
    named(recordFields(layout), 'gap').with('zero');
    withEdit(layout, 0, { row: 3, position: 2, value: '1' });
    expect(JSON.stringify(layout)).toBe(before);
    expect(named(recordFields(layout), 'gap').with('zero').gaps).toEqual([{ of: 'precipitation', fill: 'zero', upToSteps: 1 }]);
  });

  it('ask anew what a value stands for where a column is said to hold something else', () => {
    const taken = setAt(layout, ['sources', 0, 'columns', 0, 'standsFor'], 'totalPreceding');
    const changed = named(columnFields(taken, 0, 0), 'holds').with('streamTracer');
    expect(named(columnFields(changed, 0, 0), 'standsFor').value).toBe('instant');
  });
});

describe('mergeLayouts(own, proposed, names)', () => {
  it('keeps what is settled by the name of its source, takes the rest as proposed, in the order of the files', () => {
    const own: Layout = { areaKm2: 5, grid: { zone: 'UTC' }, sources: [{ name: 'b', time, columns: [] }] };
    const proposed: Layout = {
      areaKm2: null,
      grid: { stepDays: 1, zone: null },
      sources: ['a', 'b'].map((name) => ({ name, time, columns: [{ position: 2, holds: 'ignored' as const }] })),
    };
    const merged = mergeLayouts(own, proposed, ['a', 'b']);
    expect(merged).toEqual({ areaKm2: 5, grid: { stepDays: 1, zone: 'UTC' }, sources: [proposed.sources[0], own.sources[0]] });
    expect(mergeLayouts(null, proposed, ['a', 'b'])).toEqual(proposed);
  });
});

describe('fileOf(where, names)', () => {
  it('finds the file that a finding names, by the longest name it begins with', () => {
    const names = ['a.csv', 'a.csv: b', '__proto__', ''];
    expect(
      ['a.csv', 'a.csv: rain', 'a.csv: b: rain', '__proto__: x', 'a.csvx', 'grid.zone', ''].map((where) => fileOf(where, names)),
    ).toEqual([0, 0, 1, 2, -1, -1, -1]);
  });
});

describe('edits', () => {
  it('replace one of the same cell, and are taken back one by one', () => {
    const edit = { row: 3, position: 2, value: '1' };
    const twice = withEdit(withEdit(layout, 0, edit), 0, { ...edit, value: '2' });
    expect(twice.sources[0]!.edits).toEqual([{ ...edit, value: '2' }]);
    expect(withoutEdit(twice, 0, twice.sources[0]!.edits![0]!).sources[0]!.edits).toEqual([]);
  });

  it('begin at the column that a finding names', () => {
    expect(positionOf(layout, 0, 'day.csv: flow')).toBe(3);
    expect(positionOf(layout, 1, 'rain.csv: column 3')).toBe(3);
    expect(positionOf(layout, 0, 'day.csv')).toBe(2);
  });
});
