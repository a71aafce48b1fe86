import { RillageError } from '../errors.js';

const DAY_MS = 86_400_000;
/** Half a second: instants that differ by less are the same. */
const SAME_MS = 500;

/** Milliseconds since 1970 of an ISO 8601 instant with its zone, or of a date, which begins at 00:00 UTC. */
export function instantMs(text: string, path: string): number {
  const known = /^\d{4}-\d{2}-\d{2}(T\d{2}:\d{2}(:\d{2}(\.\d+)?)?(Z|[+-]\d{2}:\d{2}))?$/.test(text);
  const value = known ? Date.parse(text) : NaN;
  if (!Number.isFinite(value)) {
    throw new RillageError({ code: 'time', path, expected: 'an ISO 8601 instant with its zone, as 2025-03-31T00:00:00Z', received: text });
  }
  return value;
}

/** The instant as ISO 8601 in UTC; whole seconds are written without a fraction. */
export function instantText(ms: number): string {
  return new Date(Math.round(ms)).toISOString().replace('.000Z', 'Z');
}

/** ISO instant at which a step ends. */
export function stepEnd(start: string, stepDays: number, step: number): string {
  return instantText(instantMs(start, 'start') + (step + 1) * stepDays * DAY_MS);
}

/**
 * The step that a moment names: an instant names the step that ends there or that it lies in; a bare date names the last step whose
 * middle lies on that day.
 * @throws RillageError 'at-outside' where no step is there
 */
export function stepOf(at: string | undefined, run: { start: string; stepDays: number; steps: number }): number {
  const last = run.steps - 1;
  if (last < 0) throw new RillageError({ code: 'at-outside', path: 'at', expected: 'a run of at least one step', received: '0 steps' });
  if (at === undefined) return last;
  const start = instantMs(run.start, 'start');
  const step = run.stepDays * DAY_MS;
  const moment = instantMs(at, 'at');
  const found =
    at.length === 10 ? Math.ceil((moment + DAY_MS - SAME_MS - start) / step - 0.5) - 1 : Math.ceil((moment - SAME_MS - start) / step) - 1;
  const onItsDay = at.length > 10 || start + (found + 0.5) * step >= moment;
  if (found < 0 || found > last || !onItsDay) {
    throw new RillageError({
      code: 'at-outside',
      path: 'at',
      expected: `a moment between ${run.start} and ${stepEnd(run.start, run.stepDays, last)}`,
      received: at,
    });
  }
  return found;
}

/** The moment whose calendar day is the step's own: its middle. A step from 09:00 to 09:00 belongs to the day it began on. */
export function stepMiddleMs(at: string, stepDays: number): number {
  return instantMs(at, 'at') - (stepDays * DAY_MS) / 2;
}

/** Days between two ISO instants. */
export function daysBetween(from: string, to: string): number {
  return (instantMs(to, 'to') - instantMs(from, 'from')) / DAY_MS;
}
