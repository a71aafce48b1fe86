import type { Quantity } from './quantity.js';

/** Standard atomic weights as abridged by IUPAC; the values of the check list that the tests carry. */
export const NITROGEN: Quantity = {
  value: 14.007,
  unit: 'g/mol',
  uncertainty: 0.001,
  source: 'IUPAC abridged standard atomic weights (from memory)',
};
export const OXYGEN: Quantity = {
  value: 15.999,
  unit: 'g/mol',
  uncertainty: 0.001,
  source: 'IUPAC abridged standard atomic weights (from memory)',
};

/** What a concentration is counted as: nitrogen, or the whole nitrate ion. */
export type Species = 'N' | 'NO3';

/** g/mol by species. */
export const MOLAR_MASS: ReadonlyMap<string, number> = new Map<Species, number>([
  ['N', NITROGEN.value],
  ['NO3', NITROGEN.value + 3 * OXYGEN.value],
]);

/**
 * Nitrate counted as nitrogen, from nitrate counted as the whole ion: c_N = c_NO3 M_N / (M_N + 3 M_O). Any mass concentration, same unit out.
 * @source molar masses above; printed equivalents: 50 mg/L NO3 is 11.3 mg/L N (common practice)
 */
export function nitrateAsNitrogen(concentrationAsNitrate: number): number {
  return (concentrationAsNitrate * NITROGEN.value) / (NITROGEN.value + 3 * OXYGEN.value);
}

/** The other way: c_NO3 = c_N (M_N + 3 M_O) / M_N. */
export function nitrateAsIon(concentrationAsNitrogen: number): number {
  return (concentrationAsNitrogen * (NITROGEN.value + 3 * OXYGEN.value)) / NITROGEN.value;
}
