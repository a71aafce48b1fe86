/** The morning job in Node: `node demo-site/service/node.mjs STATION.json ROWS.csv READING.json [EXCERPT.json]`. */
import { open, readFile, rename } from 'node:fs/promises';
import { dirname } from 'node:path';
import { pathToFileURL } from 'node:url';
import { morningCommand } from './morning.mjs';

export const nodeFiles = {
  async readText(path) {
    try {
      return await readFile(path, 'utf8');
    } catch (error) {
      if (error.code === 'ENOENT') return null;
      throw error;
    }
  },

  async writeSynced(path, text) {
    const file = await open(path, 'w');
    try {
      await file.writeFile(text);
      await file.sync();
    } finally {
      await file.close();
    }
  },

  rename,

  /** A rename is in the folder; without this a power cut may undo it. */
  async syncFolderOf(path) {
    // Windows opens no folders; there the rename itself is flushed.
    if (process.platform === 'win32') return;
    const folder = await open(dirname(path), 'r');
    try {
      await folder.sync();
    } finally {
      await folder.close();
    }
  },
};

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  process.exitCode = await morningCommand(nodeFiles, process.argv.slice(2), console.log);
}
