import { LitElement, html, nothing, svg, type TemplateResult } from 'lit';
import { buttonStyles } from '../shared/buttons.js';
import { frameStyles } from '../shared/chart-frame.js';
import { CursorLink } from '../shared/cursor-link.js';
import { DataTable, tableStyles } from '../shared/data-table.js';
import { date, msPerDay } from '../shared/format.js';
import { inkStyles } from '../shared/ink.js';
import { Language } from '../shared/language.js';
import type { Messages } from '../shared/messages.js';
import { PaintWatch, probe, probeStyles } from '../shared/paints.js';
import { PictureSize } from '../shared/picture-size.js';
import { StationLink } from '../shared/station-link.js';
import { theme } from '../shared/theme.js';
import { version } from '../version.js';
import { drawBands, layerColour, palette, type Tint } from './bitmap.js';
import { asSection } from './check.js';
import { cutView, profileScale } from './cut-view.js';
import { frameOf, timeOf, type Frame } from './geometry.js';
import { legend } from './legend.js';
import { season, SectionLine } from './line.js';
import { columnViewMessages, type ColumnViewKey } from './messages.js';
import type { SectionData } from './section-type.js';
import { sectionView, titlesOf } from './section-view.js';
import { columnViewStyles } from './styles.js';
import { tintOf } from './tint.js';
import { atLine, columnRows, dayOf, tracerName, tracersOf } from './words.js';

/**
 * The storage column as a section through time: time to the right, depth downwards from the youngest water. Bands of rain, buried and thinned,
 * are coloured by age or, in tints of ink, by a tracer; water from before the record is hatched. Beside the line that the reader moves stand
 * the column at that moment and what each outflow took of every layer, on the same depth axis.
 *
 * @slot - What is shown as long as there is no section, or where scripts do not run.
 * @csspart frame - All of it.
 * @csspart name - The picture's name.
 * @csspart summary - What it shows, in words.
 * @csspart buttons - Each row of buttons.
 * @csspart button - Each button.
 * @csspart picture - The picture, focusable; keys move the line.
 * @csspart legend - What the tints mean.
 * @csspart readout - What holds at the line.
 * @csspart table - The data table of the column at the line.
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
 * @fires {CustomEvent<{at: string}>} rillage-cursor - After the reader moved the line: the ISO instant it stands at. Bubbles, composed; other elements in the same station follow.
 */
export class RillageColumnView extends LitElement {
  /** Version of the package this class came from. */
  static readonly version = version;

  static override styles = [theme, buttonStyles, inkStyles, tableStyles, frameStyles, probeStyles, columnViewStyles];

  static override properties = {
    at: { type: String },
    tint: { type: String, reflect: true },
    table: { type: Boolean, reflect: true },
    timeZone: { type: String, attribute: 'time-zone' },
    section: { attribute: false },
    messages: { attribute: false },
    drawn: { state: true },
  };

  /** ISO instant at which the line stands; the kept moment nearest to it is shown. Default: the last. */
  declare at: string | null;
  /** What the bands show: `age` (default) or the name of a tracer. */
  declare tint: string;
  /** Whether the data table is shown on the screen; on paper it always is. */
  declare table: boolean;
  /** IANA zone in which days and times are named. Default `UTC`. */
  declare timeZone: string;
  /** The section, as the SDK's `makeSection` gives it. */
  declare section: SectionData | null;
  /** Messages of this element to replace, by key. */
  declare messages: Messages | undefined;
  /** null before the first attempt, false where there is no canvas. */
  declare private drawn: boolean | null;

