import { describe, expect, test } from 'vitest';
import { resumeColumn, RillageError, runColumn, type Catchment, type Checkpoint, type Forcing, type RunOptions } from '@rillage/sdk';

const N = 6;
function forcing(change: Partial<Forcing> = {}): Forcing {
  return {
    start: '2001-03-01T00:00:00Z',
    stepDays: 1,
    inflow: Float64Array.of(4, 0, 3, 0, 5, 0),
    outflows: { stream: Float64Array.of(1, 1, 1, 1, 1, 1), evap: Float64Array.of(1, 2, 1, 2, 1, 2) },
    inflowConcentration: { tracer: Float64Array.of(5, NaN, 6, NaN, 7, NaN) },
    ...change,
  };
}

function catchment(change: Partial<Catchment> = {}): Catchment {
  return {
    initialStorage: 100,
    selection: { stream: { form: 'gamma', shape: 0.6, scale: 30 }, evap: { form: 'exponential', scale: 20 } },
    tracers: { tracer: { preRecord: 9 } },
    ...change,
  };
}

/** What is not allowed by the types, as plain JavaScript or JSON may send it. */
const untyped = <T>(value: unknown): T => value as T;

function refusal(call: () => unknown): RillageError {
  try {
    call();
  } catch (error) {
    expect(error).toBeInstanceOf(RillageError);
    return error as RillageError;
  }
  throw new Error('nothing was refused');
}

interface Case {
  what: string;
  given?: Catchment;
  record?: Forcing;
  options?: RunOptions;
  code: string;
  path: string;
  step?: number;
}

const changed = (series: Float64Array, step: number, value: number): Float64Array => series.map((old, k) => (k === step ? value : old));
const base = forcing();
const { stream, evap } = base.outflows;
const withStream = (selection: unknown): Catchment => catchment({ selection: untyped({ stream: selection, evap: { form: 'uniform' } }) });

