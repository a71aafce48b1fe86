import { nothing, svg, type TemplateResult } from 'lit';
import { ageClass, classLimits } from '../shared/age-ramp.js';
import { hatchPath } from '../shared/hatch.js';

/** Where things stand in the picture, px. The ages end at the record's edge; beyond it lies a strip without an age scale. */
export interface Frame {
  width: number;
  height: number;
  /** Size of the small type, px: the unit of every distance, so that larger type makes more room. */
  em: number;
  left: number;
  top: number;
  /** Where the record ends. */
  edge: number;
  right: number;
  bottom: number;
  /** Youngest age on the axis, days. */
  youngest: number;
  recordDays: number;
  log: boolean;
  x: (age: number) => number;
  /** Age at a place; the reverse of `x`. */
  ageAt: (x: number) => number;
  /** 0..1 upwards. */
  y: (share: number) => number;
}

export function frameFor(width: number, em: number, recordDays: number, log: boolean): Frame {
  const left = 3.4 * em;
  const right = width - 1;
  const top = 2.2 * em;
  const bottom = top + Math.max(14 * em, Math.min(22 * em, 0.42 * width));
  const edge = right - Math.max(5 * em, 0.13 * (right - left));
  const youngest = log ? Math.min(1, recordDays / 10) : 0;
  const span = log ? Math.log(recordDays / youngest) : recordDays;
  const share = (age: number): number => (log ? Math.log(Math.max(age, youngest) / youngest) : age) / span;
  return {
    ...{ width, em, left, top, right, bottom, edge, youngest, recordDays, log, height: bottom + (2 + 1.1 * rowsFor(width, em)) * em },
    x: (age) => left + Math.max(0, Math.min(1, share(age))) * (edge - left),
    ageAt: (x) => {
      const along = Math.max(0, Math.min(1, (x - left) / (edge - left)));
      return log ? youngest * Math.exp(along * span) : along * span;
    },
    y: (value) => bottom - Math.max(0, Math.min(1, value)) * (bottom - top),
  };
}

/** Slices of the age axis, each within one colour class. */
export function classSlices({ youngest, recordDays }: Frame): { from: number; to: number; className: string }[] {
  const edges = [youngest, ...classLimits.filter((limit) => limit > youngest && limit < recordDays), recordDays];
  return edges.slice(1).map((to, index) => ({ from: edges[index]!, to, className: `age-${ageClass(to)}` }));
}

/** A mark on the age axis. */
export interface AgeMark {
  days: number;
  label: string;
}

/** Axes: shares at the left, human ages below (in rows where they would touch), the ramp between, the hatched ground at the right. */
export function axes(frame: Frame, marks: AgeMark[], shareLabels: { at: number; label: string }[]): TemplateResult {
  const { left, right, edge, top, bottom, em, x, y } = frame;
  const rampTop = bottom + 0.35 * em;
  return svg`
    ${shareLabels.map(
      ({ at, label }) => svg`<line class="hair" x1=${left} x2=${right} y1=${y(at)} y2=${y(at)} />
        <text class="end" x=${left - 0.5 * em} y=${y(at) + 0.35 * em}>${label}</text>`,
    )}
    ${classSlices(frame).map(
      ({ from, to, className }) =>
        svg`<rect class="${className} ink" x=${x(from)} width=${x(to) - x(from)} y=${rampTop} height=${0.5 * em} />`,
    )}
    ${inRows(marks, frame).map(
      ({ days, label, row }) => svg`<line class="hair" x1=${x(days)} x2=${x(days)} y1=${top} y2=${bottom} />
        <line class="tick" x1=${x(days)} x2=${x(days)} y1=${rampTop} y2=${rampTop + (0.8 + 1.1 * row) * em} />
        <text class="middle" x=${x(days)} y=${rampTop + (1.8 + 1.1 * row) * em}>${label}</text>`,
    )}
    <line class="tick" x1=${edge} x2=${edge} y1=${top - 0.4 * em} y2=${bottom + 0.85 * em} />
    <line class="tick" x1=${left} x2=${right} y1=${bottom} y2=${bottom} />
  `;
}

/**
 * The share beyond the record: hatched where it is sure, more faintly where it lies within its range, and never a curve.
 * @param place  whether it hangs from the whole or stands on the axis
 * @param top    share at the top of the axis
 */
export function beyondRecord(
  { edge, right, y }: Frame,
  { share, range, place, top }: { share: number; range: { low: number; high: number } | null; place: 'hanging' | 'standing'; top: number },
): TemplateResult {
  const width = right - edge;
  const block = (from: number, to: number, name: string): TemplateResult | typeof nothing => {
    const [upper, lower] = place === 'hanging' ? [y(1 - from), y(1 - to)] : [y(to / top), y(from / top)];
    if (lower - upper < 0.5) return nothing;
    return svg`<rect class="ground ${name}" x=${edge} width=${width} y=${upper} height=${lower - upper} />
      <path class="hatch ${name}" d=${hatchPath(edge, upper, width, lower - upper)} />`;
  };
  return range ? svg`${block(range.low, range.high, 'faint')}${block(0, range.low, '')}` : svg`${block(0, share, '')}`;
}

/** Rows of labels to leave room for: narrow pictures stack more of them. */
const rowsFor = (width: number, em: number): number => (width < 26 * em ? 3 : 2);

function inRows(marks: AgeMark[], { x, em, left, right, width }: Frame): (AgeMark & { row: number })[] {
  const ends = Array.from({ length: rowsFor(width, em) }, () => left - 3 * em);
  const placed: (AgeMark & { row: number })[] = [];
  for (const mark of marks) {
    // Half a label's width at about half an em a letter.
    const half = 0.28 * em * mark.label.length;
    const place = Math.min(x(mark.days), right - half);
    const row = ends.findIndex((end) => place - half > end + 0.5 * em);
    if (row < 0) continue;
    ends[row] = place + half;
    placed.push({ ...mark, row });
  }
  return placed;
}
