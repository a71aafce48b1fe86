/**
 * What an agency would settle once for its station: how its files are to be read, and the catchment's model. Thessle Brook is invented, so
 * the model is the one its data were made with (demo-site/data/…/truth.json); for a real stream it comes from a fit.
 */
const daily = { columns: [1], writtenAs: 'iso', zone: 'UTC' };
const grid = { stepDays: 1, dayBegins: '00:00', zone: 'UTC' };
const evapotranspiration = { method: 'hargreaves', as: 'evapotranspiration', factor: 0.66 };
const isotope = { holds: 'rainTracer', unit: 'permil', standsFor: 'bulk' };
const gaps = [
  { of: 'precipitation', fill: 'zero', upToSteps: 1 },
  { of: 'tmax', fill: 'linear', upToSteps: 3 },
  { of: 'discharge', fill: 'recession', upToSteps: 5 },
];
const temperatures = (first) => [
  { position: first, holds: 'tmin', unit: 'Cel', standsFor: 'meanFollowing', absent: ['-9999'] },
  { position: first + 1, holds: 'tmax', unit: 'Cel', standsFor: 'meanFollowing', absent: ['-9999'] },
];
const rain = { position: 2, holds: 'precipitation', unit: 'mm', standsFor: 'totalFollowing', absent: ['-9999'], trace: ['T'] };
const flow = (position) => ({ position, holds: 'outflow', as: 'discharge', unit: 'm3/s', standsFor: 'meanFollowing' });

export const station = {
  id: 'thessle-brook',
  name: 'Thessle Brook at Marrowgate',
  invented: true,
  description: 'An invented catchment. No such stream, place or agency exists; its records come from a seeded script.',
  latitude: 51.3,
  areaKm2: 23.4,
};

/** The files of the record, in the order of the layout's sources. */
export const recordFiles = ['weather.csv', 'flow.csv', 'rain-samples.csv', 'stream-samples.csv'];

export const recordLayout = {
  grid: { ...grid, from: '2015-04-01', to: '2025-04-01' },
  areaKm2: station.areaKm2,
  latitude: station.latitude,
  gaps,
  evapotranspiration,
  rainConcentration: { rule: 'bulkConstant', uncovered: 'amountWeightedMean' },
  sources: [
    {
      name: 'weather.csv',
      splitAt: ',',
      remarkMark: '#',
      namesRow: 1,
      unitsRow: 2,
      dataFrom: 3,
      time: daily,
      everyDays: 1,
      columns: [rain, ...temperatures(3)],
    },
    {
      name: 'flow.csv',
      splitAt: ',',
      remarkMark: '#',
      namesRow: 1,
      dataFrom: 2,
      time: daily,
      everyDays: 1,
      columns: [flow(2), { position: 3, holds: 'ignored' }],
    },
    {
      name: 'rain-samples.csv',
      splitAt: ',',
      remarkMark: '#',
      namesRow: 1,
      unitsRow: 2,
      dataFrom: 3,
      time: { columns: [2], from: [1], writtenAs: 'iso', zone: 'UTC', lastDayIncluded: true },
      columns: [
        { ...isotope, position: 3, as: 'd18O', standardError: 0.1 },
        { ...isotope, position: 4, as: 'd2H', standardError: 0.8 },
        { position: 5, holds: 'rainTracer', as: 'chloride', unit: 'mg/L', standsFor: 'bulk', standardError: 0.1, belowDetection: 'half' },
      ],
    },
    {
      name: 'stream-samples.csv',
      splitAt: ';',
      decimalMark: ',',
      remarkMark: '#',
      namesRow: 1,
      unitsRow: 2,
      dataFrom: 3,
      time: { columns: [2], writtenAs: 'DD.MM.YYYY', zone: 'UTC', readAt: '12:00' },
      columns: [
        { position: 1, holds: 'ignored' },
        { position: 3, holds: 'streamTracer', as: 'd18O', unit: 'permil', standsFor: 'instant', standardError: 0.1, of: 'discharge' },
        { position: 4, holds: 'streamTracer', as: 'd2H', unit: 'permil', standsFor: 'instant', standardError: 0.8, of: 'discharge' },
        { position: 5, holds: 'streamTracer', as: 'chloride', unit: 'mg/L', standsFor: 'instant', standardError: 0.2, of: 'discharge' },
      ],
    },
  ],
};

/** The days that telemetry brings each morning: one file with everything but the laboratory's values. */
export const rowsLayout = {
  grid,
  areaKm2: station.areaKm2,
  latitude: station.latitude,
  gaps,
  evapotranspiration,
  sources: [
    {
      name: 'rows.csv',
      splitAt: ',',
      remarkMark: '#',
      namesRow: 1,
      unitsRow: 2,
      dataFrom: 3,
      time: daily,
      everyDays: 1,
      columns: [rain, ...temperatures(3), flow(5)],
    },
  ],
};

/**
 * Rain of the new days has not been to the laboratory. It carries the record's amount-weighted mean until the station is made again with
 * the samples. Ages do not depend on it; the simulated concentrations do.
 */
export const rainUntilSampled = { d18O: -8.62, d2H: -59, chloride: 2.62 };

export const catchment = {
  initialStorage: 2200,
  selection: {
    discharge: { form: 'gamma', shape: 0.6, scale: { driver: 'storageAnomaly', at: [-150, 40], value: [1100, 450] } },
    evapotranspiration: { form: 'exponential', scale: 110 },
  },
  tracers: {
    d18O: { preRecord: -8.1 },
    d2H: { preRecord: -54.8 },
    chloride: { preRecord: 5, carriedShare: { evapotranspiration: 0 } },
  },
};
