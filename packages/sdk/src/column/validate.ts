import type { Catchment, Forcing, RunOptions, TracerRule } from '../contract.js';
import { shorten, throwIfAny, type Issue } from '../errors.js';
import type { SelectionEvaluator } from '../selection/index.js';

const MOST_ISSUES = 100;
const ISO_INSTANT = /^\d{4}-\d{2}-\d{2}T\d{2}:\d{2}(:\d{2}(\.\d+)?)?(Z|[+-]\d{2}:\d{2})$/;
const CATCHMENT_FIELDS = ['initialStorage', 'selection', 'tracers', 'wetnessRange'];
const TRACER_FIELDS = ['preRecord', 'carriedShare', 'decayPerDay', 'equilibrium'];
const OPTION_FIELDS = ['ageResolution', 'youngerThan', 'quantiles', 'distributionsAt', 'snapshotsAt', 'followInflowOf', 'spinUp'];

/** Milliseconds since 1970; NaN unless the text is an ISO 8601 instant with its zone. */
export function parseInstant(text: unknown): number {
  return typeof text === 'string' && ISO_INSTANT.test(text) ? Date.parse(text) : NaN;
}

function note(issues: Issue[], code: string, path: string, expected: string, received: unknown): void {
  issues.push({ code, path, expected, received: shorten(received ?? 'nothing') });
}

/** Problems of a forcing by itself: start, step, lengths, fluxes. At most a hundred. */
export function describeForcing(forcing: Forcing): Issue[] {
  const issues: Issue[] = [];
  if (typeof forcing !== 'object' || forcing === null) {
    return [{ code: 'forcing-type', path: 'forcing', expected: 'a forcing', received: shorten(forcing) }];
  }
  if (Number.isNaN(parseInstant(forcing.start))) {
    note(issues, 'forcing-start', 'start', 'an ISO 8601 instant with its zone, like 2015-10-01T00:00:00Z', forcing.start);
  }
  if (!(Number.isFinite(forcing.stepDays) && forcing.stepDays > 0)) {
    note(issues, 'forcing-step', 'stepDays', 'a finite number of days above 0', forcing.stepDays);
  }
  const steps = isNumberList(forcing.inflow) ? forcing.inflow.length : -1;
  if (steps === 0) note(issues, 'forcing-empty', 'inflow', 'at least one step', 'none');
  describeFlux(forcing.inflow, 'inflow', steps, 'outflow', issues);
  const groups = [
    ['outflows', forcing.outflows],
    ['inflowConcentration', forcing.inflowConcentration],
    ['drivers', forcing.drivers ?? {}],
  ] as const;
  for (const [group, series] of groups) {
    if (typeof series !== 'object' || series === null) {
      note(issues, 'forcing-type', group, 'series by name', series);
      continue;
    }
    for (const name of Object.keys(series)) {
      if (group === 'outflows') describeFlux(series[name], `outflows.${name}`, steps, 'inflow', issues);
      else describeLength(series[name], `${group}.${name}`, steps, issues);
    }
  }
  return issues.slice(0, MOST_ISSUES);
}

function isNumberList(list: unknown): list is ArrayLike<number> {
  return (
    list instanceof Float64Array ||
    list instanceof Float32Array ||
    (Array.isArray(list) && list.every((value) => typeof value === 'number'))
  );
}

function describeLength(list: unknown, path: string, steps: number, issues: Issue[]): boolean {
  if (!isNumberList(list)) {
    issues.push({ code: 'forcing-type', path, expected: 'a Float64Array', received: shorten(list ?? 'nothing', 40) });
    return false;
  }
  if (steps >= 0 && list.length !== steps) {
    note(issues, 'length', path, `${steps} values, as many as inflow has`, list.length);
    return false;
  }
  return true;
}

function describeFlux(list: unknown, path: string, steps: number, other: string, issues: Issue[]): void {
  if (!describeLength(list, path, steps, issues)) return;
  const flux = list as ArrayLike<number>;
  for (let k = 0; k < flux.length && issues.length < MOST_ISSUES; k++) {
    if (flux[k] >= 0 && flux[k] < Infinity) continue;
    const at = { path: `${path}[${k}]`, step: k, expected: 'a finite flux of 0 mm/day or more', received: `${flux[k]} mm/day` };
    if (flux[k] < 0) issues.push({ code: 'flux-negative', ...at, hint: `A flux cannot be negative. If it means ${other}, add it there.` });
    else issues.push({ code: 'flux-not-finite', ...at, hint: 'Settle gaps before the run; readForcing names its rules for that.' });
  }
}

