import { type AgeDistribution, type DistributionWithRange } from '../contract.js';
import { type Members } from './members.js';
import { overMembers, rangeOverMembers } from './overMembers.js';
import { stepEnd } from './readingTime.js';

/** Points kept of a distribution: enough for any picture, few enough for a file. */
const MOST_POINTS = 240;

/**
 * The age distribution of the outflow at a step whose whole distribution the runs kept; over weighted runs the middle and the 5–95 % range of
 * the cumulative share at each age.
 * @returns empty arrays where the step had no outflow or its distribution was not kept
 */
export function distributionAt(members: Members, step: number): DistributionWithRange {
  const { outflows, weights, assessed, stepDays } = members;
  const recordDays = (members.recordSteps - (members.steps - 1 - step)) * stepDays;
  const kept = outflows.map((outflow) => outflow.distributions.get(step)).filter((distribution) => distribution !== undefined);
  const preRecord = Float64Array.from(outflows, (outflow) => outflow.preRecordShare[step] as number);
  const complete = kept.length === outflows.length && kept.every(({ ageDays }) => ageDays.length > 0) && preRecord.every(Number.isFinite);
  const ageDays = complete ? commonAges(kept, stepDays, recordDays) : new Float64Array(0);

  const low = new Float64Array(ageDays.length);
  const middle = new Float64Array(ageDays.length);
  const high = new Float64Array(ageDays.length);
  const values = new Float64Array(kept.length);
  ageDays.forEach((age, i) => {
    kept.forEach((distribution, m) => (values[m] = shareAt(distribution, age)));
    [low[i], middle[i], high[i]] = rangeOverMembers(values, weights);
  });
  return {
    of: members.of,
    at: stepEnd(members.start, stepDays, step),
    ageDays,
    youngerShare: middle,
    low: assessed ? low : null,
    high: assessed ? high : null,
    preRecordShare: complete ? overMembers(preRecord, weights, 0.5) : 0,
    preRecordRange:
      assessed && complete ? { low: overMembers(preRecord, weights, 0.05), high: overMembers(preRecord, weights, 0.95) } : null,
    recordDays,
  };
}

/** A lone run's own ages where they are few enough; else ages that grow by a constant factor, from one step to the record's length. */
function commonAges(kept: readonly AgeDistribution[], stepDays: number, recordDays: number): Float64Array {
  const only = kept.length === 1 ? kept[0] : undefined;
  if (only && only.ageDays.length <= MOST_POINTS) return Float64Array.from(only.ageDays);
  const first = Math.min(stepDays, recordDays) / 4;
  return Float64Array.from({ length: MOST_POINTS }, (_, i) =>
    i === MOST_POINTS - 1 ? recordDays : first * (recordDays / first) ** (i / (MOST_POINTS - 1)),
  );
}

/** Linear between the distribution's points, from (0, 0), level beyond its last. */
function shareAt({ ageDays, youngerShare }: AgeDistribution, age: number): number {
  let low = 0;
  let high = ageDays.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((ageDays[middle] as number) < age) low = middle + 1;
    else high = middle;
  }
  if (low === ageDays.length) return youngerShare[low - 1] as number;
  const fromAge = low === 0 ? 0 : (ageDays[low - 1] as number);
  const fromShare = low === 0 ? 0 : (youngerShare[low - 1] as number);
  const toAge = ageDays[low] as number;
  const toShare = youngerShare[low] as number;
  return toAge > fromAge ? fromShare + ((toShare - fromShare) * (age - fromAge)) / (toAge - fromAge) : toShare;
}
