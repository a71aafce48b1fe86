import { type Catchment, type ColumnRun, type OutflowAges, type ReadingSource, type WeightedRun } from '../contract.js';
import { RillageError } from '../errors.js';
import { instantMs, instantText } from './readingTime.js';

/** A reading's source made regular: runs over the same steps, weights that add up to 1, and what they share. */
export interface Members {
  runs: readonly ColumnRun[];
  weights: Float64Array;
  /** More than one: ranges can be given. */
  assessed: boolean;
  of: string;
  outflows: readonly OutflowAges[];
  start: string;
  stepDays: number;
  steps: number;
  /** ISO instant at which the record began; before `start` when the run was resumed. */
  recordStart: string;
  /** Steps from the record's start to the end of the runs. */
  recordSteps: number;
  /** The first member's. */
  catchment: Catchment;
}

/**
 * @param of the outflow to speak of; by default `discharge`, or the only one
 * @throws RillageError 'no-run', 'weights', 'runs-differ', 'unknown-outflow'
 */
export function readMembers(source: ReadingSource, of?: string): Members {
  const weighted: readonly WeightedRun[] = isEnsemble(source) ? source : [{ weight: 1, run: source }];
  const first = weighted[0]?.run;
  if (!first) throw new RillageError({ code: 'no-run', expected: 'a run, or at least one run with its weight', received: 'none' });

  let total = 0;
  weighted.forEach(({ weight, run }, i) => {
    if (!(weight >= 0 && Number.isFinite(weight))) {
      throw new RillageError({ code: 'weights', path: `source[${i}].weight`, expected: 'a weight of 0 or more', received: String(weight) });
    }
    if (run.start !== first.start || run.stepDays !== first.stepDays || run.steps !== first.steps) {
      throw new RillageError({
        code: 'runs-differ',
        path: `source[${i}].run`,
        expected: `${first.steps} steps from ${first.start}`,
        received: `${run.steps} steps from ${run.start}`,
      });
    }
    total += weight;
  });
  if (!(total > 0))
    throw new RillageError({ code: 'weights', path: 'source', expected: 'weights that add up to more than 0', received: String(total) });

  // Weights that add up to 1 already are left as they are, so that a stored station gives the same bits as a new one.
  const scale = Math.abs(total - 1) < 1e-9 ? 1 : total;
  const named = of ?? defaultOutflow(Object.keys(first.outflows));
  const outflows = weighted.map(({ run }) => {
    if (!Object.hasOwn(run.outflows, named)) {
      throw new RillageError({
        code: 'unknown-outflow',
        path: 'of',
        expected: `one of ${Object.keys(run.outflows).join(', ')}`,
        received: named,
      });
    }
    return run.outflows[named] as OutflowAges;
  });
  const checkpoint = first.checkpoint();
  return {
    runs: weighted.map(({ run }) => run),
    weights: Float64Array.from(weighted, ({ weight }) => weight / scale),
    assessed: weighted.length > 1,
    of: named,
    outflows,
    start: first.start,
    stepDays: first.stepDays,
    steps: first.steps,
    recordStart: instantText(instantMs(checkpoint.recordStart, 'recordStart')),
    recordSteps: checkpoint.steps,
    catchment: checkpoint.catchment,
  };
}

function isEnsemble(source: ReadingSource): source is readonly WeightedRun[] {
  return Array.isArray(source);
}

function defaultOutflow(names: readonly string[]): string {
  return names.length === 1 ? (names[0] as string) : 'discharge';
}
