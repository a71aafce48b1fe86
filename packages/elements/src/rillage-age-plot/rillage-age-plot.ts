import { LitElement, html, svg, type PropertyValues, type TemplateResult } from 'lit';
import type { DistributionWithRange } from '@rillage/sdk';
import { asDistribution } from '../shared/check/distribution.js';
import { buttonStyles } from '../shared/buttons.js';
import { chartFrame, frameStyles } from '../shared/chart-frame.js';
import { Cursor } from '../shared/cursor.js';
import { DataTable, tableStyles } from '../shared/data-table.js';
import { moment, number, percent, percentSpan } from '../shared/format.js';
import { inkStyles } from '../shared/ink.js';
import { Language } from '../shared/language.js';
import type { Messages } from '../shared/messages.js';
import { StationLink } from '../shared/station-link.js';
import { cleanText } from '../shared/text.js';
import { theme } from '../shared/theme.js';
import { version } from '../version.js';
import { axes, beyondRecord, frameFor } from './axis.js';
import { curveView } from './curve-view.js';
import { densityView } from './density-view.js';
import { dropsView } from './drops-view.js';
import { ageMarks } from './marks.js';
import { agePlotMessages } from './messages.js';
import { agePlotStyles } from './styles.js';
import { summary } from './summary.js';
import { curvesOf, type View } from './view.js';

/** The ways to draw a distribution. */
export type AgePlotView = 'curve' | 'density' | 'drops';

/**
 * The age distribution of the water leaving at a moment: a cumulative curve with its range as a band, the share older than the record hatched
 * and never a curve; or the shares by age; or twenty drops, each one litre in twenty. Takes its distribution from the `rillage-station`
 * around it, or from its own property.
 *
 * @slot - What is shown as long as there is no distribution, or where scripts do not run.
 * @csspart frame - All of it.
 * @csspart name - The chart's name.
 * @csspart summary - What it shows, in words.
 * @csspart buttons - The row of buttons.
 * @csspart button - Each button.
 * @csspart picture - The picture, focusable.
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
 * @fires {CustomEvent<{view: AgePlotView, scale: 'log' | 'linear'}>} rillage-view-change - After the reader chose another view or scale. Bubbles, composed.
 */
export class RillageAgePlot extends LitElement {
  /** Version of the package this class came from. */
  static readonly version = version;

  static override styles = [theme, buttonStyles, inkStyles, tableStyles, frameStyles, agePlotStyles];

  static override properties = {
    view: { type: String, reflect: true },
    scale: { type: String, reflect: true },
    table: { type: Boolean, reflect: true },
    timeZone: { type: String, attribute: 'time-zone' },
    distribution: { attribute: false },
    messages: { attribute: false },
    size: { state: true },
  };

  /** How it is drawn: `curve` (default), `density` (shares by age) or `drops`. */
  declare view: AgePlotView;
  /** Scale of the ages: `log` (default), which gives young ages more room, or `linear`. */
  declare scale: 'log' | 'linear';
  /** Whether the data table is shown on the screen; on paper it always is. */
  declare table: boolean;
  /** IANA zone in which days and times are named. Default `UTC`. */
  declare timeZone: string;
  /** A distribution handed over directly; goes before the one of the station around. */
  declare distribution: DistributionWithRange | null;
  /** Messages of this element to replace, by key. */
  declare messages: Messages | undefined;
  declare private size: { width: number; em: number };

