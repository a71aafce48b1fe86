import { nothing, svg, type TemplateResult } from 'lit';
import { hatchPath } from '../shared/hatch.js';
import { number, percent } from '../shared/format.js';
import { depthOfShare, knownDepth, timeOf, type Frame } from './geometry.js';
import { depthAxis, depthMarks } from './section-view.js';
import type { SectionData, SectionDataColumn } from './section-type.js';
import { outflowName, outflowsOf, type Speech } from './words.js';

/** What the cut needs beside the column: the colour of each layer and the scale of the profiles. */
export interface CutLook {
  colour: (column: SectionDataColumn, row: number) => string;
  /** Share from one millimetre at the right edge of a profile. */
  most: number;
}

/** The line through the section, and the column at it with what each outflow took of every layer, on one depth axis. */
export function cutView(speech: Speech, section: SectionData, frame: Frame, column: SectionDataColumn, look: CutLook): TemplateResult {
  const { em, flowTop, bottom, down, depthShown } = frame;
  const { left, right, top, beside } = frame.cut;
  const x = frame.x(timeOf(section, column));
  const outflows = outflowsOf(section);
  const bar = 2.6 * em;
  const from = left + bar + 1.4 * em;
  const each = (right - from + 1.2 * em) / outflows.length;
  const floor = top + down(depthShown);
  return svg`
    <line class="cut under" x1=${x} x2=${x} y1=${flowTop - 0.3 * em} y2=${bottom} />
    <line class="cut" x1=${x} x2=${x} y1=${flowTop - 0.3 * em} y2=${bottom} />
    <path class="grip" d=${`M${x} ${flowTop + 0.3 * em}l${-0.55 * em} ${-0.9 * em}h${1.1 * em}z`} />
    ${depthMarks(frame).map((depth) => svg`<line class="hair" x1=${left} x2=${right} y1=${top + down(depth)} y2=${top + down(depth)} />`)}
    ${beside ? nothing : depthAxis(speech, frame, left, top)}
    <text x=${left} y=${top - 1.9 * em}>${speech.say('column.atLine')}</text>
    ${layers(frame, column, look, left, () => bar)}
    ${ground(frame, section, column, left, bar)}
    ${outflows.map((name, index) => {
      const place = from + index * each;
      const end = place + each - 1.2 * em;
      const last = index > 0 && index === outflows.length - 1;
      const flows = (column.flow[name] ?? 0) > 0;
      return svg`
        <text class=${last ? 'end' : ''} x=${last ? right : place} y=${top - 0.6 * em}>${outflowName(speech, name)}</text>
        ${flows ? profile(speech, section, frame, column, look, name, place, end) : nothing}
        <line class="tick" x1=${place} x2=${place} y1=${top} y2=${floor} />
        <line class="tick" x1=${place} x2=${end} y1=${floor} y2=${floor} />
        <text class="small" x=${place} y=${floor + 1.4 * em}>0</text>
        <text class="small end" x=${end} y=${floor + 1.4 * em}>${sharePerMm(speech, look.most)}</text>`;
    })}
    <text class="small end" x=${right} y=${floor + 2.5 * em}>${speech.say('column.perMillimetre')}</text>`;
}

const sharePerMm = (speech: Speech, share: number): string =>
  number(speech.tag, { style: 'percent', maximumSignificantDigits: 1 }).format(share);

/** What one outflow took of each layer: the width is the share from one millimetre, so that areas are shares of the outflow. */
function profile(
  speech: Speech,
  section: SectionData,
  frame: Frame,
  column: SectionDataColumn,
  look: CutLook,
  name: string,
  x: number,
  end: number,
): TemplateResult {
  const { em, down, depthShown } = frame;
  const { top } = frame.cut;
  const { bottom } = column;
  const shares = column.selection[name]!;
  const above = (values: number[], row: number): number => (row ? values[row - 1]! : 0);
  const width = (share: number, depth: number): number => Math.min(end - x, depth > 0 ? ((share / depth) * (end - x)) / look.most : 0);
  const half = depthOfShare(column, name, 0.5);
  const older = Math.max(0, 1 - (shares[shares.length - 1] ?? 0));
  const drawsGround = section.storageInformed && older > 0;
  return svg`
    ${layers(frame, column, look, x, (first, last) => width(shares[last]! - above(shares, first), bottom[last]! - above(bottom, first)))}
    ${drawsGround ? ground(frame, section, column, x, Math.max(1.5, width(older, column.preRecordDepth))) : nothing}
    ${
      half !== null && half < depthShown
        ? svg`<path class="half" d=${`M${x - 0.6 * em} ${top + down(half) - 0.4 * em}l${0.55 * em} ${0.4 * em}l${-0.55 * em} ${0.4 * em}z`} />`
        : nothing
    }
    ${older > 0.0005 ? svg`<text class="end" x=${end} y=${top + down(depthShown) - 0.5 * em}>${speech.say('column.olderShare', { share: percent(speech, older) })}</text>` : nothing}`;
}

/**
 * Share from one millimetre that fits a profile: what the uppermost thirtieth gives at most, over all columns and outflows, rounded up. What
 * exceeds it ends at the edge; the table has its number.
 */
export function profileScale(section: SectionData, depthShown: number): number {
  const depth = depthShown / 30;
  let most = 0;
  for (const { bottom, selection } of section.columns) {
    const row = bottom.findIndex((edge) => edge >= depth);
    if (row < 0) continue;
    for (const shares of Object.values(selection)) most = Math.max(most, shares[row]! / bottom[row]!);
  }
  if (!(most > 0)) return 1;
  const power = 10 ** Math.floor(Math.log10(most));
  return Math.ceil((most / power) * 0.999) * power;
}

/** The layers as rectangles of their colour within one outline; those thinner than half a pixel are drawn with the next. */
function layers(
  { cut: { top }, down, depthShown }: Frame,
  column: SectionDataColumn,
  { colour }: CutLook,
  x: number,
  width: (first: number, last: number) => number,
): TemplateResult {
  const { bottom } = column;
  const rects: TemplateResult[] = [];
  let outline = `M${x} ${top}`;
  let first = 0;
  let y = top;
  for (let row = 0; row < bottom.length && y < top + down(depthShown); row++) {
    const end = top + down(bottom[row]!);
    if (end - y < 0.5 && row < bottom.length - 1) continue;
    const across = Math.max(0, width(first, row));
    rects.push(
      svg`<rect class="layer" x=${x} y=${y.toFixed(2)} width=${across.toFixed(2)} height=${(end - y).toFixed(2)} fill=${colour(column, row)} />`,
    );
    outline += `H${(x + across).toFixed(2)}V${end.toFixed(2)}`;
    first = row + 1;
    y = end;
  }
  return svg`${rects}<path class="ink" d=${`${outline}H${x}Z`} />`;
}

/** Water from before the record, as far as the storage goes: hatched, never a colour. Without a known floor it has no lower edge. */
function ground(
  { cut, down, depthShown }: Frame,
  section: SectionData,
  column: SectionDataColumn,
  x: number,
  width: number,
): TemplateResult {
  const top = cut.top + down(knownDepth(column));
  const floor = cut.top + down(section.storageInformed ? column.storage : depthShown);
  if (floor - top < 0.5) return svg``;
  return section.storageInformed
    ? svg`<rect class="ground" x=${x} y=${top} width=${width} height=${floor - top} /><path class="hatch" d=${hatchPath(x, top, width, floor - top)} />`
    : svg`<path class="hatch open" d=${hatchPath(x, top, width, Math.min(floor - top, 0.12 * down(depthShown)))} />`;
}
