import { describe, expect, it } from 'vitest';
import { date } from '../../../packages/elements/src/shared/format.js';
import { lazyRows } from '../../../packages/elements/src/shared/lazy-rows.js';
import { textLines } from '../../../packages/elements/src/shared/text-lines.js';
import { timeMarks } from '../../../packages/elements/src/shared/time-axis.js';

const at = (text: string): number => Date.parse(`${text}Z`);
const labels = (from: string, to: string, most: number): string[] => timeMarks('en', at(from), at(to), most).map(({ label }) => label);

describe('timeMarks(language, from, to, most)', () => {
  it('timeMarks() are years, every so many, for long records', () => {
    expect(labels('2015-04-01', '2025-04-01', 12)).toEqual([
      '2016',
      '2017',
      '2018',
      '2019',
      '2020',
      '2021',
      '2022',
      '2023',
      '2024',
      '2025',
    ]);
    expect(labels('2015-04-01', '2025-04-01', 5)).toEqual(['2016', '2018', '2020', '2022', '2024']);
    expect(labels('1890-01-01', '2020-01-01', 6)).toEqual(['1900', '1950', '2000']);
  });

  it('timeMarks() are months, days or hours for short ones, within both ends', () => {
    expect(labels('2020-01-15', '2020-07-10', 6)).toEqual(['Feb 20', 'Mar 20', 'Apr 20', 'May 20', 'Jun 20', 'Jul 20']);
    expect(labels('2020-01-30', '2020-02-03', 8)).toEqual(['Jan 30', 'Jan 31', 'Feb 1', 'Feb 2', 'Feb 3']);
    expect(timeMarks('en', at('2020-01-30'), at('2020-01-30T05:00'), 8)).toHaveLength(6);
  });

  it('timeMarks() are few whatever the span', () => {
    for (const days of [0.1, 1, 10, 100, 1000, 1e4, 1e5]) {
      const marks = timeMarks('en', 0, days * 86_400_000, 7);
      expect(marks.length).toBeLessThanOrEqual(9);
    }
  });
});

describe('date(language, time, options, zone)', () => {
  it('date() falls back to UTC for a zone that does not exist, each time', () => {
    for (let index = 0; index < 2; index++) {
      expect(date('en-GB', at('2020-01-31T23:30'), { dateStyle: 'long' }, 'Nowhere/None')).toBe('31 January 2020');
      expect(date('en-GB', at('2020-01-31T23:30'), { dateStyle: 'long' }, 'Asia/Tokyo')).toBe('1 February 2020');
    }
    expect(date('en', 'no date', {})).toBe('');
  });
});

describe('lazyRows(count, make)', () => {
  it('lazyRows() makes only what is read, once, and reads as an array', () => {
    const made: number[] = [];
    const rows = lazyRows(300, (index) => {
      made.push(index);
      return [String(index)];
    });
    expect(rows.length).toBe(300);
    expect(rows.slice(25, 28)).toEqual([['25'], ['26'], ['27']]);
    expect(rows[299]).toEqual(['299']);
    expect(rows[300]).toBeUndefined();
    expect([rows[25], rows[26]].map((row) => row?.[0])).toEqual(['25', '26']);
    expect(made).toEqual([25, 26, 27, 299]);
  });
});

describe('textLines(text, width, em)', () => {
  it('textLines() breaks between words and loses none', () => {
    expect(textLines('Stream, mm a day', 1000, 10)).toEqual(['Stream, mm a day']);
    expect(textLines('Stream, mm a day, means over 5 days', 100, 10)).toEqual(['Stream, mm a day,', 'means over 5 days']);
    expect(textLines('Wasserdargebotspotenzial', 40, 10)).toEqual(['Wasserdargebotspotenzial']);
    expect(textLines('', 40, 10)).toEqual(['']);
  });
});
