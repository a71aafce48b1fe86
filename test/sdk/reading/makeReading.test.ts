import { describe, expect, it } from 'vitest';
import { RillageError } from '../../../packages/sdk/src/errors.js';
import { makeReading } from '../../../packages/sdk/src/reading/makeReading.js';
import { handmadeRun, type Handmade } from './handmade.js';

/** Scenarios after the sentence in the project's design; the numbers are chosen, the wording is ours. */
const ensemble = (members: Handmade[], weights: number[] = members.map(() => 1)) =>
  members.map((member, i) => ({ weight: weights[i] as number, run: handmadeRun(member) }));

function codeOf(call: () => unknown): string {
  try {
    call();
  } catch (error) {
    if (error instanceof RillageError) return error.code;
    throw error;
  }
  return 'nothing thrown';
}

describe('makeReading(run)', () => {
  it('says shares, median and pre-record water of the last step, and that the range is not assessed', () => {
    const reading = makeReading(handmadeRun());
    expect(reading).toMatchObject({ status: 'given', confidence: 'notAssessed', of: 'discharge', at: '2025-03-15T00:00:00Z' });
    expect(reading.younger).toEqual([
      { days: 7, share: 0.12, unplaced: 0, range: null },
      { days: 30, share: 0.3, unplaced: 0, range: null },
      { days: 90, share: 0.45, unplaced: 0, range: null },
      { days: 365, share: 0.7, unplaced: 0, range: null },
    ]);
    expect(reading.median).toEqual({ days: 330, beyondRecord: false, range: null });
    expect(reading.olderThanRecord).toEqual({ share: 0.1, range: null });
    expect(reading.sentences).toEqual([
      'About 3 litres in 10 of the stream on March 14, 2025 fell as rain within the last 30 days (range not assessed).',
      'Half of the water is older than about 11 months (range not assessed).',
      'About 1 litre in 10 was already in the ground when records began in March 2021 (range not assessed); its age is not known.',
    ]);
    expect(reading.confidenceBecause).toEqual(['From a single model run; the range is not assessed.']);
    expect(reading.caution).toMatch(/not a basis for drinking-water, bathing or emergency decisions/);
    expect(reading.sentence).toBe(reading.sentences?.join(' '));
  });

  it('writes dates as the language tag asks', () => {
    expect(makeReading(handmadeRun(), { language: 'en-GB' }).sentence).toContain('on 14 March 2025 fell');
  });

  it('speaks of the step that `at` names, by instant and by date', () => {
    const run = handmadeRun({ shares: { 30: (step) => step / 2000 } });
    expect(makeReading(run, { at: '2021-03-15' }).at).toBe('2021-03-16T00:00:00Z');
    expect(makeReading(run, { at: '2021-03-16T00:00:00Z' }).at).toBe('2021-03-16T00:00:00Z');
    expect(makeReading(run, { at: '2022-03-15' }).younger[0]?.share).toBeCloseTo(365 / 2000, 12);
    expect(codeOf(() => makeReading(run, { at: '2021-03-14' }))).toBe('at-outside');
    expect(codeOf(() => makeReading(run, { at: '2025-03-15' }))).toBe('at-outside');
    expect(codeOf(() => makeReading(run, { at: 'yesterday' }))).toBe('time');
  });

  it('names the day a step began on when days run from 09:00', () => {
    const reading = makeReading(handmadeRun({ start: '2021-03-15T09:00:00Z' }), {
      at: '2021-03-15',
      language: 'en-GB',
      rules: { leastRecordDays: 0 },
    });
    expect(reading.at).toBe('2021-03-16T09:00:00Z');
    expect(reading.sentences?.[0]).toContain('15 March 2021');
  });

  it('keeps a share known only from below between its bounds while the record is shorter than the age', () => {
    const reading = makeReading(
      handmadeRun({ steps: 60, start: '2025-01-01T00:00:00Z', preRecord: 0.4, shares: { 7: 0.12, 30: 0.3, 90: 0.6, 365: 0.6 } }),
    );
    expect(reading.younger.map(({ unplaced }) => unplaced)).toEqual([0, 0, 0.4, 0.4]);
  });

  it('says "older than the record" where the median is beyond it, never a number of its own', () => {
    const reading = makeReading(handmadeRun({ median: 1461, beyond: 1, preRecord: 0.6, shares: { 30: 0.2, 365: 0.35 } }));
    expect(reading.median).toEqual({ days: 1461, beyondRecord: true, range: null });
    expect(reading.sentences?.[1]).toBe(
      'Half of the water or more is older than the record, which goes back 4 years; by how much is not known.',
    );
  });

  it('speaks of hundreds near either end', () => {
    const first = (share: number): string => makeReading(handmadeRun({ shares: { 30: share } })).sentences?.[0] ?? '';
    expect(first(0.031)).toMatch(/^About 3 litres in 100 /);
    expect(first(0.012)).toMatch(/^About 1 litre in 100 /);
    expect(first(0.004)).toMatch(/^Fewer than 1 litre in 100 /);
    expect(first(0.97)).toMatch(/^About 97 litres in 100 /);
    expect(first(0.9999)).toMatch(/^More than 99 litres in 100 /);
  });

  it('refuses an unknown outflow, an unknown language and an empty source', () => {
    expect(codeOf(() => makeReading(handmadeRun(), { of: 'seepage' }))).toBe('unknown-outflow');
    expect(codeOf(() => makeReading(handmadeRun(), { of: 'constructor' }))).toBe('unknown-outflow');
    expect(codeOf(() => makeReading(handmadeRun(), { language: 'xx' }))).toBe('unknown-language');
    expect(codeOf(() => makeReading(handmadeRun(), { language: 'not a tag' }))).toBe('unknown-language');
    expect(codeOf(() => makeReading([]))).toBe('no-run');
    expect(makeReading(handmadeRun({ outflow: 'drain' })).of).toBe('drain');
  });
});

