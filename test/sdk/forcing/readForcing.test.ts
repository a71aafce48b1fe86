import { describe, expect, it } from 'vitest';
import { RillageError } from '../../../packages/sdk/src/errors.js';
import type { Layout } from '../../../packages/sdk/src/forcing/layout.js';
import { readForcing } from '../../../packages/sdk/src/forcing/readForcing.js';
import { rerunReceipt } from '../../../packages/sdk/src/forcing/rerunReceipt.js';

const PLAIN = 'date,rain,flow\n2020-01-01,2.4,0.5\n2020-01-02,0,0.25\n2020-01-03,7.1,1\n';
const LAYOUT: Layout = {
  areaKm2: 43.2,
  sources: [
    {
      time: { columns: [1], zone: 'UTC' },
      columns: [
        { position: 2, name: 'rain', holds: 'precipitation', unit: 'mm' },
        { position: 3, name: 'flow', holds: 'outflow', as: 'discharge', unit: 'm3/s' },
      ],
    },
  ],
};

export function codesOf(work: () => unknown): string[] {
  try {
    work();
  } catch (error) {
    if (error instanceof RillageError) return error.issues.map(({ code }) => code);
    throw error;
  }
  return [];
}

describe('readForcing(text, layout)', () => {
  it('reads a plain file: rain keeps its digits, flow becomes a depth over the area (0.5 m3/s over 43.2 km2 is 1 mm/day)', () => {
    const { forcing } = readForcing(PLAIN, LAYOUT);
    expect(forcing.start).toBe('2020-01-01T00:00:00.000Z');
    expect(forcing.stepDays).toBe(1);
    expect([...forcing.inflow]).toEqual([2.4, 0, 7.1]);
    const discharge = [...forcing.outflows['discharge']];
    [1, 0.5, 2].forEach((depth, step) => expect(discharge[step]).toBeCloseTo(depth, 12));
  });

  it('keeps the caller’s layout as it was, and the receipt writes every default out', () => {
    const before = JSON.stringify(LAYOUT);
    const { receipt } = readForcing(PLAIN, LAYOUT);
    expect(JSON.stringify(LAYOUT)).toBe(before);
    expect(receipt.layout).toMatchObject({
      version: 1,
      gaps: [],
      sources: [{ splitAt: ',', remarkMark: '#', columns: [{ standsFor: 'totalFollowing', absent: [] }, {}] }],
    });
    expect(JSON.parse(JSON.stringify(receipt.layout))).toEqual(receipt.layout);
  });

  it('refuses a layout whose header is not the file’s, an unknown unit and an absent area, in one batch', () => {
    const wrong = structuredClone(LAYOUT);
    delete wrong.areaKm2;
    wrong.sources[0].columns[0] = { position: 2, name: 'precip', holds: 'precipitation', unit: 'mmm' };
    expect(codesOf(() => readForcing(PLAIN, wrong)).sort()).toEqual(['area-missing', 'column-renamed', 'unit-unknown']);
  });
});

describe('rerunReceipt(sources, receipt)', () => {
  it('gives the same forcing, also from a receipt that went through JSON', () => {
    const first = readForcing(PLAIN, LAYOUT);
    const again = rerunReceipt(PLAIN, JSON.parse(JSON.stringify(first.receipt)));
    expect(again).toEqual(first);
  });

  it('refuses a source that has changed, and one too few', () => {
    const { receipt } = readForcing(PLAIN, LAYOUT);
    expect(codesOf(() => rerunReceipt(PLAIN.replace('7.1', '7.2'), receipt))).toEqual(['receipt-mismatch']);
    expect(codesOf(() => rerunReceipt([PLAIN, PLAIN], receipt))).toEqual(['receipt-mismatch']);
  });
});