  #language = new Language(this, agePlotMessages);
  #link = new StationLink(this);
  #table = new DataTable(this, this.#language);
  #drawn: View | null = null;
  #cursor = new Cursor(this, () => ({
    series: this.#drawn?.series ?? 0,
    points: () => this.#drawn?.places.length ?? 0,
    describe: (series, point) => this.#drawn?.describe(series, point) ?? '',
  }));
  #observer: ResizeObserver | undefined;

  constructor() {
    super();
    this.view = 'curve';
    this.scale = 'log';
    this.table = false;
    this.timeZone = 'UTC';
    this.distribution = null;
    this.size = { width: 640, em: 13 };
  }

  override connectedCallback(): void {
    super.connectedCallback();
    // A frame later, so that a change of height cannot call the observer within its own round.
    this.#observer = new ResizeObserver(() => requestAnimationFrame(() => this.#measure()));
    this.#observer.observe(this);
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.#observer?.disconnect();
    this.#observer = undefined;
  }

  protected override willUpdate(changed: PropertyValues<this>): void {
    if (changed.has('view') || changed.has('scale') || changed.has('distribution')) this.#cursor.show(null, 0);
  }

  override render(): TemplateResult {
    const view = this.distribution ? null : this.#link.view;
    const distribution = asDistribution(this.distribution ?? (view?.reading?.status === 'withheld' ? null : view?.station?.distribution));
    if (!distribution) {
      this.#drawn = null;
      return html`<slot></slot>`;
    }
    const language = this.#language;
    const frame = frameFor(this.size.width, this.size.em, distribution.recordDays, this.scale !== 'linear');
    const drawn = views[this.view]?.({ distribution, ...curvesOf(distribution), frame, speech: language }) ?? null;
    this.#drawn = drawn ?? curveView({ distribution, ...curvesOf(distribution), frame, speech: language });
    const shown = this.#drawn;
    const { series } = this.#cursor;
    const point = this.#cursor.point !== null && this.#cursor.point < shown.places.length ? this.#cursor.point : null;
    const line = Math.min(series, shown.series - 1);
    const name = this.#name(distribution);
    return html`<div lang=${language.tag} dir=${language.direction}>
      ${chartFrame({
        name,
        ...(view?.station?.invented ? { note: language.say('plot.invented') } : {}),
        summary: summary(language, distribution),
        buttons: this.#buttons(),
        picture: svg`<svg viewBox="0 0 ${frame.width} ${frame.height}" aria-hidden="true" focusable="false">
          ${axes(
            frame,
            ageMarks(language, frame),
            quarters.map((at) => ({ at, label: number(language.tag, { style: 'percent' }).format(at * shown.top) })),
          )}
          ${beyondRecord(frame, { share: distribution.preRecordShare, range: distribution.preRecordRange, place: shown.beyond, top: shown.top })}
          <text class="end" x=${frame.right} y=${frame.top - 0.7 * frame.em}>${this.#beyondLabel(distribution)}</text>
          ${shown.draw(line, point)}
        </svg>`,
        readout: point === null ? shown.about : shown.describe(line, point),
        cursor: this.#cursor,
        onPointerMove: this.#point,
        table: this.#table.render({ caption: name, columns: shown.columns, rows: shown.rows }),
        showsTable: this.table,
        onToggleTable: () => (this.table = !this.table),
        say: (key) => language.say(key),
      })}
    </div>`;
  }

  #name({ of, at }: DistributionWithRange): string {
    const reading = this.#link.view?.reading;
    const date = moment(this.#language.tag, at, reading?.stepDays ?? 1, this.timeZone);
    const key = of === 'discharge' ? 'plot.name' : of === 'storage' ? 'plot.nameStorage' : 'plot.nameOther';
    return this.#language.say(key, { date, of: cleanText(of, 60) });
  }

  #beyondLabel({ preRecordShare, preRecordRange }: DistributionWithRange): string {
    const values = { share: percent(this.#language, preRecordShare), range: percentSpan(this.#language, preRecordRange) };
    return this.#language.say(preRecordRange ? 'plot.beforeRecordRange' : 'plot.beforeRecord', values);
  }

  #buttons(): TemplateResult {
    const say = (key: keyof typeof agePlotMessages): string => this.#language.say(key);
    const kinds: AgePlotView[] = ['curve', 'density', 'drops'];
    return html`<span role="group" class="buttons bare" aria-label=${say('plot.view')}
        >${kinds.map(
          (kind) =>
            html`<button type="button" part="button" aria-pressed=${this.view === kind} @click=${() => this.#choose({ view: kind })}>
              ${say(`plot.${kind}`)}
            </button>`,
        )}</span
      ><button
        type="button"
        part="button"
        aria-pressed=${this.scale !== 'linear'}
        @click=${() => this.#choose({ scale: this.scale === 'linear' ? 'log' : 'linear' })}
      >
        ${say('plot.logAges')}
      </button>`;
  }

  #choose(choice: Partial<Pick<RillageAgePlot, 'view' | 'scale'>>): void {
    Object.assign(this, choice);
    this.dispatchEvent(
      new CustomEvent('rillage-view-change', { detail: { view: this.view, scale: this.scale }, bubbles: true, composed: true }),
    );
  }

  /** The nearest point under the pointer. */
  #point = (event: PointerEvent): void => {
    const picture = this.renderRoot.querySelector('svg');
    const shown = this.#drawn;
    if (!picture || !shown) return;
    const box = picture.getBoundingClientRect();
    const x = ((event.clientX - box.left) / box.width) * this.size.width;
    let nearest = 0;
    shown.places.forEach((place, index) => {
      if (Math.abs(place - x) < Math.abs(shown.places[nearest]! - x)) nearest = index;
    });
    this.#cursor.show(nearest);
  };

  #measure(): void {
    if (!this.isConnected) return;
    const width = Math.round(this.clientWidth);
    const text = this.renderRoot.querySelector('.readout');
    const em = text ? parseFloat(getComputedStyle(text).fontSize) || 13 : 13;
    if (width > 0 && (width !== this.size.width || em !== this.size.em)) this.size = { width, em };
  }

  protected override updated(): void {
    this.#measure();
  }
}

const views = { curve: curveView, density: densityView, drops: dropsView };
const quarters = [0, 0.25, 0.5, 0.75, 1];

declare global {
  interface HTMLElementTagNameMap {
    'rillage-age-plot': RillageAgePlot;
  }
  interface HTMLElementEventMap {
    'rillage-view-change': CustomEvent<{ view: AgePlotView; scale: 'log' | 'linear' }>;
  }
}
