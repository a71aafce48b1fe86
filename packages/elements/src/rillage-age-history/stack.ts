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

/** A piece of the stack: one step, or several where there are more than can be told apart. */
export interface Piece {
  /** Middle, in steps. */
  at: number;
  /** Mean over the piece, mm/day. */
  flow: number;
  /** Weighted by flow; null without outflow. */
  shares: number[] | null;
}

/** Steps in a piece so that it is at least three pixels wide. */
export const stepsAPiece = (from: number, to: number, pixels: number): number => Math.max(1, Math.ceil((3 * (to - from)) / pixels));

/**
 * A window in pieces of equally many steps, each with its mean flow and that water's own ages, so that areas are amounts of water.
 * @param from, to  first step and one past the last
 */
export function piecesOf(history: StationHistory, from: number, to: number, each: number): Piece[] {
  const pieces: Piece[] = [];
  for (let first = from; first < to; first += each) {
    const last = Math.min(to, first + each);
    let flow = 0;
    let sums: number[] | null = null;
    for (let step = first; step < last; step++) {
      const shares = sharesAt(history, step);
      if (!shares) continue;
      const here = history.flow[step]!;
      flow += here;
      sums ??= shares.map(() => 0);
      shares.forEach((share, band) => (sums![band]! += share * here));
    }
    pieces.push({ at: (first + last - 1) / 2, flow: flow / (last - first), shares: sums && sums.map((sum) => sum / flow) });
  }
  return pieces;
}

/**
 * Steps to draw of a line: all of them where they have room, else the highest and the lowest of each pixel in their order.
 * @param from, to  first step and one past the last
 */
export function stepsToDraw(values: (number | null)[], from: number, to: number, pixels: number): number[] {
  const count = to - from;
  if (count <= 2 * pixels) return Array.from({ length: count }, (_, index) => from + index);
  const steps: number[] = [];
  for (let pixel = 0; pixel < pixels; pixel++) {
    const first = from + Math.floor((pixel * count) / pixels);
    const last = from + Math.floor(((pixel + 1) * count) / pixels);
    let [high, low] = [first, first];
    for (let step = first; step < last; step++) {
      if ((values[step] ?? -Infinity) > (values[high] ?? -Infinity)) high = step;
      if ((values[step] ?? Infinity) < (values[low] ?? Infinity)) low = step;
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
