import { seededRandom } from './random.mjs';

const STREAM_EVERY = 7;
const RAIN_EVERY = 14;

/**
 * What the laboratory reports: a grab sample of the stream every seventh day and a bulk sample of the rain for every fortnight, the
 * truth plus errors of the stated size. Only the errors depend on `noiseSeed`; the water and its truth stay as they are.
 */
export function makeSamples(station, { weather, water, truth }, noiseSeed = station.noiseSeed) {
  const random = seededRandom(0x5a3d1e ^ Math.imul(noiseSeed, 2654435761));
  const { noise } = station.truth;
  const tracers = Object.keys(noise);
  const days = weather.days - (station.daysAfter ?? 0);
  const measured = (tracer, value) => {
    const spread = Math.hypot(noise[tracer].error, noise[tracer].share * value);
    return value + spread * random.normal();
  };

  const stream = [];
  for (let day = 5; day < days; day += STREAM_EVERY) {
    const values = Object.fromEntries(tracers.map((tracer) => [tracer, measured(tracer, truth.concentration[tracer][day])]));
    // A bottle is lost now and then.
    stream.push({ date: weather.dates[day], lost: random.uniform() < 0.02, values });
  }

  const rain = [];
  for (let day = 0; day < days; day += RAIN_EVERY) {
    const end = Math.min(days, day + RAIN_EVERY);
    let depth = 0;
    const sums = Object.fromEntries(tracers.map((tracer) => [tracer, 0]));
    for (let d = day; d < end; d += 1) {
      depth += weather.rain[d];
      tracers.forEach((tracer) => (sums[tracer] += weather.rain[d] * weather.rainTracers[tracer][d]));
    }
    const values = Object.fromEntries(tracers.map((tracer) => [tracer, measured(tracer, depth > 0 ? sums[tracer] / depth : 0)]));
    // Below 2 mm there is too little water to analyse. `to` is the last day of the interval, in the interval.
    rain.push({ from: weather.dates[day], to: weather.dates[end - 1], depth, lost: depth < 2, values });
  }
  return { stream, rain, days, water };
}
