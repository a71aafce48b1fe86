/** Exponents of length, mass, time, temperature and amount of substance. */
export type Dimension = readonly [length: number, mass: number, time: number, temperature: number, amount: number];

export interface Atom {
  /** Size in metre, kilogram, second, kelvin, mole. */
  factor: number;
  dimension: Dimension;
  /** Takes the metric prefixes. */
  metric?: true;
  /** Kelvin at the scale's zero, for temperature scales standing alone. */
  zeroAt?: number;
}

const LENGTH: Dimension = [1, 0, 0, 0, 0];
const AREA: Dimension = [2, 0, 0, 0, 0];
const VOLUME: Dimension = [3, 0, 0, 0, 0];
const MASS: Dimension = [0, 1, 0, 0, 0];
const TIME: Dimension = [0, 0, 1, 0, 0];
const PER_TIME: Dimension = [0, 0, -1, 0, 0];
const TEMPERATURE: Dimension = [0, 0, 0, 1, 0];
const PURE: Dimension = [0, 0, 0, 0, 0];

const FOOT = 0.3048;
const INCH = 0.0254;
const MILE = 1609.344;
const SURVEY_FOOT = 1200 / 3937;

/**
 * Tritium activity of water at one tritium unit (one tritium in 1e18 hydrogen atoms), Bq/kg: 2 N_A / M_water × 1e-18 × ln 2 / half-life.
 * Half-life 4500 d (± 8 d); M_water 18.0152801 g/mol. Source: SI value of the Avogadro constant (exact); the half-life as in `tritium.ts`.
 */
export const BECQUEREL_PER_KILOGRAM_AT_ONE_TRITIUM_UNIT = ((2 * 6.02214076e23) / 0.0180152801) * 1e-18 * (Math.LN2 / (4500 * 86400));

/**
 * Atoms by UCUM's case-sensitive code. `[acr_i]` (the international acre, 43 560 international square feet) and `[TU]` (tritium unit) are not
 * UCUM's own; they are spelled in its manner.
 * Source: The Unified Code for Units of Measure, version 2.1, tables of units; inch, foot, yard, mile exact since 1959.
 */
export const ATOMS: ReadonlyMap<string, Atom> = new Map<string, Atom>([
  ['1', { factor: 1, dimension: PURE }],
  ['%', { factor: 1e-2, dimension: PURE }],
  ['[ppth]', { factor: 1e-3, dimension: PURE }],
  ['[ppm]', { factor: 1e-6, dimension: PURE }],
  ['[ppb]', { factor: 1e-9, dimension: PURE }],
  ['m', { factor: 1, dimension: LENGTH, metric: true }],
  ['[in_i]', { factor: INCH, dimension: LENGTH }],
  ['[ft_i]', { factor: FOOT, dimension: LENGTH }],
  ['[yd_i]', { factor: 3 * FOOT, dimension: LENGTH }],
  ['[mi_i]', { factor: MILE, dimension: LENGTH }],
  ['[ft_us]', { factor: SURVEY_FOOT, dimension: LENGTH }],
  ['ar', { factor: 100, dimension: AREA, metric: true }],
  ['[acr_us]', { factor: 43560 * SURVEY_FOOT ** 2, dimension: AREA }],
  ['[acr_i]', { factor: 43560 * FOOT ** 2, dimension: AREA }],
  ['[sft_i]', { factor: FOOT ** 2, dimension: AREA }],
  ['[smi_i]', { factor: MILE ** 2, dimension: AREA }],
  ['L', { factor: 1e-3, dimension: VOLUME, metric: true }],
  ['l', { factor: 1e-3, dimension: VOLUME, metric: true }],
  ['[cft_i]', { factor: FOOT ** 3, dimension: VOLUME }],
  ['[cin_i]', { factor: INCH ** 3, dimension: VOLUME }],
  ['[gal_us]', { factor: 231 * INCH ** 3, dimension: VOLUME }],
  ['g', { factor: 1e-3, dimension: MASS, metric: true }],
  ['t', { factor: 1e3, dimension: MASS }],
  ['[lb_av]', { factor: 0.45359237, dimension: MASS }],
  ['s', { factor: 1, dimension: TIME, metric: true }],
  ['min', { factor: 60, dimension: TIME }],
  ['h', { factor: 3600, dimension: TIME }],
  ['d', { factor: 86400, dimension: TIME }],
  ['wk', { factor: 7 * 86400, dimension: TIME }],
  ['mo', { factor: (365.25 / 12) * 86400, dimension: TIME }],
  ['a', { factor: 365.25 * 86400, dimension: TIME }],
  ['K', { factor: 1, dimension: TEMPERATURE, metric: true }],
  ['Cel', { factor: 1, dimension: TEMPERATURE, zeroAt: 273.15 }],
  ['[degF]', { factor: 5 / 9, dimension: TEMPERATURE, zeroAt: 273.15 - 32 * (5 / 9) }],
  ['mol', { factor: 1, dimension: [0, 0, 0, 0, 1], metric: true }],
  ['Bq', { factor: 1, dimension: PER_TIME, metric: true }],
  ['Ci', { factor: 3.7e10, dimension: PER_TIME, metric: true }],
  ['[TU]', { factor: BECQUEREL_PER_KILOGRAM_AT_ONE_TRITIUM_UNIT, dimension: [0, -1, -1, 0, 0] }],
  ['Pa', { factor: 1, dimension: [-1, 1, -2, 0, 0], metric: true }],
  ['bar', { factor: 1e5, dimension: [-1, 1, -2, 0, 0], metric: true }],
  ['J', { factor: 1, dimension: [2, 1, -2, 0, 0], metric: true }],
  ['W', { factor: 1, dimension: [2, 1, -3, 0, 0], metric: true }],
]);

export const PREFIXES: ReadonlyMap<string, number> = new Map([
  ['G', 1e9],
  ['M', 1e6],
  ['k', 1e3],
  ['h', 1e2],
  ['d', 1e-1],
  ['c', 1e-2],
  ['m', 1e-3],
  ['u', 1e-6],
  ['n', 1e-9],
  ['p', 1e-12],
]);
