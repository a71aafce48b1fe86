import type { AgeDistribution, ColumnSnapshot } from '../contract.js';

/**
 * Residence-time distribution: the ages of what is in storage at one moment, P_S(T) = S_T(T) / S.
 * @returns cumulative shares of total storage at both edges of every parcel; the last is 1 − the pre-record share
 */
export function residenceTimes(snapshot: ColumnSnapshot): AgeDistribution & { preRecordShare: number } {
  const age: number[] = [];
  const share: number[] = [];
  let depth = 0;
  for (let i = 0; i < snapshot.depth.length; i++) {
    if (age.length === 0 || snapshot.youngestAge[i] > age[age.length - 1]) {
      age.push(snapshot.youngestAge[i]);
      share.push(depth / snapshot.storage);
    }
    depth += snapshot.depth[i];
    age.push(snapshot.oldestAge[i]);
    share.push(depth / snapshot.storage);
  }
  return {
    ageDays: Float64Array.from(age),
    youngerShare: Float64Array.from(share),
    preRecordShare: snapshot.preRecordDepth / snapshot.storage,
  };
}