  #language = new Language(this, columnViewMessages);
  #link = new StationLink(this);
  #cursor = new CursorLink(this, (at) => {
    if (at !== null) this.at = at;
  });
  #line: SectionLine = new SectionLine(
    this,
    () => {
      const section = asSection(this.section);
      return section && this.#frame && { section, frame: this.#frame };
    },
    {
      moved: (at) => this.#cursor.say(at),
      describe: () => {
        const section = asSection(this.section);
        return section ? atLine(this.#language, section, section.columns[this.#line.place(section)]!, this.timeZone) : '';
      },
    },
  );
  #table = new DataTable(this, this.#language);
  #paints = new PaintWatch(this, () => {
    this.#bitmap = null;
    this.requestUpdate();
  });
  #size = new PictureSize(this);
  /** What the bitmap on the canvas was drawn from. */
  #bitmap: unknown[] | null = null;
  #still: { from: unknown[]; picture: TemplateResult; scale: number; colours: Uint32Array } | null = null;
  #frame: Frame | null = null;

  constructor() {
    super();
    this.at = null;
    this.tint = 'age';
    this.table = false;
    this.timeZone = 'UTC';
    this.section = null;
    this.drawn = null;
  }

  override render(): TemplateResult {
    const section = asSection(this.section);
    if (!section) return html`<slot></slot>${probe}`;
    const say = (key: ColumnViewKey): string => this.#language.say(key);
    const language = this.#language;
    const place = this.#line.place(section);
    const column = section.columns[place]!;
    const { frame, picture, scale, colours, tint } = this.#stillParts(section);
    const day = dayOf(language, section, column, this.timeZone);
    const { columns, rows } = columnRows(language, section, column);
    const colour = (at: typeof column, row: number): string => layerColour(colours, tint, at, row);
    return html`<div lang=${language.tag} dir=${language.direction}>
      <figure part="frame">
        <figcaption part="name">
          ${say('column.name')}<span class="note"
            >${this.#link.view?.station?.invented ? say('column.invented') : nothing} ${say('column.single')}</span
          >
        </figcaption>
        <p part="summary" class="summary">${this.#about(section)} ${say('column.lines')}</p>
        <div class="buttons" part="buttons">
          ${this.#tints(section)}
          <button type="button" part="button" aria-pressed=${this.table} @click=${() => (this.table = !this.table)}>
            ${say('frame.table')}
          </button>
        </div>
        <div
          class=${this.drawn === false ? 'picture plain' : 'picture'}
          part="picture"
          role="slider"
          tabindex="0"
          aria-label=${`${say('column.name')}. ${say('column.line')}`}
          aria-valuemin="0"
          aria-valuemax=${section.columns.length - 1}
          aria-valuenow=${place}
          aria-valuetext=${day}
          aria-describedby="keys"
          @keydown=${this.#line.onKey}
          @pointerdown=${this.#line.onPointer}
          @pointermove=${this.#line.onPointer}
        >
          <canvas aria-hidden="true"></canvas>
          ${svg`<svg viewBox="0 0 ${frame.width} ${frame.height}" aria-hidden="true" focusable="false">
            ${picture}${cutView(language, section, frame, column, { colour, most: scale })}
          </svg>`}
        </div>
        ${legend(language, tint, (along) => wordColour(colours, along))}
        ${this.drawn === false ? html`<p class="note">${say('column.noPicture')}</p>` : nothing}
        <div class="buttons" part="buttons" role="group" aria-label=${say('column.moves')}>
          ${moves.map(
            ({ key, days }) =>
              html`<button
                type="button"
                part="button"
                ?disabled=${days < 0 ? place === 0 : place === section.columns.length - 1}
                @click=${() => this.#line.move(days)}
              >
                ${say(key)}
              </button>`,
          )}
        </div>
        <p class="readout" part="readout">${atLine(language, section, column, this.timeZone)}</p>
        <p class="unseen" id="keys">${say('column.keys')}</p>
        <div class="unseen" role="status">${this.#line.announcement}</div>
        <div class=${this.table || this.drawn === false ? 'table' : 'table printed'}>
          ${this.#table.render({ caption: language.say('column.table', { date: day }), columns, rows })}
        </div>
      </figure>
      ${probe}
    </div>`;
  }

  protected override updated(): void {
    const section = asSection(this.section);
    const canvas = this.renderRoot.querySelector('canvas');
    if (!section || !canvas || !this.#frame) return;
    const wanted = [section, this.#frame, this.tint];
    if (this.#bitmap?.every((value, index) => value === wanted[index])) return;
    this.#bitmap = wanted;
    if (this.#still) this.#still = { ...this.#still, colours: palette(this.#paints.read(), tintOf(section, this.tint)) };
    const plain = matchMedia('(forced-colors: active)').matches;
    let drawn = false;
    try {
      drawn = drawBands(canvas, section, this.#frame, this.#paints.read(), tintOf(section, this.tint), plain);
    } catch {
      // A refused canvas leaves the cut, the words and the table.
    }
    this.drawn = drawn;
    this.requestUpdate();
  }

  /** What the line does not move, kept between its moves. */
  #stillParts(section: SectionData): { frame: Frame; picture: TemplateResult; scale: number; colours: Uint32Array; tint: Tint } {
    const tint = tintOf(section, this.tint);
    const from = [section, this.#size.width, this.#size.em, this.tint, this.#language.tag, this.messages];
    if (!this.#still?.from.every((value, index) => value === from[index]) || !this.#frame) {
      const { width, em } = this.#size;
      const titles = titlesOf(this.#language, section, width, em);
      this.#frame = frameOf(section, width, em, titles);
      this.#still = {
        from,
        picture: sectionView(this.#language, section, this.#frame, titles),
        scale: profileScale(section, this.#frame.depthShown),
        colours: palette(this.#paints.read(), tint),
      };
    }
    return { ...this.#still, frame: this.#frame, tint };
  }

  #about(section: SectionData): string {
    // The middle of a step: its end may be the next month's first instant.
    const half = (section.stepDays * msPerDay) / 2;
    const ends = [section.columns[0]!, section.columns[section.columns.length - 1]!].map((column) =>
      date(this.#language.tag, timeOf(section, column) - half, { month: 'long', year: 'numeric' }, this.timeZone),
    );
    return this.#language.say(section.storageInformed ? 'column.about' : 'column.aboutOpen', { from: ends[0]!, to: ends[1]! });
  }

  #tints(section: SectionData): TemplateResult | typeof nothing {
    const tracers = tracersOf(section);
    if (tracers.length === 0) return nothing;
    const chosen = tracers.includes(this.tint) ? this.tint : 'age';
    const button = (tint: string, label: string): TemplateResult =>
      html`<button type="button" part="button" aria-pressed=${chosen === tint} @click=${() => (this.tint = tint)}>
        <bdi>${label}</bdi>
      </button>`;
    return html`<span role="group" class="buttons bare" aria-label=${this.#language.say('column.tint')}
      >${button('age', this.#language.say('column.age'))}${tracers.map((name) => button(name, tracerName(section, name)))}</span
    >`;
  }
}

const moves = [
  { key: 'column.seasonEarlier', days: -season },
  { key: 'column.earlier', days: -1e-6 },
  { key: 'column.later', days: 1e-6 },
  { key: 'column.seasonLater', days: season },
] as const;

function wordColour(colours: Uint32Array, along: number): string {
  const word = colours[Math.round(Math.min(1, along) * (colours.length - 1))]!;
  return `rgb(${word & 255} ${(word >> 8) & 255} ${(word >> 16) & 255})`;
}

declare global {
  interface HTMLElementTagNameMap {
    'rillage-column-view': RillageColumnView;
  }
}
