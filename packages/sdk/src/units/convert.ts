import { RillageError } from '../errors.js';
import { MOLAR_MASS } from './nitrate.js';
import { parseUnit, type Unit } from './parseUnit.js';

/** Facts a conversion may need. */
export interface ConversionFacts {
  /** Catchment area: turns a volume of water into a depth over it, and back. */
  areaKm2?: number;
}

/**
 * A value in another unit. Flow and volume become depth over the catchment when `facts.areaKm2` is given: h = V / A.
 * Nitrate moves between `as N` and `as NO3`, and to moles, by molar mass.
 * @throws RillageError 'unit-unknown' | 'unit-mismatch' | 'area-missing' | 'species-missing'
 * @source UCUM; exact definitions of the international foot, inch and mile
 */
export function convert(value: number, from: string, to: string, facts: ConversionFacts = {}): number {
  return converter(from, to, facts)(value);
}

/** The same as a function, for whole columns: parses the units once. Equal units return the value untouched. */
export function converter(from: string, to: string, facts: ConversionFacts = {}): (value: number) => number {
  const source = parseUnit(from);
  const target = parseUnit(to);
  const extra = extraFactor(source, target, facts);
  if (source.factor === target.factor && source.zeroAt === target.zeroAt && extra === 1) return (value) => value;
  if (source.zeroAt !== 0 || target.zeroAt !== 0) {
    // Celsius to Celsius through kelvin would lose the last digits of 0.1, so the shift is taken in the source's own degrees.
    const shift = (source.zeroAt - target.zeroAt) / target.factor;
    const scale = source.factor / target.factor;
    return (value) => value * scale + shift;
  }
  const scale = (source.factor / target.factor) * extra;
  return (value) => value * scale;
}

/** True where {@link converter} would succeed, given an area. */
export function isConvertible(from: Unit, to: Unit): boolean {
  try {
    extraFactor(from, to, { areaKm2: 1 });
    return true;
  } catch {
    return false;
  }
}

/** What unit sizes alone do not cover: area, species. */
function extraFactor(from: Unit, to: Unit, facts: ConversionFacts): number {
  const [length, mass, time, temperature, amount] = from.dimension.map((exponent, index) => exponent - to.dimension[index]);
  const others = time === 0 && temperature === 0;
  if (length === 0 && mass === 0 && amount === 0 && others) return speciesFactor(from, to);
  if (Math.abs(length) === 2 && mass === 0 && amount === 0 && others && isWater(from) && isWater(to)) {
    return areaM2(from, to, facts) ** (length > 0 ? -1 : 1);
  }
  if (length === 0 && mass !== 0 && mass === -amount && Math.abs(mass) === 1 && others) {
    const species = from.species ?? to.species;
    if (species === null) throw mismatch('species-missing', from, to, "Say what the mass counts: 'mg/L as N' or 'mg/L as NO3'.");
    const kilogramPerMole = MOLAR_MASS.get(species)! / 1000;
    return mass > 0 ? 1 / kilogramPerMole : kilogramPerMole;
  }
  throw mismatch('unit-mismatch', from, to, 'They measure different things. Check the column, or give the unit the values really have.');
}

/** Depth, volume, or either per time: all that an area may turn into one another. */
function isWater({ dimension: [length, mass, , temperature, amount] }: Unit): boolean {
  return (length === 1 || length === 3) && mass === 0 && temperature === 0 && amount === 0;
}

function speciesFactor(from: Unit, to: Unit): number {
  if (from.species === to.species || from.dimension[4] !== 0) return 1;
  if (from.species === null || to.species === null) {
    throw mismatch('species-missing', from, to, "One side says what it counts, the other does not. Write 'as N' or 'as NO3' on both.");
  }
  return MOLAR_MASS.get(to.species)! / MOLAR_MASS.get(from.species)!;
}

function areaM2(from: Unit, to: Unit, facts: ConversionFacts): number {
  if (facts.areaKm2 === undefined) {
    throw mismatch('area-missing', from, to, 'A volume becomes a depth only over an area: give the catchment area in km2.');
  }
  if (!(facts.areaKm2 > 0 && Number.isFinite(facts.areaKm2))) {
    throw new RillageError({
      code: 'area-invalid',
      path: 'areaKm2',
      expected: 'a positive number of km2',
      received: String(facts.areaKm2),
    });
  }
  return facts.areaKm2 * 1e6;
}

function mismatch(code: string, from: Unit, to: Unit, hint: string): RillageError {
  return new RillageError({ code, expected: `a unit that converts to ${to.text}`, received: from.text, hint });
}
