import type { Catchment, Checkpoint } from '../contract.js';
import { RillageError, shorten, type Issue } from '../errors.js';
import { STRIDE } from './entryCurves.js';
import type { ColumnRunner } from './runner.js';
import { parseInstant } from './validate.js';

/** A parcel that an earlier run followed: kept apart from its neighbours, as that run kept it. */
const FOLLOWED_BEFORE = 0x7fffffff;
const PER_PARCEL = ['depth', 'entryStart', 'entryEnd', 'followed'] as const;
const OF_STATE = ['count', 'assumed', 'preRecord', 'total'] as const;
const OF_BALANCE = ['initial', 'in', 'out'] as const;
const SCALARS = [...OF_STATE, ...OF_BALANCE, 'previousInflow', 'entered', 'wetnessLow', 'wetnessHigh'] as const;

/** The state of a runner at the end of its last step, as JSON-safe data that gives the same bits back. */
export function makeCheckpoint(runner: ColumnRunner): Checkpoint {
  const { state, clock, balance } = runner;
  const count = state.count;
  const rows = (list: Float64Array, n: number): number[] => {
    const flat: number[] = [];
    for (let row = 0; row < n; row++) for (let i = 0; i < count; i++) flat.push(list[row * state.capacity + i]);
    return flat;
  };
  const data: Checkpoint['state'] = {
    previousInflow: runner.step.previousInflow,
    entered: runner.entered,
    wetnessLow: runner.wetness[0],
    wetnessHigh: runner.wetness[1],
    clockTimes: [...(clock?.times ?? [])],
    clockAmounts: [...(clock?.amounts ?? [])],
    lastShare: state.lastShare.flatMap((list) => Array.from(list.subarray(0, count))),
    curves: Array.from(state.curves.data.subarray(0, STRIDE * count)),
    concentration: rows(state.concentration, state.tracers),
    ledgers: runner.ledgers.flatMap((ledger) => [ledger.entered, ledger.left, ledger.reacted, ledger.held]),
  };
  for (const key of OF_STATE) data[key] = state[key];
  for (const key of OF_BALANCE) data[key] = balance[key];
  for (const key of PER_PARCEL) data[key] = Array.from(state[key].subarray(0, count));
  return {
    kind: 'rillage-checkpoint',
    version: 1,
    steps: runner.before + runner.forcing.inflow.length,
    recordStart: runner.recordStart,
    stepDays: runner.forcing.stepDays,
    catchment: structuredCloneOf(runner.catchment),
    ageResolution: runner.ageResolution,
    state: data,
  };
}

/** Puts a checked checkpoint's state into a fresh runner. */
export function restore(runner: ColumnRunner, checkpoint: Checkpoint): void {
  const { state, clock } = runner;
  const data = checkpoint.state;
  const scalar = (key: string): number => data[key] as number;
  const list = (key: string): number[] => data[key] as number[];
  const count = scalar('count');
  state.reserve(count);
  for (const key of OF_STATE) state[key] = scalar(key);
  for (const key of OF_BALANCE) runner.balance[key] = scalar(key);
  for (const key of PER_PARCEL) state[key].set(list(key));
  for (let i = 0; i < count; i++) if (state.followed[i] >= 0) state.followed[i] = FOLLOWED_BEFORE;
  const spread = (from: number[], to: Float64Array, n: number): void => {
    for (let row = 0; row < n; row++) for (let i = 0; i < count; i++) to[row * state.capacity + i] = from[row * count + i];
  };
  state.lastShare.forEach((share, f) => share.set(list('lastShare').slice(f * count, (f + 1) * count)));
  state.curves.data.set(list('curves'));
  spread(list('concentration'), state.concentration, state.tracers);
  if (clock !== null) {
    clock.times = [...list('clockTimes')];
    clock.amounts = [...list('clockAmounts')];
  }
  runner.ledgers.forEach((ledger, t) => {
    [ledger.entered, ledger.left, ledger.reacted, ledger.held] = list('ledgers').slice(4 * t, 4 * t + 4) as [
      number,
      number,
      number,
      number,
    ];
  });
  runner.before = checkpoint.steps;
  runner.entered = scalar('entered');
  runner.wetness = [scalar('wetnessLow'), scalar('wetnessHigh')];
  runner.step.previousInflow = scalar('previousInflow');
}

