import type { Tint } from './bitmap.js';
import type { SectionData } from './section-type.js';

/** What the bands show; age where there is no such tracer. The ends of a tracer's tints leave a fiftieth of the layers beyond on either side. */
export function tintOf(section: SectionData, wanted: string): Tint {
  if (wanted === 'age' || !Object.hasOwn(section.columns[0]!.concentration, wanted)) return { of: 'age' };
  let tints = known.get(section);
  if (!tints) known.set(section, (tints = new Map()));
  let tint = tints.get(wanted);
  if (!tint) {
    const values = section.columns.flatMap(({ concentration }) => concentration[wanted] ?? []).sort((a, b) => a - b);
    const at = (share: number): number => values[Math.round(share * (values.length - 1))] ?? 0;
    tints.set(wanted, (tint = { of: 'tracer', name: wanted, low: at(0.02), high: at(0.98) }));
  }
  return tint;
}

const known = new WeakMap<SectionData, Map<string, Tint>>();
