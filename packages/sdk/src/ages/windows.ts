import type { AgeDistribution, ColumnRun } from '../contract.js';
import { RillageError } from '../errors.js';

export interface WindowOptions {
  /** First step of the window. Default 0. */
  from?: number;
  /** Step after the last. Default the number of steps. */
  to?: number;
  /** `flow`: every mm of outflow counts the same. `time`: every step with outflow does. Default `flow`. */
  weight?: 'flow' | 'time';
}

export interface WindowShare {
  /** Share known to be younger, 0..1; NaN without outflow in the window. */
  younger: number;
  /** Share from pre-record water: where the record is shorter than the age, the truth lies in [younger, younger + preRecord]. */
  preRecord: number;
  /** mm of outflow in the window. */
  outflow: number;
}

/**
 * Share of an outflow younger than an age, over a window: Σ w_k P_k(T) / Σ w_k with w_k the outflow (or 1).
 * @param days an age that the run was asked for in `youngerThan`
 * @throws RillageError `window` for an outflow or age the run does not hold, or an empty window
 */
export function shareOver(run: ColumnRun, outflow: string, days: number, options: WindowOptions = {}): WindowShare {
  const series = run.outflows[outflow]?.youngerShare.get(days);
  if (series === undefined) {
    throw new RillageError({
      code: 'window',
      path: `outflows.${outflow}.youngerShare`,
      expected: `an outflow of the run, and an age among ${[...(run.outflows[outflow]?.youngerShare.keys() ?? [])].join(', ') || 'those asked for'}`,
      received: `${outflow}, ${days} days`,
      hint: 'Name the age in the option youngerThan of the run.',
    });
  }
  const { from, to } = checkedWindow(run, options);
  const { flow, preRecordShare } = run.outflows[outflow];
  let weight = 0;
  let younger = 0;
  let old = 0;
  let outflowed = 0;
  for (let k = from; k < to; k++) {
    if (!(flow[k] > 0)) continue;
    const w = options.weight === 'time' ? 1 : flow[k];
    weight += w;
    younger += w * series[k];
    old += w * preRecordShare[k];
    outflowed += flow[k] * run.stepDays;
  }
  return { younger: younger / weight, preRecord: old / weight, outflow: outflowed };
}

/**
 * Age distribution of an outflow over a window, averaged over the steps whose distributions the run kept.
 * @returns cumulative shares at every age at which one of them has a point; the last value is 1 − the mean pre-record share
 * @throws RillageError `window` if no distribution with outflow was kept in the window
 */
export function distributionOver(run: ColumnRun, outflow: string, options: WindowOptions = {}): AgeDistribution {
  const { from, to } = checkedWindow(run, options);
  const out = run.outflows[outflow];
  const kept = [...(out?.distributions ?? [])].filter(([step]) => step >= from && step < to && out.flow[step] > 0);
  if (kept.length === 0) {
    throw new RillageError({
      code: 'window',
      path: `outflows.${outflow}.distributions`,
      expected: `at least one kept distribution in steps ${from} to ${to - 1}`,
      received: 'none',
      hint: 'Name the steps in the option distributionsAt of the run.',
    });
  }
  const ageDays = Float64Array.from([...new Set(kept.flatMap(([, distribution]) => [...distribution.ageDays]))].sort((a, b) => a - b));
  const youngerShare = new Float64Array(ageDays.length);
  let weight = 0;
  for (const [step, distribution] of kept) {
    const w = options.weight === 'time' ? 1 : out.flow[step];
    weight += w;
    ageDays.forEach((age, index) => (youngerShare[index] += w * shareAt(distribution, age)));
  }
  return { ageDays, youngerShare: youngerShare.map((share) => share / weight) };
}

/** Cumulative share at an age: linear between points, 0 before the first, the last value beyond the last. */
export function shareAt({ ageDays, youngerShare }: AgeDistribution, days: number): number {
  const last = ageDays.length - 1;
  if (last < 0 || days < ageDays[0]) return 0;
  if (days >= ageDays[last]) return youngerShare[last];
  let low = 0;
  let high = last;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (ageDays[middle] <= days) low = middle;
    else high = middle;
  }
  const width = ageDays[high] - ageDays[low];
  return width > 0 ? youngerShare[low] + ((days - ageDays[low]) / width) * (youngerShare[high] - youngerShare[low]) : youngerShare[high];
}

function checkedWindow(run: ColumnRun, options: WindowOptions): { from: number; to: number } {
  const from = options.from ?? 0;
  const to = options.to ?? run.steps;
  if (!(Number.isInteger(from) && Number.isInteger(to) && from >= 0 && to <= run.steps && from < to)) {
    throw new RillageError({
      code: 'window',
      path: 'options',
      expected: `whole steps, from below to, within 0 to ${run.steps}`,
      received: `${from} to ${to}`,
    });
  }
  return { from, to };
}
