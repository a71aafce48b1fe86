import { LitElement, html, nothing, type PropertyValues, type TemplateResult } from 'lit';
import type { Fit, FitCatchmentOptions, FitProblem, Help, HelpOptions, Issue } from '@rillage/sdk';
import { buttonStyles } from '../shared/buttons.js';
import { DataTable, tableStyles } from '../shared/data-table.js';
import { date, number, percent } from '../shared/format.js';
import { Language } from '../shared/language.js';
import type { Messages } from '../shared/messages.js';
import { cleanText } from '../shared/text.js';
import { theme } from '../shared/theme.js';
import { version } from '../version.js';
import { alternativeWords, choicesView } from './choices-view.js';
import { fitPanelMessages } from './messages.js';
import { pathWords } from './priors.js';
import { proposeChoices, tracersOf, type FitChoices, type FitRecord } from './proposal.js';
import { helpView, resultsView } from './results-view.js';
import { fitPanelStyles } from './styles.js';

/** Detail of `rillage-problem`: the problem as the reader has set it. */
export interface ProblemDetail {
  problem: FitProblem;
}

/** Detail of `rillage-fit`: a fit that finished or was stopped, with its problem. */
export interface FitDetail extends ProblemDetail {
  fit: Fit;
}

/** Detail of `rillage-sign-off`. */
export interface SignOffDetail extends FitDetail {
  name: string;
  /** As the field has it, yyyy-mm-dd. */
  date: string;
}

type Progress = Parameters<NonNullable<FitCatchmentOptions['onProgress']>>[0];

/** Shortest time between two pictures of a fit's progress, milliseconds. */
const SHOW_EVERY = 250;

/**
 * Fits a record: which selections to weigh against each other, what is believed of each unknown, the run with its progress, and what came of
 * it: verdicts, samples against their foretold ranges, alternatives with their weights, what would help, sign-off. It computes nothing: the page
 * gives `fitCatchment` and `whatWouldHelp`, the SDK's own or ones that run elsewhere.
 *
 * @slot - What is shown where scripts do not run.
 * @csspart name - The panel's name, a heading.
 * @csspart button - Each button.
 * @csspart result - All that is said of a fit.
 * @csspart outcome - Whether it converged.
 * @csspart picture - The samples of a tracer against their ranges.
 * @csspart table - Each table.
 * @csspart sign - The form for the sign-off.
 * @cssprop --rillage-ink - Colour of text and lines. Default `CanvasText`.
 * @cssprop --rillage-paper - Colour of the ground. Default `Canvas`.
 * @cssprop --rillage-quiet - Colour of minor text. Default: ink, a quarter towards paper.
 * @cssprop --rillage-hairline - Colour of rules. Default: ink, two thirds towards paper.
 * @cssprop --rillage-font - Typeface of everything but the names. Default: the page's.
 * @cssprop --rillage-font-sentence - Typeface of the names. Default: the system's serif.
 * @cssprop --rillage-size-1 - Size of labels, fields, buttons and tables.
 * @cssprop --rillage-size-2 - Size of running text.
 * @cssprop --rillage-size-3 - Size of the name.
 * @fires {CustomEvent<ProblemDetail>} rillage-problem - When the reader has changed what is to be fitted. Bubbles, composed.
 * @fires {CustomEvent<FitDetail>} rillage-fit - When a fit has finished or was stopped. Bubbles, composed.
 * @fires {CustomEvent<SignOffDetail>} rillage-sign-off - When the reader signs a finished, converged fit off. Bubbles, composed.
 */
export class RillageFitPanel extends LitElement {
  /** Version of the package this class came from. */
  static readonly version = version;

  static override styles = [theme, buttonStyles, tableStyles, fitPanelStyles];

  static override properties = {
    record: { attribute: false },
    problem: { attribute: false },
    fit: { attribute: false },
    fitCatchment: { attribute: false },
    whatWouldHelp: { attribute: false },
    today: { type: String },
    seed: { type: Number },
    messages: { attribute: false },
    choices: { state: true },
    phase: { state: true },
    progress: { state: true },
    issues: { state: true },
    changed: { state: true },
    tableOf: { state: true },
    plans: { state: true },
    signed: { state: true },
  };

