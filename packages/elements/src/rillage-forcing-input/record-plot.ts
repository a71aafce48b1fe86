import { html, svg, type ReactiveControllerHost, type TemplateResult } from 'lit';
import type { ForcingRead, Sample } from '@rillage/sdk';
import { zoomButtons } from '../rillage-age-history/controls.js';
import { endOf, frameOf, type Frame, type Span } from '../rillage-age-history/frame.js';
import { axesOf, point, ticks, tracerPanel, unbroken } from '../rillage-age-history/panels.js';
import { stepsToDraw, stopsOf } from '../rillage-age-history/stack.js';
import { dayOf } from '../rillage-age-history/words.js';
import { chartFrame } from '../shared/chart-frame.js';
import { Cursor } from '../shared/cursor.js';
import { DataTable } from '../shared/data-table.js';
import { number } from '../shared/format.js';
import { lazyRows } from '../shared/lazy-rows.js';
import { PictureSize } from '../shared/picture-size.js';
import { textLines } from '../shared/text-lines.js';
import { word, type Speech } from './field-view.js';
import { shownRecord, type RecordShown } from './record.js';

/** The plots of what was read: rain from the top, flow at the base, beneath them a tracer or another series; and the same as a table. */
export class RecordPlot {
  #record: RecordShown | null = null;
  #of: ForcingRead | null = null;
  #span: Span = { from: 0, to: 0 };
  #below = '';
  #showsTable = false;
  #stops: number[] = [];
  #still: Still | null = null;
  #table: DataTable;
  #size: PictureSize;
  #cursor: Cursor;

  constructor(
    private readonly host: ReactiveControllerHost & HTMLElement,
    private readonly speech: Speech,
  ) {
    this.#table = new DataTable(host, speech);
    this.#size = new PictureSize(host);
    this.#cursor = new Cursor(host, () => ({ series: 1, points: () => this.#stops.length, describe: (_, stop) => this.#readAt(stop) }));
  }

  render(read: ForcingRead): TemplateResult {
    const record = this.#take(read);
    const { speech } = this;
    const choices = [...record.tracers, ...record.others];
    const below = choices.includes(this.#below) ? this.#below : (choices[0] ?? '');
    const { frame, picture, table, summary } = this.#stillOf(record, below);
    const stop = this.#cursor.point;
    const x = stop === null || stop >= this.#stops.length ? null : frame.x(this.#stops[stop]!);
    return chartFrame({
      name: speech.say('forcing.picture'),
      summary,
      buttons: html`<span role="group" class="buttons bare" aria-label=${speech.say('history.below')}
          >${choices.map(
            (name) =>
              html`<button type="button" part="button" aria-pressed=${name === below} @click=${() => this.#set(() => (this.#below = name))}>
                <bdi>${word(speech, name)}</bdi>
              </button>`,
          )}</span
        >${zoomButtons(speech, this.#span, record.steps, (span) => this.#set(() => (this.#span = span)))}`,
      picture: html`${svg`<svg viewBox="0 0 ${frame.width} ${frame.height}" aria-hidden="true" focusable="false">
        ${picture}
        ${x === null ? '' : svg`<line class="cursor" x1=${x} x2=${x} y1=${frame.upper.top} y2=${frame.lower.bottom} />`}
      </svg>`}`,
      readout:
        stop === null
          ? `${speech.say('forcing.about')} ${record.tracers.includes(below) ? speech.say('forcing.aboutTracer') : ''}`
          : this.#readAt(stop),
      cursor: this.#cursor,
      onPointerMove: this.#pointer,
      table: this.#table.render({ caption: speech.say('forcing.picture'), ...table }),
      showsTable: this.#showsTable,
      onToggleTable: () => this.#set(() => (this.#showsTable = !this.#showsTable)),
      say: (key) => speech.say(key),
    });
  }

  /** What the cursor does not change, kept between its moves. */
  #stillOf(record: RecordShown, below: string): Still {
    const { speech } = this;
    const { width, em } = this.#size;
    const { from, to } = this.#span;
    const made = [record, below, width, em, from, to, speech.tag];
    if (this.#still?.from.every((part, index) => part === made[index])) return this.#still;
    const lines = (text: string): string[] => textLines(text, width - 4 * em, em);
    const upper = lines(`${word(speech, record.rain)} · ${word(speech, record.flow)} (mm)`);
    const titles = { upper, lower: lines(`${word(speech, below)}${record.unit(below)}`) };
    const frame = frameOf(width, em, from, to, titles);
    this.#stops = stopsOf(from, to);
    const total = (name: string): string => {
      let sum = 0;
      for (let step = from; step < to; step++) sum += (record.value(name, step) ?? 0) * record.stepDays;
      return number(speech.tag, { maximumFractionDigits: 0 }).format(sum);
    };
    return (this.#still = {
      from: made,
      frame,
      picture: this.#panels(record, frame, below, titles),
      table: this.#rows(record),
      summary: speech.say('forcing.summary', {
        from: dayOf(speech, record, from, 'UTC'),
        to: dayOf(speech, record, to - 1, 'UTC'),
        rain: total(record.rain),
        flow: total(record.flow),
      }),
    });
  }

  #take(read: ForcingRead): RecordShown {
    if (this.#of !== read || !this.#record) {
      this.#of = read;
      this.#record = shownRecord(read);
      this.#span = { from: 0, to: this.#record.steps };
    }
    return this.#record;
  }

