import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { copyFileSync, existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type Reading, readExcerpt, readReading, readStation } from '@rillage/sdk';

/* The jobs run for real, as processes, over the built SDK; so `npm run build` comes first, as `npm test` has it. */
const at = (path: string): string => fileURLToPath(new URL(`../../../${path}`, import.meta.url));
const made = mkdtempSync(join(tmpdir(), 'rillage-made-'));
const ROWS = readFileSync(at('demo-site/data/thessle-brook/next-days.csv'), 'utf8');
const folders: string[] = [made];

interface Morning {
  folder: string;
  station: string;
  rows: string;
  reading: string;
}

function run(command: string, args: string[], cwd = at('.')): { status: number | null; out: string } {
  const { status, stdout, stderr } = spawnSync(command, args, {
    cwd,
    encoding: 'utf8',
    env: { ...process.env, DENO_NO_UPDATE_CHECK: '1', NO_COLOR: '1' },
    timeout: 60_000,
  });
  return { status, out: `${stdout}${stderr}` };
}
const runtimes = {
  node: (script: string, args: string[], _folder: string) => run(process.execPath, [at(script), ...args]),
  deno: (script: string, args: string[], folder: string) =>
    run(at('node_modules/.bin/deno'), [
      'run',
      '--no-prompt',
      `--allow-read=${folder}`,
      `--allow-write=${folder}`,
      ...(script.includes('dying') ? ['--allow-run'] : []),
      at(script),
      ...args,
    ]),
};

/** A folder as an agency's machine has it on the morning. */
function morning(rows = ROWS): Morning {
  const folder = mkdtempSync(join(tmpdir(), 'rillage-morning-'));
  folders.push(folder);
  const paths = { folder, station: join(folder, 'station.json'), rows: join(folder, 'rows.csv'), reading: join(folder, 'reading.json') };
  copyFileSync(join(made, 'thessle-brook.json'), paths.station);
  writeFileSync(paths.rows, rows);
  return paths;
}
const argsOf = ({ station, rows, reading }: Morning): string[] => [station, rows, reading];
/** A failing comparison of whole files would print them. */
const digest = (text: string): string => createHash('sha256').update(text).digest('hex');
const textOf = (path: string): string => readFileSync(path, 'utf8');

let before = '';
let firstReading: Reading | undefined;

/** The same data, numbers to a relative 1e-9. */
function expectNear(found: unknown, expected: unknown, path = ''): void {
  if (typeof expected === 'number')
    expect(Math.abs((found as number) - expected), path).toBeLessThanOrEqual(1e-9 * Math.max(1, Math.abs(expected)));
  else if (typeof expected !== 'object' || expected === null) expect(found, path).toBe(expected);
  else {
    expect(Object.keys(found as object).sort(), path).toEqual(Object.keys(expected).sort());
    for (const [key, value] of Object.entries(expected)) expectNear((found as Record<string, unknown>)[key], value, `${path}.${key}`);
  }
}

beforeAll(() => {
  const { status, out } = run(process.execPath, [at('demo-site/service/build-station.mjs'), made]);
  expect(status, out).toBe(0);
  before = textOf(join(made, 'thessle-brook.json'));
}, 60_000);
afterAll(() => folders.forEach((folder) => rmSync(folder, { recursive: true, force: true })));

