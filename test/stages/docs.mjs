import { existsSync, mkdirSync, readFileSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { at, filesUnder } from '../../demo-site/tools/paths.mjs';
import { run, expectSuccess } from './tally.mjs';

const pages = ['README.md', 'DEVELOPERS.md', 'packages/sdk/README.md', 'packages/elements/README.md'];

/**
 * What the pages say is true: every example in JavaScript runs, every file they point to is there, every npm command exists.
 * An example is a fenced block whose language is `js`. It runs alone, in a folder where the built packages are installed; a line
 * `// → text` after a `console.log` states what must be printed.
 */
export async function docs(tally) {
  for (const page of pages) {
    await tally.check(`${page} is there`, () => existsSync(at(page)));
    if (!existsSync(at(page))) continue;
    const text = readFileSync(at(page), 'utf8');
    await tally.check(`${page}: links and commands`, () => checkMentions(page, text));
    for (const [index, code] of examplesIn(text).entries()) {
      await tally.check(`${page}: example ${index + 1}`, () => runExample(code));
    }
  }
}

const examplesIn = (text) => [...text.matchAll(/^```js\n([\s\S]*?)^```/gm)].map(([, code]) => code);

function checkMentions(page, text) {
  const folder = page.replace(/[^/]*$/, '');
  const links = [...text.matchAll(/\]\((?![a-z]+:|#)([^)#\s]+)/g)].map(([, path]) => path);
  const lost = links.filter((path) => !existsSync(at(`${folder}${path}`)));
  const { scripts } = JSON.parse(readFileSync(at('package.json'), 'utf8'));
  const commands = [...text.matchAll(/npm run ([a-z:-]+)/g)].map(([, name]) => name).filter((name) => !(name in scripts));
  if (lost.length + commands.length > 0)
    throw new Error([...lost.map((path) => `no file ${path}`), ...commands.map((name) => `no command npm run ${name}`)].join('\n'));
}

async function runExample(code) {
  const folder = at('.cache/examples');
  rmSync(folder, { recursive: true, force: true });
  mkdirSync(`${folder}/node_modules`, { recursive: true });
  symlinkSync(at('node_modules/@rillage'), `${folder}/node_modules/@rillage`, 'junction');
  const data = at('demo-site/data');
  // An example may read the invented catchment's files by the path they have in the repository.
  if (filesUnder(data).length > 0) {
    mkdirSync(`${folder}/demo-site`);
    symlinkSync(data, `${folder}/demo-site/data`, 'junction');
  }
  writeFileSync(`${folder}/example.mjs`, code);
  const printed = expectSuccess(await run(process.execPath, ['example.mjs'], { cwd: folder, timeoutMs: 60_000 }));
  const promised = [...code.matchAll(/\/\/ → (.*)$/gm)].map(([, words]) => words.trim());
  const missing = promised.filter((words) => !printed.includes(words));
  if (missing.length > 0) throw new Error(`promised but not printed: ${missing.join(' | ')}\nprinted: ${printed.trim()}`);
}
