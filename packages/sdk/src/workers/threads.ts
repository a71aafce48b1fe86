import type { Reply, Request } from './messages.js';

/** One worker of whatever kind the platform has. */
export interface Thread {
  post(request: Request): void;
  onReply: (reply: Reply) => void;
  onFailure: (error: unknown) => void;
  end(): void;
}

/** Where a caller's worker comes from: its address, a function that makes one, or the file beside this one. */
export type WorkerSource = string | URL | (() => Worker) | undefined;

const PATIENCE_MILLISECONDS = 4000;

/**
 * Opens a worker: the caller's own, or of the address given, or of the SDK's own file on the same origin. Resolves to null where the
 * platform or the page's policy does not allow it, or where nothing answers; never rejects.
 */
export async function openThread(source: WorkerSource): Promise<Thread | null> {
  try {
    const thread = typeof Worker === 'function' ? webThread(source) : await nodeThread(source);
    return thread === null ? null : await whenReady(thread);
  } catch {
    return null;
  }
}

function webThread(source: WorkerSource): Thread {
  const worker = typeof source === 'function' ? source() : new Worker(trusted(source ?? ownAddress()), { type: 'module' });
  const thread: Thread = {
    post: (request) => worker.postMessage(request),
    onReply: () => undefined,
    onFailure: () => undefined,
    end: () => worker.terminate(),
  };
  worker.onmessage = (event) => thread.onReply(event.data as Reply);
  worker.onerror = (event) => {
    event.preventDefault?.();
    thread.onFailure(event);
  };
  return thread;
}

async function nodeThread(source: WorkerSource): Promise<Thread | null> {
  if (typeof source === 'function') return null;
  const { Worker: NodeWorker } = await import('node:worker_threads');
  const worker = new NodeWorker(source === undefined ? ownAddress() : new URL(source));
  worker.unref();
  const thread: Thread = {
    post: (request) => worker.postMessage(request),
    onReply: () => undefined,
    onFailure: () => undefined,
    end: () => void worker.terminate(),
  };
  worker.on('message', (reply: Reply) => thread.onReply(reply));
  worker.on('error', (error) => thread.onFailure(error));
  return thread;
}

interface ScriptPolicy {
  createScriptURL(address: string): string;
}
let policy: ScriptPolicy | undefined;

/**
 * The address in the form that a page which requires trusted types takes, where its header names this policy; where it does not, the
 * worker is refused and the work is done in slices. Only addresses that the caller or this package gave pass through it.
 */
function trusted(address: string | URL): string | URL {
  const { trustedTypes } = globalThis as { trustedTypes?: { createPolicy(name: string, rules: ScriptPolicy): ScriptPolicy } };
  if (trustedTypes === undefined) return address;
  try {
    policy ??= trustedTypes.createPolicy('rillage-worker', { createScriptURL: (given) => given });
  } catch {
    return address;
  }
  return policy.createScriptURL(String(address));
}

function ownAddress(): URL {
  return new URL('./worker-entry.js', import.meta.url);
}

function whenReady(thread: Thread): Promise<Thread | null> {
  return new Promise((resolve) => {
    const settle = (answer: Thread | null): void => {
      clearTimeout(timer);
      if (answer === null) thread.end();
      resolve(answer);
    };
    const timer = setTimeout(() => settle(null), PATIENCE_MILLISECONDS);
    thread.onReply = (reply) => {
      if ('ready' in reply) settle(thread);
    };
    thread.onFailure = () => settle(null);
  });
}
