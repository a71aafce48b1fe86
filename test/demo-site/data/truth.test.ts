import { readFileSync } from 'node:fs';
import { beforeAll, describe, expect, it } from 'vitest';
import { makeWater, makeWeather, STATIONS } from '../../../demo-site/data/generate.mjs';
import { runColumn } from '../../../packages/sdk/src/column/index.js';
import { type Catchment, type ColumnRun, type Forcing } from '../../../packages/sdk/src/contract.js';

/*
 * The engine against the invented catchment's truth, which another program made: parcels of a day each, first order at two sub-daily steps,
 * extrapolated. Both follow the same daily fluxes and hold the driven scale over a day at its mid-day value.
 */
const station = STATIONS['thessle-brook'];
const truth = JSON.parse(readFileSync(new URL('../../../demo-site/data/thessle-brook/truth.json', import.meta.url), 'utf8')) as {
  younger: Record<string, number[]>;
  medianDays: (number | null)[];
  preRecordShare: number[];
  concentration: Record<'d18O' | 'd2H' | 'chloride', number[]>;
};

/** The range of each tracer in the rain, from the 1st to the 99th percentile: what 0.1 % of the input's range means. */
function inputRange(values: ArrayLike<number>, inflow: ArrayLike<number>): number {
  const wet = Array.from(values)
    .filter((_, i) => (inflow[i] as number) > 0)
    .sort((a, b) => a - b);
  return (wet[Math.floor(wet.length * 0.99)] as number) - (wet[Math.floor(wet.length * 0.01)] as number);
}

const worst = (found: Float64Array, expected: readonly (number | null)[]): number =>
  expected.reduce<number>((most, value, i) => (value === null ? most : Math.max(most, Math.abs((found[i] as number) - value))), 0);

describe.each([
  ['every age kept', 0],
  ['default age resolution', undefined],
] as const)('runColumn(invented catchment), %s', (_name, ageResolution) => {
  let forcing: Forcing;
  let run: ColumnRun;
  beforeAll(() => {
    const weather = makeWeather(station);
    const water = makeWater(station, weather);
    forcing = {
      start: `${station.firstDay}T00:00:00Z`,
      stepDays: 1,
      inflow: Float64Array.from(water.inflow),
      outflows: { discharge: Float64Array.from(water.discharge), evapotranspiration: Float64Array.from(water.evapotranspiration) },
      inflowConcentration: Object.fromEntries(
        Object.entries(water.inflowTracers).map(([name, list]) => [name, Float64Array.from(list as number[])]),
      ),
    };
    const { initialStorage, selection, tracers } = station.truth;
    run = runColumn({ initialStorage, selection, tracers } as Catchment, forcing, {
      youngerThan: [7, 30, 90, 365],
      quantiles: [0.5],
      ...(ageResolution === undefined ? {} : { ageResolution }),
    });
  }, 60_000);

  // The truth's two sub-steps differ by up to 0.0016 and extrapolation leaves a small part of that; 1e-3 is the engine's own bar in default mode.
  it.each([7, 30, 90, 365])('share younger than %i days within 0.001 on every one of 3,660 days', (age) => {
    expect(worst(run.outflows['discharge']?.youngerShare.get(age) as Float64Array, truth.younger[String(age)] as number[])).toBeLessThan(
      1e-3,
    );
  });

  it('share from before the record within 0.001', () => {
    expect(worst(run.outflows['discharge']?.preRecordShare as Float64Array, truth.preRecordShare)).toBeLessThan(1e-3);
  });

  it('median age within 3 days on 95 of 100 days', () => {
    const found = run.outflows['discharge']?.quantiles.get(0.5) as { days: Float64Array; beyondRecord: Uint8Array };
    const known = truth.medianDays.map((days, i) => (days === null || found.beyondRecord[i] === 1 ? null : days));
    expect(known.filter((days) => days !== null).length).toBeGreaterThan(3000);
    // Where an old dry spell makes the curve flat, a median may move by days though no share moves by 0.001.
    const differences = known
      .flatMap((days, i) => (days === null ? [] : [Math.abs((found.days[i] as number) - days)]))
      .sort((a, b) => a - b);
    expect(differences[Math.floor(differences.length * 0.95)]).toBeLessThan(3);
  });

  it.each(['d18O', 'd2H', 'chloride'] as const)('stream %s within a thousandth of the input’s range', (tracer) => {
    const range = inputRange(forcing.inflowConcentration[tracer] as Float64Array, forcing.inflow);
    expect(worst(run.outflows['discharge']?.concentration[tracer] as Float64Array, truth.concentration[tracer])).toBeLessThan(1e-3 * range);
  });
});
