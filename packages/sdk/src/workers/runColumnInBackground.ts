import type { CallOptions, Catchment, Checkpoint, ColumnRun, Forcing, RunOptions } from '../contract.js';
import { finishColumn } from '../column/index.js';
import { RillageError, throwIfAborted } from '../errors.js';
import { openPool, type Pool } from './pool.js';
import { inSlices } from './slices.js';
import { received, runnerOf, type ColumnPayload, type SentRun } from './tasks.js';
import type { WorkerSource } from './threads.js';

export interface BackgroundOptions extends CallOptions {
  /** The caller's own Worker or its address (a page under a strict policy names it); `false` for time slices on this thread. */
  worker?: WorkerSource | false;
}

const STEPS_AT_A_TIME = 40;

/**
 * `runColumn` (or, from a checkpoint, `resumeColumn`) that never blocks its caller: in a worker where one may be had, else in slices of a
 * few milliseconds on this thread. The numbers are the same bits either way.
 * @throws RillageError as `runColumn`; `aborted` within 50 ms of the signal
 */
export async function runColumnInBackground(
  model: Catchment | Checkpoint,
  forcing: Forcing,
  options: RunOptions = {},
  call: BackgroundOptions = {},
): Promise<ColumnRun> {
  throwIfAborted(call.signal);
  const payload: ColumnPayload = 'kind' in model ? { checkpoint: model, forcing, options } : { catchment: model, forcing, options };
  const pool = call.worker === false ? null : await openUnlessAborted(call.worker, call.signal);
  if (pool === null) return onThisThread(payload, call);
  const stop = (): void => pool.close();
  call.signal?.addEventListener('abort', stop, { once: true });
  try {
    throwIfAborted(call.signal);
    return received((await pool.call('column', payload, (done) => call.onProgress?.({ done }))) as SentRun);
  } catch (error) {
    throwIfAborted(call.signal);
    if (error instanceof RillageError) throw error;
    return await onThisThread(payload, call);
  } finally {
    call.signal?.removeEventListener('abort', stop);
    pool.close();
  }
}

/** A pool of one; a signal raised while it opens is answered at once, and the worker ended when it comes. */
async function openUnlessAborted(worker: WorkerSource, signal: AbortSignal | undefined): Promise<Pool | null> {
  const opening = openPool(1, { worker });
  if (signal === undefined) return opening;
  let raise: () => void = () => undefined;
  const aborted = new Promise<never>((_resolve, reject) => {
    raise = () => {
      void opening.then((pool) => pool?.close());
      reject(new RillageError({ code: 'aborted', hint: 'The caller ended this call through its signal.' }, { cause: signal.reason }));
    };
    signal.addEventListener('abort', raise, { once: true });
  });
  try {
    return await Promise.race([opening, aborted]);
  } finally {
    signal.removeEventListener('abort', raise);
  }
}

async function onThisThread(payload: ColumnPayload, call: BackgroundOptions): Promise<ColumnRun> {
  const runner = runnerOf(payload);
  const steps = runner.stepsLeft;
  const work = (): boolean => {
    runner.advance(STEPS_AT_A_TIME);
    return runner.stepsLeft > 0;
  };
  await inSlices(work, call.signal, () => call.onProgress?.({ done: 1 - runner.stepsLeft / steps }));
  return finishColumn(runner);
}
