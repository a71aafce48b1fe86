import { yearFraction } from './weather.mjs';

const SUB_STEPS = 24;

/**
 * Flow and evapotranspiration from the weather, closing the balance exactly: one store that drains as a power of its depth
 * beside a small steady flow, a share of
 * the rain that runs off quickly when the store is full, evapotranspiration at `cropFactor` × the reference by Hargreaves (FAO-56, eq. 52).
 * Snow, where the station has it, holds precipitation back by a degree-day store that mixes its tracers.
 */
export function makeWater(station, weather) {
  const { water } = station;
  const inflow = station.snow ? holdSnow(station.snow, weather) : { water: weather.rain, tracers: weather.rainTracers };
  const discharge = [];
  const evapotranspiration = [];
  let depth = water.firstStorage;

  for (let day = 0; day < weather.days; day += 1) {
    const reference = hargreaves(weather.least[day], weather.greatest[day], station.latitude, weather.dates[day]);
    const demand = water.cropFactor * reference * Math.min(1, depth / water.dryBelow);
    const quick = inflow.water[day] * Math.min(0.6, water.quickShare * (depth / water.quickReference) ** 2);
    let base = 0;
    for (let sub = 0; sub < SUB_STEPS; sub += 1) {
      const drained = water.deepFlow * Math.min(1, depth / 20) + water.baseRate * (depth / 100) ** water.baseExponent;
      base += drained / SUB_STEPS;
      depth += (inflow.water[day] - quick - demand - drained) / SUB_STEPS;
    }
    discharge.push(quick + base);
    evapotranspiration.push(demand);
  }
  return { inflow: inflow.water, inflowTracers: inflow.tracers, discharge, evapotranspiration };
}

/** Reference evapotranspiration, mm/day: 0.0023 (T + 17.8) √(Tmax − Tmin) Ra, with Ra as equivalent water. Allen et al. 1998, eq. 21–25, 52 (numbers from memory). */
export function hargreaves(least, greatest, latitude, date) {
  const phi = (latitude * Math.PI) / 180;
  const dayOfYear = Math.floor(yearFraction(new Date(`${date}T12:00:00Z`)) * daysInYear(date)) + 1;
  const angle = (2 * Math.PI * dayOfYear) / 365;
  const nearness = 1 + 0.033 * Math.cos(angle);
  const declination = 0.409 * Math.sin(angle - 1.39);
  const sunset = Math.acos(Math.max(-1, Math.min(1, -Math.tan(phi) * Math.tan(declination))));
  const radiation =
    ((24 * 60) / Math.PI) *
    0.082 *
    nearness *
    (sunset * Math.sin(phi) * Math.sin(declination) + Math.cos(phi) * Math.cos(declination) * Math.sin(sunset));
  const value = 0.0023 * ((least + greatest) / 2 + 17.8) * Math.sqrt(Math.max(0, greatest - least)) * 0.408 * radiation;
  return Math.max(0, value);
}

function daysInYear(date) {
  const year = Number(date.slice(0, 4));
  return (Date.UTC(year + 1, 0, 1) - Date.UTC(year, 0, 1)) / 86_400_000;
}

function holdSnow(snow, weather) {
  const water = [];
  const tracers = Object.fromEntries(Object.keys(weather.rainTracers).map((tracer) => [tracer, []]));
  const held = Object.fromEntries(Object.keys(tracers).map((tracer) => [tracer, 0]));
  let store = 0;
  for (let day = 0; day < weather.days; day += 1) {
    const mean = (weather.least[day] + weather.greatest[day]) / 2;
    const rain = mean >= snow.snowBelow ? weather.rain[day] : 0;
    const fallen = weather.rain[day] - rain;
    for (const tracer of Object.keys(tracers)) {
      if (store + fallen > 0) held[tracer] = (held[tracer] * store + weather.rainTracers[tracer][day] * fallen) / (store + fallen);
    }
    store += fallen;
    const melt = Math.min(store, Math.max(0, snow.meltRate * (mean - snow.meltAbove)));
    store -= melt;
    water.push(rain + melt);
    for (const tracer of Object.keys(tracers)) {
      const mass = weather.rainTracers[tracer][day] * rain + held[tracer] * melt;
      tracers[tracer].push(rain + melt > 0 ? mass / (rain + melt) : 0);
    }
  }
  return { water, tracers };
}
