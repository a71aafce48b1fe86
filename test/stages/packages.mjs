import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { publint } from 'publint';
import { formatMessage } from 'publint/utils';
import { at } from '../../demo-site/tools/paths.mjs';
import { compareNumbers } from '../package/numbers.mjs';
import { importProbe, numbersProbe, typesProbe } from '../package/probes.mjs';
import { installTarballs, manifestOf, packageNames, publicPaths } from '../package/tarballs.mjs';
import { expectSuccess, run, runNode } from './tally.mjs';

/** The packages as they would be published: their contents, every public path in Node and Deno, the numbers, the types. */
export async function packages(tally) {
  let installed;
  await tally.check('npm pack, both packages', async () => {
    installed = await installTarballs();
  });
  if (!installed) return;
  try {
    for (const name of packageNames) await checkContents(tally, installed, name);
    await checkImports(tally, installed);
    await checkNumbers(tally, installed);
    await checkTypes(tally, installed);
  } finally {
    installed.remove();
  }
}

async function checkContents(tally, { project, tarballs }, name) {
  const listed = expectSuccess(await run('tar', ['-tzf', tarballs[name]]));
  const files = listed.trim().split('\n');
  await tally.check(`${name}: nothing in the tarball but what is meant to be`, () => {
    const stray = files.filter(
      (file) => !/^package\/(dist\/|package\.json$|README\.md$|LICENSE$|custom-elements\.json$|types\/)/.test(file),
    );
    const unwanted = files.filter((file) => /\.(ts|tsbuildinfo)$/.test(file) && !file.endsWith('.d.ts'));
    if (stray.length + unwanted.length > 0) throw new Error([...stray, ...unwanted].join('\n'));
  });
  if (name === 'elements')
    await tally.check('elements: the manifest is in the tarball', () => files.includes('package/custom-elements.json'));

  await tally.check(`${name}: publint`, async () => {
    const folder = join(project, 'node_modules/@rillage', name);
    const { messages } = await publint({ pkgDir: folder, pack: false, strict: true });
    if (messages.length > 0) throw new Error(messages.map((message) => formatMessage(message, manifestOf(project, name))).join('\n'));
  });
  await tally.check(`${name}: are the types wrong, ESM only`, async () => {
    const args = [tarballs[name], '--profile', 'esm-only', '--no-definitely-typed', '--no-emoji', '--no-color', '--format', 'ascii'];
    expectSuccess(await runNode(at('node_modules/@arethetypeswrong/cli/dist/index.js'), args));
  });
}

async function checkImports(tally, { project }) {
  for (const path of publicPaths(project)) {
    for (const [engine, start] of Object.entries(engines)) {
      await tally.check(`${engine} imports ${path}`, async () => {
        const names = JSON.parse(expectSuccess(await probe(project, start, importProbe(path))));
        if (!Array.isArray(names)) throw new Error('no list of names came back');
      });
    }
  }
}

async function checkNumbers(tally, { project }) {
  await tally.check('Node and Deno give the same numbers', async () => {
    const node = expectSuccess(await probe(project, engines.Node, numbersProbe));
    const deno = expectSuccess(await probe(project, engines.Deno, numbersProbe));
    const { count, largest } = compareNumbers(node, deno);
    console.log(
      `  ${count} numbers of a run in Node and in Deno differ by ${largest === 0 ? 'nothing' : `at most ${largest.toExponential(1)}`}`,
    );
  });
}

async function checkTypes(tally, { project }) {
  await tally.check('a consumer type-checks, with every declaration file', async () => {
    writeFileSync(join(project, 'consumer.ts'), typesProbe);
    const options = { module: 'nodenext', target: 'es2022', lib: ['es2022', 'dom', 'dom.iterable'], strict: true, noEmit: true, types: [] };
    writeFileSync(join(project, 'tsconfig.json'), JSON.stringify({ compilerOptions: options, files: ['consumer.ts'] }));
    expectSuccess(await runNode(at('node_modules/typescript/bin/tsc'), ['-p', project, '--pretty', 'false']));
  });
}

const engines = {
  Node: (file) => [process.execPath, [file]],
  Deno: (file) => [process.execPath, [at('node_modules/deno/bin.cjs'), 'run', '--no-prompt', '--quiet', file]],
};

/** Runs a program in the project. No permission is granted to Deno: the packages may need none. */
function probe(project, start, code) {
  const file = join(project, 'probe.mjs');
  writeFileSync(file, code);
  const [command, args] = start(file);
  return run(command, args, { cwd: project, env: { DENO_NO_UPDATE_CHECK: '1', NO_COLOR: '1' }, timeoutMs: 60_000 });
}
