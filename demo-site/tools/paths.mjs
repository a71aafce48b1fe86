import { existsSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** The absolute path of a path in the repository. */
export const at = (path) => fileURLToPath(new URL(`../../${path}`, import.meta.url));

/** Every file under a folder, absolute, sorted; none where the folder is absent. */
export function filesUnder(folder) {
  if (!existsSync(folder)) return [];
  return readdirSync(folder, { withFileTypes: true, recursive: true })
    .filter((entry) => entry.isFile())
    .map((entry) => join(entry.parentPath ?? entry.path, entry.name))
    .sort();
}