/** Problems of a catchment by itself, but for its selections, which their own room compiles. */
export function describeCatchment(catchment: Catchment): Issue[] {
  const issues: Issue[] = [];
  if (typeof catchment !== 'object' || catchment === null) {
    return [{ code: 'catchment-type', path: 'catchment', expected: 'a catchment', received: shorten(catchment) }];
  }
  describeFields(catchment, CATCHMENT_FIELDS, '', issues);
  if (!(Number.isFinite(catchment.initialStorage) && catchment.initialStorage > 0)) {
    note(issues, 'initial-storage', 'initialStorage', 'a finite number of mm above 0', catchment.initialStorage);
  }
  if (typeof catchment.selection !== 'object' || catchment.selection === null || Object.keys(catchment.selection).length === 0) {
    note(issues, 'selection-missing', 'selection', 'one selection for each outflow', catchment.selection);
  }
  const range = catchment.wetnessRange;
  if (range !== undefined && !(Array.isArray(range) && range.length === 2 && range.every(Number.isFinite) && range[0] < range[1])) {
    note(issues, 'wetness-range', 'wetnessRange', '[low, high] in mm, low below high', range);
  }
  for (const [name, rule] of Object.entries(catchment.tracers ?? {})) describeTracer(rule, `tracers.${name}`, catchment, issues);
  return issues;
}

function describeFields(data: object, known: readonly string[], path: string, issues: Issue[]): void {
  for (const key of Object.keys(data)) {
    if (known.includes(key)) continue;
    note(issues, 'unknown-field', path ? `${path}.${key}` : key, `one of ${known.join(', ')}`, key);
  }
}

function describeTracer(rule: TracerRule, path: string, catchment: Catchment, issues: Issue[]): void {
  if (typeof rule !== 'object' || rule === null) {
    note(issues, 'tracer-rule', path, 'a tracer rule', rule);
    return;
  }
  describeFields(rule, TRACER_FIELDS, path, issues);
  const need = (good: boolean, field: string, expected: string, received: unknown): void => {
    if (!good) note(issues, 'tracer-rule', `${path}.${field}`, expected, received);
  };
  const rate = (value: unknown): boolean => typeof value === 'number' && Number.isFinite(value) && value >= 0;
  need(Number.isFinite(rule.preRecord), 'preRecord', 'a finite concentration', rule.preRecord);
  if (rule.decayPerDay !== undefined) need(rate(rule.decayPerDay), 'decayPerDay', 'a finite rate of 0 or more', rule.decayPerDay);
  if (rule.equilibrium !== undefined) {
    const { concentration, ratePerDay } = rule.equilibrium ?? {};
    need(Number.isFinite(concentration), 'equilibrium.concentration', 'a finite concentration', concentration);
    need(rate(ratePerDay), 'equilibrium.ratePerDay', 'a finite rate of 0 or more', ratePerDay);
  }
  for (const [outflow, share] of Object.entries(rule.carriedShare ?? {})) {
    const field = `carriedShare.${outflow}`;
    need(Object.hasOwn(catchment.selection ?? {}, outflow), field, 'the name of an outflow', outflow);
    need(typeof share === 'number' && share >= 0 && share <= 1, field, 'a share from 0 to 1', share);
  }
}

/** Problems of a forcing and a catchment together: names on both sides, tracers on steps with inflow, drivers that exist. */
export function describeTogether(forcing: Forcing, catchment: Catchment): Issue[] {
  const issues: Issue[] = [];
  const { selection } = catchment;
  const { outflows } = forcing;
  for (const name of new Set([...Object.keys(outflows), ...Object.keys(selection)])) {
    const given = Object.hasOwn(outflows, name);
    if (given && Object.hasOwn(selection, name)) continue;
    issues.push({
      code: given ? 'selection-missing' : 'outflow-missing',
      path: `${given ? 'selection' : 'outflows'}.${name}`,
      expected: `as much as ${given ? 'outflows' : 'selection'} has under ${shorten(name)}`,
      received: 'nothing',
      hint: 'forcing.outflows and catchment.selection are keyed by the same names.',
    });
  }
  for (const name of Object.keys(catchment.tracers ?? {})) describeInput(forcing, name, issues);
  return issues.slice(0, MOST_ISSUES);
}

