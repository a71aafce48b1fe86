import { RillageError } from '../errors.js';
import type { Quantity } from './quantity.js';

const SOURCE = 'reference sheet of the international measurement standards VSMOW2 and SLAP2 (from memory)';

/** Isotope-amount ratios of the reference water VSMOW, by isotope. */
export const REFERENCE_RATIO: Readonly<Record<'18O' | '2H', Quantity>> = {
  '18O': { value: 2005.2e-6, unit: '1', uncertainty: 0.45e-6, source: SOURCE },
  '2H': { value: 155.76e-6, unit: '1', uncertainty: 0.05e-6, source: SOURCE },
};

/**
 * Delta of an isotope-amount ratio against VSMOW: δ = (R / R_ref − 1) × 1000.
 * @param ratio heavy over light, dimensionless, not negative
 * @returns permil
 * @throws RillageError 'ratio-invalid'
 * @source definition of delta on the VSMOW scale; REFERENCE_RATIO
 */
export function deltaFromRatio(ratio: number, isotope: '18O' | '2H'): number {
  if (!(ratio >= 0 && Number.isFinite(ratio))) {
    throw new RillageError({ code: 'ratio-invalid', expected: 'a finite ratio, not negative', received: String(ratio) });
  }
  return (ratio / REFERENCE_RATIO[isotope].value - 1) * 1000;
}

/** The other way: R = R_ref (1 + δ / 1000). @throws RillageError 'delta-invalid' below −1000 permil */
export function ratioFromDelta(delta: number, isotope: '18O' | '2H'): number {
  if (!(delta >= -1000 && Number.isFinite(delta))) {
    throw new RillageError({ code: 'delta-invalid', expected: 'a finite delta of −1000 permil or more', received: String(delta) });
  }
  return REFERENCE_RATIO[isotope].value * (1 + delta / 1000);
}

/** d = δ²H − 8 δ¹⁸O, permil. @source Dansgaard 1964, Tellus 16:436–468 (from memory) */
export function deuteriumExcess(delta2H: number, delta18O: number): number {
  return delta2H - 8 * delta18O;
}

/** δ²H = 8 δ¹⁸O + 10, permil: the global meteoric water line. @source Craig 1961, Science 133:1702–1703 (from memory) */
export function meteoricWaterLine(delta18O: number): number {
  return 8 * delta18O + 10;
}
