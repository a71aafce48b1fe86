import type { Catchment, Checkpoint } from '../contract.js';
import { RillageError, shorten, type Issue } from '../errors.js';
import type { ColumnRunner } from './runner.js';
import { parseInstant } from './validate.js';

/** A parcel that an earlier run followed: kept apart from its neighbours, as that run kept it. */
const FOLLOWED_BEFORE = 0x7fffffff;
const PER_PARCEL = ['depth', 'entryStart', 'entryEnd', 'enteredBefore', 'enteredAfter', 'followed'] as const;
const SCALARS = [
  'count',
  'assumed',
  'preRecord',
  'total',
  'previousInflow',
  'entered',
  'initial',
  'in',
  'out',
  'wetnessLow',
  'wetnessHigh',
] as const;

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
    count,
    assumed: state.assumed,
    preRecord: state.preRecord,
    total: state.total,
    previousInflow: runner.step.previousInflow,
    entered: runner.entered,
    initial: balance.initial,
    in: balance.in,
    out: balance.out,
    wetnessLow: runner.wetness[0],
    wetnessHigh: runner.wetness[1],
    clockTimes: [...(clock?.times ?? [])],
    clockAmounts: [...(clock?.amounts ?? [])],
    lastShare: state.lastShare.flatMap((list) => Array.from(list.subarray(0, count))),
    concentration: rows(state.concentration, state.tracers),
    ledgers: runner.ledgers.flatMap((ledger) => [ledger.entered, ledger.left, ledger.reacted, ledger.held]),
  };
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
  state.count = count;
  state.assumed = scalar('assumed');
  state.preRecord = scalar('preRecord');
  state.total = scalar('total');
  for (const key of PER_PARCEL) state[key].set(list(key));
  for (let i = 0; i < count; i++) if (state.followed[i] >= 0) state.followed[i] = FOLLOWED_BEFORE;
  const spread = (from: number[], to: Float64Array, n: number): void => {
    for (let row = 0; row < n; row++) for (let i = 0; i < count; i++) to[row * state.capacity + i] = from[row * count + i];
  };
  state.lastShare.forEach((share, f) => share.set(list('lastShare').slice(f * count, (f + 1) * count)));
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
  runner.balance = { initial: scalar('initial'), in: scalar('in'), out: scalar('out') };
  runner.wetness = [scalar('wetnessLow'), scalar('wetnessHigh')];
  runner.step.previousInflow = scalar('previousInflow');
}

/** Throws `checkpoint` unless the data has the shape of a checkpoint, with finite numbers and lists of the right lengths. */
export function checkCheckpoint(data: unknown): asserts data is Checkpoint {
  const fail = (path: string, expected: string, received: unknown): never => {
    throw new RillageError({ code: 'checkpoint', path, expected, received: shorten(received ?? 'nothing') });
  };
  const record = (value: unknown): value is Record<string, unknown> => typeof value === 'object' && value !== null;
  if (!record(data) || data['kind'] !== 'rillage-checkpoint') return fail('checkpoint', 'data made by ColumnRun.checkpoint()', data);
  if (data['version'] !== 1) {
    throw new RillageError({
      code: 'checkpoint-version',
      path: 'checkpoint.version',
      expected: '1',
      received: shorten(data['version']),
      hint: 'It was made by another version of the SDK; update the SDK, or run the record again.',
    });
  }
  const { steps, stepDays, ageResolution, catchment, state } = data;
  if (!(Number.isInteger(steps) && Number(steps) > 0)) fail('checkpoint.steps', 'a whole number of steps', steps);
  if (!(typeof stepDays === 'number' && stepDays > 0)) fail('checkpoint.stepDays', 'a number of days above 0', stepDays);
  if (!(typeof ageResolution === 'number' && ageResolution >= 0 && ageResolution <= 0.5)) {
    fail('checkpoint.ageResolution', 'a number from 0 to 0.5', ageResolution);
  }
  if (Number.isNaN(parseInstant(data['recordStart']))) fail('checkpoint.recordStart', 'an ISO 8601 instant', data['recordStart']);
  if (!record(catchment)) return fail('checkpoint.catchment', 'a catchment', catchment);
  if (!record(state)) return fail('checkpoint.state', 'the state of a column', state);
  for (const key of SCALARS) if (!Number.isFinite(state[key])) fail(`checkpoint.state.${key}`, 'a finite number', state[key]);
  const count = state['count'] as number;
  if (!(Number.isInteger(count) && count >= 0)) fail('checkpoint.state.count', 'a whole number', count);
  const outflows = Object.keys((catchment['selection'] as object | undefined) ?? {}).length;
  const tracers = Object.keys((catchment['tracers'] as object | undefined) ?? {}).length;
  const lengths: [string, number][] = [
    ...PER_PARCEL.map((key): [string, number] => [key, count]),
    ['lastShare', outflows * count],
    ['concentration', tracers * count],
    ['ledgers', 4 * tracers],
  ];
  for (const [key, length] of lengths) checkList(state[key], length, key, fail);
  const clock = state['clockTimes'];
  checkList(clock, Array.isArray(clock) ? clock.length : -1, 'clockTimes', fail);
  checkList(state['clockAmounts'], (clock as unknown[]).length, 'clockAmounts', fail);
  checkAmounts(state as Checkpoint['state'], count, fail);
}

/** Depths of 0 or more that add up to total storage, Ω within 0 and 1, and assumed parcels among those there are. */
function checkAmounts(state: Checkpoint['state'], count: number, fail: (path: string, expected: string, received: unknown) => never): void {
  const depth = state['depth'] as number[];
  const total = state['total'] as number;
  const preRecord = state['preRecord'] as number;
  if (depth.some((mm) => mm < 0) || preRecord < 0) fail('checkpoint.state.depth', 'depths of 0 mm or more', depth);
  const stored = depth.reduce((sum, mm) => sum + mm, preRecord);
  if (!(Math.abs(stored - total) <= 1e-6 * Math.max(1, total)))
    fail('checkpoint.state.total', `${stored} mm, the sum of what is stored`, total);
  const share = state['lastShare'] as number[];
  if (share.some((value) => value < -0.5 || value > 1.5)) fail('checkpoint.state.lastShare', 'shares', share);
  const assumed = state['assumed'] as number;
  if (!(Number.isInteger(assumed) && assumed >= 0 && assumed <= count))
    fail('checkpoint.state.assumed', `a whole number up to ${count}`, assumed);
}

function checkList(list: unknown, length: number, key: string, fail: (path: string, expected: string, received: unknown) => never): void {
  const good = Array.isArray(list) && list.length === length && list.every((value) => Number.isFinite(value));
  if (!good)
    fail(`checkpoint.state.${key}`, `${Math.max(length, 0)} finite numbers`, Array.isArray(list) ? `a list of ${list.length}` : list);
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
