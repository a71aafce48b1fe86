import { fileURLToPath } from 'node:url';
import { ESLint } from 'eslint';
import { describe, expect, it } from 'vitest';

const root = fileURLToPath(new URL('../..', import.meta.url));
// No file of these names is on disk, so the rules that need types are left out; they are ESLint plugins' own and tested there.
const eslint = new ESLint({
  cwd: root,
  overrideConfig: {
    files: ['packages/*/src/**/*.ts'],
    languageOptions: { parserOptions: { projectService: false } },
    rules: {
      '@typescript-eslint/no-floating-promises': 'off',
      '@typescript-eslint/no-misused-promises': 'off',
      '@typescript-eslint/await-thenable': 'off',
      '@typescript-eslint/no-for-in-array': 'off',
    },
  },
});

async function rulesBrokenBy(code: string, filePath: string): Promise<string[]> {
  const [result] = await eslint.lintText(code, { filePath });
  return (result?.messages ?? []).map((message) => message.ruleId ?? message.message);
}

describe('rillage/arrows', () => {
  const refused: [string, string][] = [
    ['packages/sdk/src/numeric/probe.ts', "export { RillageError } from '../errors.js';"],
    ['packages/sdk/src/numeric/deep/probe.ts', "export { runColumn } from '../../column/run.js';"],
    ['packages/sdk/src/column/probe.ts', "export { readForcing } from '../forcing/read.js';"],
    ['packages/sdk/src/column/probe.ts', "export const later = (): Promise<unknown> => import('../forcing/read.js');"],
    ['packages/sdk/src/column/probe.ts', "export type Layout = import('../units/table.js').Unit;"],
    ['packages/sdk/src/selection/probe.ts', "export { convert } from '../units/convert.js';"],
    ['packages/sdk/src/fit/probe.ts', "export type { Sentence } from '../reading/sentence.js';"],
    ['packages/sdk/src/errors.ts', "export { runColumn } from './index.js';"],
    ['packages/sdk/src/ages/probe.ts', "export { readFileSync } from 'node:fs';"],
    ['packages/sdk/src/ages/probe.ts', "export { gamma } from '../numeric/gamma';"],
    ['packages/sdk/src/workers/probe.ts', "export { readFileSync } from 'node:fs';"],
    ['packages/elements/src/rillage-reading/probe.ts', "export { runColumn } from '../../../sdk/src/index.js';"],
    ['packages/elements/src/rillage-reading/probe.ts', "export { runColumn } from '@rillage/sdk/dist/column/run.js';"],
    ['packages/elements/src/rillage-reading/probe.ts', "export { ajv } from 'ajv';"],
  ];
  it.each(refused)('refuses in %s: %s', async (file, code) => {
    expect(await rulesBrokenBy(code, file)).toContain('rillage/arrows');
  });

  const allowed: [string, string][] = [
    ['packages/sdk/src/numeric/probe.ts', "export { gamma } from './gamma.js';"],
    ['packages/sdk/src/column/probe.ts', "export { RillageError } from '../errors.js';"],
    ['packages/sdk/src/column/deep/probe.ts', "export { gamma } from '../../numeric/gamma.js';"],
    ['packages/sdk/src/reading/probe.ts', "export { runColumn } from '../column/run.js';"],
    ['packages/sdk/src/workers/probe.ts', "export { parentPort } from 'node:worker_threads';"],
    ['packages/sdk/src/index.ts', "export { runColumn } from './column/run.js';"],
    ['packages/elements/src/rillage-reading/probe.ts', "export { html } from 'lit';\nexport { runColumn } from '@rillage/sdk';"],
  ];
  it.each(allowed)('allows in %s: %s', async (file, code) => {
    expect(await rulesBrokenBy(code, file)).toEqual([]);
  });
});

describe('rillage/template-hazards', () => {
  const file = 'packages/elements/src/rillage-reading/probe.ts';
  const lit = "import { html } from 'lit';\n";

  it.each(['<p style="color:red">x</p>', '<p style=${1}>x</p>', '<p onclick="go()">x</p>', '<script></script>', '<style>p{}</style>'])(
    'refuses %s',
    async (markup) => {
      expect(await rulesBrokenBy(`${lit}export const view = html\`${markup}\`;`, file)).toEqual(['rillage/template-hazards']);
    },
  );

  it('allows bindings and words that only look alike', async () => {
    const markup = '<p class="style" .style=${1} @click=${2} data-style="a" ?hidden=${3}>onset = 3</p>';
    expect(await rulesBrokenBy(`${lit}export const view = html\`${markup}\`;`, file)).toEqual([]);
  });
});

describe('eslint.config', () => {
  const sdk = 'packages/sdk/src/column/probe.ts';
  const elements = 'packages/elements/src/rillage-reading/probe.ts';
  const test = 'test/sdk/probe.test.ts';
  const cases: [string, string, string][] = [
    [sdk, 'export const now = Date.now();', 'no-restricted-syntax'],
    [sdk, 'export const now = new Date();', 'no-restricted-syntax'],
    [sdk, 'export const luck = Math.random();', 'no-restricted-syntax'],
    [sdk, 'export const where = process.cwd();', 'no-restricted-globals'],
    [sdk, 'export const loose = (value: any): unknown => value;', '@typescript-eslint/no-explicit-any'],
    [sdk, '// @ts-ignore\nexport const one = 1;', '@typescript-eslint/ban-ts-comment'],
    [sdk, "export const run = eval('1');", 'no-eval'],
    [elements, "import { unsafeHTML } from 'lit/directives/unsafe-html.js';\nexport { unsafeHTML };", 'no-restricted-imports'],
    [elements, "import { styleMap } from 'lit/directives/style-map.js';\nexport { styleMap };", 'no-restricted-imports'],
    [elements, "export const fill = (node: Element): void => {\n  node.innerHTML = 'x';\n};", 'no-restricted-syntax'],
    [elements, "export const make = new Function('return 1');", 'no-new-func'],
    [test, "import { it } from 'vitest';\nit.skip('x', () => undefined);", 'no-restricted-syntax'],
    [test, "import { describe } from 'vitest';\ndescribe.only('x', () => undefined);", 'no-restricted-syntax'],
  ];
  it.each(cases)('refuses in %s: %s', async (file, code, rule) => {
    expect(await rulesBrokenBy(code, file)).toContain(rule);
  });

  it('allows a date made from a given instant', async () => {
    expect(await rulesBrokenBy('export const day = new Date(86_400_000).toISOString();', sdk)).toEqual([]);
  });
});
