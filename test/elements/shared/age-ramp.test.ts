import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ageClass, classLimits, rampDefaults, rampPosition } from '../../../packages/elements/src/shared/age-ramp.js';
import { hatchPath } from '../../../packages/elements/src/shared/hatch.js';

describe('the age ramp', () => {
  it('ageClass() puts an age at a limit in the younger class', () => {
    expect([0, 7, 7.1, 30, 91, 365, 3652, 3653, Infinity].map(ageClass)).toEqual([1, 1, 2, 2, 3, 4, 5, 6, 6]);
  });

  it('rampPosition() rises with age and stays on the ramp', () => {
    const age = fc.double({ min: 0, max: 1e6, noNaN: true });
    fc.assert(
      fc.property(age, age, (a, b) => {
        const [young, old] = a < b ? [a, b] : [b, a];
        expect(rampPosition(young)).toBeLessThanOrEqual(rampPosition(old));
        expect(rampPosition(old)).toBeLessThanOrEqual(5);
      }),
    );
  });

  it('rampPosition() is nearest to the colour of the class an age lies in', () => {
    for (const limit of classLimits) {
      expect(rampPosition(limit)).toBeGreaterThan(ageClass(limit) - 1);
      expect(rampPosition(limit)).toBeLessThan(ageClass(limit));
    }
  });

  // Source: WCAG 2.2, definition of relative luminance and contrast ratio; the ratios are those stated for this ramp in the design.
  it('the default colours darken monotonically, with the stated contrast on warm paper and on the dark ground', () => {
    const onPaper = [1.3, 1.7, 2.8, 5.1, 9.9, 15.4];
    const onDark = [13.4, 10.1, 6.1, 3.4, 1.8, 1.1];
    rampDefaults.forEach((colour, index) => {
      expect(contrast(colour, '#fbfaf6')).toBeCloseTo(onPaper[index]!, 0.7);
      expect(contrast(colour, '#14171a')).toBeCloseTo(onDark[index]!, 0.7);
      if (index) expect(luminance(colour)).toBeLessThan(luminance(rampDefaults[index - 1]!));
    });
  });
});

describe('hatchPath()', () => {
  it('hatchPath() stays within its rectangle', () => {
    const numbers = [...hatchPath(100, 50, 40, 20).matchAll(/[ML]([\d.-]+) ([\d.-]+)/g)].map(([, x, y]) => [Number(x), Number(y)] as const);
    expect(numbers.length).toBeGreaterThan(10);
    for (const [x, y] of numbers) {
      expect(x).toBeGreaterThanOrEqual(100);
      expect(x).toBeLessThanOrEqual(140);
      expect(y).toBeGreaterThanOrEqual(50);
      expect(y).toBeLessThanOrEqual(70);
    }
  });
});

function luminance(colour: string): number {
  const [red, green, blue] = [1, 3, 5].map((start) => {
    const channel = parseInt(colour.slice(start, start + 2), 16) / 255;
    return channel <= 0.04045 ? channel / 12.92 : ((channel + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * red! + 0.7152 * green! + 0.0722 * blue!;
}

function contrast(one: string, other: string): number {
  const [dark, light] = [luminance(one), luminance(other)].sort((a, b) => a - b);
  return (light! + 0.05) / (dark! + 0.05);
}
