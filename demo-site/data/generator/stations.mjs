/**
 * The invented stations. Every name, place and number here is made up; nothing describes a real catchment, agency or person.
 * A station is plain data, so that another one is another entry and the same code.
 */
export const STATIONS = {
  'thessle-brook': {
    id: 'thessle-brook',
    name: 'Thessle Brook at Marrowgate',
    agency: 'Upland Water Office (invented)',
    note: 'An invented catchment. No such stream, place or agency exists; the data come from a seeded script.',
    seed: 20150401,
    noiseSeed: 1,
    firstDay: '2015-04-01',
    lastDay: '2025-03-31',
    daysAfter: 7,
    areaKm2: 23.4,
    latitude: 51.3,
    weather: {
      meanTemperature: 10.2,
      temperatureSwing: 6.3,
      temperatureSpread: 2.6,
      dayRange: 7.5,
      wetAfterDry: 0.3,
      wetAfterWet: 0.66,
      wetSeason: 0.07,
      rainShape: 0.75,
      rainScale: 7.6,
    },
    snow: null,
    water: {
      cropFactor: 0.66,
      dryBelow: 5,
      quickShare: 0.32,
      quickReference: 320,
      baseRate: 0.1,
      baseExponent: 2.6,
      deepFlow: 0.12,
      firstStorage: 280,
    },
    isotopes: { mean: -8.2, swing: 2.6, eventSpread: 1.9, amountEffect: -0.04, lineSlope: 8, lineIntercept: 10, excessSpread: 2.2 },
    chloride: { mean: 2.6, winterShare: 0.45, eventSpread: 0.55 },
    truth: {
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
      noise: {
        d18O: { error: 0.1, share: 0 },
        d2H: { error: 0.8, share: 0 },
        chloride: { error: 0.08, share: 0.03 },
      },
    },
    subSteps: 48,
  },
};
