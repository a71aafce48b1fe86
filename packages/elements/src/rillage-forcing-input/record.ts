import type { ForcingRead, Sample } from '@rillage/sdk';
import type { Spaced } from '../rillage-age-history/frame.js';
import { msPerDay } from '../shared/format.js';
import { cleanText } from '../shared/text.js';

type Series = (number | null)[];

/** What was read, as it is drawn: on the forcing's steps, null where the files have no value. */
export interface RecordShown extends Spaced {
  steps: number;
  /** Names of the two that are always drawn; `flow` is empty where there is no outflow. */
  rain: string;
  flow: string;
  /** The other series, then tracers: each may be drawn beneath. */
  others: string[];
  tracers: string[];
  /** Of a series: its values, null in the steps that a rule filled. Of a tracer: what the rain's samples say, over their intervals. */
  line: (name: string) => Series;
  /** Of a series: all values, those that a rule filled too. */
  value: (name: string, step: number) => number | undefined;
  /** ` (mg/L)`; empty where the record does not say. */
  unit: (name: string) => string;
  /** 1 where a rule filled. */
  filled: (name: string) => Uint8Array | undefined;
  /** The stream's samples of a tracer by step, the last where a step has several. */
  bottles: (tracer: string) => Map<number, Sample>;
}

export function shownRecord({ forcing, record, filled, samples, rainSamples }: ForcingRead): RecordShown {
  const { start, stepDays, outflows } = forcing;
  const rain = record.has('precipitation') ? 'precipitation' : 'inflow';
  const flow = Object.hasOwn(outflows, 'discharge') ? 'discharge' : (Object.keys(outflows)[0] ?? '');
  const tracers = [...new Set([...samples, ...rainSamples].map(({ tracer }) => tracer))];
  const valuesOf = (name: string): Float64Array | undefined =>
    record.get(name) ?? (Object.hasOwn(outflows, name) ? outflows[name] : undefined);
  const lines = new Map<string, Series>();
  const steps = forcing.inflow.length;
  const stepsTo = (at: string): number => (Date.parse(at) - Date.parse(start)) / (stepDays * msPerDay);
  const make = (name: string): Series => {
    const values = valuesOf(name);
    const gaps = filled.get(name);
    return values && !tracers.includes(name)
      ? Array.from(values, (value, step) => (gaps?.[step] || Number.isNaN(value) ? null : value))
      : overIntervals(name);
  };
  const overIntervals = (tracer: string): Series => {
    const series: Series = new Array<null>(steps).fill(null);
    for (const sample of rainSamples) {
      if (sample.tracer !== tracer) continue;
      series.fill(sample.value, Math.max(0, Math.floor(stepsTo(sample.from))), Math.max(0, Math.ceil(stepsTo(sample.to))));
    }
    return series;
  };
  return {
    ...{ start, stepDays, steps, rain, flow, tracers },
    others: [...new Set([...record.keys(), ...Object.keys(outflows)])].filter((name) => name !== rain && name !== flow),
    line(name) {
      let line = lines.get(name);
      if (!line) lines.set(name, (line = make(name)));
      return line;
    },
    value: (name, step) => valuesOf(name)?.[step],
    unit(name) {
      const sample = [...samples, ...rainSamples].find(({ tracer }) => tracer === name);
      const unit = sample?.unit ?? (Object.hasOwn(outflows, name) ? 'mm' : /^t(min|max|mean)$/.test(name) ? '°C' : '');
      return unit && ` (${cleanText(unit, 20)})`;
    },
    filled: (name) => filled.get(name),
    bottles: (tracer) =>
      new Map(
        samples.flatMap((sample) => {
          const step = Math.floor(stepsTo(sample.from));
          return sample.tracer === tracer && step >= 0 && step < steps ? [[step, sample] as const] : [];
        }),
      ),
  };
}
