import { LitElement, html, nothing, svg, type TemplateResult } from 'lit';
import type { Sample, StationHistory } from '@rillage/sdk';
import { buttonStyles } from '../shared/buttons.js';
import { chartFrame, frameStyles } from '../shared/chart-frame.js';
import { CursorLink } from '../shared/cursor-link.js';
import { Cursor } from '../shared/cursor.js';
import { DataTable, tableStyles } from '../shared/data-table.js';
import { age, dayCount } from '../shared/format.js';
import { inkStyles } from '../shared/ink.js';
import { Language } from '../shared/language.js';
import type { Messages } from '../shared/messages.js';
import { PictureSize } from '../shared/picture-size.js';
import { StationLink } from '../shared/station-link.js';
import { textLines } from '../shared/text-lines.js';
import { cleanText } from '../shared/text.js';
import { theme } from '../shared/theme.js';
import { version } from '../version.js';
import { companions, legend, zoomButtons } from './controls.js';
import { asHistory, asSamples } from './check.js';
import { SpanDrag } from './drag.js';
import { changed, endOf, frameOf, stepAtTime, type Frame, type Span } from './frame.js';
import { ageHistoryMessages, type AgeHistoryKey } from './messages.js';
import { axesOf, medianPanel, stackPanel, tracerPanel } from './panels.js';
import { bandsOf, piecesOf, stepsAPiece, stopsOf } from './stack.js';
import { ageHistoryStyles } from './styles.js';
import { aboutBelow, historyRows, readAt, summary } from './words.js';

/**
 * The flow of the stream through time, split by the age of its water and stacked oldest at the base; beneath it the same as shares, the median
 * age with its range, or a tracer as simulated and as bottled. Takes its history from the `rillage-station` around it, or from its property.
 *
 * @slot - What is shown as long as there is no history, or where scripts do not run.
 * @csspart frame - All of it.
 * @csspart name - The picture's name.
 * @csspart summary - What it shows, in words.
 * @csspart buttons - The row of buttons.
 * @csspart button - Each button.
 * @csspart picture - The picture, focusable.
 * @csspart legend - What the colours mean.
 * @csspart readout - What the cursor stands on.
 * @csspart table - The data table.
 * @cssprop --rillage-ink - Colour of text and lines. Default `CanvasText`.
 * @cssprop --rillage-paper - Colour of the ground. Default `Canvas`.
 * @cssprop --rillage-quiet - Colour of minor text. Default: ink, a quarter towards paper.
 * @cssprop --rillage-hairline - Colour of rules. Default: ink, two thirds towards paper.
 * @cssprop --rillage-font - Typeface of everything but the name. Default: the page's.
 * @cssprop --rillage-font-sentence - Typeface of the name. Default: the system's serif.
 * @cssprop --rillage-size-1 - Size of labels, buttons and the table.
 * @cssprop --rillage-size-2 - Size of running text.
 * @cssprop --rillage-size-3 - Size of the name.
 * @cssprop --rillage-age-1 - Colour of water younger than a week. Six colours, light to dark, mean age and nothing else.
 * @cssprop --rillage-age-2 - Colour of water a week to a month old.
 * @cssprop --rillage-age-3 - Colour of water a month to a season old.
 * @cssprop --rillage-age-4 - Colour of water a season to a year old.
 * @cssprop --rillage-age-5 - Colour of water one to ten years old.
 * @cssprop --rillage-age-6 - Colour of water older than ten years.
 * @fires {CustomEvent<{at: string | null}>} rillage-cursor - When the cursor moves: the ISO instant it stands at, or null. Bubbles, composed; other elements in the same station follow.
 */
export class RillageAgeHistory extends LitElement {
  /** Version of the package this class came from. */
  static readonly version = version;

  static override styles = [theme, buttonStyles, inkStyles, tableStyles, frameStyles, ageHistoryStyles];

  static override properties = {
    below: { type: String, reflect: true },
    table: { type: Boolean, reflect: true },
    timeZone: { type: String, attribute: 'time-zone' },
    history: { attribute: false },
    samples: { attribute: false },
    messages: { attribute: false },
    span: { state: true },
    linked: { state: true },
  };