describe.each(['node', 'deno'] as const)('the morning job in %s', (name) => {
  const runtime = runtimes[name];
  const script = `demo-site/service/${name}.mjs`;
  let after = '';
  let readingAfter = '';

  it('adds the new rows, writes station and reading, and says the reading', () => {
    const paths = morning();
    const { status, out } = runtime(script, argsOf(paths), paths.folder);
    expect(status, out).toBe(0);
    const station = readStation(textOf(paths.station));
    expect(station.reading.at).toBe('2025-04-08T00:00:00Z');
    expect(readReading(textOf(paths.reading))).toEqual(station.reading);
    expect(out).toContain(station.reading.sentence);
    expect(readdirSync(paths.folder).sort()).toEqual(['reading.json', 'rows.csv', 'station.json']);
    [after, readingAfter] = [textOf(paths.station), textOf(paths.reading)];
    // Within one runtime the bytes are the same; between two, exp and pow differ in the last bit (no standard fixes it).
    firstReading ??= station.reading;
    expectNear(station.reading, firstReading);
  });

  it('writes the public’s excerpt where it is given a fourth path, of the same station', () => {
    const paths = morning();
    const excerpt = join(paths.folder, 'excerpt.json');
    const { status, out } = runtime(script, [...argsOf(paths), excerpt], paths.folder);
    expect(status, out).toBe(0);
    const [station, shown] = [readStation(textOf(paths.station)), readExcerpt(textOf(excerpt))];
    expect(shown).toMatchObject({ stationSeal: station.seal, reading: station.reading, history: station.history });
    expect(textOf(excerpt)).not.toContain('checkpoint');
  });

  it('run twice, writes nothing the second time', () => {
    const paths = morning();
    expect(runtime(script, argsOf(paths), paths.folder).status).toBe(0);
    const written = [paths.station, paths.reading].map((path) => statSync(path));
    const { status, out } = runtime(script, argsOf(paths), paths.folder);
    expect(status, out).toBe(0);
    expect(out).toContain('nothing written');
    [paths.station, paths.reading].forEach((path, i) => {
      expect(statSync(path).mtimeMs).toBe(written[i]?.mtimeMs);
      expect(statSync(path).ino).toBe(written[i]?.ino);
    });
    expect(digest(textOf(paths.station))).toBe(digest(after));
  });

  it('killed before any act and in the middle of any write, leaves whole files, and the next run makes good', () => {
    const counted = morning();
    const script = 'test/demo-site/service/dying.mjs';
    const alive = runtime(script, ['0', ...argsOf(counted)], counted.folder);
    const acts = /acts (.+)/.exec(alive.out)?.[1]?.split(' ') ?? [];
    expect(
      acts.filter((act) => act === 'writeSynced'),
      alive.out,
    ).toHaveLength(2);
    expect(acts.filter((act) => act === 'rename')).toHaveLength(2);
    const points = acts.flatMap((act, i) => (act === 'writeSynced' ? [i + 1, i + 1.5] : [i + 1]));
    for (const point of points) {
      const paths = morning();
      const died = runtime(script, [String(point), ...argsOf(paths)], paths.folder);
      // Killed without a word: an error would have said something. (The npm launcher of Deno turns the signal into status 1.)
      expect([died.status === 0, died.out], `${point}`).toEqual([false, '']);
      expect([before, after].map(digest)).toContain(digest(textOf(paths.station)));
      if (existsSync(paths.reading)) expect(digest(textOf(paths.reading))).toBe(digest(readingAfter));
      expect(runtime(`demo-site/service/${name}.mjs`, argsOf(paths), paths.folder).status).toBe(0);
      expect(digest(textOf(paths.station))).toBe(digest(after));
      expect(digest(textOf(paths.reading))).toBe(digest(readingAfter));
    }
  }, 120_000);

  it.each([
    ['a gap', ROWS.replace(/2025-04-01.*\n/, ''), /time-gap/],
    ['a page instead of rows', '<!doctype html><title>Sign in</title>', /html/],
    ['nothing', '', /empty/],
  ])('refuses %s and writes nothing', (_what, rows, words) => {
    const paths = morning(rows);
    const { status, out } = runtime(script, argsOf(paths), paths.folder);
    expect(status).toBe(1);
    expect(out).toMatch(words);
    expect(digest(textOf(paths.station))).toBe(digest(before));
    expect(existsSync(paths.reading)).toBe(false);
  });

  it('refuses rows that contradict what the station has', () => {
    const paths = morning();
    expect(runtime(script, argsOf(paths), paths.folder).status).toBe(0);
    writeFileSync(paths.rows, ROWS.replace('2025-04-05,5.9', '2025-04-05,59.0'));
    const { status, out } = runtime(script, argsOf(paths), paths.folder);
    expect(status).toBe(1);
    expect(out).toMatch(/contradicting-rows/);
    expect(digest(textOf(paths.station))).toBe(digest(after));
  });

  it('refuses a station from a newer version, cut short or changed, and leaves it as it is', () => {
    for (const [text, words] of [
      [
        before.replace('"kind":"rillage-station"', '"kind":"rillage-station"').replace(/"version":1}?\s*$/, '"version":2}'),
        /newer-version|seal-broken/,
      ],
      [before.slice(0, before.length / 2), /truncated/],
      [before.replace('Marrowgate', 'Elsewhere'), /seal-broken/],
    ] as const) {
      const paths = morning();
      writeFileSync(paths.station, text);
      const { status, out } = runtime(script, argsOf(paths), paths.folder);
      expect(status).toBe(1);
      expect(out).toMatch(words);
      expect(digest(textOf(paths.station))).toBe(digest(text));
    }
  });

  it('says how it is used when arguments are missing', () => {
    const { status, out } = runtime(script, [], made);
    expect(status).toBe(2);
    expect(out).toMatch(/Usage/);
  });
});
