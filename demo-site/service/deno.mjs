/** The morning job in Deno: `deno run --allow-read=FOLDER --allow-write=FOLDER demo-site/service/deno.mjs STATION.json ROWS.csv READING.json [EXCERPT.json]`. */
import { morningCommand } from './morning.mjs';

export const denoFiles = {
  async readText(path) {
    try {
      return await Deno.readTextFile(path);
    } catch (error) {
      if (error instanceof Deno.errors.NotFound) return null;
      throw error;
    }
  },

  async writeSynced(path, text) {
    const file = await Deno.open(path, { write: true, create: true, truncate: true });
    try {
      const bytes = new TextEncoder().encode(text);
      for (let done = 0; done < bytes.length;) done += await file.write(bytes.subarray(done));
      await file.sync();
    } finally {
      file.close();
    }
  },

  rename: Deno.rename,

  /** A rename is in the folder; without this a power cut may undo it. */
  async syncFolderOf(path) {
    // Windows opens no folders; there the rename itself is flushed.
    if (Deno.build.os === 'windows') return;
    const folder = await Deno.open(path.replace(/[^/]*$/, '') || '.', { read: true });
    try {
      await folder.sync();
    } finally {
      folder.close();
    }
  },
};

if (import.meta.main) Deno.exit(await morningCommand(denoFiles, Deno.args, console.log));
