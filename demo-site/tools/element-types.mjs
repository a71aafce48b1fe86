import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { at } from './paths.mjs';

/**
 * Writes types/jsx.d.ts and types/vue.d.ts of the elements package from the manifest: what a template may set on each tag. Types of values
 * come from the classes themselves, so that the two cannot part.
 */
export function writeElementTypes() {
  const { modules } = JSON.parse(readFileSync(at('packages/elements/custom-elements.json'), 'utf8'));
  const elements = modules.flatMap((module) => module.declarations).filter((element) => element.tagName);
  mkdirSync(at('packages/elements/types'), { recursive: true });
  writeFileSync(at('packages/elements/types/jsx.d.ts'), jsx(elements));
  writeFileSync(at('packages/elements/types/vue.d.ts'), vue(elements));
}

function jsx(elements) {
  const entries = elements.map((element) => entry(element, `Common & {\n${[...props(element), ...listeners(element)].join('')}  }`));
  return [
    "/** What JSX may set on each tag. Add it to the framework: `declare module 'react' { namespace JSX { interface IntrinsicElements extends RillageElements {} } }`. */",
    importOf(elements),
    '',
    common,
    '',
    `export interface RillageElements {\n${entries.join('')}}`,
    '',
  ].join('\n');
}

function vue(elements) {
  const entries = elements.map((element) =>
    entry(element, `new () => {\n    $props: Common & {\n${props(element).join('')}    };\n${emits(element)}  }`),
  );
  return [
    "/** What a Vue template may set on each tag. Add it: `declare module 'vue' { interface GlobalComponents extends RillageComponents {} }`. */",
    importOf(elements),
    '',
    common,
    '',
    `export interface RillageComponents {\n${entries.join('')}}`,
    '',
  ].join('\n');
}

const importOf = (elements) => `import type { ${elements.map((element) => element.name).join(', ')} } from '../dist/index.js';`;

const common = `interface Common {
  id?: string;
  class?: string;
  className?: string;
  slot?: string;
  lang?: string;
  dir?: string;
  hidden?: boolean;
  key?: string | number | null;
  ref?: unknown;
  children?: unknown;
}`;

const entry = (element, type) => `${comment(element, '  ')}  '${element.tagName}': ${type};\n`;

/** Attributes by their own name, and rich data by property. */
function props(element) {
  const fields = element.members.filter((member) => member.kind === 'field' && !member.static && !member.readonly && !member.inheritedFrom);
  const attributes = (element.attributes ?? []).map((attribute) => line(attribute, attribute.name, valueOf(element, attribute.fieldName)));
  const rich = fields.filter((field) => !field.attribute).map((field) => line(field, field.name, valueOf(element, field.name)));
  return [...attributes, ...rich];
}

const valueOf = (element, field) => `${element.name}['${field}']`;
const line = (item, name, type) => `${comment(item, '    ')}    '${name}'?: ${type};\n`;

const listeners = (element) =>
  (element.events ?? []).map((event) => line(event, `on${event.name}`, `(event: HTMLElementEventMap['${event.name}']) => void`));

function emits(element) {
  const calls = (element.events ?? []).map((event) => `(name: '${event.name}', event: HTMLElementEventMap['${event.name}']) => void`);
  return calls.length > 0 ? `    $emit: ${calls.map((call) => `(${call})`).join(' & ')};\n` : '';
}

function comment({ description = '' }, indent) {
  const words = description.replace(/\s+/g, ' ').replaceAll('*/', '* /').trim();
  return words ? `${indent}/** ${words} */\n` : '';
}
