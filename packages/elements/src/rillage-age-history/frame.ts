import type { StationHistory } from '@rillage/sdk';
import { msPerDay } from '../shared/format.js';
import { lineHeight } from '../shared/text-lines.js';

/** Where the two panels stand, CSS px, and how steps lie along them. Time runs left to right in every language. */
export interface Frame {
  width: number;
  height: number;
  em: number;
  left: number;
  right: number;
  upper: { top: number; bottom: number };
  lower: { top: number; bottom: number };
  /** First step shown, and one past the last. */
  from: number;
  to: number;
  /** px of a step's middle. */
  x: (step: number) => number;
  /** Step under a place. */
  stepAt: (x: number) => number;
}

/** @param titles  lines above each panel */
export function frameOf(width: number, em: number, from: number, to: number, titles: { upper: string[]; lower: string[] }): Frame {
  const left = 3.9 * em;
  const right = width - 1;
  const upperTop = (0.6 + lineHeight * titles.upper.length) * em;
  const upper = { top: upperTop, bottom: upperTop + Math.round(Math.max(13 * em, Math.min(20 * em, 0.3 * width))) };
  const lowerTop = upper.bottom + (1.2 + lineHeight * titles.lower.length) * em;
  const lower = { top: lowerTop, bottom: lowerTop + 10 * em };
  const each = (right - left) / (to - from);
  return {
    ...{ width, em, left, right, upper, lower, from, to },
    height: lower.bottom + 2.2 * em,
    x: (step) => left + (step - from + 0.5) * each,
    stepAt: (x) => Math.max(from, Math.min(to - 1, from + Math.floor((x - left) / each))),
  };
}

/** Steps in time: the beginning of the first and their length. */
export type Spaced = Pick<StationHistory, 'start' | 'stepDays'>;

/** ms since 1970 at a step's end. */
export const endOf = (history: Spaced, step: number): number => Date.parse(history.start) + (step + 1) * history.stepDays * msPerDay;

export const stepAtTime = (history: Spaced, time: number): number =>
  Math.round((time - Date.parse(history.start)) / (history.stepDays * msPerDay)) - 1;

/** A span of steps, first and one past the last. */
export interface Span {
  from: number;
  to: number;
}

/** The span made closer or wider about a step, or moved by a share of its width; never beyond the record nor below a fortnight of steps. */
export function changed(span: Span, steps: number, factor: number, by = 0): Span {
  const least = Math.min(steps, 14);
  const width = Math.max(least, Math.min(steps, Math.round((span.to - span.from) * factor)));
  const shift = Math.trunc(by * (span.to - span.from));
  const from = Math.max(0, Math.min(steps - width, Math.round((span.from + span.to - width) / 2) + shift));
  return { from, to: from + width };
}
