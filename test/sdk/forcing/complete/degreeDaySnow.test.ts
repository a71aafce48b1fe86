import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { degreeDaySnow } from '../../../../packages/sdk/src/forcing/complete/degreeDaySnow.js';

const { snow } = JSON.parse(readFileSync(new URL('../../../checks/snow.json', import.meta.url), 'utf8'));

test('degreeDaySnow: the worked example', () => {
  const { T, P, ddf, T_melt, T_snow, swe_end, liquid } = snow.example;
  const run = degreeDaySnow(
    { precipitation: Float64Array.from(P), temperature: Float64Array.from(T), stepDays: 1 },
    { meltFactor: ddf, meltAbove: T_melt, snowBelow: T_snow, rainAbove: T_snow },
  );
  expect([...run.waterHeld]).toEqual(swe_end);
  expect([...run.release]).toEqual(liquid);
});

test('degreeDaySnow: water and tracer that fell are released or held', () => {
  const day = fc.record({ rain: fc.double({ min: 0, max: 40, noNaN: true }), temperature: fc.double({ min: -12, max: 12, noNaN: true }) });
  fc.assert(
    fc.property(fc.array(day, { minLength: 1, maxLength: 60 }), (days) => {
      const precipitation = Float64Array.from(days, ({ rain }) => rain);
      const chloride = precipitation.map((_mm, k) => 1 + (k % 5));
      const run = degreeDaySnow(
        { precipitation, temperature: Float64Array.from(days, ({ temperature }) => temperature), concentration: { chloride }, stepDays: 1 },
        { meltFactor: 3, meltAbove: 0, snowBelow: -1, rainAbove: 2 },
      );
      const last = days.length - 1;
      let water = run.waterHeld[last] * 1;
      let mass = run.waterHeld[last] > 0 ? run.waterHeld[last] * run.heldConcentration['chloride'][last] : 0;
      let fell = 0;
      let fellMass = 0;
      for (let k = 0; k <= last; k++) {
        fell += precipitation[k];
        fellMass += precipitation[k] * chloride[k];
        water += run.release[k];
        if (run.release[k] > 0) mass += run.release[k] * run.releaseConcentration['chloride'][k];
      }
      expect(Math.abs(water - fell)).toBeLessThan(1e-9 * (1 + fell));
      expect(Math.abs(mass - fellMass)).toBeLessThan(1e-9 * (1 + fellMass));
    }),
    { seed: 4, numRuns: 200 },
  );
});
