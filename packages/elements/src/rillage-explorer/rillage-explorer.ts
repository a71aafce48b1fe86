import { LitElement, html, nothing, type PropertyValues, type TemplateResult } from 'lit';
import type { Catchment, Selection } from '@rillage/sdk';
import { buttonStyles } from '../shared/buttons.js';
import { number } from '../shared/format.js';
import { Language } from '../shared/language.js';
import type { Messages } from '../shared/messages.js';
import { cleanText } from '../shared/text.js';
import { theme } from '../shared/theme.js';
import { version } from '../version.js';
import { handOut, type ExploreResult } from './hand-out.js';
import { explorerMessages, type ExplorerKey } from './messages.js';
import { moved, placeOf, slidersOf, sliderSteps, startingForms, valueAt, withSelection, type Slider } from './sliders.js';
import { explorerStyles } from './styles.js';

/** What is asked for when a reader has moved a slider. */
export interface ExploreRequest {
  /** The catchment with the selection as the sliders now stand. */
  catchment: Catchment;
  /** False while a slider is being dragged: the answer may be coarser, and another request follows. */
  settled: boolean;
}

/** Detail of `rillage-explore`: a request, and the call that takes its answer. An answer to an older request is dropped. */
export interface ExploreDetail extends ExploreRequest {
  respond: (result: ExploreResult) => void;
}

/**
 * Sliders for the parameters of each outflow's selection. It computes nothing: it asks its `compute` property, or by the event `rillage-explore`,
 * and hands what comes to the elements inside it: the section to a `rillage-column-view`, the ages to a `rillage-age-plot`, the history with
 * its simulated tracer to a `rillage-age-history`. Requests are gathered to one a frame, and an answer given at once is drawn in that frame.
 *
 * @slot - The elements that show the result.
 * @csspart name - The explorer's name, a heading.
 * @csspart controls - The sliders.
 * @csspart button - The button.
 * @cssprop --rillage-ink - Colour of text and lines. Default `CanvasText`.
 * @cssprop --rillage-paper - Colour of the ground. Default `Canvas`.
 * @cssprop --rillage-quiet - Colour of minor text. Default: ink, a quarter towards paper.
 * @cssprop --rillage-font - Typeface of everything but the name. Default: the page's.
 * @cssprop --rillage-font-sentence - Typeface of the name. Default: the system's serif.
 * @cssprop --rillage-size-1 - Size of labels and buttons.
 * @cssprop --rillage-size-2 - Size of running text.
 * @cssprop --rillage-size-3 - Size of the name.
 * @fires {CustomEvent<ExploreDetail>} rillage-explore - Asks for a trial, where no `compute` is set: at first, and at most once a frame while a slider moves. Bubbles, composed.
 */
export class RillageExplorer extends LitElement {
  /** Version of the package this class came from. */
  static readonly version = version;

  static override styles = [theme, buttonStyles, explorerStyles];

  static override properties = {
    catchment: { attribute: false },
    compute: { attribute: false },
    messages: { attribute: false },
    trial: { state: true },
    state: { state: true },
  };

  /** The model to begin from. It is not changed. */
  declare catchment: Catchment | null;
  /** Makes a trial, at once or later. Without it the event asks. */
  declare compute: ((request: ExploreRequest) => ExploreResult | Promise<ExploreResult>) | null;
  /** Messages of this element to replace, by key. */
  declare messages: Messages | undefined;
  declare private trial: Catchment | null;
  declare private state: 'idle' | 'working' | 'failed';

  #language = new Language(this, explorerMessages);
  #frame = 0;
  #asked = 0;
  #settled = true;
  #result: ExploreResult | null = null;

  constructor() {
    super();
    this.catchment = null;
    this.compute = null;
    this.trial = null;
    this.state = 'idle';
  }