  /** What is drawn beneath the flow: `shares` (default), `median`, or the name of a tracer. */
  declare below: string;
  /** Whether the data table is shown on the screen; on paper it always is. */
  declare table: boolean;
  /** IANA zone in which days and times are named. Default `UTC`. */
  declare timeZone: string;
  /** A history handed over directly; goes before the one of the station around. */
  declare history: StationHistory | null;
  /** Bottles to draw on their tracer. */
  declare samples: Sample[] | null;
  /** Messages of this element to replace, by key. */
  declare messages: Messages | undefined;
  /** Steps shown; null: all of them. */
  declare private span: Span | null;
  /** Moment another element of the station points at. */
  declare private linked: string | null;

  #language = new Language(this, ageHistoryMessages);
  #link = new StationLink(this);
  #cursorLink = new CursorLink(this, (at) => (this.linked = at));
  #table = new DataTable(this, this.#language);
  #stops: number[] = [];
  #drawn: StationHistory | null = null;
  #frame: Frame | null = null;
  #said: string | null = null;
  #still: Still | null = null;
  #cursor = new Cursor(this, () => ({
    series: this.#drawn ? bandsOf(this.#drawn).length + 2 : 0,
    points: () => this.#stops.length,
    describe: (series, point) => (this.#drawn ? readAt(this.#language, this.#drawn, series, this.#stops[point]!, this.timeZone) : ''),
  }));
  #drag = new SpanDrag(
    this,
    () => this.#frame,
    (span) => {
      const steps = this.#drawn?.flow.length;
      if (steps) this.#show(changed(span, steps, 1), steps);
    },
  );
  #size = new PictureSize(this);

  constructor() {
    super();
    this.below = 'shares';
    this.table = false;
    this.timeZone = 'UTC';
    this.history = null;
    this.samples = null;
    this.span = null;
    this.linked = null;
  }

  override render(): TemplateResult {
    const view = this.history ? null : this.#link.view;
    const reading = view?.reading;
    // A dry day withholds its reading; every other reason holds for the history too.
    const withheld = reading?.status === 'withheld' && reading.withheld.some(({ code }) => code !== 'noOutflow');
    const history = asHistory(this.history ?? (withheld ? null : view?.station?.history));
    this.#drawn = history;
    if (!history) return html`<slot></slot>`;
    const language = this.#language;
    const say = (key: AgeHistoryKey): string => language.say(key);
    const span = this.#spanOf(history);
    const { picture, table, summary: words, frame } = this.#stillParts(history, span);
    const { series } = this.#cursor;
    const point = this.#cursor.point !== null && this.#cursor.point < this.#stops.length ? this.#cursor.point : null;
    const step = point === null ? this.#linkedStep(history, span) : this.#stops[point]!;
    return html`<div lang=${language.tag} dir=${language.direction}>
      ${chartFrame({
        name: say('history.name'),
        ...(view?.station?.invented ? { note: say('history.invented') } : {}),
        summary: words,
        buttons: html`${companions(language, history, this.#belowOf(history), (name) => (this.below = name))}${zoomButtons(
          language,
          span,
          history.flow.length,
          (to) => this.#show(to, history.flow.length),
        )}`,
        picture: html`${svg`<svg viewBox="0 0 ${frame.width} ${frame.height}" aria-hidden="true" focusable="false">
          ${picture}
          ${this.#drag.at ? svg`<rect class="chosen" x=${Math.min(this.#drag.at.from, this.#drag.at.to)} width=${Math.abs(this.#drag.at.to - this.#drag.at.from)} y=${frame.upper.top} height=${frame.lower.bottom - frame.upper.top} />` : nothing}
          ${
            step === null
              ? nothing
              : ['cursor under', 'cursor'].map(
                  (name) =>
                    svg`<line class=${name} x1=${frame.x(step)} x2=${frame.x(step)} y1=${frame.upper.top} y2=${frame.lower.bottom} />`,
                )
          }
        </svg>`}${legend(language, history)}`,
        readout:
          step === null
            ? aboutBelow(language, history, this.#belowOf(history), asSamples(this.samples))
            : readAt(language, history, point === null ? 0 : series, step, this.timeZone),
        cursor: this.#cursor,
        onPointerMove: this.#pointer,
        table: this.#table.render({ caption: say('history.name'), ...table }),
        showsTable: this.table,
        onToggleTable: () => (this.table = !this.table),
        say,
      })}
    </div>`;
  }

  protected override updated(): void {
    const { point } = this.#cursor;
    const step = point === null ? undefined : this.#stops[point];
    const at = step === undefined || !this.#drawn ? null : new Date(endOf(this.#drawn, step)).toISOString();
    if (at === this.#said) return;
    this.#said = at;
    this.linked = null;
    this.#cursorLink.say(at);
  }

  /** What the cursor does not change, kept between its moves. */
  #stillParts(history: StationHistory, span: Span): Still & { frame: Frame } {
    const from = [
      history,
      this.samples,
      this.below,
      this.#size.width,
      this.#size.em,
      span.from,
      span.to,
      this.#language.tag,
      this.messages,
      this.timeZone,
    ];
    if (!this.#still?.from.every((value, index) => value === from[index]) || !this.#frame) {
      const language = this.#language;
      const { width, em } = this.#size;
      const below = this.#belowOf(history);
      const each = stepsAPiece(span.from, span.to, width - 4 * em);
      const titles = this.#titles(history, below, each);
      const frame = frameOf(width, em, span.from, span.to, titles);
      this.#frame = frame;
      this.#stops = stopsOf(span.from, span.to);
      const pieces = piecesOf(history, span.from, span.to, each);
      const most = pieces.reduce((high, { flow }) => Math.max(high, flow), 0) || 1;
      this.#still = {
        from,
        picture: svg`
          ${stackPanel(history, frame, pieces, frame.upper, most, false)}
          ${
            below === 'shares'
              ? stackPanel(history, frame, pieces, frame.lower, 1, true)
              : below === 'median'
                ? medianPanel(history, frame, this.#marks())
                : tracerPanel(history, frame, below, asSamples(this.samples), language)
          }
          ${axesOf(history, frame, language, most, titles, below === 'shares')}`,
        table: historyRows(language, history, this.#stops, below, this.timeZone),
        summary: summary(language, history, span, this.timeZone),
      };
    }
    return { ...this.#still, frame: this.#frame };
  }

  #titles(history: StationHistory, below: string, each: number): { upper: string[]; lower: string[] } {
    const language = this.#language;
    const days = dayCount(language, Math.round(each * history.stepDays * 10) / 10);
    const upper = each === 1 ? language.say('history.flow') : language.say('history.flowMeans', { days });
    const lower =
      below === 'shares' ? language.say('history.shares') : below === 'median' ? language.say('history.median') : cleanText(below, 40);
    const { width, em } = this.#size;
    return { upper: textLines(upper, width - 4 * em, em), lower: textLines(lower, width - 4 * em, em) };
  }

  #marks(): { days: number; label: string }[] {
    return [7, 30.4375, 91.3125, 365.25, 1826.25, 3652.5].map((days) => ({ days, label: age(this.#language, days) }));
  }

  #belowOf(history: StationHistory): string {
    return this.below === 'median' || Object.hasOwn(history.concentration, this.below) ? this.below : 'shares';
  }

  #spanOf({ flow }: StationHistory): Span {
    const { span } = this;
    return span && span.to <= flow.length ? span : { from: 0, to: flow.length };
  }

  #linkedStep(history: StationHistory, { from, to }: Span): number | null {
    if (this.linked === null) return null;
    const step = stepAtTime(history, Date.parse(this.linked));
    return step >= from && step < to ? step : null;
  }

  #show(span: Span, steps: number): void {
    this.span = span.from === 0 && span.to === steps ? null : span;
    this.#cursor.show(null);
  }

  /** A hover moves the cursor, a drag chooses a span. */
  #pointer = (event: PointerEvent): void => {
    const box = this.renderRoot.querySelector('.picture > svg')?.getBoundingClientRect();
    const frame = this.#frame;
    if (!box?.width || !frame || !this.#drawn) return;
    const x = Math.max(frame.left, Math.min(frame.right, ((event.clientX - box.left) / box.width) * frame.width));
    this.#drag.follow(event, x);
    const step = frame.stepAt(x);
    const stride = (this.#stops[1] ?? 1) - (this.#stops[0] ?? 0);
    this.#cursor.show(Math.max(0, Math.min(this.#stops.length - 1, Math.round((step - frame.from) / (stride || 1)))), 0);
  };
}

/** What the cursor does not change, with what it was made from. */
interface Still {
  from: unknown[];
  picture: TemplateResult;
  table: { columns: string[]; rows: string[][] };
  summary: string;
}

declare global {
  interface HTMLElementTagNameMap {
    'rillage-age-history': RillageAgeHistory;
  }
}
