import { createHash } from 'node:crypto';
import { copyFileSync, existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { basename, dirname } from 'node:path';
import { bundles } from '../../rollup.config.mjs';
import { at, filesUnder } from './paths.mjs';

/**
 * Copies the single-file builds to the demo site's own lib/ and writes their integrity hashes, for the `integrity` attribute of an
 * embedding page, there and into each package.
 */
export function publishLibrary() {
  const library = at('demo-site/public/lib');
  mkdirSync(library, { recursive: true });
  const files = bundles()
    .filter((bundle) => existsSync(bundle.file))
    .map((bundle) => bundle.file);
  const hashes = Object.fromEntries(files.map((path) => [basename(path), integrityOf(path)]));

  for (const path of files) copyFileSync(path, `${library}/${basename(path)}`);
  const licences = at('packages/elements/dist/third-party-licences.txt');
  if (existsSync(licences)) copyFileSync(licences, `${library}/third-party-licences.txt`);
  writeJson(`${library}/integrity.json`, hashes);
  for (const name of ['sdk', 'elements']) {
    const folder = at(`packages/${name}/dist`);
    const own = files.filter((path) => path.startsWith(`${folder}/`)).map((path) => [basename(path), integrityOf(path)]);
    if (own.length > 0) writeJson(`${folder}/integrity.json`, Object.fromEntries(own));
  }

  const wanted = new Set([...files.map((path) => basename(path)), 'integrity.json', 'third-party-licences.txt']);
  for (const path of filesUnder(library)) if (!wanted.has(basename(path))) rmSync(path);
  return hashes;
}

export const integrityOf = (path) => `sha384-${createHash('sha384').update(readFileSync(path)).digest('base64')}`;

function writeJson(path, value) {
  mkdirSync(dirname(path), { recursive: true });
  writeFileSync(path, `${JSON.stringify(value, null, 2)}\n`);
}
