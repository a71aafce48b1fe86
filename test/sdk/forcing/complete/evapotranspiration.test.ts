import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { hargreaves } from '../../../../packages/sdk/src/forcing/complete/hargreaves.js';
import {
  airPressure,
  meanSaturation,
  penmanMonteith,
  psychrometricConstant,
  windAtTwoMetres,
} from '../../../../packages/sdk/src/forcing/complete/penmanMonteith.js';
import {
  daylightHours,
  extraterrestrialRadiation,
  radiationFromSunshine,
} from '../../../../packages/sdk/src/forcing/complete/radiation.js';

// FAO-56 worked examples (numbers from memory); the last digit of the printed results is not asserted.
const { fao56 } = JSON.parse(readFileSync(new URL('../../../checks/fao56.json', import.meta.url), 'utf8'));
const TO_STANDARD = 1e-6;

describe('FAO-56 worked examples', () => {
  test('example 8 and 9: 3 September at 20° S', () => {
    expect(extraterrestrialRadiation(-20, 246)).toBeCloseTo(fao56.ex8.Ra, 3);
    expect(daylightHours(-20, 246)).toBeCloseTo(fao56.ex8.N, 3);
  });
  test('example 2: pressure and psychrometric constant at 1800 m', () => {
    expect(Math.abs(airPressure(1800) - fao56.ex2.P)).toBeLessThan(0.01);
    expect(Math.abs(psychrometricConstant(1800) - fao56.ex2.gamma)).toBeLessThan(1e-4);
  });
  test('example 3: mean saturation vapour pressure', () =>
    expect(Math.abs(meanSaturation(15, 24.5) - fao56.ex3.es)).toBeLessThan(TO_STANDARD * 100));
  test('example 10: radiation from sunshine', () => {
    const top = extraterrestrialRadiation(-22.9, 135);
    expect(Math.abs(top - fao56.ex10.Ra)).toBeLessThan(0.01);
    expect(Math.abs(radiationFromSunshine(220 / 31, daylightHours(-22.9, 135), top) - fao56.ex10.Rs)).toBeLessThan(0.01);
  });
  test('example 17: Penman–Monteith, monthly', () => {
    const { in: given, ETo, tol_abs_ETo: tolerance } = fao56.ex17;
    const day = {
      tmin: given.tmin,
      tmax: given.tmax,
      latitude: given.lat_deg,
      dayOfYear: 105,
      altitude: given.z,
      vapourPressure: given.ea,
      windSpeed: given.u2,
      sunshine: given.n,
      soilHeat: fao56.ex17.G,
    };
    expect(Math.abs(penmanMonteith(day) - ETo)).toBeLessThan(tolerance);
  });
  test('example 18: Penman–Monteith, 6 July at 50.8° N', () => {
    const { in: given, ETo, u2, tol_abs_ETo: tolerance } = fao56.ex18;
    const windSpeed = given.u10_kmh / 3.6;
    expect(Math.abs(windAtTwoMetres(windSpeed, 10) - u2)).toBeLessThan(1e-3);
    const day = {
      tmin: given.tmin,
      tmax: given.tmax,
      latitude: given.lat_deg,
      dayOfYear: 187,
      altitude: given.z,
      humidityMax: given.rhmax,
      humidityMin: given.rhmin,
      windSpeed,
      windHeight: 10,
      sunshine: given.n,
    };
    expect(Math.abs(penmanMonteith(day) - ETo)).toBeLessThan(tolerance);
  });
  test('example 15 and 20: temperatures only, Hargreaves and Penman–Monteith', () => {
    const { in: given, Hargreaves_eq52, PM_with_u2_2_ea_from_tmin, tol_abs: tolerance } = fao56.ex15_20;
    const day = { tmin: given.tmin, tmax: given.tmax, latitude: 45 + 43 / 60, dayOfYear: 196 };
    expect(Math.abs(hargreaves(day) - Hargreaves_eq52)).toBeLessThan(tolerance);
    expect(Math.abs(penmanMonteith({ ...day, altitude: 200, windSpeed: 2 }) - PM_with_u2_2_ea_from_tmin)).toBeLessThan(tolerance);
  });
});
