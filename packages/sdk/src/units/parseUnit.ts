import { RillageError } from '../errors.js';
import { ATOMS, PREFIXES, type Atom, type Dimension } from './atoms.js';
import { nearestWords } from './nearest.js';
import type { Species } from './nitrate.js';
import { COMMON_UNITS, SPELLINGS } from './spellings.js';

export interface Unit {
  /** As written. */
  text: string;
  /** Size in metre, kilogram, second, kelvin, mole. */
  factor: number;
  dimension: Dimension;
  /** Kelvin at the scale's zero; 0 but for temperature scales standing alone. */
  zeroAt: number;
  /** What a nitrate concentration is counted as, where the text says so. */
  species: Species | null;
}

/**
 * A unit from its UCUM spelling (`m3/s`, `mm/d`, `[in_i]`, `mg/L`), or from an everyday one (`cfs`, `inches`, `m³ s⁻¹`, `mg/L as N`).
 * @throws RillageError 'unit-unknown', with near units in the hint
 */
export function parseUnit(text: string): Unit {
  const unit = findUnit(text);
  if (unit) return unit;
  const near = nearestWords(plain(text), COMMON_UNITS);
  throw new RillageError({
    code: 'unit-unknown',
    expected: 'a unit by its UCUM spelling, such as mm/d, m3/s or mg/L',
    received: text,
    hint: near.length > 0 ? `Near ones: ${near.join(', ')}.` : 'Nothing near it is known; see the list of common units.',
  });
}

/** The same, null where the unit is unknown. */
export function findUnit(text: string): Unit | null {
  if (text.length > 60) return null;
  const { bare, species } = takeSpecies(plain(text));
  const product = bare === '' ? null : (parseExpression(bare, 0) ?? parseExpression(bare.toLowerCase(), 0));
  return product && { text, ...product, species };
}

type Product = Pick<Unit, 'factor' | 'dimension' | 'zeroAt'>;

/** One spelling for superscripts, micro signs, products and spaces. */
function plain(text: string): string {
  return text
    .trim()
    .replace(/[²³¹⁻]/g, (mark) => ({ '²': '2', '³': '3', '¹': '1' })[mark] ?? '-')
    .replace(/[µμ]/g, 'u')
    .replace(/[−–]/g, '-')
    .replace(/\*\*|\^/g, '')
    .replace(/\s+per\s+/gi, '/')
    .replace(/\s*\/\s*/g, '/')
    .replace(/[·*]/g, '.')
    .replace(/NO3-N\b/gi, 'N');
}

/** `mg/L as N`, `mg/L-N`, `mg{NO3}/L`, `mg N/L` → what it counts, and the unit without it. */
function takeSpecies(text: string): { bare: string; species: Species | null } {
  const match = /\s+as\s+(NO3|N)$|[-_ ](NO3|N)$|\{(NO3|N)\}|(?<=g) (NO3|N)(?=\/)|(?<=g)-(NO3|N)(?=\/)/i.exec(text);
  if (!match) return { bare: text.replace(/\{[^}]*\}/g, ''), species: null };
  const found = match.slice(1).find((group) => group !== undefined);
  return { bare: text.replace(match[0], '').replace(/\{[^}]*\}/g, ''), species: found?.toUpperCase() === 'N' ? 'N' : 'NO3' };
}

/** Components joined by `.`, `/` or a space. A `/` turns only the component after it, as UCUM reads from left to right. */
function parseExpression(text: string, depth: number): Product | null {
  const whole = SPELLINGS.get(text.toLowerCase());
  if (whole !== undefined && !ATOMS.has(text) && depth < 2 && whole !== text) return parseExpression(whole, depth + 1);
  const parts = text.split(/([./ ])/).filter((part) => part !== '');
  let factor = 1;
  const dimension: [number, number, number, number, number] = [0, 0, 0, 0, 0];
  let only: Product | null = null;
  let sign = 1;
  let expectsComponent = true;
  for (const part of parts) {
    if (part === '/' || part === '.' || part === ' ') {
      if (expectsComponent) return null;
      sign = part === '/' ? -1 : 1;
      expectsComponent = true;
      continue;
    }
    const component = parseComponent(part, depth);
    if (!component) return null;
    factor *= component.factor ** sign;
    component.dimension.forEach((exponent, index) => (dimension[index] += sign * exponent));
    only = component;
    expectsComponent = false;
  }
  if (expectsComponent || only === null) return null;
  return { factor, dimension, zeroAt: parts.length === 1 ? only.zeroAt : 0 };
}

/** `mm`, `km2`, `s-1`, `[ft_i]3`, `1000000[gal_us]`. */
function parseComponent(text: string, depth: number): Product | null {
  const match = /^(\d{1,9})?(.*?)(-?[1-9])?$/.exec(text);
  if (!match) return null;
  const [, countText, name, exponentText] = match;
  if (name === '') return countText === undefined ? null : { factor: Number(countText), dimension: ATOMS.get('1')!.dimension, zeroAt: 0 };
  const base = prefixed(name) ?? spelled(text, name, depth);
  if (!base) return null;
  const exponent = exponentText === undefined ? 1 : Number(exponentText);
  return {
    factor: Number(countText ?? 1) * base.factor ** exponent,
    dimension: base.dimension.map((each) => each * exponent) as unknown as Dimension,
    zeroAt: exponent === 1 && countText === undefined ? (base.zeroAt ?? 0) : 0,
  };
}

function prefixed(name: string): Atom | null {
  const atom = ATOMS.get(name);
  if (atom) return atom;
  const prefix = PREFIXES.get(name[0]);
  const stem = ATOMS.get(name.slice(1));
  return prefix !== undefined && stem?.metric ? { factor: prefix * stem.factor, dimension: stem.dimension } : null;
}

function spelled(whole: string, name: string, depth: number): Product | null {
  const spelling = SPELLINGS.get(name.toLowerCase()) ?? (whole === name ? undefined : SPELLINGS.get(whole.toLowerCase()));
  return spelling === undefined || depth > 2 ? null : parseExpression(spelling, depth + 1);
}
