import { readFileSync } from 'node:fs';
import { relative } from 'node:path';
import { gzipSync } from 'node:zlib';
import { rollup } from 'rollup';
import { at } from '../../demo-site/tools/paths.mjs';
import { optionsFor } from '../../rollup.config.mjs';
import { budgets, nowhere } from '../size/budgets.mjs';

/** Holds each build against its budget (minified, gzip, kB of 1000 bytes) and against the list of what must not be in it. */
export async function size(tally) {
  for (const { name, limitKb, bundle, exports, without, later = [] } of budgets()) {
    let built;
    await tally.check(`${name} builds`, async () => {
      built = await bundled(bundle, later);
    });
    if (!built) continue;
    const kb = gzipSync(built.code, { level: 9 }).length / 1000;
    console.log(`  ${name.padEnd(16)} ${kb.toFixed(1).padStart(5)} of ${limitKb} kB${remark(kb / limitKb)}`);
    await tally.check(`${name} within ${limitKb} kB`, () => {
      if (kb > limitKb) throw new Error(`${kb.toFixed(2)} kB\n${largest(built.modules)}`);
    });
    await tally.check(`${name} holds nothing it should not`, () => {
      const found = built.modules.filter(([id]) => without.some((pattern) => pattern.test(id))).map(([id]) => relative(at('.'), id));
      const words = nowhere.filter((pattern) => pattern.test(built.code)).map(String);
      if (found.length + words.length > 0) throw new Error([...found, ...words].join('\n'));
    });
    for (const each of exports ?? []) {
      await tally.check(`${name} exports ${each}`, () => built.exports.includes(each));
    }
  }
}

async function bundled(bundle, later) {
  const missing = bundle.needs.filter((path) => !exists(path));
  if (missing.length > 0) throw new Error(`not built yet: ${missing.map((path) => relative(at('.'), path)).join(', ')}`);
  const { output, ...options } = optionsFor(bundle);
  const build = await rollup({ ...options, external: later });
  const {
    output: [chunk],
  } = await build.generate(output);
  await build.close();
  const modules = Object.entries(chunk.modules)
    .map(([id, { renderedLength }]) => [id, renderedLength])
    .filter(([, length]) => length > 0);
  return { code: chunk.code, exports: chunk.exports, modules };
}

function largest(modules) {
  return modules
    .sort(([, a], [, b]) => b - a)
    .slice(0, 12)
    .map(([id, length]) => `${String(length).padStart(8)} bytes before minifying  ${relative(at('.'), id)}`)
    .join('\n');
}

function exists(path) {
  try {
    readFileSync(path);
    return true;
  } catch {
    return false;
  }
}

function remark(share) {
  if (share > 1) return ', too much';
  return share > 0.95 ? ', less than a twentieth left' : '';
}
