import { mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { basename } from 'node:path';
import { streams } from '../pages/stations.mjs';
import { embedValues } from './embed-page.mjs';
import { escaped } from './escaped.mjs';
import { at, filesUnder } from './paths.mjs';

/** Fills in the pages of demo-site/pages/ and writes them where the site is served from. */
export function writePages() {
  const folder = at('demo-site/public/stations');
  mkdirSync(folder, { recursive: true });
  const template = (name) => readFileSync(at(`demo-site/pages/${name}.html`), 'utf8');
  for (const stream of streams) writeFileSync(`${folder}/${stream.id}.html`, fill(template('station'), { ...stream, ...wordsOf(stream) }));
  const wanted = new Set(streams.map(({ id }) => `${id}.html`));
  for (const path of filesUnder(folder)) if (!wanted.has(basename(path))) rmSync(path);
  writeFileSync(at('demo-site/public/embed.html'), fill(template('embed'), embedValues()));
}

/** The text with its holes filled. @throws Error where a hole has no value */
export function fill(template, values) {
  const valueOf = (name) => {
    if (!Object.hasOwn(values, name)) throw new Error(`nothing to put into {{${name}}}`);
    return String(values[name]);
  };
  return template.replace(/\{\{\{(\w+)\}\}\}|\{\{(\w+)\}\}/g, (_, raw, name) => (raw ? valueOf(raw) : escaped(valueOf(name))));
}

/** Bottles are taken, and the column has a page, at Thessle Brook alone. */
function wordsOf({ id }) {
  if (id !== 'thessle-brook') return { held: ', with a model assumed for such ground; no bottle of its water has been analysed', more: '' };
  return {
    held: ', and held against the isotopes and salt in bottles of rain and stream water',
    more: '<a href="../column.html">The water in the ground</a> · ',
  };
}
