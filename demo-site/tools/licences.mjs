import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { at } from './paths.mjs';

const packages = ['lit', 'lit-html', 'lit-element', '@lit/reactive-element', 'idb-keyval'];

/** Writes the licences of the packages that the single-file build of the elements contains, beside it. */
export function writeLicences() {
  const folder = at('packages/elements/dist');
  if (!existsSync(folder)) return;
  const parts = packages.map((name) => {
    const { version } = JSON.parse(readFileSync(at(`node_modules/${name}/package.json`), 'utf8'));
    const file = ['LICENSE', 'LICENCE', 'LICENSE.md'].map((each) => at(`node_modules/${name}/${each}`)).find((path) => existsSync(path));
    if (!file) throw new Error(`no licence file found in ${name}`);
    return `${name} ${version}\n\n${readFileSync(file, 'utf8').trim()}\n`;
  });
  writeFileSync(`${folder}/third-party-licences.txt`, `${parts.join(`\n${'-'.repeat(72)}\n\n`)}`);
}
