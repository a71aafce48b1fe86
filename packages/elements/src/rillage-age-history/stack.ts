import type { StationHistory } from '@rillage/sdk';
import { ageClass } from '../shared/age-ramp.js';

/** One class of age in the stack, the youngest first. */
export interface AgeBand {
  /** Days; null: from before the record. */
  from: number | null;
  /** Days; null: no upper limit within the record. */
  to: number | null;
  /** `age-1` to `age-6`; empty for pre-record water, which is hatched. */
  className: string;
}

/** Classes between the limits that the history keeps, youngest first, pre-record water last. */
export function bandsOf(history: StationHistory): AgeBand[] {
  const limits = limitsOf(history);
  const bands = limits.map((to, index): AgeBand => ({ from: index ? limits[index - 1]! : 0, to, className: `age-${ageClass(to)}` }));
  const oldest = limits[limits.length - 1] ?? 0;
  return [...bands, { from: oldest, to: null, className: `age-${ageClass(oldest + 1)}` }, { from: null, to: null, className: '' }];
}

/**
 * Shares of one step by class, as {@link bandsOf} orders them, adding up to one; null without outflow. What the record is too short to place
 * is part of the pre-record water.
 */
export function sharesAt(history: StationHistory, step: number): number[] | null {
  const beyond = history.preRecordShare[step];
  if (beyond === null || beyond === undefined || !(history.flow[step]! > 0)) return null;
  const shares: number[] = [];
  let reached = 0;
  for (const limit of limitsOf(history)) {
    const younger = Math.max(reached, Math.min(1, history.younger[limit]![step] ?? reached));
    shares.push(younger - reached);
    reached = younger;
  }
  const older = Math.max(0, 1 - reached - beyond);
  return [...shares, older, Math.max(0, 1 - reached - older)];
}

export function limitsOf({ younger }: StationHistory): number[] {
  let limits = kept.get(younger);
  if (!limits) {
    limits = Object.keys(younger)
      .map(Number)
      .sort((a, b) => a - b);
    kept.set(younger, limits);
  }
  return limits;
}

/**
 * Steps to draw of a window: all of them where they have room, else the highest and the lowest flow of each pixel in their order, so that
 * no flood and no drought is lost and each keeps its own ages.
 * @param from, to  first step and one past the last
 */
export function stepsToDraw(flow: (number | null)[], from: number, to: number, pixels: number): number[] {
  const count = to - from;
  if (count <= 2 * pixels) return Array.from({ length: count }, (_, index) => from + index);
  const steps: number[] = [];
  for (let pixel = 0; pixel < pixels; pixel++) {
    const first = from + Math.floor((pixel * count) / pixels);
    const last = from + Math.floor(((pixel + 1) * count) / pixels);
    let [high, low] = [first, first];
    for (let step = first; step < last; step++) {
      if ((flow[step] ?? 0) > (flow[high] ?? 0)) high = step;
      if ((flow[step] ?? 0) < (flow[low] ?? 0)) low = step;
    }
    if (high === low) steps.push(high);
    else steps.push(Math.min(high, low), Math.max(high, low));
  }
  return steps;
}

/** Steps at which the cursor stops and the table has a row: all, or evenly spaced ones where there are more than about a year of them. */
export function stopsOf(from: number, to: number, most = 366): number[] {
  const stride = Math.max(1, Math.ceil((to - from) / most));
  return Array.from({ length: Math.ceil((to - from) / stride) }, (_, index) => from + index * stride);
}

const kept = new WeakMap<object, number[]>();
