import type { DistributionWithRange } from '@rillage/sdk';
import { fields, firstUnfit, instant, isNumber, orNull, positive, rangeOf, share, slack, text, that, Unfit, type Check } from './fields.js';

/** Increasing ages, shares between 0 and 1 that do not fall, a range around them or none; empty for a step without outflow. */
export const distributionCheck: Check = (value, at) => {
  fields({
    of: text,
    at: instant,
    ageDays: series(Infinity, true),
    youngerShare: series(1, false),
    low: orNull(series(1, false)),
    high: orNull(series(1, false)),
    preRecordShare: share,
    preRecordRange: rangeOf(share),
    recordDays: positive,
  })(value, at);
  const { ageDays, youngerShare, low, high } = value as DistributionWithRange;
  for (const shares of [youngerShare, low, high]) {
    if (shares && shares.length !== ageDays.length) throw new Unfit(`${at}.youngerShare`);
  }
  if ((low === null) !== (high === null)) throw new Unfit(`${at}.low`);
};

/** The value where it is a distribution that can be drawn, else null. */
export function asDistribution(value: unknown): DistributionWithRange | null {
  const found = value && firstUnfit(distributionCheck, value) === null ? (value as DistributionWithRange) : null;
  return found?.ageDays.length ? found : null;
}

const mostValues = 200_000;

function series(most: number, strictly: boolean): Check {
  return (value, at) => {
    that((it) => (Array.isArray(it) || it instanceof Float64Array) && it.length <= mostValues)(value, at);
    const values = value as ArrayLike<unknown>;
    let before = 0;
    for (let index = 0; index < values.length; index++) {
      const here = values[index];
      if (!isNumber(here) || here > most + slack || !(strictly && index ? here > before : here >= before - slack))
        throw new Unfit(`${at}[${index}]`);
      before = here;
    }
  };
}
