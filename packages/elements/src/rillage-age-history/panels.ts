import { svg, type TemplateResult } from 'lit';
import type { Sample, StationHistory } from '@rillage/sdk';
import { number } from '../shared/format.js';
import type { Language } from '../shared/language.js';
import { linesAt } from '../shared/text-lines.js';
import { timeMarks } from '../shared/time-axis.js';
import { endOf, stepAtTime, type Frame, type Spaced } from './frame.js';
import { hatchBetween } from './hatch-between.js';
import type { AgeHistoryKey } from './messages.js';
import { bandsOf, stepsToDraw, type Piece } from './stack.js';

export type Speech = Language<AgeHistoryKey>;
type Panel = Frame['upper'];

/** The stack: classes of age upon each other, the oldest at the base, as depths of flow or as shares. */
export function stackPanel(
  history: StationHistory,
  frame: Frame,
  pieces: Piece[],
  panel: Panel,
  most: number,
  asShares: boolean,
): TemplateResult {
  const bands = bandsOf(history);
  const y = (value: number): number => panel.bottom - (value / most) * (panel.bottom - panel.top);
  const near = pieces.length === frame.to - frame.from;
  // Heights of each class's lower edge; the pre-record water stands at the base.
  const below = pieces.map(() => 0);
  const edge = (): [x: number, y: number][] => pieces.map(({ at }, index) => [frame.x(at), y(below[index]!)]);
  const areas: TemplateResult[] = [];
  for (let band = bands.length - 1; band >= 0; band--) {
    const lower = edge();
    pieces.forEach(({ flow, shares }, index) => (below[index]! += (shares?.[band] ?? 0) * (asShares ? 1 : flow)));
    const upper = edge();
    const line = upper.map(([x, at]) => point(x, at)).join('L');
    areas.push(
      bands[band]!.className
        ? svg`<path class="area ${bands[band]!.className}" d=${`M${line}L${lower
            .reverse()
            .map(([x, at]) => point(x, at))
            .join('L')}Z`} />`
        : svg`<path class="hatch" d=${hatchBetween(upper.map(([x, at]) => [x, at, panel.bottom]))} />`,
      svg`<path class=${band === 0 ? 'line thin' : near || band === bands.length - 1 ? 'between near' : 'between'} d=${`M${line}`} />`,
    );
  }
  return svg`${areas}`;
}

/** Median age on a stretched axis: its range as a band without a middle line, or a bare line; hatched where only a lower bound is known. */
export function medianPanel(history: StationHistory, frame: Frame, marks: { days: number; label: string }[]): TemplateResult {
  const { lower, left, right, em } = frame;
  const steps = stepsToDraw(history.medianDays, frame.from, frame.to, Math.max(1, Math.round(right - left)));
  const shown = steps
    .flatMap((step) => [history.medianDays[step], history.medianLow?.[step], history.medianHigh?.[step]])
    .filter((days) => days != null && days > 0) as number[];
  const low = Math.max(0.5, 0.8 * shown.reduce((least, days) => Math.min(least, days), Infinity));
  const high = Math.max(low * 4, 1.25 * shown.reduce((most, days) => Math.max(most, days), 0));
  const y = (days: number): number =>
    lower.bottom - (Math.log(Math.max(low, Math.min(high, days)) / low) / Math.log(high / low)) * (lower.bottom - lower.top);
  const runs = unbroken(steps, (step) => history.medianDays[step] != null);
  const { medianLow, medianHigh } = history;
  return svg`
    ${marks
      .filter(({ days }) => days > low && days < high)
      .map(
        ({ days, label }) => svg`<line class="hair" x1=${left} x2=${right} y1=${y(days)} y2=${y(days)} />
        <text x=${left + 0.4 * em} y=${y(days) - 0.35 * em}>${label}</text>`,
      )}
    ${runs.map((run) =>
      medianLow && medianHigh
        ? svg`<path class="band" d=${`M${run.map((step) => point(frame.x(step), y(medianHigh[step]!))).join('L')}L${run
            .map((step) => point(frame.x(step), y(medianLow[step]!)))
            .reverse()
            .join('L')}Z`} />`
        : svg`<path class="line" d=${`M${run.map((step) => point(frame.x(step), y(history.medianDays[step]!))).join('L')}`} />`,
    )}
    ${unbroken(steps, (step) => history.medianBeyondRecord[step] === 1 && history.medianDays[step] != null).map(
      (run) => svg`<path class="hatch" d=${hatchBetween(run.map((step) => [frame.x(step), lower.top, y(history.medianDays[step]!)]))} />`,
    )}
  `;
}

