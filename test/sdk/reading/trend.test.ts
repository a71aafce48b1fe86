import { describe, expect, it } from 'vitest';
import { type StationHistory } from '../../../packages/sdk/src/contract.js';
import { trendAt } from '../../../packages/sdk/src/reading/trend.js';

function history(steps: number, share: (step: number) => number | null): StationHistory {
  const list = Array.from({ length: steps }, (_, i) => share(i));
  return {
    start: '2020-01-01T00:00:00Z',
    stepDays: 1,
    flow: list,
    younger: { '30': list },
    medianDays: list,
    medianBeyondRecord: list.map(() => 0),
    preRecordShare: list,
    concentration: {},
  };
}
// 2024-06-30 ends at step 1641 (2020 is a leap year, as 2024 is): 366 + 365 × 3 + 181 days − 1.
const at = '2024-07-01T00:00:00Z';

describe('trendAt(history, at, share)', () => {
  // Each year the same wave, so the season's own values are known: the middle of the window is the wave's value at the day.
  const wave = history(1642, (step) => 0.3 + 0.2 * Math.sin((2 * Math.PI * step) / 365.25));

  it('compares with the same season of earlier years', () => {
    const usual = 0.3 + 0.2 * Math.sin((2 * Math.PI * 1641) / 365.25);
    expect(trendAt(wave, at, usual)).toMatchObject({ direction: 'usual', days: 30, years: 4 });
    expect(trendAt(wave, at, usual)?.usualShare).toBeCloseTo(usual, 2);
    expect(trendAt(wave, at, usual + 0.1)?.direction).toBe('younger');
    expect(trendAt(wave, at, usual - 0.1)?.direction).toBe('older');
  });

  it('is null with fewer than two earlier years, without the share, or where the season was dry', () => {
    expect(
      trendAt(
        history(700, () => 0.3),
        '2021-12-01T00:00:00Z',
        0.3,
      ),
    ).toBeNull();
    expect(trendAt(wave, at, null)).toBeNull();
    expect(
      trendAt(
        history(1642, () => null),
        at,
        0.3,
      ),
    ).toBeNull();
  });
});
