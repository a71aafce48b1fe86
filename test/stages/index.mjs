import { browser } from './browser.mjs';
import { size } from './size.mjs';
import { buildAll, format, lint, types } from './static.mjs';
import { unit } from './unit.mjs';

/** In order of running. `verify` marks what a commit must pass. */
export const stages = [
  { name: 'format', run: format, verify: true },
  { name: 'lint', run: lint, verify: true },
  { name: 'types', run: types, verify: true },
  { name: 'build', run: buildAll, verify: true },
  { name: 'unit', run: unit, verify: true },
  { name: 'size', run: size, verify: true },
  { name: 'browser', run: browser },
];
