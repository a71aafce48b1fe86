import { RillageError } from '../errors.js';

/** What a value, not the shape of a catchment, can be refused for: storage that runs out, a parameter outside its domain. */
const CODES = new Set(['storage-empty', 'parameter-domain', 'mixture-weights', 'initial-storage', 'tracer-rule']);

/** Whether a run failed because a prior reaches where the model does not: an impossible point, not a mistake. */
export function isBeyondModel(error: unknown): boolean {
  return error instanceof RillageError && error.issues.every(({ code }) => CODES.has(code));
}
