import { throwIfAborted } from '../errors.js';

/** Shorter than half a display frame, so that a page goes on answering. */
const SLICE_MILLISECONDS = 8;

/** Lets everything else on this thread have its turn. */
export function pause(): Promise<void> {
  return new Promise((resolve) => setTimeout(resolve, 0));
}

/**
 * Calls `work` until it says that nothing is left, giving the thread back every few milliseconds.
 * @param work does a little (well below a slice) and tells whether more is left
 * @throws RillageError `aborted` within a slice of the signal
 */
export async function inSlices(work: () => boolean, signal: AbortSignal | undefined, onSlice?: () => void): Promise<void> {
  for (;;) {
    throwIfAborted(signal);
    const end = performance.now() + SLICE_MILLISECONDS;
    let more = true;
    while (more && performance.now() < end) more = work();
    onSlice?.();
    if (!more) return;
    await pause();
  }
}
