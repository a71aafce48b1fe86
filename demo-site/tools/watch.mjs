import { statSync } from 'node:fs';
import { at, filesUnder } from './paths.mjs';

/**
 * Calls `work` after a source file has changed, one call at a time. Looks once a second: recursive watching in Node is not available on
 * every system, and the sources are a few hundred files.
 */
export function watchSources(work) {
  let seen = fingerprint();
  const look = async () => {
    const now = fingerprint();
    if (now !== seen) {
      seen = now;
      await work();
    }
    setTimeout(look, 1000);
  };
  setTimeout(look, 1000);
}

function fingerprint() {
  return ['packages/sdk/src', 'packages/elements/src']
    .flatMap((folder) => filesUnder(at(folder)))
    .map((path) => `${path}:${modified(path)}`)
    .join('\n');
}

function modified(path) {
  return statSync(path, { throwIfNoEntry: false })?.mtimeMs ?? 0;
}
