/** A share as litres out of ten or a hundred, with its range in the same count. */
export interface Frequency {
  /** 0..of; where `bound` is set, the share lies beyond it. */
  count: number;
  of: 10 | 100;
  low: number | null;
  high: number | null;
  /** `fewer` than one, or `more` than all but one, litre in a hundred. */
  bound: 'fewer' | 'more' | null;
}

/**
 * Chooses the coarser count, ten, unless that would hide the share or its range. The range is rounded outwards, never inwards.
 * @param share 0..1
 */
export function frequency(share: number, range: { low: number; high: number } | null): Frequency {
  const narrow = range !== null && range.high - range.low < narrowest;
  const of = share < 0.05 || share > 0.95 || narrow ? 100 : 10;
  const exact = share * of;
  const bound = of === 100 && exact < 1 ? 'fewer' : of === 100 && exact > 99 ? 'more' : null;
  const count = bound === 'fewer' ? 1 : bound === 'more' ? 99 : Math.round(exact);
  return {
    count,
    of,
    low: range && Math.max(0, Math.floor(range.low * of + tiny)),
    high: range && Math.min(of, Math.ceil(range.high * of - tiny)),
    bound,
  };
}

// A range below a tenth would round outwards to at least twice its width in tenths.
const narrowest = 0.1;
const tiny = 1e-9;
