import { browser } from './browser.mjs';
import { docs } from './docs.mjs';
import { journeys } from './journeys.mjs';
import { manifest } from './manifest.mjs';
import { packages } from './packages.mjs';
import { size } from './size.mjs';
import { start } from './start.mjs';
import { buildAll, format, lint, types } from './static.mjs';
import { unit } from './unit.mjs';

/** In order of running. `verify` marks what a commit must pass. */
export const stages = [
  { name: 'format', run: format, verify: true },
  // Before lint, whose rules on promises need the types that it writes.
  { name: 'build', run: buildAll, verify: true },
  { name: 'lint', run: lint, verify: true },
  { name: 'types', run: types, verify: true },
  { name: 'unit', run: unit, verify: true },
  { name: 'size', run: size, verify: true },
  { name: 'manifest', run: manifest, verify: true },
  { name: 'docs', run: docs, verify: true },
  { name: 'packages', run: packages },
  { name: 'start', run: start },
  { name: 'journeys', run: journeys },
  { name: 'browser', run: browser },
];
