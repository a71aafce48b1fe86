import type { Reading, Station, StationExcerpt } from '@rillage/sdk';
import { openCache } from '../shared/storage.js';
import { checkStation } from '../shared/check/station.js';
import { LoadFailure, type LoadProblem } from '../shared/fetch-bytes.js';
import { byteCap, load } from './load.js';

export interface SourceProblem {
  code: LoadProblem | 'notStation' | 'newer';
  /** The field that does not hold, or the version. */
  at?: string;
  /** HTTP status. */
  status?: number;
}

/** What is at hand: nothing, nothing yet, or data and, where the newest could not be had, why. `keptAt`: when a copy was fetched, ms; 0 where not known. */
export type Sourced =
  | { kind: 'empty' }
  | { kind: 'loading' }
  | { kind: 'data'; station: Station | StationExcerpt | null; reading: Reading | null; problem: SourceProblem | null; keptAt: number };

/**
 * Where a station comes from, one at a time: opening another, or closing, aborts what runs and drops what comes late.
 * From an address, the kept copy is told at once and the server's answer after it.
 */
export class StationSource {
  #running: AbortController | null = null;

  constructor(private readonly tell: (sourced: Sourced) => void) {}

  /** @param given goes before `src`; `child`, a JSON text on the page, stands in until `src` has answered */
  open(given: unknown, src: string | null, child: string | null): void {
    this.close();
    if (given) return this.tell(this.#checked(given));
    // When the page was made is not known.
    const kept = child ? this.#parsed(child, 0) : null;
    if (!src) return this.tell(kept ?? { kind: 'empty' });
    this.tell(kept ?? { kind: 'loading' });
    this.#running = new AbortController();
    void this.#fetch(src, kept?.reading ? kept : null, this.#running.signal);
  }

  close(): void {
    this.#running?.abort();
    this.#running = null;
  }

  async #fetch(src: string, child: Data | null, signal: AbortSignal): Promise<void> {
    const key = URL.canParse(src, document.baseURI) ? new URL(src, document.baseURI).href : null;
    if (!key) return this.tell({ ...(child ?? nothing), problem: { code: 'notFound' } });
    const copy = await cache.read(key);
    if (signal.aborted) return;
    let best = child;
    if (copy) {
      const parsed = this.#parsed(copy.text, copy.at);
      // A page newer than the copy may carry the newer reading itself.
      if (parsed.reading && !(child?.reading && child.reading.at > parsed.reading.at)) {
        best = parsed;
        this.tell(parsed);
      }
    }
    const trusted = best !== null && best !== child;
    let sourced: Data;
    try {
      const loaded = await load(key, trusted ? copy!.etag : null, signal);
      sourced = loaded ? this.#parsed(loaded.text) : { ...best!, problem: null };
      if (loaded && !sourced.problem) void cache.write(key, { text: loaded.text, etag: loaded.etag, at: Date.now() });
    } catch (error) {
      if (signal.aborted) return;
      const problem: SourceProblem = error instanceof LoadFailure ? { code: error.code, status: error.status } : { code: 'unreachable' };
      sourced = { ...nothing, problem };
    }
    if (signal.aborted) return;
    this.tell(sourced.problem && best ? { ...best, problem: sourced.problem } : sourced);
  }

  #parsed(text: string, keptAt = Date.now()): Data {
    if (text.length > byteCap) return { ...nothing, problem: { code: 'tooLarge' } };
    let value: unknown;
    try {
      value = JSON.parse(text);
    } catch {
      return { ...nothing, problem: { code: 'truncated' } };
    }
    return this.#checked(value, keptAt);
  }

  #checked(value: unknown, keptAt = Date.now()): Data {
    const checked = checkStation(value);
    if (checked.problem) return { ...nothing, problem: checked.problem };
    return { kind: 'data', station: checked.station, reading: checked.reading, problem: null, keptAt };
  }
}

type Data = Extract<Sourced, { kind: 'data' }>;
interface Copy {
  text: string;
  etag: string | null;
  /** When it was fetched, ms. */
  at: number;
}

const nothing: Data = { kind: 'data', station: null, reading: null, problem: null, keptAt: 0 };

const cache = openCache<Copy>('rillage', (value): value is Copy => {
  const copy = value as Copy | null | undefined;
  return (
    typeof copy === 'object' &&
    copy !== null &&
    typeof copy.text === 'string' &&
    copy.text.length <= byteCap &&
    (copy.etag === null || typeof copy.etag === 'string') &&
    typeof copy.at === 'number'
  );
});
