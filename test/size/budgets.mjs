import { at } from '../../demo-site/tools/paths.mjs';
import { definitions, elementBundle, isForReaders, readersExports } from '../../rollup.config.mjs';

/**
 * What each build may weigh and what must not be in it. A function, as entries of elements are made of what the build has written.
 * `later` is left out of the weight: what an application's bundler puts in a file of its own, fetched only by readers who need it.
 */
export function budgets() {
  const defining = definitions();
  const of = (...tags) => tags.map((tag) => at(`packages/elements/dist/${tag}/define.js`));
  const engine = room('column', 'selection', 'tracers', 'fit', 'outlook', 'workers', 'forcing');
  return [
    {
      name: 'SDK core',
      limitKb: 20,
      bundle: core(),
      exports: ['runColumn', 'resumeColumn'],
      without: [room('fit', 'outlook', 'reading', 'workers'), outside('sdk')],
    },
    {
      name: 'reading alone',
      limitKb: 12,
      later: [fullForm],
      bundle: elementBundle('rillage-reading', of('rillage-reading')),
      without: [/uplot/, engine, outside('sdk', 'elements', 'lit')],
    },
    {
      name: 'station and reading',
      limitKb: 16,
      later: [fullForm],
      bundle: elementBundle('rillage-reading', of('rillage-station', 'rillage-reading')),
      without: [/uplot/, engine, outside('sdk', 'elements', 'lit', 'idb-keyval')],
    },
    {
      name: 'one plot',
      limitKb: 36,
      bundle: elementBundle('rillage-age-plot', of('rillage-age-plot')),
      without: [engine, outside('sdk', 'elements', 'lit')],
    },
    {
      name: 'all elements for readers',
      limitKb: 60,
      bundle: elementBundle('rillage-elements', defining.filter(isForReaders), readersExports),
      without: [engine, outside('sdk', 'elements', 'lit', 'idb-keyval')],
    },
    // Over the 60 kB that were aimed at for all: intake and fit are a hydrologist's tools, which no portal loads.
    {
      name: 'with the desk',
      limitKb: 70,
      bundle: elementBundle('rillage-desk', defining, "export * from './index.js';"),
      without: [engine, outside('sdk', 'elements', 'lit', 'idb-keyval')],
    },
  ];
}

/** Words that no build may hold: what the strict policy refuses, and what a copy of Lit for development says. */
export const nowhere = [
  /\beval\(/,
  /new Function\(/,
  /createPolicy\(["']lit-html/,
  /Lit is in dev mode/,
  /sourceMappingURL/,
  /process\.env/,
];

/** The engine's calls alone, as a page that runs a column and shows nothing would bundle them. */
function core() {
  const from = at('packages/sdk/dist/core.entry.js');
  return {
    name: 'core',
    from,
    code: "export { runColumn, resumeColumn } from './index.js';",
    needs: [at('packages/sdk/dist/index.js')],
    file: at('.cache/core.min.js'),
  };
}

/** What the reading fetches for its full form, and for sentences in another language than the file's. */
const fullForm = /elements[\\/]dist[\\/]rillage-reading[\\/](compose|compose-messages|details|numbers|evidence|strip)\.js/;

const room = (...names) => new RegExp(`packages[\\\\/]sdk[\\\\/]dist[\\\\/](${names.join('|')})[\\\\/]`);

/** Modules of any package but these; `lit` stands for the packages it is made of. */
function outside(...names) {
  const places = names.flatMap((name) => {
    if (name === 'sdk' || name === 'elements') return [`packages/${name}/dist/`];
    if (name === 'lit') return ['node_modules/lit/', 'node_modules/lit-html/', 'node_modules/lit-element/', 'node_modules/@lit/'];
    return [`node_modules/${name}/`];
  });
  return { test: (id) => !id.startsWith('\0') && !places.some((place) => id.replaceAll('\\', '/').includes(place)) };
}
