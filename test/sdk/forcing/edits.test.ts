import { describe, expect, it } from 'vitest';
import type { CellEditLayout, Layout } from '../../../packages/sdk/src/forcing/layout.js';
import { readForcing } from '../../../packages/sdk/src/forcing/readForcing.js';
import { rerunReceipt } from '../../../packages/sdk/src/forcing/rerunReceipt.js';
import { codesOf } from './readForcing.test.js';

const TEXT = '# gauge\n\nday,rain,flow\n2020-01-01,2.4,0.5\n2020-01-02,24,0.25\n2020-01-03,7.1\n2020-01-04,0,1\n';
function layoutWith(edits: unknown): Layout {
  return {
    areaKm2: 43.2,
    gaps: [{ of: 'discharge', fill: 'linear', upToSteps: 1 }],
    sources: [
      {
        name: 'day.csv',
        time: { columns: [1], zone: 'UTC' },
        columns: [
          { position: 2, name: 'rain', holds: 'precipitation', unit: 'mm' },
          { position: 3, name: 'flow', holds: 'outflow', unit: 'm3/s' },
        ],
        edits: edits as CellEditLayout[],
      },
    ],
  };
}
const edit = { row: 5, position: 2, value: '2.4', why: 'a tipped bucket, says the log' };

describe('edits of a layout', () => {
  it('stand in place of the cell, as if the file said so', () => {
    const edited = readForcing(TEXT, layoutWith([edit]));
    const rewritten = readForcing(TEXT.replace('-02,24,', '-02,2.4,'), layoutWith([]));
    expect(edited.forcing).toEqual(rewritten.forcing);
    expect([...edited.forcing.inflow]).toEqual([2.4, 2.4, 7.1, 0]);
  });

  it('are each a finding: row, what was there, what stands now, why', () => {
    const { findings, receipt } = readForcing(TEXT, layoutWith([edit]));
    const found = findings.filter(({ code }) => code === 'cell-edited');
    expect(found).toEqual([
      {
        code: 'cell-edited',
        severity: 'warning',
        where: 'day.csv: rain',
        rows: [5],
        count: 1,
        seen: '"24" in the file',
        done: '"2.4" stands in its place: a tipped bucket, says the log',
        settle: 'Take the edit out of edits to read the file as it is.',
      },
    ]);
    expect(receipt.acts).toContainEqual(found[0]);
    expect(receipt.layout).toMatchObject({ sources: [{ edits: [edit] }] });
  });

  it('leave the text’s hash as it was, and a receipt gives the same again, also through JSON', () => {
    const plain = readForcing(TEXT, layoutWith([]));
    const edited = readForcing(TEXT, layoutWith([edit]));
    expect(edited.receipt.sources).toEqual(plain.receipt.sources);
    expect(rerunReceipt(TEXT, JSON.parse(JSON.stringify(edited.receipt)))).toEqual(edited);
  });

  it('may change a time, a header, and a cell that a short row lacks; an empty value is a gap', () => {
    const { forcing, filled } = readForcing(TEXT, layoutWith([{ row: 6, position: 3, value: '2' }]));
    expect(forcing.outflows['discharge']![2]).toBeCloseTo(4, 12);
    expect(filled.size).toBe(0);
    const gap = readForcing(
      TEXT,
      layoutWith([
        { row: 5, position: 3, value: '' },
        { row: 6, position: 3, value: '1' },
      ]),
    );
    expect([...gap.filled.get('discharge')!]).toEqual([0, 1, 0, 0]);
    expect(codesOf(() => readForcing(TEXT, layoutWith([{ row: 3, position: 2, value: 'pluie' }])))).toEqual(['column-renamed']);
    expect(codesOf(() => readForcing(TEXT, layoutWith([{ row: 4, position: 1, value: '2020-01-02' }])))).toContain('duplicate-times');
  });

  it('are refused where there is no such row or column, all in one batch: remark, blank line, beyond the end, beyond the widest row', () => {
    const nowhere = [
      { row: 1, position: 1, value: 'x' },
      { row: 2, position: 1, value: 'x' },
      { row: 99, position: 1, value: 'x' },
      { row: 4, position: 4, value: 'x' },
    ];
    expect(codesOf(() => readForcing(TEXT, layoutWith(nowhere)))).toEqual(Array(4).fill('edit-misplaced'));
  });

  it('are refused where the layout is not plain: no list, unknown keys, missing ones, fractions, numbers as values, one cell twice', () => {
    for (const wrong of [
      'x',
      [null],
      [{ ...edit, who: 'me' }],
      [{ row: 5, position: 2 }],
      [{ value: '1', position: 2 }],
      [{ ...edit, row: 5.5 }],
      [{ ...edit, position: 0 }],
      [{ ...edit, value: 2.4 }],
      [edit, { ...edit, value: '3' }],
    ]) {
      expect(new Set(codesOf(() => readForcing(TEXT, layoutWith(wrong)))), JSON.stringify(wrong)).toEqual(new Set(['layout-invalid']));
    }
  });

  it('keep direction marks and controls out of the finding’s words', () => {
    const { findings } = readForcing(TEXT, layoutWith([{ ...edit, why: 'a\u202eb' }]));
    expect(findings.find(({ code }) => code === 'cell-edited')!.done).toBe('"2.4" stands in its place: a b');
  });
});

describe('readForcing(text, layout).filled', () => {
  it('marks the steps that a gap rule filled, and says nothing of series without any', () => {
    const { filled, record } = readForcing(TEXT, layoutWith([]));
    expect([...filled.keys()]).toEqual(['discharge']);
    expect([...filled.get('discharge')!]).toEqual([0, 0, 1, 0]);
    expect(record.get('discharge')![2]).toBeGreaterThan(0);
  });
});
