import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { age, ageSpan, amountMessages, date, moment, percent, percentSpan } from '../../../packages/elements/src/shared/format.js';
import { fill } from '../../../packages/elements/src/shared/messages.js';

const speech = (tag: string) => ({
  tag,
  say: (key: keyof typeof amountMessages, values: Record<string, string | number> = {}) => fill(amountMessages[key], values, tag),
});
const english = speech('en-GB');

describe('age()', () => {
  it('age() speaks of days up to two months, months up to two years, years beyond', () => {
    expect(age(english, 1)).toBe('1 day');
    expect(age(english, 2.26)).toBe('2.3 days');
    expect(age(english, 45)).toBe('45 days');
    expect(age(english, 90)).toBe('3 months');
    expect(age(english, 365)).toBe('12 months');
    expect(age(english, 900)).toBe('2.5 years');
    expect(age(english, 7305)).toBe('20 years');
  });

  it('age() writes a decimal comma where the language does', () => {
    expect(age(speech('de'), 900)).toBe('2,5 Jahre');
  });
});

describe('ageSpan()', () => {
  it('ageSpan() says the unit once', () => {
    expect(ageSpan(english, 260, 420)).toBe('8 to 14 months');
    expect(ageSpan(english, 244, 426)).toBe('8 to 14 months');
  });

  it('ageSpan() says both units where the lower end would be nothing in the upper one', () => {
    expect(ageSpan(english, 12, 400)).toBe('12 days to 14 months');
  });

  it('ageSpan() rounds a lower bound down: the record of 10 years is not "more than 11"', () => {
    expect(ageSpan(english, 400, 3700, true)).toBe('13 months to more than 10 years');
  });

  it('ageSpan() never narrows a range', () => {
    const ages = { min: 3, max: 20_000, noNaN: true };
    const lengths: Record<string, number> = { day: 1, month: 30.4375, year: 365.25 };
    fc.assert(
      fc.property(fc.double(ages), fc.double(ages), (a, b) => {
        const [low, high] = a < b ? [a, b] : [b, a];
        const [first, last = first] = ageSpan(english, low, high)
          .split(' to ')
          .map((text) => /^([\d.,]+)(?: (day|month|year)s?)?$/.exec(text)!);
        const days = ([, value, unit]: RegExpExecArray): number => Number(value!.replaceAll(',', '')) * lengths[unit ?? last![2]!]!;
        expect(days(last!)).toBeGreaterThanOrEqual(high - 1e-3);
        expect(days(first!)).toBeLessThanOrEqual(low + 1e-3);
      }),
    );
  });
});

describe('percent(), percentSpan()', () => {
  it('percent() never says 0 or 100 where it is neither', () => {
    expect(percent(english, 0.004)).toBe('< 1%');
    expect(percent(english, 0.996)).toBe('> 99%');
    expect(percent(english, 0)).toBe('0%');
    expect(percent(english, 1)).toBe('100%');
    expect(percent(english, 0.235)).toBe('24%');
  });

  it('percent() says "not known" of null and NaN', () => {
    expect(percent(english, null)).toBe('not known');
    expect(percent(english, NaN)).toBe('not known');
  });

  it('percentSpan() rounds outwards, and says "range not assessed" of null', () => {
    expect(percentSpan(english, { low: 0.186, high: 0.272 })).toBe('18 to 28%');
    expect(percentSpan(english, null)).toBe('range not assessed');
  });
});

describe('moment(), date()', () => {
  it('moment() names the day a daily step stands for, not the next one it ends with', () => {
    expect(moment('en-GB', '2025-03-15T00:00:00Z', 1)).toBe('14 March 2025');
    expect(moment('en-GB', '2025-03-15T06:00:00Z', 1)).toBe('14 March 2025');
  });

  it('moment() names the time of a shorter step', () => {
    expect(moment('en-GB', '2025-03-15T09:00:00Z', 1 / 24)).toBe('15 March 2025 at 09:00');
  });

  it('date() falls back to UTC in a zone that does not exist, and to nothing for no date', () => {
    expect(date('en-GB', '2025-03-15T00:00:00Z', { dateStyle: 'long' }, 'Nowhere/Land')).toBe('15 March 2025');
    expect(date('en-GB', 'yesterday', { dateStyle: 'long' })).toBe('');
  });
});
