import type { FollowedInflow } from '../contract.js';

export interface ForwardDistribution {
  /** [K] days since the middle of the step in which it entered, at the end of each step. */
  sinceDays: Float64Array;
  /** By outflow: [K] share of what entered that has left with it by then. */
  left: Record<string, Float64Array>;
  /** [K] share still in storage. */
  stored: Float64Array;
  /** By outflow: share of what entered that left with it while it was followed; what is still stored belongs to none. */
  partition: Record<string, number>;
}

/**
 * Forward distribution of one step's inflow (Niemi 1977, J. Hydrol. 33, 275): where it went, and when. At every step the shares that left
 * and the share still stored add up to 1.
 * @param followed of a run with that step in `followInflowOf`; NaN throughout where nothing entered
 */
export function forwardDistribution(followed: FollowedInflow, stepDays: number): ForwardDistribution {
  const { entered, left, stored } = followed;
  const share = (amounts: Float64Array): Float64Array => amounts.map((mm) => mm / entered);
  const shares = Object.fromEntries(Object.entries(left).map(([name, amounts]) => [name, share(amounts)]));
  return {
    sinceDays: Float64Array.from(stored, (_value, k) => (k + 0.5) * stepDays),
    left: shares,
    stored: share(stored),
    partition: Object.fromEntries(Object.entries(shares).map(([name, amounts]) => [name, amounts[amounts.length - 1]])),
  };
}
