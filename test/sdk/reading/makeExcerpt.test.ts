import { createHash } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { checkStation } from '../../../packages/elements/src/shared/check/station.js';
import { RillageError } from '../../../packages/sdk/src/errors.js';
import { canonicalJson } from '../../../packages/sdk/src/reading/canonicalJson.js';
import { makeExcerpt } from '../../../packages/sdk/src/reading/makeExcerpt.js';
import { makeStation } from '../../../packages/sdk/src/reading/makeStation.js';
import { readExcerpt, readStation, writeExcerpt, writeStation } from '../../../packages/sdk/src/reading/stationText.js';
import { handmadeForcing, handmadeRun } from './handmade.js';

const runs = [0.9, 1, 1.1].map((factor, i) => ({ weight: i + 1, run: handmadeRun({ steps: 400, median: 300 * factor }) }));
const station = makeStation({
  id: 'made-up',
  name: 'Made-up Brook',
  invented: true,
  description: 'Invented.',
  forcing: handmadeForcing(runs[0]!.run),
  source: runs,
  fit: { converged: true, secret: 'a parameter' },
  samples: { count: 30, last: '2022-03-01T00:00:00Z' },
  signedOff: { by: 'A. Nobody', at: '2022-04-01T00:00:00Z' },
});

function codeOf(call: () => unknown): string {
  try {
    call();
  } catch (error) {
    if (error instanceof RillageError) return error.code;
    throw error;
  }
  return 'nothing thrown';
}

describe('makeExcerpt(station)', () => {
  const excerpt = makeExcerpt(station);

  it('has all that the elements draw from, as the station has it', () => {
    const { id, name, invented, description, of, history, distribution, reading, samples, signedOff } = station;
    expect(excerpt).toMatchObject({ id, name, invented, description, of, history, distribution, reading, samples, signedOff });
  });

  it('has nothing that a morning continues from, nor a field that it does not know', () => {
    const later = { ...station, notes: 'for the office alone' };
    for (const field of ['members', 'fit', 'recent', 'balance', 'receipt', 'notes']) expect(makeExcerpt(later)).not.toHaveProperty(field);
    expect(writeExcerpt(makeExcerpt(later))).not.toMatch(/checkpoint|secret|office/);
  });

  it('is sealed by its own content and names the station’s seal', () => {
    const { seal, ...content } = JSON.parse(writeExcerpt(excerpt)) as Record<string, unknown>;
    // Node's own digest is the reference.
    expect(seal).toBe(createHash('sha256').update(canonicalJson(content), 'utf8').digest('hex'));
    expect(content['stationSeal']).toBe(station.seal);
  });

  it('leaves the station as it was', () => {
    const before = writeStation(station);
    makeExcerpt(station, { historyDays: 10 });
    expect(writeStation(station)).toBe(before);
  });
});

describe('makeExcerpt(station, { historyDays })', () => {
  it('keeps the last days, and says from when', () => {
    const { history } = makeExcerpt(station, { historyDays: 100 });
    // 400 days from 15 March 2021; the last 100 begin 300 days later.
    expect(history.start).toBe('2022-01-09T00:00:00Z');
    expect(history.flow).toEqual(station.history.flow.slice(300));
    expect(history.younger['30']).toEqual(station.history.younger['30']!.slice(300));
    expect(history.medianLow).toEqual(station.history.medianLow!.slice(300));
    expect(history.stepDays).toBe(1);
  });

  it('keeps none for 0, and all where there are not so many', () => {
    expect(makeExcerpt(station, { historyDays: 0 }).history).toMatchObject({ flow: [], medianDays: [], start: '2022-04-19T00:00:00Z' });
    expect(makeExcerpt(station, { historyDays: 1e6 }).history).toEqual(station.history);
  });

  it.each([-1, NaN])('refuses %s', (historyDays) => {
    expect(codeOf(() => makeExcerpt(station, { historyDays }))).toBe('parameter-domain');
  });
});

describe('readExcerpt(writeExcerpt(excerpt))', () => {
  const text = writeExcerpt(makeExcerpt(station, { historyDays: 50 }));

  it('gives the excerpt back, and the same bytes again', () => {
    expect(readExcerpt(text)).toEqual(makeExcerpt(station, { historyDays: 50 }));
    expect(writeExcerpt(readExcerpt(text))).toBe(text);
  });

  it.each([
    ['not-an-excerpt', writeStation(station)],
    ['seal-broken', text.replace('Made-up', 'Made up')],
    ['truncated', text.slice(0, 500)],
    ['html-instead', '<!doctype html>'],
    ['newer-version', '{"kind":"rillage-excerpt","version":2}'],
  ])('refuses with %s', (code, given) => expect(codeOf(() => readExcerpt(given))).toBe(code));

  it('is no station: the morning job is told what it was given', () => {
    expect(() => readStation(text)).toThrow(/public excerpt/);
    expect(codeOf(() => readStation(text))).toBe('not-a-station');
  });

  it('is what the elements accept, and refuse when damaged', () => {
    const parsed = JSON.parse(text) as { distribution: { youngerShare: number[] } };
    expect(checkStation(parsed)).toMatchObject({ problem: null, station: { id: 'made-up' }, reading: { of: 'discharge' } });
    parsed.distribution.youngerShare[2] = 7;
    expect(checkStation(parsed)).toMatchObject({ problem: { code: 'notStation', at: 'distribution.youngerShare[2]' } });
  });
});
