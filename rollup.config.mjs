import { existsSync } from 'node:fs';
import resolve from '@rollup/plugin-node-resolve';
import terser from '@rollup/plugin-terser';
import { languageFile, laterLanguages } from './demo-site/tools/rollup/later-languages.mjs';
import { narrowTemplates } from './demo-site/tools/rollup/narrow-templates.mjs';
import { ownPolicy } from './demo-site/tools/rollup/own-policy.mjs';
import { at, filesUnder } from './demo-site/tools/paths.mjs';
import { lines } from './demo-site/tools/rollup/lines.mjs';

const banner = '/*! Rillage, MIT. What it contains of others: third-party-licences.txt in the same folder. */';

/**
 * Every single-file build that ships, with the words of other languages beside them. The unbundled modules come from tsc; see demo-site/build.mjs, which runs both. A function, since an
 * entry of elements is made of what tsc has written. A page loads one file of elements: a second would ask for the same policy name.
 */
export function bundles() {
  const every = definitions();
  return [
    { name: 'sdk', input: at('packages/sdk/dist/index.js'), file: at('packages/sdk/dist/rillage-sdk.min.js') },
    { name: 'worker', input: at('packages/sdk/dist/workers/worker-entry.js'), file: at('packages/sdk/dist/workers/rillage-worker.min.js') },
    elementBundle('rillage-elements', every.filter(isForReaders), readersExports),
    elementBundle('rillage-desk', every, "export * from './index.js';"),
    elementBundle(
      'rillage-reading',
      every.filter((path) => /rillage-(station|reading)[\\/]/.test(path)),
    ),
    ...languages.map((language) => ({
      name: `words of ${language}`,
      input: at(`packages/elements/dist/languages/${language}.js`),
      file: at(`packages/elements/dist/${languageFile(language)}`),
    })),
  ].filter((bundle) => (bundle.needs ?? [bundle.input]).every((path) => existsSync(path)));
}

/** Elements that a portal shows; the others are the hydrologist's, and only the desk's file carries them. */
export const isForReaders = (path) => !/rillage-(forcing-input|fit-panel)[\\/]/.test(path);
export const readersExports = "export * from './classes.js'; export * from './page.js'; export * from './version.js';";

/** Languages that ship beside English. */
const languages = ['ar', 'de'];

/** One file that defines some elements. @param defining  absolute paths of built define.js files */
export function elementBundle(name, defining, more = '', folder = at('packages/elements/dist')) {
  const from = at(`packages/elements/dist/${name}.entry.js`);
  const code = [...defining.map((path) => `import ${JSON.stringify(path)};`), more].join('\n');
  // An absent file keeps the bundle out of the list until there is something to define.
  const needs = defining.length > 0 ? [...defining, ...(more ? [at('packages/elements/dist/index.js')] : [])] : [from];
  return { name, from, code, needs, file: `${folder}/${name}.min.js` };
}

/** The built define.js of every element. */
export const definitions = () => filesUnder(at('packages/elements/dist')).filter((path) => /rillage-[a-z-]+[\\/]define\.js$/.test(path));

/** Rollup's options for one bundle. */
export function optionsFor({ input, from, code, file }) {
  return {
    input: input ?? from,
    plugins: [
      code ? lines(from, code) : null,
      code ? laterLanguages() : null,
      ownPolicy(),
      resolve({ browser: true, exportConditions: ['browser', 'production'] }),
      small(),
      from?.includes('elements') ? narrowTemplates() : null,
    ],
    output: { file, format: 'es', inlineDynamicImports: true, sourcemap: false, banner },
    // A warning here is an unresolved import or a circle: a defect of the build, not a remark.
    onLog(level, log, handler) {
      if (log.code !== 'EMPTY_BUNDLE') handler(level === 'warn' ? 'error' : level, log);
    },
  };
}

export default bundles().map(optionsFor);

function small() {
  return terser({
    module: true,
    ecma: 2022,
    compress: { passes: 3, pure_getters: true, unsafe_arrows: true, unsafe_methods: true },
    format: { comments: /^!/ },
  });
}
