import { createStore, del, get, set, type UseStore } from 'idb-keyval';

/** What a cache keeps: by key, a value that a check recognises. */
export interface Cache<Value> {
  read(key: string): Promise<Value | null>;
  write(key: string, value: Value): Promise<void>;
  remove(key: string): Promise<void>;
}

/**
 * A cache over IndexedDB that never throws and never hangs. Storage may be refused at once (a sandboxed frame throws synchronously),
 * later, or not answer at all; each leaves a memory that lasts as long as the page. What comes back is checked before it is believed.
 * @param name     database
 * @param accepts  whether a stored value is one of ours
 */
export function openCache<Value>(name: string, accepts: (value: unknown) => value is Value, timeoutMs = 800): Cache<Value> {
  const memory = new Map<string, Value>();
  let store: UseStore | null = null;
  let closed = false;

  /** One storage call; null on any failure, after which this page no longer tries. */
  async function attempt<T>(call: (store: UseStore) => Promise<T>): Promise<T | null> {
    if (closed) return null;
    let timer: ReturnType<typeof setTimeout> | undefined;
    try {
      store ??= createStore(name, 'kept');
      const late = new Promise<never>((_, refuse) => {
        timer = setTimeout(() => refuse(new Error('storage did not answer')), timeoutMs);
      });
      return await Promise.race([call(store), late]);
    } catch {
      closed = true;
      store = null;
      return null;
    } finally {
      clearTimeout(timer);
    }
  }

  return {
    async read(key) {
      const held = memory.get(key);
      if (held !== undefined) return held;
      const value: unknown = await attempt((open) => get(key, open));
      return accepts(value) ? value : null;
    },
    async write(key, value) {
      memory.set(key, value);
      if (memory.size > mostInMemory) memory.delete(memory.keys().next().value as string);
      await attempt((open) => set(key, value, open));
    },
    async remove(key) {
      memory.delete(key);
      await attempt((open) => del(key, open));
    },
  };
}

const mostInMemory = 20;
