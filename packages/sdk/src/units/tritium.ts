import { BECQUEREL_PER_KILOGRAM_AT_ONE_TRITIUM_UNIT } from './atoms.js';
import type { Quantity } from './quantity.js';

export const TRITIUM_HALF_LIFE: Quantity = {
  value: 4500,
  unit: 'd',
  uncertainty: 8,
  source: 'Lucas & Unterweger 2000, J. Res. NIST 105:541–549 (from memory)',
};

/** Activity of water that holds one tritium in 1e18 hydrogen atoms. */
export const TRITIUM_UNIT: Quantity = {
  value: BECQUEREL_PER_KILOGRAM_AT_ONE_TRITIUM_UNIT,
  unit: 'Bq/kg',
  uncertainty: BECQUEREL_PER_KILOGRAM_AT_ONE_TRITIUM_UNIT * (8 / 4500),
  source: 'computed: 2 N_A / M_water × 1e-18 × ln 2 / half-life',
};

/**
 * First-order decay constant of a half-life: k = ln 2 / T½.
 * @param halfLifeDays days, positive; NaN in, NaN out
 * @returns per day, as `TracerRule.decayPerDay` wants it
 * @source definition
 */
export function decayPerDay(halfLifeDays: number): number {
  return Math.LN2 / halfLifeDays;
}