  /** What is fitted: forcing, samples and bulk samples of rain, as `readForcing` gives them. A new record drops the fit shown. */
  declare record: FitRecord | null;
  /** The problem to begin with, with or without its record; null: one is proposed. It is not changed; `rillage-problem` carries what becomes of it. */
  declare problem: Partial<FitProblem> | null;
  /** The fit to show. */
  declare fit: Fit | null;
  /** Fits a problem: the SDK's call of that name. */
  declare fitCatchment: ((problem: FitProblem, options: FitCatchmentOptions) => Promise<Fit>) | null;
  /** Says which samples would help: the SDK's call of that name. Without it the question is not offered. */
  declare whatWouldHelp: ((fit: Fit, problem: FitProblem, options: HelpOptions) => Promise<Help[]>) | null;
  /** The day that the sign-off proposes, yyyy-mm-dd. */
  declare today: string;
  /** Seed of the fit: the same gives the same draws. */
  declare seed: number;
  /** Messages of this element to replace, by key. */
  declare messages: Messages | undefined;
  declare private choices: FitChoices | null;
  declare private phase: 'idle' | 'fitting' | 'helping';
  declare private progress: Progress | null;
  declare private issues: readonly Issue[];
  declare private changed: boolean;
  declare private tableOf: string;
  declare private plans: Help[] | null;
  declare private signed: { name: string; date: string } | null;

  #language = new Language(this, fitPanelMessages);
  #table = new DataTable(this, this.#language);
  #stop: AbortController | null = null;
  #shown = 0;
  #helped = 0;
  #said = '';

  constructor() {
    super();
    this.record = null;
    this.problem = null;
    this.fit = null;
    this.fitCatchment = null;
    this.whatWouldHelp = null;
    this.today = '';
    this.seed = 1;
    this.choices = null;
    this.phase = 'idle';
    this.progress = null;
    this.issues = [];
    this.changed = false;
    this.tableOf = '';
    this.plans = null;
    this.signed = null;
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.#stop?.abort();
  }

  protected override willUpdate(changed: PropertyValues<this>): void {
    if (changed.has('record') && changed.get('record') !== undefined) {
      this.#stop?.abort();
      if (!changed.has('fit')) this.fit = null;
      if (!changed.has('problem')) this.problem = null;
    }
    if (changed.has('record') || changed.has('problem')) {
      this.choices = this.record && tracersOf(this.record).length > 0 ? choicesOf(this.problem, this.record) : null;
      this.issues = [];
      this.changed = false;
    }
    if (changed.has('fit') || changed.has('record')) {
      this.plans = null;
      this.signed = null;
      this.changed = false;
    }
  }