const cases: Case[] = [
  {
    what: 'negative flux',
    record: forcing({ outflows: { stream: changed(stream, 3, -0.3), evap } }),
    code: 'flux-negative',
    path: 'outflows.stream[3]',
    step: 3,
  },
  { what: 'negative inflow', record: forcing({ inflow: changed(base.inflow, 1, -2) }), code: 'flux-negative', path: 'inflow[1]', step: 1 },
  {
    what: 'flux that is NaN',
    record: forcing({ outflows: { stream, evap: changed(evap, 5, NaN) } }),
    code: 'flux-not-finite',
    path: 'outflows.evap[5]',
    step: 5,
  },
  {
    what: 'infinite inflow',
    record: forcing({ inflow: changed(base.inflow, 0, Infinity) }),
    code: 'flux-not-finite',
    path: 'inflow[0]',
    step: 0,
  },
  {
    what: 'lengths that differ',
    record: forcing({ outflows: { stream: stream.slice(1), evap } }),
    code: 'length',
    path: 'outflows.stream',
  },
  {
    what: 'lengths of a tracer',
    record: forcing({ inflowConcentration: { tracer: new Float64Array(4) } }),
    code: 'length',
    path: 'inflowConcentration.tracer',
  },
  {
    what: 'no steps',
    record: {
      ...forcing(),
      inflow: new Float64Array(0),
      outflows: { stream: new Float64Array(0), evap: new Float64Array(0) },
      inflowConcentration: { tracer: new Float64Array(0) },
    },
    code: 'forcing-empty',
    path: 'inflow',
  },
  { what: 'a start without zone', record: forcing({ start: '2001-03-01T00:00:00' }), code: 'forcing-start', path: 'start' },
  { what: 'a step of 0', record: forcing({ stepDays: 0 }), code: 'forcing-step', path: 'stepDays' },
  {
    what: 'a series that is text',
    record: forcing({ outflows: { stream: untyped('1,2,3'), evap } }),
    code: 'forcing-type',
    path: 'outflows.stream',
  },
  { what: 'unknown form', given: withStream({ form: 'gama', shape: 1, scale: 3 }), code: 'selection-form', path: 'selection.stream.form' },
  {
    what: 'parameter out of domain',
    given: withStream({ form: 'gamma', shape: -1, scale: 3 }),
    code: 'parameter-domain',
    path: 'selection.stream.shape',
  },
  { what: 'parameter missing', given: withStream({ form: 'gamma', shape: 1 }), code: 'parameter-type', path: 'selection.stream.scale' },
  { what: 'parameter unknown', given: withStream({ form: 'uniform', width: 3 }), code: 'unknown-field', path: 'selection.stream.width' },
  {
    what: 'parameter in text',
    given: withStream({ form: 'exponential', scale: '30' }),
    code: 'parameter-type',
    path: 'selection.stream.scale',
  },
  {
    what: 'parameter driven out of its domain at some step',
    given: withStream({ form: 'exponential', scale: { driver: 'moisture', at: [0, 1], value: [10, -10] } }),
    record: forcing({ drivers: { moisture: Float64Array.of(0.1, 0.2, 0.3, 0.7, 0.2, 0.1) } }),
    code: 'parameter-domain',
    path: 'selection.stream.scale',
    step: 3,
  },
  {
    what: 'weights driven off 1 at some step',
    given: withStream({
      form: 'mixture',
      parts: [
        { weight: { driver: 'moisture', at: [0, 1], value: [0.5, 1] }, selection: { form: 'uniform' } },
        { weight: 0.5, selection: { form: 'power', exponent: 2 } },
      ],
    }),
    record: forcing({ drivers: { moisture: Float64Array.of(0, 0, 0.4, 0, 0, 0) } }),
    code: 'mixture-weights',
    path: 'selection.stream',
    step: 2,
  },
  {
    what: 'piecewise table that falls',
    given: withStream({ form: 'piecewise', storage: [0, 20, 10], share: [0, 0.5, 1] }),
    code: 'piecewise-table',
    path: 'selection.stream.storage',
  },
  {
    what: 'driver table with places out of order',
    given: withStream({ form: 'exponential', scale: { driver: 'storage', at: [5, 5], value: [1, 2] } }),
    code: 'driver-table',
    path: 'selection.stream.scale.at[1]',
  },
  {
    what: 'selection for an outflow that is not in the forcing',
    record: forcing({ outflows: { stream } }),
    code: 'outflow-missing',
    path: 'outflows.evap',
  },
  {
    what: 'outflow without a selection',
    record: forcing({ outflows: { stream, evap, pumped: stream } }),
    code: 'selection-missing',
    path: 'selection.pumped',
  },
  { what: 'no initial storage', given: catchment({ initialStorage: 0 }), code: 'initial-storage', path: 'initialStorage' },
  {
    what: 'concentration missing on a step with inflow',
    record: forcing({ inflowConcentration: { tracer: changed(base.inflowConcentration.tracer, 2, NaN) } }),
    code: 'concentration-missing',
    path: 'inflowConcentration.tracer[2]',
    step: 2,
  },
  {
    what: 'tracer without a series',
    record: forcing({ inflowConcentration: {} }),
    code: 'concentration-missing',
    path: 'inflowConcentration.tracer',
  },
  {
    what: 'negative decay',
    given: catchment({ tracers: { tracer: { preRecord: 9, decayPerDay: -1 } } }),
    code: 'tracer-rule',
    path: 'tracers.tracer.decayPerDay',
  },
  {
    what: 'carried share above 1',
    given: catchment({ tracers: { tracer: { preRecord: 9, carriedShare: { evap: 2 } } } }),
    code: 'tracer-rule',
    path: 'tracers.tracer.carriedShare.evap',
  },
  { what: 'unknown field of a catchment', given: untyped({ ...catchment(), storage: 3 }), code: 'unknown-field', path: 'storage' },
  { what: 'an age of 0', options: { youngerThan: [7, 0] }, code: 'option', path: 'options.youngerThan[1]' },
  { what: 'a quantile of 1', options: { quantiles: [1] }, code: 'option', path: 'options.quantiles[0]' },
  { what: 'a step after the end', options: { snapshotsAt: [N] }, code: 'option', path: 'options.snapshotsAt[0]' },
  { what: 'half a repeat', options: { spinUp: { repeats: 0.5 } }, code: 'option', path: 'options.spinUp.repeats' },
];