describe('makeReading(run), withheld', () => {
  it.each([
    ['noOutflow', { flow: 0 }, /there was no outflow/],
    ['recordTooShort', { steps: 5 }, /the record is only 5 days long/],
    ['recordTooShort', { steps: 1 }, /the record is only 1 day long/],
    ['storageRunsDown', { storage: 150, flow: 9 }, /drains the storage/],
    ['storageRunsDown', { storage: 600 }, /drains the storage/],
    [
      'preRecordDominates',
      { steps: 60, preRecord: 0.95, shares: { 7: 0.03, 30: 0.05 } },
      /already in the ground when records began in March 2021/,
    ],
    ['preRecordDominates', { preRecord: 0.995, shares: { 30: 0.002 } }, /already in the ground/],
  ] satisfies [string, Handmade, RegExp][])('%s for %o', (code, given, words) => {
    const reading = makeReading(handmadeRun(given));
    expect(reading.status).toBe('withheld');
    expect(reading.confidence).toBe('withheld');
    expect(reading.withheld.map((reason) => reason.code)).toContain(code);
    expect(reading.sentence).toMatch(/^No age is given for /);
    expect(reading.sentence).toMatch(words);
    expect(reading.median).toBeNull();
    expect(reading.younger.every(({ share }) => share === null)).toBe(true);
    expect(JSON.stringify(reading)).not.toMatch(/NaN|Infinity/);
    expect(reading.sentence).not.toMatch(/NaN|Infinity|undefined|\{/);
  });

  it('when the last sample is too old, and when the fit has not settled', () => {
    const old = makeReading(handmadeRun(), { samples: { count: 40, last: '2024-08-02T00:00:00Z' } });
    expect(old.sentence).toBe(
      'No age is given for March 14, 2025: the last bottle analysed is from August 2024, and the record cannot carry a statement this far.',
    );
    expect(makeReading(handmadeRun(), { converged: false }).withheld[0]?.code).toBe('fitNotConverged');
  });

  it('not when a long record finds most of the water older than itself: that is a statement', () => {
    const reading = makeReading(
      handmadeRun({ preRecord: 0.95, median: 1461, beyond: 1, shares: { 7: 0.01, 30: 0.02, 90: 0.03, 365: 0.04 } }),
    );
    expect(reading.status).toBe('given');
    expect(reading.sentences?.[1]).toMatch(/older than the record/);
  });

  it('not for what a season or dry years take from storage', () => {
    expect(makeReading(handmadeRun({ storage: 860, steps: 200 })).status).toBe('given');
    expect(makeReading(handmadeRun({ storage: 750 })).status).toBe('given');
  });

  it('judges the balance of a resumed run by the outflow handed over', () => {
    const resumed = handmadeRun({ steps: 1, stepsBefore: 3000, storage: 600, start: '2025-03-14T00:00:00Z' });
    expect(makeReading(resumed).status).toBe('given');
    expect(makeReading(resumed, { balance: { outflow: 2000 } }).withheld[0]?.code).toBe('storageRunsDown');
  });

  it('by a rule of the caller, in the caller’s code', () => {
    const reading = makeReading(handmadeRun(), { judge: () => ({ confidence: 'withheld', because: [], withheld: ['iceOnGauge'] }) });
    expect(reading.sentence).toMatch(/a rule of the publisher withholds it \(iceOnGauge\)/);
  });
});

describe('makeReading(weighted runs)', () => {
  const spread = Array.from({ length: 21 }, (_, i) => ({
    shares: { 7: 0.1, 30: 0.2 + i * 0.01, 90: 0.45, 365: 0.7 },
    median: 250 + 8.5 * i,
    preRecord: 0.05 + i * 0.005,
  }));

  it('gives 5–95 % ranges that hold the middle, and says them', () => {
    const reading = makeReading(ensemble(spread), { samples: { count: 90, last: '2025-03-01T00:00:00Z' }, language: 'en-GB' });
    const month = reading.younger[1];
    expect(month?.share).toBeCloseTo(0.3, 6);
    expect(month?.range?.low).toBeGreaterThanOrEqual(0.2);
    expect(month?.range?.low).toBeLessThanOrEqual(0.22);
    expect(month?.range?.high).toBeGreaterThanOrEqual(0.38);
    expect(month?.range?.high).toBeLessThanOrEqual(0.4);
    expect(reading.sentences?.[0]).toBe(
      'About 3 litres in 10 of the stream on 14 March 2025 fell as rain within the last 30 days (likely between 2 and 4 in 10).',
    );
    expect(reading.sentences?.[1]).toBe('Half of the water is older than 8 to 14 months.');
    // a narrow range is firm only where it carries the doubt about the input
    expect(reading.confidence).toBe('tentative');
    expect(reading.confidenceBecause.join(' ')).toContain('the truth may lie outside it');
    const carried = { samples: { count: 90, last: '2025-03-01T00:00:00Z' }, inputDoubtInRange: true };
    expect(makeReading(ensemble(spread), carried).confidence).toBe('firm');
  });

  it('follows the weights', () => {
    const members = Array.from({ length: 40 }, (_, i) => ({ shares: { 30: i < 20 ? 0.2 : 0.6 } }));
    const leaning = (first: number): number[] => members.map((_, i) => (i < 20 ? first : 1 - first));
    expect(makeReading(ensemble(members, leaning(0.9))).younger[0]?.share).toBe(0.2);
    expect(makeReading(ensemble(members, leaning(0.1))).younger[0]?.share).toBe(0.6);
    expect(makeReading(ensemble(members, leaning(0.9))).younger[0]?.range).toEqual({ low: 0.2, high: 0.6 });
    expect(makeReading(ensemble(members, leaning(0.99))).younger[0]?.range).toEqual({ low: 0.2, high: 0.2 });
  });

  it('keeps the upper end open where some members lie beyond the record', () => {
    const reading = makeReading(ensemble([...spread, ...Array.from({ length: 4 }, (): Handmade => ({ beyond: 1, median: 1461 }))]), {
      language: 'en-GB',
    });
    expect(reading.median).toMatchObject({ beyondRecord: false, range: { highBeyondRecord: true, high: 1461 } });
    expect(reading.sentences?.[1]).toMatch(
      /^Half of the water is older than \d+ months, and perhaps older than the record itself, which goes back 4 years\.$/,
    );
  });

  it('calls wide ranges, missing samples and short records tentative', () => {
    const wide = makeReading(ensemble([{ shares: { 30: 0.1 } }, { shares: { 30: 0.6 } }]), { inputDoubtInRange: true });
    expect(wide.confidence).toBe('tentative');
    expect(wide.confidenceBecause).toEqual(['The ranges are wide.', 'No laboratory sample supports the model.']);
  });

  it('refuses bad weights and runs over other steps', () => {
    expect(codeOf(() => makeReading(ensemble([{}, {}], [0, 0])))).toBe('weights');
    expect(codeOf(() => makeReading(ensemble([{}, {}], [1, -1])))).toBe('weights');
    expect(codeOf(() => makeReading(ensemble([{}, {}], [1, NaN])))).toBe('weights');
    expect(codeOf(() => makeReading(ensemble([{}, { steps: 10 }])))).toBe('runs-differ');
  });
});
