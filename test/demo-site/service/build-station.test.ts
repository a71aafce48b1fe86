import { spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type Station, readStation } from '@rillage/sdk';

const at = (path: string): string => fileURLToPath(new URL(`../../../${path}`, import.meta.url));
const folder = mkdtempSync(join(tmpdir(), 'rillage-build-'));
const truth = JSON.parse(readFileSync(at('demo-site/data/thessle-brook/truth.json'), 'utf8')) as {
  younger: Record<string, number[]>;
  preRecordShare: number[];
  concentration: Record<string, number[]>;
};
let station: Station;

beforeAll(() => {
  const { status, stderr } = spawnSync(process.execPath, [at('demo-site/service/build-station.mjs'), folder], { encoding: 'utf8' });
  expect(status, stderr).toBe(0);
  station = readStation(readFileSync(join(folder, 'thessle-brook.json'), 'utf8'));
}, 60_000);
afterAll(() => rmSync(folder, { recursive: true, force: true }));

/* The files carry an agency's habits (rounded flow, three days without it, traces, fortnightly rain samples), so the truth is met nearly. */
describe('node demo-site/service/build-station.mjs', () => {
  it.each(['7', '30', '90', '365'])(
    'comes from the CSV files to the true share younger than %s days, within 0.01 on every day of ten years',
    (age) => {
      const found = station.history.younger[age] as number[];
      expect(found).toHaveLength(3653);
      found.forEach((share, day) => expect(Math.abs(share - (truth.younger[age]?.[day] as number)), `day ${day}`).toBeLessThan(0.01));
    },
  );

  it('and to the true concentrations but for what a fortnight’s bulk sample cannot know', () => {
    // The stated laboratory errors are 0.1 ‰, 0.8 ‰ and 3 %; daily rain scatters by 1.9 ‰ about its fortnight.
    for (const [tracer, within] of [
      ['d18O', 0.15],
      ['d2H', 1.2],
      ['chloride', 0.15],
    ] as const) {
      const found = station.history.concentration[tracer] as number[];
      const squares = found.reduce((sum, value, day) => sum + (value - (truth.concentration[tracer]?.[day] as number)) ** 2, 0);
      expect(Math.sqrt(squares / found.length), tracer).toBeLessThan(within);
    }
  });

  it('says that it is invented, of when it is, and that no range was assessed', () => {
    expect(station).toMatchObject({ invented: true, reading: { status: 'given', confidence: 'notAssessed', at: '2025-04-01T00:00:00Z' } });
    expect(station.reading.station?.invented).toBe(true);
    expect(station.reading.sentences?.[0]).toMatch(
      /of the stream on 31 March 2025 fell as rain within the last 30 days \(range not assessed\)\.$/,
    );
    expect(station.reading.evidence.samples).toBeGreaterThan(500);
    expect(station.reading.evidence.sources).toHaveLength(4);
    expect(station.reading.trend?.years).toBeGreaterThan(7);
  });

  it('stays below half a megabyte', () => {
    expect(readFileSync(join(folder, 'thessle-brook.json')).length).toBeLessThan(500_000);
  });
});
