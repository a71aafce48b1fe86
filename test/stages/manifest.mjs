import { existsSync, readFileSync } from 'node:fs';
import { at, filesUnder } from '../../demo-site/tools/paths.mjs';
import { tagsIn } from '../../demo-site/tools/manifest.mjs';

/** The elements' manifest is complete: every element, and of each every attribute, property, event, part, slot and CSS property, described. */
export async function manifest(tally) {
  const path = at('packages/elements/custom-elements.json');
  if (!existsSync(path)) return tally.fail('custom-elements.json', 'it has not been built');
  const elements = JSON.parse(readFileSync(path, 'utf8')).modules.flatMap((module) =>
    module.declarations.map((declaration) => ({ ...declaration, file: module.path })),
  );
  const sources = filesUnder(at('packages/elements/src')).filter((file) => file.endsWith('.ts'));

  for (const tag of tagsIn(sources).values()) {
    await tally.check(`<${tag}> is in the manifest`, () => elements.some((element) => element.tagName === tag));
  }
  for (const element of elements) await checkElement(tally, element, sources);
}

async function checkElement(tally, element, sources) {
  const name = element.tagName ? `<${element.tagName}>` : element.name;
  await tally.check(`${name} is described`, () => described(element));
  for (const [kind, items] of Object.entries(partsOf(element))) {
    await tally.check(`${name}: every ${kind} is described`, () => {
      const bare = items.filter((item) => !described(item)).map((item) => item.name || '(unnamed)');
      if (bare.length > 0) throw new Error(`without a description: ${bare.join(', ')}`);
    });
  }
  const folder = element.file.replace(/^dist\//, '').replace(/[^/]*$/, '');
  const text = sources
    .filter((path) => path.includes(`/src/${folder}`))
    .map((path) => readFileSync(path, 'utf8'))
    .join('\n');
  for (const [kind, pattern, items] of used(element)) {
    await tally.check(`${name}: no ${kind} in the source is missing from the manifest`, () => {
      const known = new Set((items ?? []).map((item) => item.name));
      const found = new Set([...text.matchAll(pattern)].flatMap(([, names]) => names.split(/\s+/)).filter(Boolean));
      const missing = [...found].filter((each) => !known.has(each));
      if (missing.length > 0) throw new Error(`missing: ${missing.join(', ')}`);
    });
  }
  await tally.check(`${name}: every property of public state has its attribute or is said to have none`, () => {
    const linked = new Set((element.attributes ?? []).map((attribute) => attribute.fieldName));
    const attributes = (element.members ?? []).filter((member) => member.attribute !== undefined && !linked.has(member.name));
    if (attributes.length > 0) throw new Error(`attributes not listed: ${attributes.map((member) => member.attribute).join(', ')}`);
  });
}

/** What can be described, by kind. */
function partsOf(element) {
  const members = element.members ?? [];
  return {
    attribute: element.attributes ?? [],
    property: members.filter((member) => member.kind === 'field' && !member.static),
    method: members.filter((member) => member.kind === 'method'),
    event: element.events ?? [],
    slot: element.slots ?? [],
    part: element.cssParts ?? [],
    'CSS property': element.cssProperties ?? [],
  };
}

/** What the source of an element uses, as patterns whose first group holds names, beside what the manifest lists. */
const used = (element) => [
  ['event', /CustomEvent(?:<[^>]*>)?\(\s*['"](rillage-[a-z-]+)['"]/g, element.events],
  ['part', /\spart="([a-z -]+)"/g, element.cssParts],
  ['CSS property', /var\(\s*(--rillage-[a-z0-9-]+)/g, element.cssProperties],
];

const described = (item) => (item.description ?? item.summary ?? '').trim().length >= 10;