  /** The last result handed out. */
  get result(): ExploreResult | null {
    return this.#result;
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    cancelAnimationFrame(this.#frame);
    this.#frame = 0;
    this.#asked++;
  }

  protected override willUpdate(changed: PropertyValues<this>): void {
    if (changed.has('catchment')) this.trial = isCatchment(this.catchment) ? this.catchment : null;
    if ((changed.has('catchment') || changed.has('compute')) && this.trial) this.#ask(true);
  }

  override render(): TemplateResult {
    const { trial } = this;
    const say = (key: ExplorerKey, values?: Record<string, string | number>): string => this.#language.say(key, values);
    if (!trial) return html`<slot @slotchange=${this.#slotted}></slot>`;
    return html`<div lang=${this.#language.tag} dir=${this.#language.direction}>
        <h2 part="name">${say('explorer.name')}</h2>
        <p class="note">${say('explorer.note')}</p>
        <div class="controls" part="controls">${Object.keys(trial.selection).map((outflow) => this.#outflow(trial, outflow))}</div>
        <p>
          <button type="button" part="button" ?disabled=${trial === this.catchment} @click=${this.#reset}>${say('explorer.reset')}</button>
        </p>
        <p class="state" role="status">${this.state === 'idle' ? nothing : say(`explorer.${this.state}`)}</p>
      </div>
      <slot @slotchange=${this.#slotted}></slot>`;
  }

  #outflow(trial: Catchment, outflow: string): TemplateResult {
    const say = (key: ExplorerKey, values?: Record<string, string | number>): string => this.#language.say(key, values);
    const form = trial.selection[outflow]!.form;
    const own = this.catchment?.selection[outflow]?.form;
    const forms = [...new Set([...(own ? [own] : []), ...Object.keys(startingForms)])];
    return html`<fieldset>
      <legend>
        ${say('explorer.from', { outflow: outflow === 'discharge' || outflow === 'evapotranspiration' ? say(`explorer.${outflow}`) : cleanText(outflow, 40) })}
      </legend>
      <label class="row"
        ><span>${say('explorer.form')}</span>
        <select @change=${(event: Event) => this.#choose(outflow, (event.target as HTMLSelectElement).value)}>
          ${forms.map((name) => html`<option value=${name} .selected=${name === form}>${this.#word(name)}</option>`)}
        </select></label
      >
      ${slidersOf(trial, outflow).map((slider) => this.#slider(slider))}
    </fieldset>`;
  }

  #slider(slider: Slider): TemplateResult {
    const { parameter, driven, value } = slider;
    const word = parameter === 'from' ? this.#language.say('explorer.from.depth') : this.#word(parameter);
    const format = number(this.#language.tag, { maximumSignificantDigits: 3 });
    const label = driven
      ? this.#language.say('explorer.driven', { parameter: word, at: format.format(driven.at), driver: this.#word(driven.driver) })
      : word;
    const shown = format.format(value);
    return html`<label class="row"
      ><span>${label}</span><output>${shown}</output>
      <input
        type="range"
        min="0"
        max=${sliderSteps}
        .value=${String(placeOf(slider))}
        aria-valuetext=${shown}
        @input=${(event: Event) => this.#move(slider, event, false)}
        @change=${(event: Event) => this.#move(slider, event, true)}
    /></label>`;
  }

  /** A word of ours where there is one, else the name as it came. */
  #word(name: string): string {
    const key = `explorer.${name}`;
    return Object.hasOwn(explorerMessages, key) ? this.#language.say(key as ExplorerKey) : cleanText(name, 40);
  }

  #move(slider: Slider, event: Event, settled: boolean): void {
    if (!this.trial) return;
    const value = valueAt(slider, Number((event.target as HTMLInputElement).value));
    this.trial = moved(this.trial, slider, value);
    this.#ask(settled);
  }

  #choose(outflow: string, form: string): void {
    if (!this.trial) return;
    const own = this.catchment?.selection[outflow];
    const selection: Selection | undefined = own?.form === form ? own : startingForms[form];
    if (!selection) return;
    this.trial = withSelection(this.trial, outflow, selection);
    this.#ask(true);
  }

  #reset = (): void => {
    this.trial = this.catchment;
    this.#ask(true);
  };

  #slotted = (): void => {
    if (this.#result) handOut(this, this.#result);
  };

  /** One request a frame, of how the sliders stand then. */
  #ask(settled: boolean): void {
    this.#settled = settled;
    this.#frame ||= requestAnimationFrame(() => {
      this.#frame = 0;
      this.#request();
    });
  }

  #request(): void {
    const { trial } = this;
    if (!trial) return;
    const asked = ++this.#asked;
    const respond = (result: ExploreResult): void => {
      if (asked !== this.#asked || !result || typeof result !== 'object') return;
      this.#result = result;
      this.state = 'idle';
      handOut(this, result);
    };
    const failed = (): void => {
      if (asked === this.#asked) this.state = 'failed';
    };
    const request: ExploreRequest = { catchment: trial, settled: this.#settled };
    if (!this.compute) {
      this.dispatchEvent(
        new CustomEvent<ExploreDetail>('rillage-explore', { detail: { ...request, respond }, bubbles: true, composed: true }),
      );
      return;
    }
    try {
      const answer = this.compute(request);
      if (answer instanceof Promise) {
        this.state = 'working';
        answer.then(respond, failed);
      } else respond(answer);
    } catch {
      failed();
    }
  }
}

const isCatchment = (value: unknown): value is Catchment => {
  const selection = (value as Partial<Catchment> | null)?.selection;
  return typeof selection === 'object' && selection !== null && Object.values(selection).every((one) => typeof one?.form === 'string');
};

declare global {
  interface HTMLElementTagNameMap {
    'rillage-explorer': RillageExplorer;
  }
  interface HTMLElementEventMap {
    'rillage-explore': CustomEvent<ExploreDetail>;
  }
}