/** A tracer in the stream: simulated as a line, bottles as circles with their stated error; a detection limit as a stroke that points away. */
export function tracerPanel(
  history: Spaced & Pick<StationHistory, 'concentration'>,
  frame: Frame,
  tracer: string,
  samples: Sample[],
  speech: Speech,
): TemplateResult {
  const { lower, left, right, em, from, to } = frame;
  const values = history.concentration[tracer] ?? [];
  const steps = stepsToDraw(values, from, to, Math.max(1, Math.round(right - left)));
  const bottles = samples
    .filter((sample) => sample.tracer === tracer && (sample.of ?? 'discharge') === 'discharge')
    .map((sample) => ({ ...sample, step: stepAtTime(history, (Date.parse(sample.from) + Date.parse(sample.to)) / 2) }))
    .filter(({ step }) => step >= from && step < to);
  const all = [...steps.map((step) => values[step]).filter((value) => value != null), ...bottles.map(({ value }) => value)] as number[];
  const least = all.reduce((low, value) => Math.min(low, value), Infinity);
  const most = all.reduce((high, value) => Math.max(high, value), -Infinity);
  const room = (most - least) * 0.08 || 1;
  const y = (value: number): number => lower.bottom - ((value - least + room) / (most - least + 2 * room)) * (lower.bottom - lower.top);
  return svg`
    ${ticks(least, most).map(
      (value) => svg`<line class="hair" x1=${left} x2=${right} y1=${y(value)} y2=${y(value)} />
        <text class="end" x=${left - 0.5 * em} y=${y(value) + 0.35 * em}>${number(speech.tag, { maximumSignificantDigits: 3 }).format(value)}</text>`,
    )}
    ${unbroken(steps, (step) => values[step] != null).map(
      (run) => svg`<path class="line thin" d=${`M${run.map((step) => point(frame.x(step), y(values[step]!))).join('L')}`} />`,
    )}
    ${bottles.map(({ step, value, error, censored }) => {
      const x = frame.x(step);
      if (censored) return svg`<path class="line thin" d=${`M${x - 3} ${y(value)}h6M${x} ${y(value)}v${censored === 'below' ? 8 : -8}`} />`;
      return svg`${error ? svg`<line class="tick" x1=${x} x2=${x} y1=${y(value - error)} y2=${y(value + error)} />` : ''}<circle class="bottle" cx=${x} cy=${y(value)} r=${0.2 * em} />`;
    })}`;
}

/**
 * Lines and words around both panels.
 * @param mostFlow  value at the upper panel's top; `ticksTo` bounds its marks
 */
export function axesOf(
  history: Spaced,
  frame: Frame,
  speech: Speech,
  mostFlow: number,
  titles: { upper: string[]; lower: string[] },
  asShares: boolean,
  ticksTo = mostFlow,
): TemplateResult {
  const { em, left, right, upper, lower } = frame;
  const [begins, ends] = [endOf(history, frame.from - 1), endOf(history, frame.to - 1)];
  const format = number(speech.tag, { maximumSignificantDigits: 3 });
  const y = (value: number): number => upper.bottom - (value / mostFlow) * (upper.bottom - upper.top);
  return svg`
    ${linesAt(titles.upper, titles.upper.length > 1 ? 0 : left, upper.top - 0.6 * em, em, true)}
    ${linesAt(titles.lower, titles.lower.length > 1 ? 0 : left, lower.top - 0.6 * em, em, true)}
    ${ticks(0, ticksTo).map(
      (value) => svg`<line class="tick" x1=${left - 0.4 * em} x2=${left} y1=${y(value)} y2=${y(value)} />
        <text class="end" x=${left - 0.6 * em} y=${y(value) + 0.35 * em}>${format.format(value)}</text>`,
    )}
    ${
      asShares
        ? [0, 0.5, 1].map(
            (share) =>
              svg`<text class="end" x=${left - 0.5 * em} y=${lower.bottom - share * (lower.bottom - lower.top) + 0.35 * em}>${number(speech.tag, { style: 'percent' }).format(share)}</text>`,
          )
        : ''
    }
    ${timeMarks(speech.tag, begins, ends, (right - left) / (4 * em)).map(({ time, label }) => {
      const x = left + ((time - begins) / (ends - begins)) * (right - left);
      return svg`<line class="tick" x1=${x} x2=${x} y1=${upper.bottom} y2=${upper.bottom + 0.4 * em} /><line class="tick" x1=${x} x2=${x} y1=${lower.bottom} y2=${lower.bottom + 0.4 * em} />
        <text class=${x > right - 2 * em ? 'end' : x < left + 2 * em ? '' : 'middle'} x=${x} y=${lower.bottom + 1.6 * em}>${label}</text>`;
    })}
    ${[upper, lower].map(({ bottom }) => svg`<line class="tick" x1=${left} x2=${right} y1=${bottom} y2=${bottom} />`)}
  `;
}

export const point = (x: number, y: number): string => `${x.toFixed(1)} ${y.toFixed(1)}`;

/** About four round values between two. */
export function ticks(low: number, high: number): number[] {
  const span = high - low;
  if (!(span > 0)) return [low];
  const power = 10 ** Math.floor(Math.log10(span / 3));
  const step = power * ([1, 2, 5].find((digit) => span / (digit * power) <= 5) ?? 10);
  const first = Math.ceil(low / step - 1e-9);
  return Array.from({ length: Math.floor(high / step + 1e-9) - first + 1 }, (_, index) => (first + index) * step);
}

/** Runs of steps that hold, without those that do not. */
export function unbroken(steps: number[], holds: (step: number) => boolean): number[][] {
  const runs: number[][] = [];
  let open = false;
  for (const step of steps) {
    const here = holds(step);
    if (here && open) runs[runs.length - 1]!.push(step);
    else if (here) runs.push([step]);
    open = here;
  }
  return runs;
}