describe('runColumn refuses', () => {
  test.each(cases)('$what: $code at $path', ({ given = catchment(), record = forcing(), options = {}, code, path, step }) => {
    const error = refusal(() => runColumn(given, record, options));
    const issue = error.issues.find((one) => one.path === path && one.code === code);
    expect(issue, JSON.stringify(error.issues)).toBeDefined();
    expect(issue!.step).toBe(step);
    expect(issue!.expected).toBeTruthy();
    expect(issue!.received).toBeTruthy();
    expect(error.message).toContain(path);
  });

  test('storage that would fall to zero, with the step and how much would be needed', () => {
    const record = forcing({ outflows: { stream: Float64Array.of(1, 1, 1, 30, 1, 1), evap } });
    const error = refusal(() => runColumn(catchment({ initialStorage: 20 }), record));
    expect([error.code, error.path, error.step]).toEqual(['storage-empty', 'initialStorage', 3]);
    // by hand: +2, −3, +1, −32, +3, −3 mm: lowest 32 mm below the start
    expect(error.expected).toContain('32.0000 mm');
    expect(error.hint).toBeTruthy();
    runColumn(catchment({ initialStorage: 32.001 }), record);
    expect(refusal(() => runColumn(catchment({ initialStorage: 32 }), record)).code).toBe('storage-empty');
  });

  test('several problems in one batch, the first of them as the error’s own', () => {
    const record = forcing({
      inflow: changed(base.inflow, 0, -1),
      outflows: { stream: changed(stream, 2, NaN), evap: evap.slice(2) },
      stepDays: -1,
    });
    const error = refusal(() => runColumn(catchment({ initialStorage: NaN }), record));
    expect(error.issues.map(({ code }) => code).sort()).toEqual([
      'flux-negative',
      'flux-not-finite',
      'forcing-step',
      'initial-storage',
      'length',
    ]);
    expect([error.code, error.path]).toEqual([error.issues[0].code, error.issues[0].path]);
    const selections = refusal(() => runColumn(withStream({ form: 'beta', a: 0, b: -3 }), forcing()));
    expect(selections.issues.map(({ path }) => path)).toEqual(['selection.stream.a', 'selection.stream.b']);
  });

  test('a driver that does not exist, naming it', () => {
    const given = withStream({ form: 'exponential', scale: { driver: 'moistness', at: [0], value: [10] } });
    const error = refusal(() => runColumn(given, forcing({ drivers: { moisture: new Float64Array(N) } })));
    expect(error.code).toMatch(/^driver/);
    expect(error.message).toContain('moistness');
  });

  test('what was refused is unchanged', () => {
    const record = forcing({ inflow: changed(base.inflow, 0, -1) });
    const [copy, given] = [structuredClone(record), catchment()];
    refusal(() => runColumn(given, record));
    expect(record).toEqual(copy);
    expect(given).toEqual(catchment());
  });
});

describe('resumeColumn refuses', () => {
  const checkpoint = runColumn(catchment(), forcing()).checkpoint();
  const next = forcing({ start: '2001-03-07T00:00:00Z' });
  const altered = (change: Record<string, unknown>): Checkpoint => untyped({ ...structuredClone(checkpoint), ...change });
  const alteredState = (change: Record<string, unknown>): Checkpoint => altered({ state: { ...checkpoint.state, ...change } });

  test('nothing that fits', () => expect(resumeColumn(checkpoint, next).steps).toBe(N));

  test.each([
    ['a time gap', checkpoint, forcing({ start: '2001-03-08T00:00:00Z' }), {}, 'checkpoint-gap', 'start'],
    ['an overlap', checkpoint, forcing({ start: '2001-03-06T00:00:00Z' }), {}, 'checkpoint-overlap', 'start'],
    ['another step', checkpoint, { ...next, stepDays: 0.5 }, {}, 'checkpoint-step', 'stepDays'],
    ['other outflows', checkpoint, { ...next, outflows: { stream } }, {}, 'outflow-missing', 'outflows.evap'],
    ['another age resolution', checkpoint, next, { ageResolution: 0 }, 'checkpoint-options', 'options.ageResolution'],
    ['spin-up', checkpoint, next, { spinUp: { repeats: 1 } }, 'checkpoint-options', 'options.spinUp'],
    ['a newer version', altered({ version: 2 }), next, {}, 'checkpoint-version', 'checkpoint.version'],
    ['something else', untyped<Checkpoint>({ kind: 'other' }), next, {}, 'checkpoint', 'checkpoint'],
    ['no object', untyped<Checkpoint>(null), next, {}, 'checkpoint', 'checkpoint'],
    ['a truncated list', alteredState({ depth: [1] }), next, {}, 'checkpoint', 'checkpoint.state.depth'],
    ['a number that became null', alteredState({ preRecord: null }), next, {}, 'checkpoint', 'checkpoint.state.preRecord'],
    [
      'a catchment with more outflows',
      altered({ catchment: { ...checkpoint.catchment, selection: { ...checkpoint.catchment.selection, third: { form: 'uniform' } } } }),
      { ...next, outflows: { ...next.outflows, third: stream } },
      {},
      'checkpoint',
      'checkpoint.state.lastShare',
    ],
    [
      'a catchment with more tracers',
      altered({ catchment: { ...checkpoint.catchment, tracers: { ...checkpoint.catchment.tracers, more: { preRecord: 1 } } } }),
      next,
      {},
      'checkpoint',
      'checkpoint.state.concentration',
    ],
  ] as [string, Checkpoint, Forcing, RunOptions, string, string][])('%s', (_what, from, record, options, code, path) => {
    const error = refusal(() => resumeColumn(from, record, options));
    expect([error.code, error.path]).toEqual([code, path]);
    expect(error.expected).toBeTruthy();
  });

  test('storage that would fall to zero after the checkpoint', () => {
    const record = { ...next, outflows: { stream: new Float64Array(N).fill(30), evap } };
    expect(refusal(() => resumeColumn(checkpoint, record)).code).toBe('storage-empty');
  });
});
