import { fetchBytes, LoadFailure } from '../shared/fetch-bytes.js';

export interface Loaded {
  text: string;
  etag: string | null;
}

/** 5 MB; a station file is bounded in size far below it. */
export const byteCap = 5_000_000;

/**
 * Fetches a JSON text, at most `byteCap` bytes of it.
 * @param etag  of the copy at hand
 * @returns null where the copy at hand is still right (304)
 * @throws LoadFailure, or the abort's reason when `signal` is aborted
 */
export async function load(url: string, etag: string | null, signal: AbortSignal): Promise<Loaded | null> {
  const came = await fetchBytes(url, { accept: 'application/json', cap: byteCap, signal, etag });
  if (!came) return null;
  try {
    return { text: new TextDecoder('utf-8', { fatal: true }).decode(came.bytes), etag: came.etag };
  } catch {
    throw new LoadFailure('truncated');
  }
}
