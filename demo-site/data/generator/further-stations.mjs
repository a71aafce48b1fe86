import { STATIONS } from './stations.mjs';

/**
 * More stations of the same invented agency, each of another character. Their files are made afresh whenever the site is built, so none is
 * stored, and no truth is tracked for them. Every name, place and number is made up; nothing describes a real catchment, agency or person.
 */
const brook = STATIONS['thessle-brook'];

export const FURTHER_STATIONS = [
  /** Young water, and a flow that jumps. */
  station({
    id: 'ottering-beck',
    name: 'Ottering Beck at Clayfold',
    ground: 'Clay, which sheds a storm within days.',
    seed: 20190402,
    firstDay: '2019-04-01',
    areaKm2: 8.7,
    water: { quickShare: 0.62, quickReference: 210, baseRate: 0.12, baseExponent: 3.2, deepFlow: 0.02, firstStorage: 190 },
    truth: {
      initialStorage: 520,
      selection: {
        discharge: { form: 'gamma', shape: 0.5, scale: { driver: 'storageAnomaly', at: [-120, 60], value: [200, 60] } },
        evapotranspiration: { form: 'exponential', scale: 70 },
      },
    },
  }),
  /** A flow that hardly moves, and most of its water older than the record. */
  station({
    id: 'ambrel-spring',
    name: 'Ambrel Spring at Ashendown',
    ground: 'Thick chalk, out of which the water comes late.',
    seed: 20190403,
    firstDay: '2019-04-01',
    areaKm2: 31,
    water: { quickShare: 0.01, quickReference: 400, baseRate: 0.12, baseExponent: 1.6, deepFlow: 0.2, firstStorage: 330 },
    truth: {
      initialStorage: 14000,
      selection: {
        discharge: { form: 'gamma', shape: 1.1, scale: 5600 },
        evapotranspiration: { form: 'exponential', scale: 110 },
      },
    },
  }),
  /** Dry on the record's last day. */
  station({
    id: 'tessen-sike',
    name: 'Tessen Sike at Low Hummock',
    ground: 'Moor on fissured rock; the stream stops in dry weather.',
    seed: 20190514,
    firstDay: '2019-04-01',
    areaKm2: 0.9,
    weather: { wetAfterDry: 0.26, wetAfterWet: 0.6, rainScale: 5.8 },
    water: { quickShare: 0.04, quickReference: 220, baseRate: 0.00002, baseExponent: 16, deepFlow: 0, firstStorage: 190 },
    truth: {
      initialStorage: 700,
      selection: {
        discharge: { form: 'gamma', shape: 0.6, scale: 180 },
        evapotranspiration: { form: 'exponential', scale: 80 },
      },
    },
  }),
];

/** What a station does not say of itself is Thessle Brook's. */
function station({ weather, water, ...own }) {
  return { ...brook, daysAfter: 0, ...own, weather: { ...brook.weather, ...weather }, water: { ...brook.water, ...water } };
}