function describeInput(forcing: Forcing, name: string, issues: Issue[]): void {
  const path = `inflowConcentration.${name}`;
  const series = Object.hasOwn(forcing.inflowConcentration, name) ? forcing.inflowConcentration[name] : undefined;
  if (series === undefined) {
    note(issues, 'concentration-missing', path, 'a series for each tracer of the catchment', 'none');
    return;
  }
  for (let k = 0; k < series.length && issues.length < MOST_ISSUES; k++) {
    if (forcing.inflow[k] > 0 && !Number.isFinite(series[k])) {
      issues.push({
        code: 'concentration-missing',
        path: `${path}[${k}]`,
        step: k,
        expected: 'a finite concentration on every step with inflow',
        received: String(series[k]),
        hint: 'Fill rain concentrations from bulk samples before the run.',
      });
    }
  }
}

export function describeDrivers(evaluator: SelectionEvaluator, forcing: Forcing): Issue[] {
  const known = ['storage', 'storageAnomaly', 'wetness', 'season'];
  const issues: Issue[] = [];
  for (const driver of evaluator.drivers) {
    if (known.includes(driver)) continue;
    if (driver === 'discharge' ? Object.hasOwn(forcing.outflows, 'discharge') : Object.hasOwn(forcing.drivers ?? {}, driver)) continue;
    issues.push({
      code: 'driver-missing',
      path: driver === 'discharge' ? 'outflows.discharge' : `drivers.${driver}`,
      expected: 'a series for the driver that a parameter names',
      received: 'none',
    });
  }
  return issues;
}

export function describeOptions(options: RunOptions, steps: number): Issue[] {
  if (typeof options !== 'object' || options === null)
    return [{ code: 'option', path: 'options', expected: 'options by name', received: shorten(options) }];
  const issues: Issue[] = [];
  describeFields(options, OPTION_FIELDS, 'options', issues);
  const each = (
    key: 'youngerThan' | 'quantiles' | 'distributionsAt' | 'snapshotsAt' | 'followInflowOf',
    good: (value: number) => boolean,
    words: string,
  ): void => {
    const list: unknown = options[key];
    if (list === undefined) return;
    if (!Array.isArray(list)) note(issues, 'option', `options.${key}`, `a list of ${words}`, list);
    else
      list.forEach((value, index) => {
        if (typeof value !== 'number' || !good(value)) note(issues, 'option', `options.${key}[${index}]`, words, value);
      });
  };
  const isStep = (value: number): boolean => Number.isInteger(value) && value >= 0 && value < steps;
  each('youngerThan', (value) => value > 0 && value < Infinity, 'ages in days above 0');
  each('quantiles', (value) => value > 0 && value < 1, 'probabilities between 0 and 1');
  for (const key of ['distributionsAt', 'snapshotsAt', 'followInflowOf'] as const) each(key, isStep, `step indices from 0 to ${steps - 1}`);
  const resolution = options.ageResolution;
  if (resolution !== undefined && !(resolution >= 0 && resolution <= 0.5))
    note(issues, 'option', 'options.ageResolution', 'a number from 0 to 0.5', resolution);
  const repeats = options.spinUp?.repeats;
  if (options.spinUp !== undefined && !(Number.isInteger(repeats) && Number(repeats) >= 0 && Number(repeats) <= 1000))
    note(issues, 'option', 'options.spinUp.repeats', 'a whole number from 0 to 1000', repeats);
  return issues;
}

/** Throws unless storage stays above 0 through the record; says where it would end and how much would be needed at its start. */
export function requireStorage(forcing: Forcing, atStart: number): void {
  let storage = atStart;
  let lowest = Infinity;
  let first = -1;
  const outflows = Object.values(forcing.outflows);
  for (let k = 0; k < forcing.inflow.length; k++) {
    let rate = forcing.inflow[k];
    for (const flux of outflows) rate -= flux[k];
    storage += rate * forcing.stepDays;
    if (storage <= 0 && first < 0) first = k;
    if (storage < lowest) lowest = storage;
  }
  if (first < 0) return;
  const needed = atStart - lowest;
  throwIfAny([
    {
      code: 'storage-empty',
      path: 'initialStorage',
      step: first,
      expected: `more than ${needed.toPrecision(6)} mm in storage at the start`,
      received: `${atStart.toPrecision(6)} mm`,
      hint: 'Either the balance runs storage down (check units, area, evapotranspiration), or initial storage is too small.',
    },
  ]);
}
