import { describe, expect, it } from 'vitest';
import { ageRangeTexts, ageText, dateText, litres, litresRange } from '../../../packages/sdk/src/reading/wording.js';

describe('ageText(days, language)', () => {
  it.each([
    [0.4, '0.4 days'],
    [1, '1 day'],
    [12.4, '12 days'],
    [59, '59 days'],
    [61, '2 months'],
    [330, '11 months'],
    [760, '2.1 years'],
    [3653, '10 years'],
    [7305, '20 years'],
  ])('%f days is "%s"', (days, text) => expect(ageText(days, 'en')).toBe(text));

  it('uses the language’s own plural', () => {
    expect(ageText(30, 'de')).toBe('30 Tage');
    expect(ageText(330, 'ar')).toMatch(/شهر/);
  });
});

describe('ageRangeTexts(low, high, language)', () => {
  it('rounds outwards in one unit', () => {
    expect(ageRangeTexts(243.6, 425, 'en')).toEqual({ low: '8', high: '14 months' });
    expect(ageRangeTexts(200, 1000, 'en')).toEqual({ low: '0.5', high: '2.8 years' });
  });
});

describe('dateText(at, stepDays, language)', () => {
  it('names the day that the step covers, in UTC whatever the machine’s zone', () => {
    expect(dateText('2025-04-01T00:00:00Z', 1, 'en-GB')).toBe('31 March 2025');
    expect(dateText('2025-03-31T14:00:00Z', 1 / 24, 'en-GB')).toContain('14:00');
  });
});

describe('litres(share)', () => {
  it('stays between one and all but one', () => {
    expect(litres(0.05)).toEqual({ kind: 'about', count: 1, base: 10 });
    expect(litres(0.94)).toEqual({ kind: 'about', count: 9, base: 10 });
    expect(litres(0.951)).toEqual({ kind: 'about', count: 95, base: 100 });
    expect(litres(0)).toEqual({ kind: 'few' });
    expect(litres(1)).toEqual({ kind: 'nearlyAll' });
  });

  it('rounds ranges outwards', () => {
    expect(litresRange({ low: 0.28, high: 0.33 }, 10)).toEqual({ low: 2, high: 4 });
    expect(litresRange({ low: 0.2, high: 0.4 }, 10)).toEqual({ low: 2, high: 4 });
  });
});
