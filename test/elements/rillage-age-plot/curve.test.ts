import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { frameFor } from '../../../packages/elements/src/rillage-age-plot/axis.js';
import { agesToRead } from '../../../packages/elements/src/rillage-age-plot/curve-view.js';
import { ageAt, shareAt } from '../../../packages/elements/src/rillage-age-plot/curve.js';

// A distribution with a closed form: exponential with a mean of 100 days, P(T < t) = 1 − exp(−t / 100).
const ages = Array.from({ length: 4001 }, (_, index) => index / 2).slice(1);
const exponential = { ages, shares: ages.map((age) => 1 - Math.exp(-age / 100)) };

describe('shareAt(), ageAt()', () => {
  it('shareAt() and ageAt() agree with the closed form to the error of straight pieces', () => {
    for (const age of [0.1, 7, 30.25, 69.3, 365, 1999]) expect(shareAt(exponential, age)).toBeCloseTo(1 - Math.exp(-age / 100), 5);
    // The median of an exponential distribution is its mean times ln 2.
    expect(ageAt(exponential, 0.5)).toBeCloseTo(100 * Math.LN2, 2);
  });

  it('ageAt() is Infinity above the curve’s end, shareAt() stays level beyond it', () => {
    const short = { ages: [1, 10], shares: [0.1, 0.6] };
    expect(ageAt(short, 0.61)).toBe(Infinity);
    expect(ageAt(short, 0.6)).toBe(10);
    expect(shareAt(short, 1000)).toBe(0.6);
    expect(shareAt(short, 0.5)).toBeCloseTo(0.05, 12);
  });

  it('ageAt() gives the first age of a share across a level stretch', () => {
    expect(ageAt({ ages: [1, 5, 9], shares: [0.2, 0.2, 0.4] }, 0.2)).toBe(1);
  });

  it('shareAt(ageAt(share)) is the share', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.001, max: 0.999, noNaN: true }), (share) => {
        expect(shareAt(exponential, ageAt(exponential, share))).toBeCloseTo(share, 9);
      }),
    );
  });
});

describe('frameFor()', () => {
  for (const log of [true, false]) {
    it(`x() and ageAt() are each other’s reverse, ${log ? 'log' : 'linear'}`, () => {
      const frame = frameFor(640, 13, 3653, log);
      for (const age of [1, 7, 30, 365, 3653]) expect(frame.ageAt(frame.x(age))).toBeCloseTo(age, 6);
      expect(frame.x(3653)).toBeCloseTo(frame.edge, 9);
      expect(frame.x(1e9)).toBeCloseTo(frame.edge, 9);
    });
  }

  it('leaves room beyond the record at any width and type size', () => {
    for (const width of [200, 320, 1280])
      for (const em of [13, 26]) expect(frameFor(width, em, 3653, true).edge).toBeLessThan(width - 3 * em);
  });
});

describe('agesToRead()', () => {
  it('rises, stays within the record and ends with it', () => {
    for (const recordDays of [1, 6, 365, 3653, 40_000]) {
      const read = agesToRead(frameFor(640, 13, recordDays, true));
      expect(read.at(-1)).toBe(recordDays);
      expect([...read].sort((a, b) => a - b)).toEqual(read);
      expect(new Set(read).size).toBe(read.length);
    }
  });
});
