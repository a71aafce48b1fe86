/**
 * Builds everything: modules and types (tsc), single-file builds (Rollup), the element manifest, the demo site's library with integrity
 * hashes. A step whose inputs have not changed is passed over. `--keep-going` builds on in spite of type errors, for work in progress.
 */
import { pathToFileURL } from 'node:url';
import { buildBundles } from './tools/bundles.mjs';
import { writeElementTypes } from './tools/element-types.mjs';
import { writeLicences } from './tools/licences.mjs';
import { publishLibrary } from './tools/library.mjs';
import { alone } from './tools/lock.mjs';
import { buildManifest } from './tools/manifest.mjs';
import { buildModules } from './tools/modules.mjs';
import { writePages } from './tools/pages.mjs';
import { at, filesUnder } from './tools/paths.mjs';

/** @returns true where every step succeeded; what failed is printed. */
export function build({ keepGoing = false, log = console.log } = {}) {
  return alone(async () => {
    let good = true;
    for (const [name, step] of steps) {
      const began = performance.now();
      let outcome;
      try {
        outcome = (await step()) ?? 'done';
      } catch (reason) {
        console.error(`build: ${name}: ${reason instanceof Error ? reason.message : String(reason)}`);
        outcome = 'failed';
      }
      if (outcome !== 'fresh') log(`build: ${name} ${outcome} in ${((performance.now() - began) / 1000).toFixed(1)} s`);
      if (outcome === 'failed') {
        good = false;
        if (!keepGoing) return false;
      }
    }
    return good;
  });
}

const steps = [
  ['sdk modules', () => buildModules('sdk')],
  [
    'elements modules',
    () =>
      buildModules(
        'elements',
        filesUnder(at('packages/sdk/dist')).filter((path) => path.endsWith('.d.ts')),
      ),
  ],
  ['elements manifest', buildManifest],
  ['types for JSX and Vue', once(writeElementTypes)],
  ['single-file builds', buildBundles],
  ['licences', once(writeLicences)],
  ['site library', once(publishLibrary)],
  ['site pages', once(writePages)],
];

/** A step too cheap to be worth a stamp. */
function once(work) {
  return () => {
    work();
    return 'fresh';
  };
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) {
  const good = await build({ keepGoing: process.argv.includes('--keep-going') });
  process.exitCode = good ? 0 : 1;
}
