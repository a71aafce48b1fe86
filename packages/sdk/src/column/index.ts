import type { Catchment, Checkpoint, ColumnRun, Forcing, RunOptions } from '../contract.js';
import { throwIfAny } from '../errors.js';
import { checkCheckpoint, describeContinuation, makeCheckpoint, restore } from './checkpoint.js';
import { ColumnRunner, DEFAULT_AGE_RESOLUTION } from './runner.js';
import {
  describeCatchment,
  describeDrivers,
  describeForcing,
  describeOptions,
  describeTogether,
  parseInstant,
  requireStorage,
} from './validate.js';

export { ColumnRunner } from './runner.js';
export { makeCheckpoint } from './checkpoint.js';

/**
 * Solves the age-ranked storage balance ∂S_T/∂t + ∂S_T/∂T = J − Σ F_f Ω_f(S_T, t), S_T(0, t) = 0, through a forcing, with the
 * tracers that ride on it.
 *
 * In the default mode (`ageResolution` 0.1) parcels older than ten steps merge once their joint width is a tenth of their age; what
 * that costs is in the accuracy table of the README. `ageResolution: 0` keeps every age and carries every boundary to 1e-9.
 *
 * @param catchment mm, and parameters as the forms state them
 * @param forcing   fluxes mm/day, [N] steps; never changed
 * @returns         series of [N]; NaN where an outflow is 0
 * @throws RillageError with all problems of the input at once, or `parameter-domain` / `mixture-weights` at the step of a driven
 *   parameter, or `storage-empty` with the initial storage that would be needed
 * @source Botter, Bertuzzo & Rinaldo 2011; van der Velde et al. 2012; Harman 2015; Rinaldo et al. 2015
 */
export function runColumn(catchment: Catchment, forcing: Forcing, options: RunOptions = {}): ColumnRun {
  const runner = startColumn(catchment, forcing, options);
  runner.advance(runner.stepsLeft);
  return finishColumn(runner);
}

/**
 * Continues a run from its checkpoint: the same numbers as one long run, bit for bit. Step indices in `options` count from the start of
 * this forcing. `ageResolution` is the checkpoint's.
 * @throws RillageError as {@link runColumn}; `checkpoint…` where the checkpoint is damaged, of another version, or does not fit the
 *   forcing in time or names
 */
export function resumeColumn(checkpoint: Checkpoint, forcing: Forcing, options: RunOptions = {}): ColumnRun {
  const runner = continueColumn(checkpoint, forcing, options);
  runner.advance(runner.stepsLeft);
  return finishColumn(runner);
}

/** A checked runner at the start of a forcing, for callers that advance it in slices. */
export function startColumn(catchment: Catchment, forcing: Forcing, options: RunOptions = {}): ColumnRunner {
  throwIfAny([...describeForcing(forcing), ...describeCatchment(catchment)]);
  throwIfAny([...describeTogether(forcing, catchment), ...describeOptions(options, forcing.inflow.length)]);
  const repeats = options.spinUp?.repeats ?? 0;
  const start = catchment.initialStorage - repeats * storageChange(forcing);
  const resolution = options.ageResolution ?? DEFAULT_AGE_RESOLUTION;
  const runner = new ColumnRunner(catchment, forcing, options, resolution, new Date(forcing.start).toISOString(), start);
  throwIfAny(describeDrivers(runner.evaluator, forcing));
  if (repeats > 0) requireStorage(forcing, start);
  requireStorage(forcing, catchment.initialStorage);
  if (catchment.wetnessRange !== undefined) runner.wetness = catchment.wetnessRange;
  else if (runner.evaluator.drivers.includes('wetness')) runner.wetness = rangeOfStorage(forcing, catchment.initialStorage);
  if (repeats > 0) {
    runner.spinUp(repeats);
    runner.state.total = catchment.initialStorage;
  }
  return runner;
}

/** A checked runner at the end of a checkpoint. */
export function continueColumn(checkpoint: Checkpoint, forcing: Forcing, options: RunOptions = {}): ColumnRunner {
  checkCheckpoint(checkpoint);
  const { catchment } = checkpoint;
  throwIfAny([...describeForcing(forcing), ...describeCatchment(catchment)]);
  throwIfAny([
    ...describeTogether(forcing, catchment),
    ...describeOptions(options, forcing.inflow.length),
    ...describeContinuation(checkpoint, parseInstant(forcing.start), parseInstant(checkpoint.recordStart), forcing.stepDays),
  ]);
  const resolution = options.ageResolution ?? checkpoint.ageResolution;
  throwIfAny(
    resolution === checkpoint.ageResolution && options.spinUp === undefined
      ? []
      : [
          {
            code: 'checkpoint-options',
            path: options.spinUp === undefined ? 'options.ageResolution' : 'options.spinUp',
            expected:
              options.spinUp === undefined ? `${checkpoint.ageResolution}, as in the run before` : 'no spin-up of a run that goes on',
            received: options.spinUp === undefined ? String(resolution) : 'one',
          },
        ],
  );
  const runner = new ColumnRunner(catchment, forcing, options, resolution, checkpoint.recordStart, catchment.initialStorage);
  throwIfAny(describeDrivers(runner.evaluator, forcing));
  restore(runner, checkpoint);
  requireStorage(forcing, runner.state.total);
  return runner;
}

/** The result of a runner that has advanced through all its steps. Its checkpoint is taken at once, as the runner's state is reused by nobody. */
export function finishColumn(runner: ColumnRunner): ColumnRun {
  return runner.finish(() => makeCheckpoint(runner));
}

function storageChange(forcing: Forcing): number {
  let change = 0;
  const outflows = Object.values(forcing.outflows);
  for (let k = 0; k < forcing.inflow.length; k++) {
    let rate = forcing.inflow[k];
    for (const flux of outflows) rate -= flux[k];
    change += rate * forcing.stepDays;
  }
  return change;
}

/** [lowest, highest] storage over a forcing; widened a little where it is constant. */
function rangeOfStorage(forcing: Forcing, initial: number): [number, number] {
  let storage = initial;
  let low = initial;
  let high = initial;
  const outflows = Object.values(forcing.outflows);
  for (let k = 0; k < forcing.inflow.length; k++) {
    let rate = forcing.inflow[k];
    for (const flux of outflows) rate -= flux[k];
    storage += rate * forcing.stepDays;
    low = Math.min(low, storage);
    high = Math.max(high, storage);
  }
  return high > low ? [low, high] : [low, low + 1];
}
