import { seededRandom } from './random.mjs';

const DAY = 86_400_000;

/**
 * Daily rain, least and greatest temperature, and the tracers of each day's rain: a two-state wet/dry chain with gamma amounts, a
 * yearly temperature wave with day-to-day memory, isotopes on a yearly wave with scatter by event, chloride higher in winter.
 * A wet day that rounds to nothing is a trace. `daysAfter` more days follow the record's last, for the morning job.
 */
export function makeWeather(station) {
  const { weather, isotopes, chloride } = station;
  const random = seededRandom(station.seed);
  const firstDay = Date.parse(`${station.firstDay}T00:00:00Z`);
  const days = Math.round((Date.parse(`${station.lastDay}T00:00:00Z`) - firstDay) / DAY) + 1 + (station.daysAfter ?? 0);
  const out = { days, dates: [], rain: [], trace: [], least: [], greatest: [], rainTracers: { d18O: [], d2H: [], chloride: [] } };
  let wet = false;
  let memory = 0;

  for (let day = 0; day < days; day += 1) {
    const date = new Date(firstDay + day * DAY);
    const phase = 2 * Math.PI * yearFraction(date);
    // Warmest about 20 July.
    const warmth = -Math.cos(phase - 0.33);

    const chance = (wet ? weather.wetAfterWet : weather.wetAfterDry) - weather.wetSeason * warmth;
    wet = random.uniform() < chance;
    const amount = wet ? random.gamma(weather.rainShape, weather.rainScale) * (1 + 0.12 * warmth) : 0;
    const rain = Math.round(amount * 10) / 10;

    memory = 0.72 * memory + Math.sqrt(1 - 0.72 ** 2) * random.normal();
    const mean = weather.meanTemperature + weather.temperatureSwing * warmth + weather.temperatureSpread * memory;
    const range = Math.max(1.5, weather.dayRange * (1 + 0.25 * warmth) * (wet ? 0.75 : 1.15) + 1.1 * random.normal());

    const d18O =
      isotopes.mean + isotopes.swing * warmth + isotopes.eventSpread * random.normal() + isotopes.amountEffect * (rain - weather.rainScale);
    const d2H = isotopes.lineSlope * d18O + isotopes.lineIntercept + isotopes.excessSpread * random.normal();
    const salt =
      chloride.mean *
      (1 - chloride.winterShare * warmth) *
      Math.exp(chloride.eventSpread * random.normal() - chloride.eventSpread ** 2 / 2);

    out.dates.push(date.toISOString().slice(0, 10));
    out.rain.push(rain);
    out.trace.push(wet && rain === 0);
    out.least.push(Math.round((mean - range / 2) * 10) / 10);
    out.greatest.push(Math.round((mean + range / 2) * 10) / 10);
    out.rainTracers.d18O.push(d18O);
    out.rainTracers.d2H.push(d2H);
    out.rainTracers.chloride.push(salt);
  }
  return out;
}

export function yearFraction(date) {
  const start = Date.UTC(date.getUTCFullYear(), 0, 1);
  return (date.getTime() - start) / (Date.UTC(date.getUTCFullYear() + 1, 0, 1) - start);
}
