import { nothing, svg, type TemplateResult } from 'lit';
import { ageClass } from '../shared/age-ramp.js';
import { hatchPath } from '../shared/hatch.js';

/** A share and what is not sure about it, on a line from nothing to all of the water. */
export interface Strip {
  share: number;
  unplaced: number;
  range: { low: number; high: number } | null;
  /** Age that colours it, days; null for water older than the record, which is hatched. */
  days: number | null;
}

/** The range as an outlined bar without a middle; where no range was assessed, a bare stroke at the share. */
export function strip({ share, unplaced, range, days }: Strip): TemplateResult {
  return svg`<svg class="strip" part="strip" aria-hidden="true" focusable="false">
    <line class="axis" x1="0" x2="100%" y1="6" y2="6" />
    <line class="axis" x1="0.5" x2="0.5" y1="0" y2="12" />
    <line class="axis" x1="100%" x2="100%" y1="0" y2="12" />
    ${unplaced > 0 ? hatched(share, share + unplaced, 'unplaced') : nothing}
    ${range ? (days === null ? hatched(range.low, range.high, '') : bar(range.low, range.high, `age-${ageClass(days)}`)) : nothing}
    ${range ? nothing : svg`<line class="point" x1=${percent(share)} x2=${percent(share)} y1="0" y2="12" />`}
  </svg>`;
}

const percent = (value: number): string => `${(Math.max(0, Math.min(1, value)) * 100).toFixed(2)}%`;
const width = (low: number, high: number): string => percent(Math.max(thinnest, high - low));
// A hundredth of the line: what is left of a very narrow range.
const thinnest = 0.01;
// Wide enough for any page; the nested svg cuts it.
const strokes = hatchPath(0, 0, 1600, 10, 5);

const bar = (low: number, high: number, kind: string): TemplateResult =>
  svg`<rect class=${kind} x=${percent(low)} width=${width(low, high)} y="1" height="10" />`;

const hatched = (low: number, high: number, kind: string): TemplateResult => svg`${bar(low, high, `ground ${kind}`)}
  <svg x=${percent(low)} width=${width(low, high)} y="1" height="10"><path class="hatch" d=${strokes} /></svg>`;
