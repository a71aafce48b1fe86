import { shorten, type Issue } from '../errors.js';
import type { Curve } from './curve.js';
import { piece, type FormDefinition } from './form.js';

/** Ω linear between the pairs (storage in mm, share): 0 above the first, 1 below the last. */
export const piecewise: FormDefinition = {
  form: 'piecewise',
  fields: ['storage', 'share'],
  compile(data, path, amounts, weights) {
    const issues = describeTable(data['storage'], data['share'], path);
    amounts.issues.push(...issues);
    if (issues.length > 0) return [];
    const curve = piecewiseCurve(Float64Array.from(data['storage'] as number[]), Float64Array.from(data['share'] as number[]));
    return [piece(weights, { curve, scale: amounts.constant(1) })];
  },
};

function piecewiseCurve(storage: Float64Array, share: Float64Array): Curve {
  const last = storage.length - 1;
  const below = (x: number): number => {
    let low = 0;
    let high = last;
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if (storage[middle] <= x) low = middle;
      else high = middle;
    }
    return low;
  };
  const slope = (k: number): number => (share[k + 1] - share[k]) / (storage[k + 1] - storage[k]);
  return {
    name: 'piecewise',
    over: 'depth',
    share(x) {
      if (x <= storage[0]) return 0;
      if (x >= storage[last]) return 1;
      const k = below(x);
      return share[k] + slope(k) * (x - storage[k]);
    },
    density: (x) => (x < storage[0] || x >= storage[last] ? 0 : slope(below(x))),
    costly: false,
    cornered: true,
    centre: () => storage[last] / 2,
  };
}

function describeTable(storage: unknown, share: unknown, path: string): Issue[] {
  const issues: Issue[] = [];
  const numbers = (list: unknown, key: string): list is number[] => {
    const good = Array.isArray(list) && list.length >= 2 && list.every((value) => typeof value === 'number' && Number.isFinite(value));
    if (!good)
      issues.push({
        code: 'piecewise-table',
        path: `${path}.${key}`,
        expected: 'two or more finite numbers',
        received: shorten(list ?? 'nothing'),
      });
    return good;
  };
  if (!numbers(storage, 'storage') || !numbers(share, 'share')) return issues;
  if (storage.length !== share.length) {
    issues.push({
      code: 'piecewise-table',
      path,
      expected: 'as many shares as storages',
      received: `${storage.length} storages and ${share.length} shares`,
    });
    return issues;
  }
  const expect = (good: boolean, key: string, expected: string): void => {
    if (!good)
      issues.push({ code: 'piecewise-table', path: `${path}.${key}`, expected, received: shorten(key === 'storage' ? storage : share) });
  };
  expect(
    storage[0] >= 0 && storage.every((value, k) => k === 0 || value > storage[k - 1]),
    'storage',
    'storages of 0 or more that increase',
  );
  expect(share[0] === 0, 'share', 'a first share of 0');
  expect(share[share.length - 1] === 1, 'share', 'a last share of 1');
  expect(
    share.every((value, k) => k === 0 || value >= share[k - 1]),
    'share',
    'shares that never decrease',
  );
  return issues;
}