/** Throws `checkpoint` unless the data has the shape of a checkpoint: finite numbers, lists of the right lengths, depths that add up. */
export function checkCheckpoint(data: unknown): asserts data is Checkpoint {
  const need = (good: boolean, path: string, expected: string, received: unknown): void => {
    if (!good)
      throw new RillageError({ code: 'checkpoint', path: `checkpoint${path}`, expected, received: shorten(received ?? 'nothing') });
  };
  const isRecord = (value: unknown): boolean => typeof value === 'object' && value !== null;
  const whole = (value: number): boolean => Number.isInteger(value) && value >= 0;
  need(isRecord(data) && (data as Checkpoint).kind === 'rillage-checkpoint', '', 'data made by ColumnRun.checkpoint()', data);
  const { version, steps, stepDays, ageResolution, recordStart, catchment, state } = data as Checkpoint;
  if (version !== 1) {
    throw new RillageError({
      code: 'checkpoint-version',
      path: 'checkpoint.version',
      expected: '1',
      received: shorten(version ?? 'nothing'),
      hint: 'It was made by another version of the SDK; update the SDK, or run the record again.',
    });
  }
  need(whole(steps) && steps > 0, '.steps', 'a whole number of steps', steps);
  need(Number.isFinite(stepDays) && stepDays > 0, '.stepDays', 'a number of days above 0', stepDays);
  need(ageResolution >= 0 && ageResolution <= 0.5, '.ageResolution', 'a number from 0 to 0.5', ageResolution);
  need(!Number.isNaN(parseInstant(recordStart)), '.recordStart', 'an ISO 8601 instant', recordStart);
  need(isRecord(catchment), '.catchment', 'a catchment', catchment);
  need(isRecord(state), '.state', 'the state of a column', state);
  for (const key of SCALARS) need(Number.isFinite(state[key]), `.state.${key}`, 'a finite number', state[key]);
  const { count, assumed, total, preRecord } = state as Record<string, number>;
  need(whole(count), '.state.count', 'a whole number', count);
  need(whole(assumed) && assumed <= count, '.state.assumed', `a whole number up to ${count}`, assumed);
  const outflows = Object.keys(catchment.selection ?? {}).length;
  const tracers = Object.keys(catchment.tracers ?? {}).length;
  const lengths: Record<string, number> = {
    lastShare: outflows * count,
    curves: STRIDE * count,
    concentration: tracers * count,
    ledgers: 4 * tracers,
    clockTimes: (state['clockTimes'] as number[] | undefined)?.length ?? 0,
  };
  lengths['clockAmounts'] = lengths['clockTimes'];
  for (const key of PER_PARCEL) lengths[key] = count;
  for (const [key, length] of Object.entries(lengths)) {
    const list: unknown = state[key];
    const good = Array.isArray(list) && list.length === length && list.every(Number.isFinite);
    need(good, `.state.${key}`, `${length} finite numbers`, Array.isArray(list) ? `a list of ${list.length}` : list);
  }
  const depth = state['depth'] as number[];
  const share = state['lastShare'] as number[];
  need(preRecord >= 0 && depth.every((mm) => mm >= 0), '.state.depth', 'depths of 0 mm or more', depth);
  need(
    share.every((value) => Math.abs(value) < 2),
    '.state.lastShare',
    'shares',
    share,
  );
  const stored = depth.reduce((sum, mm) => sum + mm, preRecord);
  need(Math.abs(stored - total) <= 1e-6 * Math.max(1, total), '.state.total', `${stored} mm, the sum of what is stored`, total);
}

/** Problems of continuing a checkpoint with a forcing: another step, another catchment's outflows, a gap or an overlap in time. */
export function describeContinuation(checkpoint: Checkpoint, start: number, recordStart: number, stepDays: number): Issue[] {
  const issues: Issue[] = [];
  if (stepDays !== checkpoint.stepDays)
    issues.push({ code: 'checkpoint-step', path: 'stepDays', expected: `${checkpoint.stepDays}, as before`, received: String(stepDays) });
  const expected = recordStart + checkpoint.steps * checkpoint.stepDays * 86_400_000;
  if (Math.abs(start - expected) > 500) {
    issues.push({
      code: start > expected ? 'checkpoint-gap' : 'checkpoint-overlap',
      path: 'start',
      expected: new Date(expected).toISOString(),
      received: new Date(start).toISOString(),
      hint: 'New steps must begin where the checkpoint ends.',
    });
  }
  return issues;
}

function structuredCloneOf(catchment: Catchment): Catchment {
  return JSON.parse(JSON.stringify(catchment)) as Catchment;
}
