import type { Forcing, Sample } from '../contract.js';

/** Samples that might be taken: which tracer, of which outflow, when, how many. */
export interface SamplingPlan {
  tracer: string;
  of: string;
  /** Lowest quarter of the flows, any, or highest quarter, of the last year with which next year is taken to be alike. */
  when: 'lowFlow' | 'anyFlow' | 'highFlow';
  count: number;
  /** Steps of the record that stand for next year's. */
  steps: number[];
}

/** @returns every tracer and outflow that was sampled, at each kind of flow and each count */
export function samplingPlans(forcing: Forcing, samples: readonly Sample[], counts: readonly number[], days: number): SamplingPlan[] {
  const sampled = new Map(samples.map(({ tracer, of = 'discharge' }) => [`${tracer} ${of}`, { tracer, of }]));
  return [...sampled.values()].flatMap(({ tracer, of }) => {
    const flow = forcing.outflows[of];
    const first = Math.max(0, flow.length - Math.round(days / forcing.stepDays));
    const steps = Array.from({ length: flow.length - first }, (_value, k) => first + k).filter((step) => flow[step] > 0);
    const sorted = [...steps].sort((a, b) => flow[a] - flow[b] || a - b);
    const quarter = Math.floor(sorted.length / 4);
    const choices: [SamplingPlan['when'], number[]][] = [
      ['lowFlow', sorted.slice(0, quarter)],
      ['anyFlow', sorted],
      ['highFlow', sorted.slice(sorted.length - quarter)],
    ];
    return choices.flatMap(([when, open]) => {
      const inTime = open.sort((a, b) => a - b);
      return counts
        .filter((count) => count <= inTime.length)
        .map((count) => ({
          tracer,
          of,
          when,
          count,
          steps: Array.from({ length: count }, (_value, k) => inTime[Math.floor(((k + 0.5) * inTime.length) / count)]),
        }));
    });
  });
}
