import type { Forcing, Sample } from '../contract.js';

/** Steps of a sample's interval with the share of each that lies in it; a grab sample stands for its step. */
export interface SampleWindow {
  first: number;
  weights: number[];
}

/** @param sample  inside the record */
export function windowOf(sample: Pick<Sample, 'from' | 'to'>, forcing: Pick<Forcing, 'start' | 'stepDays' | 'inflow'>): SampleWindow {
  const step = forcing.stepDays * 86_400_000;
  const start = Date.parse(forcing.start);
  const from = (Date.parse(sample.from) - start) / step;
  const to = (Date.parse(sample.to) - start) / step;
  const last = forcing.inflow.length - 1;
  const first = Math.min(last, Math.max(0, Math.floor(from)));
  if (to - from < 1e-9) return { first, weights: [1] };
  const end = Math.min(last, Math.ceil(to) - 1);
  const weights: number[] = [];
  for (let k = first; k <= end; k++) weights.push(Math.max(0, Math.min(k + 1, to) - Math.max(k, from)));
  return { first, weights };
}

/**
 * Flow-weighted mean concentration over a window, Σ wQC / Σ wQ.
 * @returns NaN where nothing flowed
 */
export function meanOver({ first, weights }: SampleWindow, flow: ArrayLike<number>, concentration: ArrayLike<number>): number {
  let mass = 0;
  let water = 0;
  for (let k = 0; k < weights.length; k++) {
    const own = weights[k] * flow[first + k];
    if (!(own > 0)) continue;
    mass += own * concentration[first + k];
    water += own;
  }
  return mass / water;
}
