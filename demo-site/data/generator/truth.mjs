/** The truth beside the files, daily, rounded to what it is good for. Row order: one value a day from `firstDay`. */
export function truthFile(station, { weather, water, truth }) {
  const days = weather.days;
  const round = (digits) => (value) => (value === null ? null : Number(value.toFixed(digits)));
  const series = (list, digits) => list.slice(0, days).map(round(digits));
  const { concentration } = truth;
  return `${JSON.stringify({
    about: `The truth of an invented catchment. ${station.note}`,
    made: 'An independent age-tracking loop, first order at two sub-daily steps and extrapolated; see generator/. No part of the SDK took part.',
    station: station.id,
    firstDay: station.firstDay,
    lastDay: station.lastDay,
    daysAfter: station.daysAfter ?? 0,
    subStepsPerDay: [station.subSteps / 2, station.subSteps],
    largestDifferenceOfTheTwo: Object.fromEntries(
      Object.entries(truth.differ).map(([name, value]) => [name, Number(value.toPrecision(2))]),
    ),
    areaKm2: station.areaKm2,
    cropFactor: station.water.cropFactor,
    initialStorage: station.truth.initialStorage,
    selection: station.truth.selection,
    tracers: station.truth.tracers,
    noise: {
      ...station.truth.noise,
      meaning: 'standard deviation √(error² + (share × value)²), normal, stream and rain alike',
      seed: station.noiseSeed,
    },
    notes: [
      'younger: share of the day’s flow that entered less than so many days before the day’s end.',
      'medianDays: null where the median is older than the record.',
      'Rain reaches storage on the day it falls unless the station has snow. Evapotranspiration carries no chloride.',
    ],
    younger: Object.fromEntries(Object.entries(truth.younger).map(([age, list]) => [age, series(list, 4)])),
    medianDays: series(truth.medianDays, 1),
    preRecordShare: series(truth.preRecordShare, 4),
    concentration: { d18O: series(concentration.d18O, 3), d2H: series(concentration.d2H, 2), chloride: series(concentration.chloride, 3) },
    evapotranspiration: series(water.evapotranspiration, 4),
  })}\n`;
}
