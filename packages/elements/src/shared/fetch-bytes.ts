/** Why a file could not be had. */
export type LoadProblem = 'unreachable' | 'notFound' | 'refused' | 'html' | 'empty' | 'tooLarge' | 'truncated';

export class LoadFailure extends Error {
  constructor(
    readonly code: LoadProblem,
    readonly status = 0,
  ) {
    super(code);
  }
}

export interface FetchOptions {
  accept: string;
  /** Most bytes that are taken. */
  cap: number;
  signal: AbortSignal;
  /** Of the copy at hand; sent to the page's own origin only, since elsewhere the header would cost a preflight that static hosts refuse. */
  etag?: string | null;
  timeoutMs?: number;
}

/**
 * Fetches a file, at most `cap` bytes of it.
 * @returns null where the copy at hand is still right (304)
 * @throws LoadFailure, or the abort's reason when `signal` is aborted
 */
export async function fetchBytes(
  url: string,
  { accept, cap, signal, etag = null, timeoutMs = 20_000 }: FetchOptions,
): Promise<{ bytes: Uint8Array; etag: string | null } | null> {
  const patience = new AbortController();
  const abort = (): void => patience.abort(signal.reason);
  signal.throwIfAborted();
  signal.addEventListener('abort', abort);
  const timer = setTimeout(() => patience.abort(), timeoutMs);
  let started = false;
  try {
    const own = new URL(url, document.baseURI).origin === location.origin;
    const response = await fetch(url, {
      // 'no-cache' asks the server again with whatever the browser's own cache holds; with our ETag the browser's cache stands aside.
      cache: 'no-cache',
      headers: { accept, ...(etag && own ? { 'if-none-match': etag } : {}) },
      signal: patience.signal,
    });
    started = true;
    if (response.status === 304) {
      if (etag) return null;
      throw new LoadFailure('empty', 304);
    }
    if (response.status === 404 || response.status === 410) throw new LoadFailure('notFound', response.status);
    if (!response.ok) throw new LoadFailure('refused', response.status);
    if (/\bhtml\b/i.test(response.headers.get('content-type') ?? '')) throw new LoadFailure('html');
    const bytes = await bounded(response, cap);
    const first = bytes.find((byte) => !blank.has(byte));
    if (first === undefined) throw new LoadFailure('empty');
    if (first === lessThan) throw new LoadFailure('html');
    return { bytes, etag: response.headers.get('etag') };
  } catch (error) {
    if (signal.aborted) throw signal.reason;
    if (error instanceof LoadFailure) throw error;
    throw new LoadFailure(started && !patience.signal.aborted ? 'truncated' : 'unreachable');
  } finally {
    clearTimeout(timer);
    signal.removeEventListener('abort', abort);
  }
}

async function bounded(response: Response, cap: number): Promise<Uint8Array> {
  const reader = response.body?.getReader();
  const pieces: BlobPart[] = [];
  let length = 0;
  while (reader) {
    const { done, value } = await reader.read();
    if (done) break;
    length += value.byteLength;
    if (length > cap) {
      void reader.cancel();
      throw new LoadFailure('tooLarge');
    }
    pieces.push(value);
  }
  return new Uint8Array(await new Blob(pieces).arrayBuffer());
}

// Blanks, line ends and the bytes of a byte-order mark.
const blank = new Set([9, 10, 11, 12, 13, 32, 0xef, 0xbb, 0xbf]);
const lessThan = 0x3c;
