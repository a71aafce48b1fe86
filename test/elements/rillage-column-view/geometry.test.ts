import { describe, expect, it } from 'vitest';
import { asSection } from '../../../packages/elements/src/rillage-column-view/check.js';
import { depthOfShare, depthYounger, nearestColumn, timeOf } from '../../../packages/elements/src/rillage-column-view/geometry.js';
import { profileScale } from '../../../packages/elements/src/rillage-column-view/cut-view.js';
import { roundUp } from '../../../packages/elements/src/rillage-column-view/section-view.js';
import type { SectionData, SectionDataColumn } from '../../../packages/elements/src/rillage-column-view/section-type.js';
import { tintOf } from '../../../packages/elements/src/rillage-column-view/tint.js';
import type { Section } from '../../../packages/sdk/src/ages/section.js';

// 20 mm of age 0–1 and 10 mm of age 2–3 above 100 mm from before; uniform selection.
const column: SectionDataColumn = {
  step: 2,
  storage: 130,
  preRecordDepth: 100,
  bottom: [20, 30],
  youngest: [0, 2],
  oldest: [1, 3],
  concentration: { salt: [7, 4] },
  selection: { stream: [0.6, 0.9] },
  flow: { stream: 1 },
};
const section: SectionData = {
  kind: 'rillage-section',
  version: 1,
  start: '2020-01-01T00:00:00Z',
  stepDays: 1,
  steps: 10,
  columns: [column, { ...column, step: 9 }],
  flow: { stepDays: 1, outflows: { stream: [1, 2] } },
  storageInformed: true,
  units: {},
};

describe('depthOfShare(column, outflow, share)', () => {
  it('depthOfShare() is linear within a layer, null in the pre-record water', () => {
    expect(depthOfShare(column, 'stream', 0.3)).toBeCloseTo(10, 12);
    expect(depthOfShare(column, 'stream', 0.75)).toBeCloseTo(25, 12);
    expect(depthOfShare(column, 'stream', 0.95)).toBeNull();
    expect(depthOfShare(column, 'none', 0.5)).toBeNull();
  });
});

describe('depthYounger(column, days)', () => {
  it('depthYounger() is flat where nothing fell', () => {
    expect([0, 0.5, 1, 1.5, 2, 2.5, 3, 99].map((days) => depthYounger(column, days))).toEqual([0, 10, 20, 20, 20, 25, 30, 30]);
  });
});

describe('nearestColumn(section, time)', () => {
  it('nearestColumn() goes by the end of the step', () => {
    expect(new Date(timeOf(section, column)).toISOString()).toBe('2020-01-04T00:00:00.000Z');
    expect(nearestColumn(section, Date.parse('2020-01-07T00:00:00Z'))).toBe(0);
    expect(nearestColumn(section, Date.parse('2020-01-08T00:00:00Z'))).toBe(1);
  });
});

describe('profileScale(section, depth)', () => {
  it('profileScale() fits the uppermost thirtieth, rounded up to one digit', () => {
    // 0.6 in 20 mm is 3 % a millimetre
    expect(profileScale(section, 600)).toBeCloseTo(0.03, 12);
    expect(profileScale({ ...section, columns: [{ ...column, selection: { stream: [0.61, 0.9] } }] }, 600)).toBeCloseTo(0.04, 12);
    expect(profileScale({ ...section, columns: [{ ...column, bottom: [], selection: { stream: [] } }] }, 600)).toBe(1);
  });

  it('roundUp() is the next of 1, 2, 5', () => {
    expect([0.7, 1, 1.1, 3, 5.1, 130].map(roundUp)).toEqual([1, 1, 2, 5, 10, 200]);
  });
});

describe('tintOf(section, wanted)', () => {
  it('tintOf() is age for anything that is no tracer', () => {
    expect(tintOf(section, 'salt')).toEqual({ of: 'tracer', name: 'salt', low: 4, high: 7 });
    for (const other of ['age', 'x', '__proto__', 'constructor']) expect(tintOf(section, other)).toEqual({ of: 'age' });
  });
});

describe('asSection(value)', () => {
  it('asSection() takes what the SDK makes: the types are one', () => {
    const made: Section = section;
    const taken: SectionData = made;
    expect(asSection(taken)).toBe(section);
  });

  it('asSection() refuses what cannot be drawn', () => {
    const withColumn = (change: Record<string, unknown>): unknown => ({ ...section, columns: [{ ...column, ...change }] });
    for (const wrong of [
      null,
      'text',
      { ...section, version: 2 },
      { ...section, stepDays: 0 },
      { ...section, columns: [] },
      { ...section, columns: [column, column] },
      { ...section, columns: new Array(1201).fill(column) },
      { ...section, flow: { stepDays: 1, outflows: { stream: [-1] } } },
      withColumn({ bottom: [30, 20] }),
      withColumn({ bottom: [20] }),
      withColumn({ selection: { stream: [0.5, 1.5] } }),
      withColumn({ concentration: { salt: [1, NaN] } }),
      withColumn({ oldest: 'x' }),
    ])
      expect(asSection(wrong)).toBeNull();
  });
});
