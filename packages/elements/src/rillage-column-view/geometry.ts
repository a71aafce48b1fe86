import { msPerDay } from '../shared/format.js';
import { lineHeight } from '../shared/text-lines.js';
import type { SectionData, SectionDataColumn } from './section-type.js';

/** Where everything of the picture stands, CSS px. Time runs left to right and depth downwards in every language. */
export interface Frame {
  width: number;
  height: number;
  em: number;
  left: number;
  right: number;
  /** The flow record. */
  flowTop: number;
  flowBottom: number;
  /** The section. */
  top: number;
  bottom: number;
  /** The cut: its own depth axis has the same scale, beside the section or, on a narrow page, beneath it. */
  cut: { left: number; right: number; top: number; beside: boolean };
  /** mm at the lower edge of the picture. */
  depthShown: number;
  /** ms since 1970 at both ends. */
  from: number;
  to: number;
  x: (time: number) => number;
  /** px below the top of the section (or of the cut). */
  down: (mm: number) => number;
}

/** @param titles  lines above the flow record and below the depth axis */
export function frameOf(section: SectionData, width: number, em: number, titles: { flow: string[]; depth: string[] }): Frame {
  const beside = width >= 44 * em;
  const left = 3.9 * em;
  const panel = beside ? Math.max(20 * em, Math.min(28 * em, 0.385 * width)) : 0;
  const right = width - panel - (beside ? 0 : 2.8 * em);
  const flowTop = (0.6 + lineHeight * titles.flow.length) * em;
  const more = lineHeight * (titles.depth.length - 1) * em;
  const flowBottom = flowTop + 4 * em;
  const top = flowBottom + 0.9 * em;
  const bottom = top + Math.round(Math.max(20 * em, Math.min(30 * em, 0.42 * width)));
  const cut = beside
    ? { left: right + 3.4 * em, right: width - 1, top, beside }
    : { left, right: width - 1, top: bottom + 6.4 * em + more, beside };
  const from = Date.parse(section.start);
  const to = from + section.steps * section.stepDays * msPerDay;
  const depthShown = shownDepth(section);
  return {
    ...{ width, em, left, right, flowTop, flowBottom, top, bottom, cut, depthShown, from, to },
    height: cut.top + (bottom - top) + 2.7 * em + (beside ? 0.3 * em + more : 0),
    x: (time) => left + ((time - from) / (to - from)) * (right - left),
    down: (mm) => (Math.min(mm, depthShown) / depthShown) * (bottom - top),
  };
}

/** ms since 1970 at the end of a column's step. */
export const timeOf = (section: SectionData, column: SectionDataColumn): number =>
  Date.parse(section.start) + (column.step + 1) * section.stepDays * msPerDay;

export const knownDepth = ({ bottom }: SectionDataColumn): number => bottom[bottom.length - 1] ?? 0;

/** The column whose moment is nearest. */
export function nearestColumn(section: SectionData, time: number): number {
  let nearest = 0;
  section.columns.forEach((column, index) => {
    if (Math.abs(timeOf(section, column) - time) < Math.abs(timeOf(section, section.columns[nearest]!) - time)) nearest = index;
  });
  return nearest;
}

/** Depth above which a share of the outflow was drawn, mm; null where it reaches into the pre-record water. */
export function depthOfShare({ bottom, selection }: SectionDataColumn, outflow: string, wanted: number): number | null {
  const shares = selection[outflow] ?? [];
  const row = shares.findIndex((share) => share >= wanted);
  if (row < 0) return null;
  const [share, depth] = row ? [shares[row - 1]!, bottom[row - 1]!] : [0, 0];
  return depth + ((wanted - share) / (shares[row]! - share || 1)) * (bottom[row]! - depth);
}

/** Depth of the water that is younger than an age, mm. */
export function depthYounger({ bottom, youngest, oldest }: SectionDataColumn, days: number): number {
  let depth = 0;
  for (let row = 0; row < bottom.length && youngest[row]! < days; row++) {
    const within = oldest[row]! <= days ? 1 : (days - youngest[row]!) / (oldest[row]! - youngest[row]!);
    depth += within * (bottom[row]! - (row ? bottom[row - 1]! : 0));
  }
  return depth;
}

/** The deepest known boundary with some ground below it; no more than there is storage where that is known. */
function shownDepth({ columns, storageInformed }: SectionData): number {
  let deepest = 1;
  let storage = 1;
  for (const column of columns) {
    deepest = Math.max(deepest, knownDepth(column));
    storage = Math.max(storage, column.storage);
  }
  const wanted = deepest * 1.18;
  return storageInformed ? Math.min(wanted, storage) : wanted;
}
