import { describe, expect, it } from 'vitest';
import { readFileSync } from 'node:fs';
import { cellsAt, lineAt, lineCount, namesOf } from '../../../packages/elements/src/rillage-forcing-input/text-rows.js';
import { tokenize, type TokenRules } from '../../../packages/sdk/src/forcing/text/tokenize.js';

const caps = { maxRows: 1e6, maxColumns: 1000 };

/** The SDK's tokenizer is the oracle: what it calls a row at a line, this must call the same. */
function expectSameRows(text: string, splitAt: TokenRules['splitAt'], remarkMark = '#'): void {
  const { rows } = tokenize(text, { splitAt, remarkMark, ...caps });
  const file = { name: 'x', text };
  expect(rows.length).toBeGreaterThan(0);
  for (const { line, cells } of rows) expect(cellsAt(file, line, splitAt, remarkMark), `line ${line}`).toEqual(cells);
}

describe('cellsAt(file, line, splitAt, remarkMark)', () => {
  it('gives the cells that the SDK’s tokenizer gives, quotes, blanks and line ends of all kinds included', () => {
    expectSameRows('a,b,c\n1, 2 ,\n"x,y","say ""no""",3\n\n# remark\n"two\nlines",4,5\n"st" ray,,\n', ',');
    expectSameRows('\uFEFFa;b\r\n1,5;2\r3;"4;5"\r\n', ';');
    expectSameRows('a\tb\t\n 1 \t\t3\n', '\t');
    expectSameRows('a|b\n1|2\n', '|');
    expectSameRows('  a  b\tc  \n1 2 3\n"x y"  4 5\n', 'blanks');
    expectSameRows('% a\nday,rain\n1,2', ',', '%');
  });

  it.each([
    ['weather.csv', ','],
    ['flow.csv', ','],
    ['rain-samples.csv', ','],
    ['stream-samples.csv', ';'],
  ] as const)('gives the same for every row of the invented %s', (name, splitAt) => {
    expectSameRows(readFileSync(new URL(`../../../demo-site/data/thessle-brook/${name}`, import.meta.url), 'utf8'), splitAt);
  });

  it('gives null for a blank line, a remark, and none', () => {
    const file = { name: 'x', text: '# r\n\n  \na,b\n' };
    expect([1, 2, 3, 5, 0, -1, 1.5].map((line) => cellsAt(file, line))).toEqual(Array(7).fill(null));
    expect(cellsAt(file, 1, ',', '')).toEqual(['# r']);
  });

  it('ends, in bounded time, on a quote that never closes', () => {
    const file = { name: 'x', text: `a,"${'b,'.repeat(1_000_000)}` };
    const before = performance.now();
    expect(cellsAt(file, 1)!.length).toBeGreaterThan(1);
    expect(performance.now() - before).toBeLessThan(1000);
  });
});

describe('lineAt(file, line), lineCount(file)', () => {
  it('count as an editor does, in text and in bytes of three encodings', () => {
    const text = 'a\r\nü\rc\n';
    const latin = Uint8Array.from([...text], (letter) => letter.charCodeAt(0));
    const wide = new Uint8Array(new Uint16Array([0xfeff, ...[...text].map((letter) => letter.charCodeAt(0))]).buffer);
    for (const content of [text, new TextEncoder().encode(text), latin, wide]) {
      const file = { name: 'x', text: content };
      expect(lineCount(file)).toBe(3);
      expect([1, 2, 3, 4].map((line) => lineAt(file, line))).toEqual(['a', 'ü', 'c', '']);
    }
  });
});

describe('namesOf(file, rules)', () => {
  it('counts rows as a layout does, without remarks and blank lines; none where there is no names row', () => {
    const file = { name: 'x', text: '# r\n\nstation 7\nday;rain\n1;2\n' };
    expect(namesOf(file, { splitAt: ';', namesRow: 2 })).toEqual(['day', 'rain']);
    expect(namesOf(file, { splitAt: ';', namesRow: 0 })).toEqual([]);
    expect(namesOf(file, { splitAt: ';', namesRow: 9 })).toEqual([]);
  });
});
