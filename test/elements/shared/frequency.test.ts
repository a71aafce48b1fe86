import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { frequency } from '../../../packages/elements/src/shared/frequency.js';

describe('frequency()', () => {
  it('frequency(0.3, { low: 0.2, high: 0.4 }) is about 3 in 10, likely between 2 and 4', () => {
    expect(frequency(0.3, { low: 0.2, high: 0.4 })).toEqual({ count: 3, of: 10, low: 2, high: 4, bound: null });
  });

  it('frequency() counts in hundredths where tenths would hide the share or a narrow range', () => {
    expect(frequency(0.03, null)).toMatchObject({ count: 3, of: 100 });
    expect(frequency(0.23, { low: 0.19, high: 0.27 })).toMatchObject({ count: 23, of: 100, low: 19, high: 27 });
  });

  it('frequency() says fewer than one and more than all but one', () => {
    expect(frequency(0.004, null)).toMatchObject({ of: 100, bound: 'fewer' });
    expect(frequency(0, null)).toMatchObject({ bound: 'fewer' });
    expect(frequency(0.997, null)).toMatchObject({ of: 100, count: 99, bound: 'more' });
  });

  it('frequency() never narrows a range', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 1, noNaN: true }), fc.double({ min: 0, max: 1, noNaN: true }), (a, b) => {
        const [low, high] = a < b ? [a, b] : [b, a];
        const told = frequency((low + high) / 2, { low, high });
        expect(told.low! / told.of).toBeLessThanOrEqual(low + 1e-8);
        expect(told.high! / told.of).toBeGreaterThanOrEqual(high - 1e-8);
        expect(told.count).toBeGreaterThanOrEqual(0);
      }),
    );
  });
});
