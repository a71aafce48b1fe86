import { LitElement, css, html, type PropertyValues, type TemplateResult } from 'lit';
import type { Reading, Station, StationExcerpt } from '@rillage/sdk';
import { date, moment, msPerDay } from '../shared/format.js';
import { Language } from '../shared/language.js';
import type { Messages } from '../shared/messages.js';
import type { StationState, StationView, StationWanted } from '../shared/station-link.js';
import { cleanText } from '../shared/text.js';
import { theme } from '../shared/theme.js';
import { version } from '../version.js';
import { stationMessages } from './messages.js';
import { StationSource, type Sourced } from './source.js';
import { freshness, patience, type Freshness } from './stale.js';

/**
 * Loads a station, its excerpt or a reading, and hands it to the Rillage elements inside. It shows nothing of its own but what must be said about the
 * data: that they load, are old, come from a kept copy, are withheld, or could not be had.
 *
 * @slot - The elements that show the station, and any content of the page.
 * @csspart notice - What is said about the data; a polite live region, empty when there is nothing to say.
 * @cssprop --rillage-ink - Colour of text and lines. Default `CanvasText`.
 * @cssprop --rillage-paper - Colour of the ground. Default `Canvas`.
 * @cssprop --rillage-font - Typeface of everything but the sentence. Default: the page's.
 * @fires {CustomEvent<StationView>} rillage-station-change - After the station, its reading or its state changed. Composed, does not bubble.
 * @fires {CustomEvent<null>} rillage-station-available - When it begins to answer the elements inside. Bubbles, composed.
 */
export class RillageStation extends LitElement {
  /** Version of the package this class came from. */
  static readonly version = version;

  static override styles = [
    theme,
    css`
      :host {
        container-type: normal;
      }
      .said {
        border-block: 1px solid var(--_ink);
        padding-block: 0.5em;
        margin-block-end: 1.5em;
      }
      p {
        margin: 0;
        font-weight: 600;
      }
      [data-quiet] p {
        font-weight: inherit;
      }
    `,
  ];

  static override properties = {
    src: { type: String },
    staleAfter: { type: String, attribute: 'stale-after' },
    timeZone: { type: String, attribute: 'time-zone' },
    state: { type: String, reflect: true },
    station: { attribute: false },
    messages: { attribute: false },
    clock: { attribute: false },
    sourced: { state: true },
  };

  /** Address of a file: a station, its excerpt or a reading. Nothing else is ever fetched. */
  declare src: string | null;
  /** How old the data may be before they look old: days (`2`), a duration (`PT36H`), or `never`. Default three days. */
  declare staleAfter: string | null;
  /** IANA zone in which days and times are named. Default `UTC`. */
  declare timeZone: string;
  /** What holds, reflected for styling; read it, do not set it: `empty`, `loading`, `ready`, `stale`, `offline`, `withheld` or `failed`. */
  declare state: StationState;
  /** A station, its excerpt or a reading handed over directly; goes before `src` and before a JSON child. */
  declare station: Station | StationExcerpt | Reading | null;
  /** Messages of this element to replace, by key. */
  declare messages: Messages | undefined;
  /** The reader's clock, milliseconds; for tests and replays. */
  declare clock: () => number;
  declare private sourced: Sourced;

  #language = new Language(this, stationMessages);
  #source = new StationSource((sourced) => (this.sourced = sourced));
  #receivers = new Set<StationWanted['receive']>();
  #view: StationView = { state: 'empty', station: null, reading: null, stale: false, offline: false };
  #timer: ReturnType<typeof setTimeout> | undefined;
  #children: MutationObserver | undefined;
  #childText: string | null = null;

