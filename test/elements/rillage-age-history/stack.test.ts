import { describe, expect, it } from 'vitest';
import type { StationHistory } from '@rillage/sdk';
import { changed } from '../../../packages/elements/src/rillage-age-history/frame.js';
import { hatchBetween } from '../../../packages/elements/src/rillage-age-history/hatch-between.js';
import { ticks } from '../../../packages/elements/src/rillage-age-history/panels.js';
import {
  bandsOf,
  piecesOf,
  sharesAt,
  stepsAPiece,
  stepsToDraw,
  stopsOf,
} from '../../../packages/elements/src/rillage-age-history/stack.js';

const history: StationHistory = {
  start: '2020-01-01T00:00:00Z',
  stepDays: 1,
  flow: [2, 4, null, 1],
  younger: { '30': [0.3, 0.5, null, 0.6], '7': [0.1, 0.2, null, 0.5], '365': [0.6, 0.7, null, 0.6] },
  medianDays: [100, 30, null, 7],
  medianBeyondRecord: [0, 0, 0, 0],
  preRecordShare: [0.25, 0.1, null, 0.4],
  concentration: {},
};
const close = (values: number[] | null, expected: number[]): void => {
  expect(values).toHaveLength(expected.length);
  values!.forEach((value, index) => expect(value).toBeCloseTo(expected[index]!, 12));
};

describe('sharesAt(history, step)', () => {
  it('sharesAt() splits one step into classes, youngest first, adding up to one', () => {
    close(sharesAt(history, 0), [0.1, 0.2, 0.3, 0.15, 0.25]);
    close(sharesAt(history, 3), [0.5, 0.1, 0, 0, 0.4]);
  });

  it('sharesAt() is null without outflow', () => {
    expect(sharesAt(history, 2)).toBeNull();
    expect(sharesAt(history, 9)).toBeNull();
  });

  it('bandsOf() names the classes, pre-record water last and without a colour', () => {
    expect(bandsOf(history).map(({ from, to, className }) => [from, to, className])).toEqual([
      [0, 7, 'age-1'],
      [7, 30, 'age-2'],
      [30, 365, 'age-4'],
      [365, null, 'age-5'],
      [null, null, ''],
    ]);
  });
});

describe('piecesOf(history, from, to, each)', () => {
  // By hand: (2 · 0.1 + 4 · 0.2) / 6 of two days' water is younger than a week.
  it('piecesOf() gives mean flow, and shares weighted by it', () => {
    const [first, second] = piecesOf(history, 0, 4, 2);
    expect(first).toMatchObject({ at: 0.5, flow: 3 });
    close(first!.shares, [1 / 6, (0.4 + 1.2) / 6, (0.6 + 0.8) / 6, (0.3 + 0.8) / 6, (0.5 + 0.4) / 6]);
    expect(second).toMatchObject({ at: 2.5, flow: 0.5 });
    close(second!.shares, [0.5, 0.1, 0, 0, 0.4]);
  });

  it('piecesOf() keeps all water: flows times lengths add up', () => {
    const flow = Array.from({ length: 101 }, (_, step) => (step % 7 ? step / 10 : null));
    const long = { ...history, flow, younger: {}, preRecordShare: flow.map((value) => (value === null ? null : 1)) };
    const total = piecesOf(long, 0, 101, 10).reduce((sum, { flow: mean }, index) => sum + mean * (index < 10 ? 10 : 1), 0);
    expect(total).toBeCloseTo(
      flow.reduce<number>((sum, value) => sum + (value ?? 0), 0),
      9,
    );
  });

  it('stepsAPiece() leaves three pixels a piece', () => {
    expect(stepsAPiece(0, 3653, 730)).toBe(16);
    expect(stepsAPiece(0, 200, 730)).toBe(1);
  });
});

describe('stepsToDraw(values, from, to, pixels)', () => {
  it('stepsToDraw() is every step where there is room', () => {
    expect(stepsToDraw([5, 1, 2, 3], 1, 4, 10)).toEqual([1, 2, 3]);
  });

  it('stepsToDraw() keeps the highest and the lowest of every pixel, in order', () => {
    const values = Array.from({ length: 1000 }, (_, step) => (step === 333 ? 50 : step === 777 ? -50 : Math.sin(step)));
    const steps = stepsToDraw(values, 0, 1000, 20);
    expect(steps.length).toBeLessThanOrEqual(40);
    expect(steps).toContain(333);
    expect(steps).toContain(777);
    expect(steps).toEqual([...steps].sort((a, b) => a - b));
  });

  it('stopsOf() has every step of a year, and at most about a year of stops', () => {
    expect(stopsOf(5, 9)).toEqual([5, 6, 7, 8]);
    expect(stopsOf(0, 3653)).toHaveLength(366);
  });
});

describe('changed(span, steps, factor, by)', () => {
  it('changed() never leaves the record, nor goes below a fortnight of steps', () => {
    expect(changed({ from: 0, to: 1000 }, 1000, 2)).toEqual({ from: 0, to: 1000 });
    expect(changed({ from: 100, to: 120 }, 1000, 0.1)).toEqual({ from: 103, to: 117 });
    expect(changed({ from: 0, to: 100 }, 1000, 1, -0.5)).toEqual({ from: 0, to: 100 });
    expect(changed({ from: 950, to: 1000 }, 1000, 2)).toEqual({ from: 900, to: 1000 });
    expect(changed({ from: 0, to: 4 }, 4, 0.5)).toEqual({ from: 0, to: 4 });
  });

  it('changed() comes back by the same step', () => {
    for (const width of [14, 115, 116]) {
      const span = { from: 300, to: 300 + width };
      expect(changed(changed(span, 1000, 1, -0.5), 1000, 1, 0.5)).toEqual(span);
    }
  });
});

describe('ticks(low, high)', () => {
  it('ticks() are round and within', () => {
    expect(ticks(0, 19)).toEqual([0, 5, 10, 15]);
    expect(ticks(-10.6, -7.5)).toEqual([-10, -9, -8]);
    expect(ticks(3, 3)).toEqual([3]);
  });
});

describe('hatchBetween(edges)', () => {
  const strokes = (path: string): number[][] => [...path.matchAll(/M(\d+) (\d+)L(\d+) (\d+)/g)].map((match) => match.slice(1).map(Number));

  it('hatchBetween() stays between the edges, leaning as x + y = const', () => {
    const edges: [number, number, number][] = [
      [0, 50, 100],
      [100, 20, 100],
      [200, 80, 100],
    ];
    const found = strokes(hatchBetween(edges));
    expect(found.length).toBeGreaterThan(20);
    const top = (x: number): number => (x < 100 ? 50 - 0.3 * x : 20 + 0.6 * (x - 100));
    for (const [x1, y1, x2, y2] of found) {
      expect(x1! + y1!).toBe(x2! + y2!);
      for (const [x, y] of [
        [x1!, y1!],
        [x2!, y2!],
      ] as const) {
        expect(y).toBeGreaterThanOrEqual(top(x) - 1);
        expect(y).toBeLessThanOrEqual(101);
      }
    }
  });

  it('hatchBetween() is empty where there is nothing between', () => {
    expect(hatchBetween([])).toBe('');
    expect(
      hatchBetween([
        [0, 10, 10],
        [50, 10, 10],
      ]),
    ).toBe('');
  });
});
