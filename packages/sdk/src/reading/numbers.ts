import { type MedianAge, type Range, type ShareYounger } from '../contract.js';
import { type Members } from './members.js';
import { overMembers } from './overMembers.js';

/** Everything a reading says in numbers, for one step, before any rule withholds it. */
export interface StepNumbers {
  /** mm/day */
  flow: number;
  recordDays: number;
  younger: ShareYounger[];
  median: MedianAge | null;
  older: { share: number; range: Range | null };
  assumedShare: number;
}

const LOW = 0.05;
const HIGH = 0.95;

/**
 * The shares, the median and the share older than the record at one step: the middle (weighted median) over the members and, for more
 * than one, their 5–95 % range. While the record is shorter than an age, its share is only known to lie in
 * [share, share + unplaced], and its range spans the low end of the first and the high end of the second.
 * @returns NaN shares where the step has no outflow
 */
export function numbersAt(members: Members, step: number): StepNumbers {
  const { outflows, weights, assessed, stepDays } = members;
  const recordDays = (members.recordSteps - (members.steps - 1 - step)) * stepDays;
  const over = (values: Float64Array, p: number): number => overMembers(values, weights, p);
  const rangeOf = (lows: Float64Array, highs: Float64Array): Range | null =>
    assessed ? { low: over(lows, LOW), high: over(highs, HIGH) } : null;

  const preRecord = Float64Array.from(outflows, (outflow) => bounded(outflow.preRecordShare[step] as number));
  const ages = [...(outflows[0]?.youngerShare.keys() ?? [])]
    .filter((age) => outflows.every((o) => o.youngerShare.has(age)))
    .sort((a, b) => a - b);
  const younger = ages.map((days): ShareYounger => {
    const known = Float64Array.from(outflows, (outflow) => bounded((outflow.youngerShare.get(days) as Float64Array)[step] as number));
    const short = recordDays < days * (1 - 1e-9);
    const upper = short ? known.map((value, i) => bounded(value + (preRecord[i] as number))) : known;
    const share = over(known, 0.5);
    return { days, share, unplaced: short ? Math.max(0, over(upper, 0.5) - share) : 0, range: rangeOf(known, upper) };
  });

  return {
    flow: over(
      Float64Array.from(outflows, (outflow) => outflow.flow[step] as number),
      0.5,
    ),
    recordDays,
    younger,
    median: medianAt(members, step, recordDays),
    older: { share: over(preRecord, 0.5), range: rangeOf(preRecord, preRecord) },
    assumedShare: over(
      Float64Array.from(outflows, (outflow) => bounded(outflow.assumedShare[step] as number)),
      0.5,
    ),
  };
}

/** Median age over the members. An age beyond the record counts as the record's own, which none exceeds, and is flagged wherever it decides. */
function medianAt({ outflows, weights, assessed }: Members, step: number, recordDays: number): MedianAge | null {
  if (!outflows.every((outflow) => outflow.quantiles.has(0.5))) return null;
  const days = new Float64Array(outflows.length);
  let beyondWeight = 0;
  outflows.forEach((outflow, i) => {
    const quantile = outflow.quantiles.get(0.5) as { days: Float64Array; beyondRecord: Uint8Array };
    const beyond = quantile.beyondRecord[step] === 1;
    if (beyond) beyondWeight += weights[i] as number;
    days[i] = beyond ? recordDays : (quantile.days[step] as number);
  });
  const middle = overMembers(days, weights, 0.5);
  if (!Number.isFinite(middle)) return null;
  return {
    days: middle,
    beyondRecord: beyondWeight >= 0.5,
    range: assessed
      ? {
          low: overMembers(days, weights, LOW),
          high: overMembers(days, weights, HIGH),
          highBeyondRecord: beyondWeight >= 1 - HIGH,
        }
      : null,
  };
}

/** Rounding may leave a share outside 0..1 by some 1e-16; NaN stays NaN. */
function bounded(share: number): number {
  return Math.min(1, Math.max(0, share));
}
