import { RillageError } from '../../errors.js';
import type { SnowRule } from '../layout.js';

export interface SnowInput {
  /** [N] mm/day */
  precipitation: Float64Array;
  /** [N] Cel, mean of the step */
  temperature: Float64Array;
  /** By tracer: [N]; NaN is allowed where nothing falls. */
  concentration?: Record<string, Float64Array>;
  /** days */
  stepDays: number;
}

export interface SnowRun {
  /** [N] mm/day that leaves the store: rain and melt. */
  release: Float64Array;
  /** [N] mm/day */
  snowfall: Float64Array;
  melt: Float64Array;
  /** [N] mm of water held at the end of each step. */
  waterHeld: Float64Array;
  /** By tracer: [N] of the release; NaN where nothing is released. */
  releaseConcentration: Record<string, Float64Array>;
  /** By tracer: [N] of the store at the end of each step; NaN where it is empty. */
  heldConcentration: Record<string, Float64Array>;
}

/**
 * Snow by degree-days, carrying the tracer of what fell. Each step: snow joins the store, melt = min(store, f (T − T_melt)⁺ Δt) leaves it with the
 * concentration of the well-mixed store, rain passes. Water and tracer close: fallen = released + held.
 * @returns see {@link SnowRun}
 * @throws RillageError 'length-mismatch' | 'snow-invalid' | 'negative-flux' | 'concentration-missing'
 * @source temperature index method, NRCS National Engineering Handbook part 630 chapter 11 (from memory); mixing is an assumption of ours
 */
export function degreeDaySnow(input: SnowInput, rule: SnowRule): SnowRun {
  const { precipitation, temperature, stepDays } = input;
  const tracers = Object.entries(input.concentration ?? {});
  check(input, rule);
  const count = precipitation.length;
  const run: SnowRun = {
    release: new Float64Array(count),
    snowfall: new Float64Array(count),
    melt: new Float64Array(count),
    waterHeld: new Float64Array(count),
    releaseConcentration: Object.fromEntries(tracers.map(([name]) => [name, new Float64Array(count).fill(NaN)])),
    heldConcentration: Object.fromEntries(tracers.map(([name]) => [name, new Float64Array(count).fill(NaN)])),
  };
  let held = 0;
  const heldAt = new Float64Array(tracers.length);
  for (let step = 0; step < count; step++) {
    const fallen = precipitation[step] * stepDays;
    const snow = fallen * snowShare(temperature[step], rule);
    const rain = fallen - snow;
    const before = held;
    held += snow;
    const melt = Math.min(held, rule.meltFactor * Math.max(0, temperature[step] - rule.meltAbove) * stepDays);
    tracers.forEach(([name, concentration], index) => {
      // A mean of two, not a mass over a volume: equal concentrations stay equal to the last digit, however small the store.
      if (snow > 0) heldAt[index] = mix(heldAt[index], before, concentration[step], snow);
      const released = melt + rain;
      if (released > 0)
        run.releaseConcentration[name][step] = rain > 0 ? mix(heldAt[index], melt, concentration[step], rain) : heldAt[index];
      if (held - melt > 0) run.heldConcentration[name][step] = heldAt[index];
    });
    held -= melt;
    run.snowfall[step] = snow / stepDays;
    run.melt[step] = melt / stepDays;
    run.release[step] = (melt + rain) / stepDays;
    run.waterHeld[step] = held;
  }
  return run;
}

function mix(a: number, volumeA: number, b: number, volumeB: number): number {
  return volumeA === 0 ? b : a + (b - a) * (volumeB / (volumeA + volumeB));
}

function snowShare(temperature: number, { snowBelow, rainAbove }: SnowRule): number {
  if (temperature <= snowBelow) return 1;
  return temperature >= rainAbove ? 0 : (rainAbove - temperature) / (rainAbove - snowBelow);
}

function check({ precipitation, temperature, concentration, stepDays }: SnowInput, rule: SnowRule): void {
  if (!(rule.meltFactor >= 0 && rule.rainAbove >= rule.snowBelow && Number.isFinite(rule.meltAbove) && stepDays > 0)) {
    throw new RillageError({
      code: 'snow-invalid',
      path: 'snow',
      expected: 'meltFactor of 0 or more, rainAbove not below snowBelow',
      received: JSON.stringify(rule),
    });
  }
  for (const [path, series] of [['temperature', temperature], ...Object.entries(concentration ?? {})] as [string, Float64Array][]) {
    if (series.length === precipitation.length) continue;
    throw new RillageError({ code: 'length-mismatch', path, expected: `${precipitation.length} values`, received: String(series.length) });
  }
  for (let step = 0; step < precipitation.length; step++) {
    if (!(precipitation[step] >= 0 && precipitation[step] < Infinity)) {
      throw new RillageError({
        code: 'negative-flux',
        path: 'precipitation',
        step,
        expected: 'zero or more, finite',
        received: String(precipitation[step]),
      });
    }
    if (!Number.isFinite(temperature[step])) {
      throw new RillageError({
        code: 'snow-invalid',
        path: 'temperature',
        step,
        expected: 'a finite temperature',
        received: String(temperature[step]),
      });
    }
    for (const [name, series] of precipitation[step] > 0 ? Object.entries(concentration ?? {}) : []) {
      if (!Number.isNaN(series[step])) continue;
      throw new RillageError({
        code: 'concentration-missing',
        path: name,
        step,
        expected: 'a concentration wherever something falls',
        received: 'NaN',
      });
    }
  }
}
