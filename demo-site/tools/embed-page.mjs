import { readFileSync } from 'node:fs';
import { gzipSync } from 'node:zlib';
import { streams } from '../pages/stations.mjs';
import { contentSecurityPolicy } from '../policy.mjs';
import { escaped } from './escaped.mjs';
import { integrityOf } from './library.mjs';
import { at } from './paths.mjs';
import { policyName } from './rollup/own-policy.mjs';

/** What the embed page cannot know by hand: the policy, this build's files, and what the elements say of themselves. */
export function embedValues() {
  const { version } = json('packages/elements/package.json');
  return {
    ...{ version, policyName, policy: contentSecurityPolicy, twoLines: twoLines() },
    stationOptions: streams.map(({ id, short }) => `<option value="./data/${id}-public.json">${escaped(short)}</option>`).join(''),
    fileRows: Object.entries(holds).map(fileRow).join('\n'),
    reference: elements().map(referenceOf).join('\n'),
  };
}

const holds = {
  'rillage-elements.min.js': 'every element for readers',
  'rillage-desk.min.js': 'the same, with intake and fit for the hydrologist’s desk',
  'rillage-reading.min.js': 'rillage-station and rillage-reading',
  'rillage-sdk.min.js': 'the SDK, for pages that compute',
  'rillage-worker.min.js': 'the SDK’s worker',
  'rillage-words-ar.min.js': 'Arabic, fetched by the files of elements from beside them',
  'rillage-words-de.min.js': 'German, likewise',
};
const library = (name) => at(`demo-site/public/lib/${name}`);
const json = (path) => JSON.parse(readFileSync(at(path), 'utf8'));

function twoLines() {
  const name = 'rillage-elements.min.js';
  return [
    `<script type="module" src="/lib/${name}" integrity="${integrityOf(library(name))}"></script>`,
    '<rillage-station src="/water/thessle-brook-public.json"><rillage-reading>Call the office.</rillage-reading></rillage-station>',
  ].join('\n');
}

function fileRow([name, what]) {
  const bytes = readFileSync(library(name));
  const kb = (length) => (length / 1000).toFixed(1);
  const cells = [
    `<th scope="row"><a href="./lib/${name}">${name}</a></th>`,
    `<td>${escaped(what)}</td>`,
    `<td class="number">${kb(bytes.length)}</td>`,
    `<td class="number">${kb(gzipSync(bytes, { level: 9 }).length)}</td>`,
    `<td><code>${integrityOf(library(name))}</code></td>`,
  ];
  return `<tr>${cells.join('')}</tr>`;
}

function elements() {
  return json('packages/elements/custom-elements.json')
    .modules.flatMap((module) => module.declarations)
    .filter((element) => element.tagName)
    .sort((one, other) => (one.tagName < other.tagName ? -1 : 1));
}

function referenceOf(element) {
  const { tagName, description, attributes = [], members = [], events = [], cssParts = [], cssProperties = [] } = element;
  const attributed = new Set(attributes.map((attribute) => attribute.fieldName));
  const properties = members.filter(
    (member) => member.kind === 'field' && !member.static && !member.readonly && !attributed.has(member.name),
  );
  const lists = [
    ['Attributes', attributes],
    ['Properties without an attribute', properties],
    ['Methods', members.filter((member) => member.kind === 'method')],
    ['Events', events],
    ['Parts', cssParts],
    ['Custom properties', cssProperties],
  ].filter(([, items]) => items.length > 0);
  return [
    `<details id="${tagName}"><summary><code>${tagName}</code></summary>`,
    `<p>${prose(description)}</p>`,
    ...lists.map(([title, items]) => `<h3>${title}</h3><dl>${items.map(entry).join('')}</dl>`),
    '</details>',
  ].join('\n');
}

const entry = ({ name, description = '' }) => `<dt><code>${escaped(name)}</code></dt><dd>${prose(description)}</dd>`;
/** Descriptions mark code by backticks. */
const prose = (text = '') => escaped(text.replace(/\s+/g, ' ').trim()).replace(/`([^`]+)`/g, '<code>$1</code>');
