import { describe, expect, it } from 'vitest';
import { freshness, patience } from '../../../packages/elements/src/rillage-station/stale.js';

const day = 86_400_000;

describe('patience()', () => {
  it('patience() reads days, ISO 8601 durations, and never', () => {
    expect(patience('2')).toBe(2 * day);
    expect(patience('0.5')).toBe(0.5 * day);
    expect(patience('P1DT12H')).toBe(1.5 * day);
    expect(patience('PT90M')).toBe(day / 16);
    expect(patience('P2W')).toBe(14 * day);
    expect(patience('never')).toBe(Infinity);
  });

  it('patience() takes anything else as three days, never as endless', () => {
    for (const text of [null, '', 'P', 'PT', '-1', 'soon', '1e99', 'Infinity', 'P1Y']) expect(patience(text), String(text)).toBe(3 * day);
  });
});

describe('freshness()', () => {
  const at = '2025-03-15T00:00:00Z';
  const now = Date.parse(at);
  it('freshness() goes by the time of the data', () => {
    expect(freshness(at, now + day, 3 * day)).toBe('fresh');
    expect(freshness(at, now + 3 * day, 3 * day)).toBe('fresh');
    expect(freshness(at, now + 3 * day + 1, 3 * day)).toBe('stale');
    expect(freshness(at, now - 2 * 3_600_000, 3 * day)).toBe('future');
    expect(freshness(at, now - 1_800_000, 3 * day)).toBe('fresh');
  });
});
