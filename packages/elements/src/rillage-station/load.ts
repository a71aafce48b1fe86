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

export interface Loaded {
  text: string;
  etag: string | null;
}

/** 5 MB; a station file is bounded in size far below it. */
export const byteCap = 5_000_000;

/**
 * Fetches a JSON text, at most `byteCap` bytes of it.
 * @param etag  of the copy at hand; sent to the page's own origin only, since elsewhere the header would cost a preflight that static hosts refuse
 * @returns null where the copy at hand is still right (304)
 * @throws LoadFailure, or the abort's reason when `signal` is aborted
 */
export async function load(url: string, etag: string | null, signal: AbortSignal, timeoutMs = 20_000): Promise<Loaded | null> {
  const own = new URL(url, document.baseURI).origin === location.origin;
  const patience = new AbortController();
  const abort = (): void => patience.abort(signal.reason);
  signal.throwIfAborted();
  signal.addEventListener('abort', abort);
  const timer = setTimeout(() => patience.abort(), timeoutMs);
  let started = false;
  try {
    const response = await fetch(url, {
      // 'no-cache' asks the server again with whatever the browser's own cache holds; with our ETag the browser's cache stands aside.
      cache: 'no-cache',
      headers: { accept: 'application/json', ...(etag && own ? { 'if-none-match': etag } : {}) },
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
    const text = await bounded(response);
    if (!text.trim()) throw new LoadFailure('empty');
    if (text.trimStart().startsWith('<')) throw new LoadFailure('html');
    return { text, etag: response.headers.get('etag') };
  } catch (error) {
    if (signal.aborted) throw signal.reason;
    if (error instanceof LoadFailure) throw error;
    throw new LoadFailure(started && !patience.signal.aborted ? 'truncated' : 'unreachable');
  } finally {
    clearTimeout(timer);
    signal.removeEventListener('abort', abort);
  }
}

async function bounded(response: Response): Promise<string> {
  const reader = response.body?.getReader();
  if (!reader) return '';
  const decoder = new TextDecoder('utf-8', { fatal: true });
  let text = '';
  let bytes = 0;
  for (;;) {
    const { done, value } = await reader.read();
    if (done) return text + decoder.decode();
    bytes += value.byteLength;
    if (bytes > byteCap) {
      void reader.cancel();
      throw new LoadFailure('tooLarge');
    }
    text += decoder.decode(value, { stream: true });
  }
}
