import { existsSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import resolve from '@rollup/plugin-node-resolve';
import terser from '@rollup/plugin-terser';
import { lateUplot } from './demo-site/tools/rollup/late-uplot.mjs';
import { ownPolicy } from './demo-site/tools/rollup/own-policy.mjs';
import { lines } from './demo-site/tools/rollup/lines.mjs';

const at = (path) => fileURLToPath(new URL(path, import.meta.url));

const banner = '/*! Rillage, MIT. What it contains of others: third-party-licences.txt in the same folder. */';

/**
 * Every single-file build. The unbundled modules come from tsc; see demo-site/build.mjs, which runs both.
 * `input` is a built module, or `from` with `code`: an entry made of a few lines, resolved as if it lay at `from`.
 */
export const bundles = [
  { name: 'sdk', input: at('packages/sdk/dist/index.js'), file: at('packages/sdk/dist/rillage-sdk.min.js') },
  {
    name: 'worker',
    input: at('packages/sdk/dist/workers/worker-entry.js'),
    file: at('packages/sdk/dist/workers/rillage-worker.min.js'),
  },
  { name: 'elements', input: at('packages/elements/dist/index.js'), file: at('packages/elements/dist/rillage-elements.min.js') },
];

/** Rollup's options for one bundle. */
export function optionsFor({ input, from, code, file }) {
  return {
    input: input ?? from,
    plugins: [
      code ? lines(from, code) : null,
      ownPolicy(),
      lateUplot(),
      resolve({ browser: true, exportConditions: ['browser', 'production'] }),
      small(),
    ],
    output: { file, format: 'es', inlineDynamicImports: true, sourcemap: false, banner },
    // A warning here is an unresolved import or a circle: a defect of the build, not a remark.
    onLog(level, log, handler) {
      if (log.code !== 'EMPTY_BUNDLE') handler(level === 'warn' ? 'error' : level, log);
    },
  };
}

export default bundles.filter((bundle) => existsSync(bundle.input)).map(optionsFor);

function small() {
  return terser({ module: true, ecma: 2022, compress: { passes: 2 }, format: { comments: /^!/ } });
}
