import { makeExcerpt, readStation, updateStation, writeExcerpt, writeReading, writeStation } from '@rillage/sdk';
import { forcingOfRows } from './rows.mjs';

/**
 * One morning's work, the same in every runtime: read the station, add the rows it does not have, write station and reading.
 * Run again with the same rows it writes nothing. A file is written beside its name, forced to the disk and renamed, so that whoever
 * reads it, and whenever this process dies, finds the old file whole or the new one whole. The station goes first: dying between
 * files leaves a reading or an excerpt of yesterday, which the next run makes good from the station.
 *
 * @param files what the runtime offers: `readText(path)` (null where there is none), `writeSynced(path, text)`, `rename(from, to)`,
 *              `syncFolderOf(path)`; all may be asynchronous
 * @param paths `station` (JSON), `rows` (CSV), `reading` (JSON, made where there is none), and `excerpt` where a page loads more than the reading
 * @returns     what was done: `wrote` names the files that changed
 * @throws      RillageError where the station or the rows are not fit; nothing has been written then
 */
export async function runMorning(files, paths) {
  const station = readStation(await present(files, paths.station));
  const rows = forcingOfRows(await present(files, paths.rows), station);
  const next = updateStation(station, rows.forcing);

  const wrote = [];
  if (await writeWhole(files, paths.station, writeStation(next.station))) wrote.push(paths.station);
  if (await writeWhole(files, paths.reading, writeReading(next.reading))) wrote.push(paths.reading);
  if (paths.excerpt && (await writeWhole(files, paths.excerpt, writeExcerpt(makeExcerpt(next.station))))) wrote.push(paths.excerpt);
  return { reading: next.reading, findings: rows.findings, wrote };
}

/** @returns false where the file holds that text already */
async function writeWhole(files, path, text) {
  if ((await files.readText(path)) === text) return false;
  const partial = `${path}.partial`;
  await files.writeSynced(partial, text);
  await files.rename(partial, path);
  await files.syncFolderOf(path);
  return true;
}

async function present(files, path) {
  const text = await files.readText(path);
  if (text === null) throw new Error(`${path} is missing.`);
  return text;
}

/** For the command lines: arguments to paths, outcome to lines. */
export async function morningCommand(files, args, say) {
  const [station, rows, reading, excerpt] = args;
  if (!station || !rows || !reading) {
    say(
      'Usage: (node node.mjs | deno run --allow-read=FOLDER --allow-write=FOLDER deno.mjs) STATION.json ROWS.csv READING.json [EXCERPT.json]',
    );
    return 2;
  }
  try {
    const done = await runMorning(files, { station, rows, reading, excerpt });
    for (const finding of done.findings) if (finding.severity !== 'note') say(`${finding.where}: ${finding.seen} ${finding.done}`);
    say(done.reading.sentence);
    say(done.wrote.length > 0 ? `Written: ${done.wrote.join(', ')}` : 'Nothing new; nothing written.');
    return 0;
  } catch (error) {
    say(`Nothing more was written. ${error instanceof Error ? error.message : String(error)}`);
    return 1;
  }
}
