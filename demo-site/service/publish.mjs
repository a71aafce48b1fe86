import { copyFile, mkdir, writeFile } from 'node:fs/promises';
import { makeExcerpt, writeExcerpt, writeReading } from '@rillage/sdk';

/**
 * What a page loads of a station, beside the station's own file: ID-public.json, all that the elements draw from, and ID-reading.json, the
 * statement alone, for a list of stations.
 * @param station made, or read with `readStation`
 * @param folder  URL of a folder, with its closing slash
 */
export async function publishStation(station, folder) {
  await writeFile(new URL(`${station.id}-public.json`, folder), writeExcerpt(makeExcerpt(station)));
  await writeFile(new URL(`${station.id}-reading.json`, folder), writeReading(station.reading));
}

/** The invented agency's own files, for whoever tries the desk. */
export async function publishAgencyFiles(names, from, folder) {
  await mkdir(folder, { recursive: true });
  for (const name of names) await copyFile(new URL(name, from), new URL(name, folder));
}
