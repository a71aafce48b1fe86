import { cpSync, existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join, relative } from 'node:path';
import { at, filesUnder } from '../../demo-site/tools/paths.mjs';
import { expectSuccess, run } from '../stages/tally.mjs';

export const packageNames = ['sdk', 'elements'];

/**
 * Packs both packages as they would be published and unpacks them into a project outside the repository, beside copies of their
 * dependencies. No registry is asked.
 * @returns folder of the project, path of each tarball, and `remove`
 */
export async function installTarballs() {
  const folder = mkdtempSync(join(tmpdir(), 'rillage-package-'));
  const project = join(folder, 'project');
  mkdirSync(project);
  writeFileSync(join(project, 'package.json'), '{ "name": "probe", "private": true, "type": "module" }\n');
  const tarballs = {};
  for (const name of packageNames) {
    const packed = expectSuccess(await run('npm', ['pack', '--json', '--pack-destination', folder], { cwd: at(`packages/${name}`) }));
    tarballs[name] = join(folder, JSON.parse(packed)[0].filename);
    const target = join(project, 'node_modules/@rillage', name);
    mkdirSync(target, { recursive: true });
    expectSuccess(await run('tar', ['-xzf', tarballs[name], '--strip-components=1', '-C', target]));
  }
  for (const name of packageNames) copyDependencies(join(project, 'node_modules/@rillage', name), project);
  return { project, tarballs, remove: () => rmSync(folder, { recursive: true, force: true }) };
}

export const manifestOf = (project, name) => JSON.parse(readFileSync(join(project, 'node_modules/@rillage', name, 'package.json'), 'utf8'));

/** Every address that a package's exports map offers: `@rillage/sdk`, `@rillage/sdk/worker`; a pattern as all the files it fits; not those of types alone. */
export function publicPaths(project) {
  return packageNames.flatMap((name) =>
    Object.entries(manifestOf(project, name).exports)
      .filter(([, target]) => typeof target === 'string' || target.default)
      .flatMap(([path, target]) => (path.includes('*') ? expanded(project, name, path, target.default ?? target) : [path]))
      .map((path) => `@rillage/${name}${path.slice(1)}`),
  );
}

function expanded(project, name, path, target) {
  const folder = join(project, 'node_modules/@rillage', name);
  const [before, ...after] = target.slice(2).split('*');
  // The same text stands for every star.
  const pattern = new RegExp(`^${[before, ...after].map(escaped).join('(.+)')}$`);
  return filesUnder(folder)
    .map((file) => pattern.exec(relative(folder, file).replaceAll('\\', '/')))
    .filter((match) => match && new Set(match.slice(1)).size === 1)
    .map((match) => path.replaceAll('*', match[1]));
}

const escaped = (text) => text.replace(/[.*+?^${}()|[\]\\/]/g, '\\$&');

function copyDependencies(packageFolder, project) {
  const { dependencies = {} } = JSON.parse(readFileSync(join(packageFolder, 'package.json'), 'utf8'));
  for (const name of Object.keys(dependencies)) {
    const target = join(project, 'node_modules', name);
    if (existsSync(target)) continue;
    mkdirSync(dirname(target), { recursive: true });
    cpSync(at(`node_modules/${name}`), target, { recursive: true, dereference: true });
    copyDependencies(target, project);
  }
}
