import { LitElement, html, nothing, type TemplateResult } from 'lit';
import type { Reading } from '@rillage/sdk';
import { asReading } from '../shared/check/reading.js';
import { moment } from '../shared/format.js';
import { inkStyles } from '../shared/ink.js';
import { Language } from '../shared/language.js';
import { later } from '../shared/later.js';
import type { Messages } from '../shared/messages.js';
import { StationLink } from '../shared/station-link.js';
import { cleanText } from '../shared/text.js';
import { theme } from '../shared/theme.js';
import { version } from '../version.js';
import { readingMessages } from './messages.js';
import { statement } from './sentence.js';
import { stripStyles } from './strip-styles.js';
import { readingStyles } from './styles.js';

/**
 * How old the water of a stream is, for everyone: one sentence with its range, the numbers, the date of the data, how sure it is and why, and
 * what it must not be used for. Takes its reading from the `rillage-station` around it, or from its own property.
 *
 * @slot - What is shown as long as there is no reading, or where scripts do not run.
 * @csspart name - Name of the station.
 * @csspart sentence - The sentence.
 * @csspart rest - The sentences that follow it.
 * @csspart date - The date of the data.
 * @csspart trend - Comparison with the same season.
 * @csspart table - The numbers behind the sentence.
 * @csspart strip - A share's range drawn on a line from nothing to all.
 * @csspart confidence - How sure it is and why.
 * @csspart evidence - What it rests on.
 * @csspart caution - What it must not be used for.
 * @cssprop --rillage-ink - Colour of text and lines. Default `CanvasText`.
 * @cssprop --rillage-paper - Colour of the ground. Default `Canvas`.
 * @cssprop --rillage-quiet - Colour of minor text. Default: ink, a quarter towards paper.
 * @cssprop --rillage-hairline - Colour of rules. Default: ink, two thirds towards paper.
 * @cssprop --rillage-font - Typeface of everything but the sentence. Default: the page's.
 * @cssprop --rillage-font-sentence - Typeface of the sentence. Default: the system's serif.
 * @cssprop --rillage-size-1 - Smallest of five type sizes.
 * @cssprop --rillage-size-2 - Size of running text.
 * @cssprop --rillage-size-3 - Size of what follows the sentence.
 * @cssprop --rillage-size-4 - Size of the sentence in the compact form.
 * @cssprop --rillage-size-5 - Size of the sentence.
 * @cssprop --rillage-age-1 - Colour of water younger than a week. Six colours, light to dark, mean age and nothing else.
 * @cssprop --rillage-age-2 - Colour of water a week to a month old.
 * @cssprop --rillage-age-3 - Colour of water a month to a season old.
 * @cssprop --rillage-age-4 - Colour of water a season to a year old.
 * @cssprop --rillage-age-5 - Colour of water one to ten years old.
 * @cssprop --rillage-age-6 - Colour of water older than ten years.
 */
export class RillageReading extends LitElement {
  /** Version of the package this class came from. */
  static readonly version = version;

  static override styles = [theme, inkStyles, stripStyles, readingStyles];

  static override properties = {
    form: { type: String, reflect: true },
    youngerThan: { type: Number, attribute: 'younger-than' },
    timeZone: { type: String, attribute: 'time-zone' },
    reading: { attribute: false },
    messages: { attribute: false },
  };

  /** `full` (default), or `compact`: sentence, date and caution only. */
  declare form: 'full' | 'compact';
  /** Age limit in days that the sentence is about, where it is made from the numbers. Default 30. */
  declare youngerThan: number;
  /** IANA zone in which days and times are named. Default `UTC`. */
  declare timeZone: string;
  /** A reading handed over directly; goes before the one of the station around. */
  declare reading: Reading | null;
  /** Messages of this element to replace, by key. */
  declare messages: Messages | undefined;

  #language = new Language(this, readingMessages);
  #link = new StationLink(this);

  constructor() {
    super();
    this.form = 'full';
    this.youngerThan = 30;
    this.timeZone = 'UTC';
    this.reading = null;
  }

  override render(): TemplateResult {
    const reading = this.reading ? asReading(this.reading) : (this.#link.view?.reading ?? null);
    if (!reading) return html`<slot></slot>`;
    const language = this.#language;
    const view = this.reading ? null : this.#link.view;
    const said = statement(language, reading, this.youngerThan || 30, this.timeZone, this.#came);
    const name = cleanText(this.#link.view?.station?.name ?? reading.station?.name, 120);
    const full = this.form !== 'compact';
    const part = full ? detailing(this.#came) : null;
    return html`<article
      aria-busy=${said.coming || part === undefined}
      class=${classes(full, view?.stale)}
      lang=${language.tag}
      dir=${language.direction}
    >
      ${name ? html`<p part="name" class="name"><bdi>${name}</bdi></p>` : nothing}
      ${reading.station?.invented || view?.station?.invented ? html`<p class="invented">${language.say('reading.invented')}</p>` : nothing}
      <p part="sentence" class="sentence" lang=${said.language} dir="auto">${said.lead}</p>
      ${said.rest.length ? html`<p part="rest" class="rest" lang=${said.language} dir="auto">${said.rest.join(' ')}</p>` : nothing}
      <p part="date" class="date">
        ${this.#date(reading)}${view?.stale ? html` · <strong>${language.say('reading.old')}</strong>` : nothing}${view?.offline ? html` · <strong>${language.say('reading.kept')}</strong>` : nothing}
      </p>
      ${part ? part.details(language, reading, this.timeZone) : nothing}
      <p part="caution" class="caution">
        ${(language.speaks(reading.language) && cleanText(reading.caution, 600)) || language.say('reading.caution')}
      </p>
    </article>`;
  }

  #came = (): void => this.requestUpdate();

  #date(reading: Reading): TemplateResult {
    const language = this.#language;
    const text = moment(language.tag, reading.at, reading.stepDays, this.timeZone);
    return html`<time datetime=${reading.at}
      >${language.say(reading.stepDays >= 1 ? 'reading.dateEnd' : 'reading.date', { date: text })}</time
    >`;
  }
}

const detailing = later(() => import('./details.js'));

const classes = (full: boolean, stale: boolean | undefined): string => `${full ? 'full' : 'compact'}${stale ? ' old' : ''}`;

declare global {
  interface HTMLElementTagNameMap {
    'rillage-reading': RillageReading;
  }
}
