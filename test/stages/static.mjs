import { build } from '../../demo-site/build.mjs';
import { at } from '../../demo-site/tools/paths.mjs';
import { expectSuccess, runNode } from './tally.mjs';

/** Stages that look at the sources without running them, and the build. One check each. */
export const format = (tally) =>
  tally.check('prettier --check', async () => void expectSuccess(await runNode(prettier, ['--check', '--log-level', 'warn', '.'])));

export const lint = (tally) => tally.check('eslint', async () => void expectSuccess(await runNode(eslint, ['--max-warnings', '0', '.'])));

export const types = (tally) =>
  tally.check('tsc', async () => void expectSuccess(await runNode(tsc, ['-p', 'tsconfig.json', '--noEmit', '--pretty', 'false'])));

export const buildAll = (tally) => tally.check('build', () => build({ log: (line) => console.log(`  ${line}`), keepGoing: true }));

const prettier = at('node_modules/prettier/bin/prettier.cjs');
const eslint = at('node_modules/eslint/bin/eslint.js');
const tsc = at('node_modules/typescript/bin/tsc');