  override render(): TemplateResult {
    const say = this.#language.say.bind(this.#language);
    const { record, choices, fit } = this;
    return html`<div lang=${this.#language.tag} dir=${this.#language.direction}>
      <h2 part="name">${say('fit.name')}</h2>
      ${
        !record || !choices
          ? html`<p class="note">${say(record ? 'fit.noSamples' : 'fit.noRecord')}</p>`
          : html`${choicesView({
              record,
              choices,
              issues: this.issues,
              disabled: this.phase !== 'idle',
              language: this.#language,
              change: this.#change,
            })}
            ${this.#actions()} ${this.#refusals()}
            ${
              fit
                ? html`${this.changed ? html`<p class="note">${say('fit.changed')}</p>` : nothing}
                  ${resultsView({
                    fit,
                    choices,
                    language: this.#language,
                    table: this.#table,
                    tableOf: this.tableOf,
                    showTable: (tracer) => (this.tableOf = tracer),
                  })}
                  ${this.#help(fit)} ${this.#signOff(fit)}`
                : nothing
            }`
      }
      <slot hidden></slot>
    </div>`;
  }

  #actions(): TemplateResult {
    const say = this.#language.say.bind(this.#language);
    const fitting = this.phase === 'fitting';
    const goesOn = this.fit?.partial && this.fit.state && !this.changed;
    return html`<div class="actions">
        ${
          fitting
            ? html`<button type="button" part="button" @click=${() => this.#stop?.abort()}>${say('fit.stop')}</button>
                <progress max="1" .value=${this.progress?.done ?? 0} aria-label=${say('fit.name')}></progress>`
            : html`${goesOn ? html`<button type="button" part="button" @click=${() => this.#run(true)}>${say('fit.goOn')}</button>` : nothing}
                <button
                  type="button"
                  part="button"
                  ?disabled=${!this.fitCatchment || this.phase !== 'idle'}
                  @click=${() => this.#run(false)}
                >
                  ${say(this.fit ? 'fit.anew' : 'fit.run')}
                </button>`
        }
        ${fitting ? html`<span class="note">${this.#progressWords()}</span>` : nothing}
      </div>
      <p class="note" role="status">${this.#said}</p>`;
  }

  #progressWords(): string {
    if (!this.progress) return '';
    const { done, alternative, evaluations, rHat, timeLeft } = this.progress;
    const say = this.#language.say.bind(this.#language);
    const digits = number(this.#language.tag, { maximumFractionDigits: 3 });
    const words = say('fit.running', {
      done: percent(this.#language, done),
      alternative: alternativeWords(alternative, this.choices, this.#language),
      count: evaluations,
      rHat: Number.isFinite(rHat) ? digits.format(rHat) : say('amount.unknown'),
    });
    return Number.isFinite(timeLeft) ? `${words}; ${say('fit.left', { count: Math.ceil(timeLeft) })}` : words;
  }

  #refusals(): TemplateResult | typeof nothing {
    const say = this.#language.say.bind(this.#language);
    if (this.issues.length === 0) return nothing;
    return html`<div class="grave" role="alert">
      <p>${say('fit.refused')}</p>
      <ul>
        ${this.issues.slice(0, 20).map(({ path, expected, received, hint, code }) => {
          const words = expected
            ? say('fit.expected', { path: pathWords(path ?? code), expected, received: received ?? say('amount.unknown') })
            : code;
          return html`<li>${cleanText([words, hint].filter(Boolean).join(' '), 500)}</li>`;
        })}
      </ul>
    </div>`;
  }

  #help(fit: Fit): TemplateResult | typeof nothing {
    const say = this.#language.say.bind(this.#language);
    if (!this.whatWouldHelp || fit.partial) return nothing;
    return html`<h3>${say('fit.help')}</h3>
      ${this.plans ? helpView(this.plans, this.#language) : nothing}
      <p class="actions">
        <button type="button" part="button" ?disabled=${this.phase !== 'idle' || this.changed} @click=${this.#askHelp}>
          ${say('fit.helpAsk')}
        </button>
        ${this.phase === 'helping' ? html`<span class="note">${say('fit.helpRunning', { done: percent(this.#language, this.#helped) })}</span>` : nothing}
      </p>`;
  }

  #signOff(fit: Fit): TemplateResult {
    const say = this.#language.say.bind(this.#language);
    const ready = fit.converged && !fit.partial && !this.changed;
    return html`<h3>${say('fit.signOff')}</h3>
      <form class="sign" part="sign" @submit=${this.#sign}>
        <p class="note">${say('fit.statement')}</p>
        <label>${say('fit.by')} <input name="by" required maxlength="120" autocomplete="name" ?disabled=${!ready} /></label>
        <label>${say('fit.on')} <input name="on" type="date" required .value=${this.today} ?disabled=${!ready} /></label>
        <p>
          <button part="button" ?disabled=${!ready}>${say('fit.sign')}</button>
          ${ready ? nothing : say(this.changed ? 'fit.changed' : 'fit.notYet')}
        </p>
        <p class="note" role="status">
          ${
            this.signed
              ? say('fit.signed', {
                  name: cleanText(this.signed.name, 120),
                  date: date(this.#language.tag, this.signed.date, { dateStyle: 'long' }),
                })
              : nothing
          }
        </p>
      </form>`;
  }

  #change = (choices: FitChoices): void => {
    this.choices = choices;
    this.issues = [];
    this.changed = this.fit !== null;
    this.dispatchEvent(new CustomEvent<ProblemDetail>('rillage-problem', going({ problem: this.#whole() })));
  };

  /** The choices with the record, of which only the tracers chosen are compared. */
  #whole(): FitProblem {
    const { forcing, samples, rainSamples } = this.record!;
    const choices = this.choices!;
    const chosen = ({ tracer }: { tracer: string }): boolean => Object.hasOwn(choices.errors, tracer);
    const rain = rainSamples?.filter(chosen) ?? [];
    return { ...choices, forcing, samples: samples.filter(chosen), ...(rain.length > 0 ? { rainSamples: rain } : {}) };
  }

  async #run(goOn: boolean): Promise<void> {
    const { fitCatchment } = this;
    if (!fitCatchment || !this.choices || this.phase !== 'idle') return;
    const problem = this.#whole();
    const resume = goOn ? this.fit?.state : null;
    const stop = (this.#stop = new AbortController());
    this.phase = 'fitting';
    this.progress = null;
    this.issues = [];
    this.#said = '';
    try {
      const fit = await fitCatchment(problem, {
        seed: this.seed,
        signal: stop.signal,
        onProgress: this.#follow,
        ...(resume ? { resume } : {}),
      });
      // a record that came meanwhile has taken this fit's place
      if (this.#stop !== stop || !this.isConnected) return;
      this.fit = fit;
      this.#said = this.#language.say(fit.partial ? 'fit.stopped' : 'fit.finished');
      this.dispatchEvent(new CustomEvent<FitDetail>('rillage-fit', going({ fit, problem })));
    } catch (reason) {
      // stopped before there was anything, or overtaken by another record: nothing was refused
      if (this.#stop === stop && (reason as { code?: string }).code !== 'aborted') this.issues = issuesOf(reason);
    } finally {
      if (this.#stop === stop) {
        this.#stop = null;
        this.phase = 'idle';
      }
    }
  }

  #follow = (progress: Progress): void => {
    const now = performance.now();
    if (now - this.#shown < SHOW_EVERY) return;
    this.#shown = now;
    this.progress = progress;
  };

  #askHelp = async (): Promise<void> => {
    const { whatWouldHelp, fit } = this;
    if (!whatWouldHelp || !fit || this.phase !== 'idle') return;
    this.phase = 'helping';
    this.#helped = 0;
    try {
      const plans = await whatWouldHelp(fit, this.#whole(), {
        onProgress: ({ done }) => {
          this.#helped = done;
          this.requestUpdate();
        },
      });
      if (this.fit === fit) this.plans = plans;
    } catch (reason) {
      this.issues = issuesOf(reason);
    } finally {
      this.phase = 'idle';
    }
  };

  #sign = (event: SubmitEvent): void => {
    event.preventDefault();
    const form = event.target as HTMLFormElement;
    const valueOf = (name: string): string => (form.elements.namedItem(name) as HTMLInputElement).value.trim();
    const name = valueOf('by');
    const { fit } = this;
    if (!name || !fit?.converged || fit.partial || this.changed) return;
    this.signed = { name, date: valueOf('on') };
    this.dispatchEvent(new CustomEvent<SignOffDetail>('rillage-sign-off', going({ ...this.signed, fit, problem: this.#whole() })));
  };
}

const going = <Detail>(detail: Detail): CustomEventInit<Detail> => ({ detail, bubbles: true, composed: true });

/** What the page put back, where it holds a problem; what is proposed otherwise. */
function choicesOf(problem: Partial<FitProblem> | null, record: FitRecord): FitChoices {
  if (!problem?.catchment?.selection || !problem.errors) return proposeChoices(record);
  const { forcing: _forcing, samples: _samples, rainSamples: _rain, ...choices } = problem;
  return choices as FitChoices;
}

function issuesOf(reason: unknown): readonly Issue[] {
  const { issues, message } = reason as { issues?: Issue[]; message?: string };
  return issues?.length ? issues : [{ code: message ?? String(reason) }];
}

declare global {
  interface HTMLElementTagNameMap {
    'rillage-fit-panel': RillageFitPanel;
  }
  interface HTMLElementEventMap {
    'rillage-problem': CustomEvent<ProblemDetail>;
    'rillage-fit': CustomEvent<FitDetail>;
    'rillage-sign-off': CustomEvent<SignOffDetail>;
  }
}