  #panels(record: RecordShown, frame: Frame, below: string, titles: { upper: string[]; lower: string[] }): TemplateResult {
    const { upper, left, right, from, to, em } = frame;
    const { speech } = this;
    const pixels = Math.max(1, Math.round(right - left));
    const [rain, flow] = [record.line(record.rain), record.line(record.flow)];
    const [rainSteps, flowSteps] = [stepsToDraw(rain, from, to, pixels), stepsToDraw(flow, from, to, pixels)];
    const most = (series: (number | null)[], steps: number[]): number =>
      steps.reduce((high, step) => Math.max(high, series[step] ?? 0), 0) || 1;
    const [mostRain, mostFlow] = [most(rain, rainSteps), most(flow, flowSteps)];
    const height = upper.bottom - upper.top;
    const rainY = (value: number): number => upper.top + (value / mostRain) * rainShare * height;
    const flowY = (value: number): number => upper.bottom - (value / mostFlow) * flowShare * height;
    const each = (right - left) / (to - from);
    // A gap of one day in ten years is still a mark that can be seen.
    const gaps = (name: string, y: number): TemplateResult => {
      const marks = record.filled(name);
      const runs = marks
        ? unbroken(
            Array.from({ length: to - from }, (_, index) => from + index),
            (step) => marks[step] === 1,
          )
        : [];
      return svg`${runs.map((run) => {
        const middle = (frame.x(run[0]!) + frame.x(run[run.length - 1]!)) / 2;
        const half = Math.max(2, (run.length * each) / 2);
        return svg`<line class="gap" x1=${middle - half} x2=${middle + half} y1=${y} y2=${y} />`;
      })}`;
    };
    const format = number(speech.tag, { maximumSignificantDigits: 3 });
    // Each stands in the step it was taken in, however many days a step has.
    const bottles = [...record.bottles(below)].map(([step, { of: _, ...sample }]): Sample => {
      const at = new Date(endOf(record, step)).toISOString();
      return { ...sample, from: at, to: at };
    });
    return svg`
      <path class="rain" stroke-width=${Math.max(0.75, 0.7 * each)} d=${rainSteps.flatMap((step) => (rain[step] ? [`M${point(frame.x(step), upper.top)}V${rainY(rain[step]!).toFixed(1)}`] : [])).join('')} />
      ${unbroken(flowSteps, (step) => flow[step] !== null && flow[step] !== undefined).map(
        (run) => svg`<path class="line thin" d=${`M${run.map((step) => point(frame.x(step), flowY(flow[step]!))).join('L')}`} />`,
      )}
      <line class="tick" x1=${left} x2=${right} y1=${upper.top} y2=${upper.top} />
      ${ticks(0, mostRain)
        .slice(1)
        .map((value) => svg`<text class="end" x=${left - 0.6 * em} y=${rainY(value) + 0.35 * em}>${format.format(value)}</text>`)}
      ${tracerPanel({ ...record, concentration: { [below]: record.line(below) } }, frame, below, bottles, speech)}
      ${axesOf(record, frame, speech, mostFlow / flowShare, titles, false, mostFlow)}
      ${gaps(record.rain, upper.top)}${gaps(record.flow, upper.bottom)}${gaps(below, frame.lower.bottom)}`;
  }

  /** One row for each stop of the cursor. Of samples, the last of those that lie between it and the next. */
  #rows(record: RecordShown): { columns: string[]; rows: string[][] } {
    const { speech } = this;
    const stops = this.#stops;
    const { to } = this.#span;
    const format = number(speech.tag, { maximumSignificantDigits: 4 });
    const text = (value: number | null | undefined): string => (value == null || Number.isNaN(value) ? '–' : format.format(value));
    const series = [record.rain, record.flow, ...record.others];
    const bottles = record.tracers.map(record.bottles);
    const bottleAt = (own: Map<number, Sample>, stop: number): string => {
      for (let step = (stops[stop + 1] ?? to) - 1; step >= stops[stop]!; step--) {
        const { value, censored } = own.get(step) ?? {};
        if (value !== undefined) return `${censored ? (censored === 'below' ? '< ' : '> ') : ''}${text(value)}`;
      }
      return '–';
    };
    return {
      columns: [
        speech.say('history.date'),
        ...series.map((name) => word(speech, name)),
        ...record.tracers.map((name) => speech.say('forcing.inRain', { tracer: word(speech, name) })),
        ...record.tracers.map((name) => speech.say('forcing.inStream', { tracer: word(speech, name) })),
      ],
      rows: lazyRows(stops.length, (stop) => {
        const step = stops[stop]!;
        return [
          dayOf(speech, record, step, 'UTC'),
          ...series.map((name) => {
            const value = text(record.value(name, step));
            return record.filled(name)?.[step] ? speech.say('forcing.filled', { value }) : value;
          }),
          ...record.tracers.map((name) => text(record.line(name)[step])),
          ...bottles.map((own) => bottleAt(own, stop)),
        ];
      }),
    };
  }

  #readAt(stop: number): string {
    const { columns, rows } = this.#still?.table ?? { columns: [], rows: [] };
    const [day, ...values] = rows[stop] ?? [];
    return `${day ?? ''}. ${values.flatMap((value, index) => (value === '–' ? [] : [`${columns[index + 1]}: ${value}`])).join('; ')}`;
  }

  #set(change: () => void): void {
    change();
    this.#cursor.show(null);
    this.host.requestUpdate();
  }

  #pointer = (event: PointerEvent): void => {
    const box = this.host.shadowRoot?.querySelector('.picture > svg')?.getBoundingClientRect();
    const frame = this.#still?.frame;
    if (!box?.width || !frame) return;
    const step = frame.stepAt(((event.clientX - box.left) / box.width) * frame.width);
    const stride = (this.#stops[1] ?? 1) - (this.#stops[0] ?? 0) || 1;
    this.#cursor.show(Math.max(0, Math.min(this.#stops.length - 1, Math.round((step - frame.from) / stride))));
  };
}

interface Still {
  /** What it was made from. */
  from: unknown[];
  frame: Frame;
  picture: TemplateResult;
  table: { columns: string[]; rows: string[][] };
  summary: string;
}

// Of the upper panel's height; between them stays a little air, however much it rains.
const rainShare = 0.33;
const flowShare = 0.6;
