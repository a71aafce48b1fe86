import { describe, expect, test } from 'vitest';
import { carryInputDoubt } from '../../../packages/sdk/src/fit/inputDoubt.js';

// One unknown z with variance 0.04, samples s_i = x_i z: everything below can be worked out by hand.
const sd = 0.2;
const points = Array.from({ length: 101 }, (_value, d) => [(d - 50) / 50]);
const raw = Math.sqrt(points.reduce((sum, [z]) => sum + z * z, 0) / 100);
const drawn = points.map(([z]) => [(z / raw) * sd]);
const slopes = [1, 2, -1, 0.5];
const simulated = drawn.map(([z]) => slopes.map((x) => x * z));
const scale = [0.5, 0.5, 0.8, 1];
const stated = [0.1, 0.1, 0.1, 0.1];
const centre = [0, 0, 0, 0];
const spread = (list: number[][]): number => Math.sqrt(list.reduce((sum, [z]) => sum + z * z, 0) / (list.length - 1));

describe('carryInputDoubt(points, simulated, redistributed, …)', () => {
  test('a change that shows in every sample at once adds (Σ G r)² less what the error already holds', () => {
    const change = [0.2, 0.4, -0.1, 0.3];
    const rows = [change, change.map((r) => -r)];
    const { points: after, widened } = carryInputDoubt(drawn, simulated, rows, centre, scale, stated);
    const gain = slopes.map((x, i) => (sd * sd * x) / scale[i] ** 2);
    const together = gain.reduce((sum, g, i) => sum + g * change[i], 0) ** 2;
    const held = gain.reduce((sum, g, i) => sum + g * g * Math.min(change[i] ** 2, scale[i] ** 2 - stated[i] ** 2), 0);
    const expected = Math.sqrt(sd * sd + together - held);
    expect(spread(after)).toBeCloseTo(expected, 12);
    expect(widened[0]).toBeCloseTo(expected / sd, 12);
  });

  test('changes that are independent from sample to sample are in the error already', () => {
    const rows = [0, 1, 2, 3].flatMap((s) => [0.3, -0.3].map((r) => slopes.map((_x, i) => (i === s ? r : 0))));
    const { points: after, widened } = carryInputDoubt(drawn, simulated, rows, centre, scale, stated);
    expect(widened[0]).toBeCloseTo(1, 12);
    after.forEach(([z], d) => expect(z).toBeCloseTo(drawn[d][0], 12));
  });

  test('never narrows, and leaves the mean and its arguments as they are', () => {
    const before = JSON.stringify(drawn);
    const { points: after, widened } = carryInputDoubt(drawn, simulated, [[0.5, -0.25, 0, 0]], centre, scale, stated);
    expect(widened[0]).toBe(1);
    expect(after.reduce((sum, [z]) => sum + z, 0)).toBeCloseTo(0, 10);
    expect(JSON.stringify(drawn)).toBe(before);
  });

  test('samples without flow are passed over; draws that do not move stay', () => {
    const rows = [[NaN, 0.4, 0, 0]];
    expect(carryInputDoubt(drawn, simulated, rows, [NaN, 0, 0, 0], scale, stated).widened[0]).toBeGreaterThanOrEqual(1);
    const still = drawn.map(() => [0.3]);
    expect(carryInputDoubt(still, simulated, rows, centre, scale, stated).points).toEqual(still);
  });
});
