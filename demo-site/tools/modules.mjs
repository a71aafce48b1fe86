import { spawnSync } from 'node:child_process';
import { copyFileSync, existsSync, mkdirSync, rmSync } from 'node:fs';
import { dirname, join, relative } from 'node:path';
import { at, filesUnder } from './paths.mjs';
import { onChange } from './stamp.mjs';

/**
 * The modules of one package, from src/ to dist/: tsc for TypeScript, a copy for everything else (the JSON Schema of a station).
 * @param name        folder under packages/
 * @param alsoInputs  files outside the package that its types rest on
 */
export function buildModules(name, alsoInputs = []) {
  const source = at(`packages/${name}/src`);
  const target = at(`packages/${name}/dist`);
  const sources = filesUnder(source).filter((path) => !path.endsWith('.md'));
  const outputs = sources.filter((path) => !path.endsWith('.d.ts')).flatMap((path) => outputsOf(join(target, relative(source, path))));
  const config = at(`packages/${name}/tsconfig.json`);

  return onChange({
    name: `modules-${name}`,
    inputs: [...sources, ...alsoInputs, config, at('tsconfig.json'), at('package-lock.json')],
    outputs,
    work() {
      if (sources.length === 0) return true;
      removeStale(target, outputs);
      for (const path of sources.filter((each) => !each.endsWith('.ts'))) copyInto(path, join(target, relative(source, path)));
      return compile(name, config, outputs);
    },
  });
}

function outputsOf(path) {
  if (!path.endsWith('.ts')) return [path];
  const stem = path.slice(0, -'.ts'.length);
  return [`${stem}.js`, `${stem}.d.ts`, `${stem}.js.map`];
}

/** What an earlier build made from a source that is gone. The single-file builds have no source of their own and stay. */
function removeStale(target, outputs) {
  const wanted = new Set(outputs);
  for (const path of filesUnder(target)) {
    if (!wanted.has(path) && !/(\.min\.js|licences\.txt|integrity\.json)$/.test(path)) rmSync(path);
  }
}

function compile(name, config, outputs) {
  const memory = at(`.cache/build/${name}.tsbuildinfo`);
  // tsc writes only what its memory says has changed, so memory of files since removed must go.
  if (!outputs.every((path) => existsSync(path))) rmSync(memory, { force: true });
  const tsc = at('node_modules/typescript/bin/tsc');
  const { status } = spawnSync(process.execPath, [tsc, '-p', config, '--incremental', '--tsBuildInfoFile', memory, '--pretty', 'false'], {
    stdio: 'inherit',
  });
  return status === 0;
}

function copyInto(from, to) {
  mkdirSync(dirname(to), { recursive: true });
  copyFileSync(from, to);
}