  constructor() {
    super();
    this.src = null;
    this.staleAfter = null;
    this.timeZone = 'UTC';
    this.state = 'empty';
    this.station = null;
    this.clock = Date.now;
    this.sourced = { kind: 'empty' };
    this.addEventListener('rillage-station-wanted', this.#register);
  }

  /** What the elements inside were last handed. */
  get view(): StationView {
    return this.#view;
  }

  /** Asks the server again. */
  reload(): void {
    this.#childText = this.#jsonChild();
    this.#source.open(this.station, this.src, this.#childText);
  }

  override connectedCallback(): void {
    super.connectedCallback();
    this.#children = new MutationObserver(this.#childrenChanged);
    this.#children.observe(this, { childList: true, subtree: true, characterData: true });
    addEventListener('online', this.#online);
    document.addEventListener('visibilitychange', this.#look);
    if (document.readyState === 'loading') document.addEventListener('DOMContentLoaded', this.#parsed, { once: true });
    if (this.hasUpdated) this.reload();
    this.dispatchEvent(new CustomEvent('rillage-station-available', { detail: null, bubbles: true, composed: true }));
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.#children?.disconnect();
    removeEventListener('online', this.#online);
    document.removeEventListener('visibilitychange', this.#look);
    document.removeEventListener('DOMContentLoaded', this.#parsed);
    clearTimeout(this.#timer);
    this.#source.close();
  }

  protected override willUpdate(changed: PropertyValues<this>): void {
    if (!this.hasUpdated || changed.has('src') || changed.has('station')) this.reload();
    const before = this.#view;
    this.#view = this.#viewNow();
    this.state = this.#view.state;
    if (same(before, this.#view)) this.#view = before;
  }

  protected override updated(): void {
    const view = this.#view;
    if (view === this.#handed) return;
    this.#handed = view;
    for (const receive of [...this.#receivers]) receive(view);
    this.dispatchEvent(new CustomEvent('rillage-station-change', { detail: view, composed: true }));
  }
  #handed: StationView = this.#view;

  override render(): TemplateResult {
    const notes = this.#notes();
    const quiet = this.#view.state === 'loading' || this.#view.state === 'empty';
    return html`<div
        part="notice"
        role="status"
        class=${notes.length ? 'said' : ''}
        lang=${this.#language.tag}
        dir=${this.#language.direction}
        ?data-quiet=${quiet}
      >
        ${notes.map((note) => html`<p>${note}</p>`)}
      </div>
      <slot></slot>`;
  }

  #viewNow(): StationView {
    const { sourced } = this;
    if (sourced.kind === 'empty' || sourced.kind === 'loading')
      return { state: sourced.kind, station: null, reading: null, stale: false, offline: false };
    const { station, reading, problem } = sourced;
    const stale = reading !== null && this.#freshness(reading) === 'stale';
    const offline = problem?.code === 'unreachable' && reading !== null;
    const state =
      problem && !offline ? 'failed' : offline ? 'offline' : stale ? 'stale' : reading?.status === 'withheld' ? 'withheld' : 'ready';
    return { state, station, reading, stale, offline };
  }

  #notes(): string[] {
    const { sourced } = this;
    const language = this.#language;
    if (sourced.kind === 'loading') return [language.say('station.loading')];
    if (sourced.kind === 'empty') return [];
    const { reading, problem, keptAt } = sourced;
    const notes: string[] = [];
    if (problem?.code === 'unreachable' && reading && keptAt) {
      notes.push(
        language.say('station.offline', { date: date(language.tag, keptAt, { dateStyle: 'long', timeStyle: 'short' }, this.timeZone) }),
      );
    } else if (problem) {
      const why = language.say(`station.${problem.code}`, {
        at: cleanText(problem.at, 80),
        status: String(problem.status ?? ''),
        megabytes: 5,
      });
      notes.push(language.say(reading ? 'station.failedKept' : 'station.failed', { why }));
    }
    if (!reading) return notes;
    const fresh = this.#freshness(reading);
    const day = moment(language.tag, reading.at, reading.stepDays, this.timeZone);
    if (fresh === 'stale')
      notes.push(language.say('station.stale', { date: day, count: Math.floor((this.clock() - Date.parse(reading.at)) / msPerDay) }));
    if (fresh === 'future') notes.push(language.say('station.future', { date: day }));
    if (reading.status === 'withheld') notes.push(language.say('station.withheld'));
    return notes;
  }

  /** Also sets the clock for the moment at which fresh data turn old on an open page. */
  #freshness(reading: Reading): Freshness {
    const wait = patience(this.staleAfter);
    const left = Date.parse(reading.at) + wait - this.clock();
    clearTimeout(this.#timer);
    if (this.isConnected && left > 0 && left < longestTimer) this.#timer = setTimeout(this.#look, left + 1000);
    return freshness(reading.at, this.clock(), wait);
  }

  #jsonChild(): string | null {
    if (document.readyState === 'loading') return null;
    const script = [...this.children].find(
      (child) => child.localName === 'script' && child.getAttribute('type')?.trim() === 'application/json',
    );
    return script?.textContent ?? null;
  }

  #register = (event: HTMLElementEventMap['rillage-station-wanted']): void => {
    if (event.target === this || event.detail.release) return;
    event.stopPropagation();
    const { receive } = event.detail;
    this.#receivers.add(receive);
    event.detail.release = () => this.#receivers.delete(receive);
    receive(this.#view);
  };

  #childrenChanged = (): void => {
    if (!this.src && !this.station && this.#jsonChild() !== this.#childText) this.reload();
  };
  #online = (): void => {
    if (this.#view.offline || this.#view.state === 'failed') this.reload();
  };
  #look = (): void => this.requestUpdate();
  #parsed = (): void => {
    if (this.#jsonChild() !== this.#childText) this.reload();
  };
}

const longestTimer = 2 ** 31 - 2000;

const same = (one: StationView, other: StationView): boolean =>
  (Object.keys(one) as (keyof StationView)[]).every((key) => one[key] === other[key]);

declare global {
  interface HTMLElementTagNameMap {
    'rillage-station': RillageStation;
  }
}
