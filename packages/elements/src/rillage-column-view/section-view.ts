import { svg, type TemplateResult } from 'lit';
import { msPerDay, number } from '../shared/format.js';
import { linesAt, textLines } from '../shared/text-lines.js';
import { timeMarks } from '../shared/time-axis.js';
import { depthYounger, knownDepth, timeOf, type Frame } from './geometry.js';
import type { SectionData } from './section-type.js';
import { millimetres, outflowName, outflowsOf, type Speech } from './words.js';

/** Everything of the picture that the line does not move: axes, the flow record, the fine lines of years, the outline of what is known. */
export function sectionView(speech: Speech, section: SectionData, frame: Frame, titles: Titles): TemplateResult {
  const { em, left, right, top, bottom } = frame;
  return svg`
    ${flowRecord(speech, section, frame, titles.flow)}
    <path class="ink" d=${boundary(section, frame)} />
    ${yearLines(speech, section, frame)}
    <rect class="edge" x=${left} y=${top} width=${right - left} height=${bottom - top} />
    ${depthAxis(speech, frame, left, top)}
    ${timeMarks(speech.tag, frame.from, frame.to, (right - left) / (3.9 * em)).map(
      ({ time, label }) => svg`<line class="tick" x1=${frame.x(time)} x2=${frame.x(time)} y1=${bottom} y2=${bottom + 0.4 * em} />
        <text class=${frame.x(time) > right - 2 * em ? 'end' : frame.x(time) < left + 2 * em ? '' : 'middle'} x=${frame.x(time)} y=${bottom + 1.6 * em}>${label}</text>`,
    )}
    ${linesAt(titles.depth, 0, bottom + 2.9 * em, em)}
  `;
}

/** Lines of text above the flow record and below the depth axis. */
export interface Titles {
  flow: string[];
  depth: string[];
}

export function titlesOf(speech: Speech, section: SectionData, width: number, em: number): Titles {
  const name = shownOutflow(section);
  const flow = name === undefined ? '' : speech.say('column.flow', { outflow: outflowName(speech, name) });
  return { flow: textLines(flow, width - 4 * em, em), depth: textLines(speech.say('column.depth'), width, em) };
}

const shownOutflow = (section: SectionData): string | undefined =>
  outflowsOf(section).find((outflow) => Object.hasOwn(section.flow.outflows, outflow));

/** Ticks of depth at an edge. */
export function depthAxis(speech: Speech, frame: Frame, x: number, top: number): TemplateResult[] {
  const { em, down } = frame;
  return depthMarks(frame).map(
    (depth) => svg`<line class="tick" x1=${x - 0.4 * em} x2=${x} y1=${top + down(depth)} y2=${top + down(depth)} />
      <text class="end" x=${x - 0.6 * em} y=${top + down(depth) + 0.35 * em}>${millimetres(speech, depth)}</text>`,
  );
}

/** Round depths, about one every four lines. */
export function depthMarks({ depthShown, bottom, top, em }: Frame): number[] {
  const step = roundUp((depthShown * 4 * em) / (bottom - top));
  return Array.from({ length: Math.floor(depthShown / step) + 1 }, (_, index) => index * step);
}

/** The next of 1, 2, 5 times a power of ten. */
export function roundUp(value: number): number {
  const power = 10 ** Math.floor(Math.log10(value));
  return ([1, 2, 5].find((digit) => digit * power >= value * 0.999) ?? 10) * power;
}

function flowRecord(speech: Speech, section: SectionData, frame: Frame, title: string[]): TemplateResult | undefined {
  const name = shownOutflow(section);
  const values = name === undefined ? [] : section.flow.outflows[name]!;
  if (name === undefined || values.length === 0) return undefined;
  const { em, left, right, flowTop, flowBottom } = frame;
  const width = Math.max(1, Math.round(right - left));
  // The highest flow within each pixel: a flood of a day is not lost in ten years.
  const peaks = new Float64Array(width);
  values.forEach((value, index) => {
    const time = frame.from + (index + 0.5) * section.flow.stepDays * msPerDay;
    const place = Math.max(0, Math.min(width - 1, Math.floor(frame.x(time) - left)));
    peaks[place] = Math.max(peaks[place]!, value);
  });
  // Fewer values than pixels leave gaps between them, which are bridged by leaving them out.
  const sparse = values.length < width;
  const greatest = peaks.reduce((most, value) => Math.max(most, value), 0);
  const y = (value: number): string => (flowBottom - (greatest ? value / greatest : 0) * (flowBottom - flowTop)).toFixed(1);
  const points: string[] = [];
  peaks.forEach((value, place) => (value || !sparse ? points.push(`${(left + place + 0.5).toFixed(1)} ${y(value)}`) : 0));
  return svg`<path class="flow" d=${`M${left} ${flowBottom}L${points.join('L')}L${right} ${flowBottom}`} />
    <line class="tick" x1=${left} x2=${right} y1=${flowBottom} y2=${flowBottom} />
    ${linesAt(title, title.length > 1 ? 0 : left, flowTop - 0.6 * em, em, true)}
    <line class="tick" x1=${left - 0.4 * em} x2=${left} y1=${flowTop} y2=${flowTop} />
    <text class="end" x=${left - 0.6 * em} y=${flowTop + 0.35 * em}>${number(speech.tag, { maximumSignificantDigits: 2 }).format(greatest)}</text>`;
}

/** Lower edge of all that fell within the record. */
function boundary(section: SectionData, frame: Frame): string {
  const points = section.columns.map(
    (column) => `${frame.x(timeOf(section, column)).toFixed(1)} ${(frame.top + frame.down(knownDepth(column))).toFixed(1)}`,
  );
  return `M${frame.left} ${frame.top}L${points.join('L')}`;
}

/** Paths of boundaries of the balance: above each lies what fell since the start of a year. */
function yearLines(speech: Speech, section: SectionData, frame: Frame): TemplateResult[] {
  const { em, right, top } = frame;
  let lastLabel = -Infinity;
  return timeMarks(speech.tag, frame.from + 1, frame.to, 12)
    .reverse()
    .map(({ time, label }) => {
      let end = 0;
      const points = section.columns
        .filter((column) => timeOf(section, column) > time)
        .map((column) => {
          const depth = depthYounger(column, (timeOf(section, column) - time) / msPerDay);
          end = top + frame.down(depth);
          return `${frame.x(timeOf(section, column)).toFixed(1)} ${end.toFixed(1)}`;
        });
      const labelled = points.length > 0 && end > lastLabel + 1.1 * em && end < frame.bottom + 0.3 * em;
      if (labelled) lastLabel = end;
      return svg`<path class="year" d=${`M${frame.x(time).toFixed(1)} ${top}L${points.join('L')}`} />
        ${labelled ? svg`<text class="small" x=${right + 0.35 * em} y=${end + 0.35 * em}>${label}</text>` : ''}`;
    });
}
