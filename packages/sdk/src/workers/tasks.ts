import type { Catchment, Checkpoint, ColumnRun, Forcing, RunOptions } from '../contract.js';
import { startColumn, continueColumn, finishColumn, type ColumnRunner } from '../column/index.js';

/** Work that a worker can be asked for. `report` tells how far it is, 0..1. */
export type Task = (payload: unknown, report: (done: number) => void) => unknown;

export interface ColumnPayload {
  catchment?: Catchment;
  checkpoint?: Checkpoint;
  forcing: Forcing;
  options: RunOptions;
}

/** A run as it can cross to another thread: its checkpoint taken, since a function cannot. */
export type SentRun = Omit<ColumnRun, 'checkpoint'> & { taken: Checkpoint };

const STEPS_PER_REPORT = 500;

/** By name; rooms further down the flow add theirs through {@link addTask}. */
const TASKS = new Map<string, Task>([['column', columnTask]]);

export function addTask(name: string, task: Task): void {
  TASKS.set(name, task);
}

export function runTask(name: string, payload: unknown, report: (done: number) => void): unknown {
  const task = TASKS.get(name);
  if (task === undefined) throw new Error(`This worker knows no task called ${name}; page and worker must be of one version.`);
  return task(payload, report);
}

/** The runner that a payload asks for, checked. */
export function runnerOf(payload: ColumnPayload): ColumnRunner {
  return payload.checkpoint !== undefined
    ? continueColumn(payload.checkpoint, payload.forcing, payload.options)
    : startColumn(payload.catchment!, payload.forcing, payload.options);
}

function columnTask(payload: unknown, report: (done: number) => void): SentRun {
  const runner = runnerOf(payload as ColumnPayload);
  const steps = runner.stepsLeft;
  while (runner.stepsLeft > 0) {
    runner.advance(STEPS_PER_REPORT);
    report(1 - runner.stepsLeft / steps);
  }
  const { checkpoint, ...rest } = finishColumn(runner);
  return { ...rest, taken: checkpoint() };
}

/** Puts the checkpoint back behind its call. */
export function received(sent: SentRun): ColumnRun {
  const { taken, ...rest } = sent;
  return { ...rest, checkpoint: () => taken };
}
