import { readFileSync, writeFileSync } from 'node:fs';
import { cli } from '@custom-elements-manifest/analyzer/cli.js';
import { at, filesUnder } from './paths.mjs';
import { onChange } from './stamp.mjs';

const folder = at('packages/elements');
const config = at('demo-site/tools/manifest-config.mjs');

/** Generates packages/elements/custom-elements.json from the docstrings of the elements. */
export function buildManifest() {
  const sources = filesUnder(`${folder}/src`).filter((path) => path.endsWith('.ts'));
  return onChange({
    name: 'manifest',
    inputs: [...sources, config, at('demo-site/tools/manifest.mjs'), at('package-lock.json')],
    outputs: sources.length > 0 ? [`${folder}/custom-elements.json`] : [],
    async work() {
      if (sources.length === 0) return;
      const analysed = await cli({ cwd: folder, argv: ['analyze', '--config', config], noWrite: true });
      writeFileSync(`${folder}/custom-elements.json`, `${JSON.stringify(publicPart(analysed, tagsIn(sources)), null, 2)}\n`);
    },
  });
}

/** Class name → tag, from calls of the guarded helper, which the analyzer does not know: `define('rillage-reading', RillageReading)`. */
export function tagsIn(sources) {
  const tags = new Map();
  for (const path of sources) {
    for (const [, tag, name] of readFileSync(path, 'utf8').matchAll(/\bdefine\(\s*['"]([a-z]+(?:-[a-z]+)+)['"]\s*,\s*(\w+)/g))
      tags.set(name, tag);
  }
  return tags;
}

/** The elements alone, without private members, under the paths of the published files. */
function publicPart(manifest, tags) {
  const modules = manifest.modules
    .map((module) => ({
      ...module,
      declarations: module.declarations.filter((each) => each.customElement).map((each) => publicElement(each, tags)),
    }))
    .filter((module) => module.declarations.length > 0)
    .map((module) => ({ ...module, exports: [...module.exports.filter(isClassExport(module)), ...definitions(module)] }));
  return JSON.parse(JSON.stringify({ ...manifest, modules }), (key, value) => (isPath(key, value) ? published(value) : value));
}

function publicElement(element, tags) {
  const members = (element.members ?? []).filter(
    (member) => !/^[_#]/.test(member.name) && (member.privacy ?? 'public') === 'public' && !inLit.has(member.name),
  );
  // The analyzer takes the internal state of an element for an attribute.
  const attributes = (element.attributes ?? []).filter(
    (each) => !each.fieldName || members.some((member) => member.name === each.fieldName),
  );
  return { ...element, members, attributes, ...(tags.has(element.name) ? { tagName: tags.get(element.name) } : {}) };
}

const isClassExport = (module) => (each) => each.kind === 'js' && module.declarations.some((element) => element.name === each.name);

function definitions(module) {
  return module.declarations
    .filter((element) => element.tagName)
    .map((element) => ({
      kind: 'custom-element-definition',
      name: element.tagName,
      declaration: { name: element.name, module: module.path },
    }));
}

const isPath = (key, value) => (key === 'path' || key === 'module') && typeof value === 'string';
const published = (path) => path.replace(/^(\/?)src\//, '$1dist/').replace(/\.ts$/, '.js');

/** What an element has from Lit and the platform; not its own interface. */
const inLit = new Set([
  ...[
    'connectedCallback',
    'disconnectedCallback',
    'attributeChangedCallback',
    'adoptedCallback',
    'createRenderRoot',
    'requestUpdate',
    'performUpdate',
  ],
  ...[
    'shouldUpdate',
    'scheduleUpdate',
    'getUpdateComplete',
    'willUpdate',
    'update',
    'updated',
    'firstUpdated',
    'render',
    'styles',
    'properties',
  ],
  ...['shadowRootOptions', 'observedAttributes'],
]);
