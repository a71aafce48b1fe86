import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { dirname } from 'node:path';
import { at } from './paths.mjs';

/**
 * Runs `work` unless it has already succeeded on the same contents of `inputs` and all of `outputs` still exist.
 * @param name     of the step; names its stamp
 * @param inputs   absolute paths, missing ones included by name only
 * @param outputs  absolute paths
 * @param work     returns false, or rejects, where it failed
 * @returns 'fresh' | 'done' | 'failed'
 */
export async function onChange({ name, inputs, outputs, work }) {
  const stampPath = at(`.cache/build/${name}.stamp`);
  const digest = digestOf(inputs);
  const known = existsSync(stampPath) ? readFileSync(stampPath, 'utf8') : '';
  if (known === digest && outputs.every((path) => existsSync(path))) return 'fresh';
  rmSync(stampPath, { force: true });
  if ((await work()) === false) return 'failed';
  mkdirSync(dirname(stampPath), { recursive: true });
  writeFileSync(stampPath, digest);
  return 'done';
}

function digestOf(paths) {
  const hash = createHash('sha256');
  for (const path of paths) {
    hash.update(`${path}\0`);
    if (existsSync(path)) hash.update(readFileSync(path));
    hash.update('\0');
  }
  return hash.digest('hex');
}
