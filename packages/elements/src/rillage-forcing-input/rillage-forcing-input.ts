import { LitElement, html, nothing, type PropertyValues, type TemplateResult } from 'lit';
import type { Finding, Forcing, ForcingRead, Issue, Layout, LayoutGuess, Receipt, Sample, SourceLayout } from '@rillage/sdk';
import { ageHistoryStyles } from '../rillage-age-history/styles.js';
import { buttonStyles } from '../shared/buttons.js';
import { frameStyles } from '../shared/chart-frame.js';
import { tableStyles } from '../shared/data-table.js';
import { fetchBytes, LoadFailure } from '../shared/fetch-bytes.js';
import { Language } from '../shared/language.js';
import type { Messages } from '../shared/messages.js';
import { cleanText } from '../shared/text.js';
import { theme } from '../shared/theme.js';
import { version } from '../version.js';
import { editView, positionOf, type Pen } from './edit-view.js';
import { mergeLayouts } from './fields.js';
import { fileOf, ofFinding, ofIssue, remarksView, type Remark } from './findings-view.js';
import { layoutView } from './layout-view.js';
import { forcingInputMessages, type ForcingInputKey } from './messages.js';
import { RecordPlot } from './record-plot.js';
import { forcingInputStyles } from './styles.js';
import { lineCount, namesOf, type ForcingFile } from './text-rows.js';

/** Detail of `rillage-forcing`: what the reader has confirmed. */
export interface ForcingDetail {
  forcing: Forcing;
  samples: Sample[];
  rainSamples: Sample[];
  findings: Finding[];
  receipt: Receipt;
  /** As it was handed to `readForcing`. */
  layout: Layout;
}

/** Detail of `rillage-layout`: all that a page keeps to put the element back as it was. */
export interface LayoutDetail {
  layout: Layout;
  files: ForcingFile[];
}

/**
 * Takes in a record: files dropped, chosen, pasted or fetched; how they are to be read, proposed and to be confirmed; what was noticed, beside
 * the lines it concerns; plots of what was read; values changed by hand, each kept in the receipt. It reads nothing itself: the page gives
 * `guessLayout` and `readForcing`, the SDK's own or ones that run elsewhere.
 *
 * @slot - What is shown where scripts do not run.
 * @csspart name - The element's name, a heading.
 * @csspart sources - Where files come in.
 * @csspart files - The list of files.
 * @csspart open - What is still to be said before the record can be read.
 * @csspart finding - Each thing that was noticed, with its lines.
 * @csspart editor - Where a value is changed.
 * @csspart edit - Each change, which can be taken back.
 * @csspart frame - The plots with their table.
 * @csspart button - Each button.
 * @csspart summary - What the plots show, in words.
 * @csspart buttons - The row of buttons above the plots.
 * @csspart picture - The plots, focusable.
 * @csspart readout - What the cursor stands on.
 * @csspart table - The data table.
 * @cssprop --rillage-ink - Colour of text and lines. Default `CanvasText`.
 * @cssprop --rillage-paper - Colour of the ground. Default `Canvas`.
 * @cssprop --rillage-quiet - Colour of minor text. Default: ink, a quarter towards paper.
 * @cssprop --rillage-hairline - Colour of rules. Default: ink, two thirds towards paper.
 * @cssprop --rillage-font - Typeface of everything but the names. Default: the page's.
 * @cssprop --rillage-font-sentence - Typeface of the names. Default: the system's serif.
 * @cssprop --rillage-size-1 - Size of labels, fields, buttons and the table.
 * @cssprop --rillage-size-2 - Size of running text.
 * @cssprop --rillage-size-3 - Size of the names.
 * @fires {CustomEvent<ForcingDetail>} rillage-forcing - When the reader hands the record over: forcing, samples, findings, receipt, layout. Bubbles, composed.
 * @fires {CustomEvent<LayoutDetail>} rillage-layout - When the layout has changed, with the files, so that a page can keep both. Bubbles, composed.
 */
export class RillageForcingInput extends LitElement {
  /** Version of the package this class came from. */
  static readonly version = version;

  static override styles = [theme, buttonStyles, tableStyles, frameStyles, ageHistoryStyles, forcingInputStyles];

  static override properties = {
    src: { type: String },
    files: { attribute: false },
    layout: { attribute: false },
    guessLayout: { attribute: false },
    readForcing: { attribute: false },
    messages: { attribute: false },
    proposed: { state: true },
    problems: { state: true },
    read: { state: true },
    pen: { state: true },
    said: { state: true },
    busy: { state: true },
  };

  /** An address to begin with in its field. Nothing is fetched before the reader asks for it. */
  declare src: string;
  /** The files of the record, each a name with its text or its bytes. A page may put back what it kept. */
  declare files: ForcingFile[];
  /** How the files are read, by the name of each source. A page may give one to begin with; null: all is proposed. */
  declare layout: Layout | null;
  /** Proposes a layout, at once or later: the SDK's call of that name. */
  declare guessLayout: ((files: ForcingFile[]) => LayoutGuess | Promise<LayoutGuess>) | null;
  /** Reads the files, at once or later: the SDK's call of that name. What it throws with `issues` is shown beside the lines it concerns. */
  declare readForcing: ((files: ForcingFile[], layout: Layout) => ForcingRead | Promise<ForcingRead>) | null;
  /** Messages of this element to replace, by key. */
  declare messages: Messages | undefined;
  declare private proposed: Remark[];
  declare private problems: Remark[];
  declare private read: { read: ForcingRead; files: ForcingFile[]; layout: Layout } | null;
  declare private pen: Pen;
  declare private said: string;
  declare private busy: boolean;

  #language = new Language(this, forcingInputMessages);
  #plot = new RecordPlot(this, this.#language);
  #run = 0;
  #pasted = 0;
  #fetching: AbortController | null = null;

  constructor() {
    super();
    this.src = '';
    this.files = [];
    this.layout = null;
    this.guessLayout = null;
    this.readForcing = null;
    this.proposed = [];
    this.problems = [];
    this.read = null;
    this.pen = { file: 0, row: 0, position: 1 };
    this.said = '';
    this.busy = false;
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.#fetching?.abort();
    this.#run++;
    this.busy = false;
  }

  protected override willUpdate(changed: PropertyValues<this>): void {
    if (changed.has('files') || changed.has('guessLayout')) void this.#propose();
  }

  override render(): TemplateResult {
    const { files, layout, read } = this;
    const say = this.#say;
    const settled = files.length > 0 && layout?.sources.length === files.length ? layout : null;
    const current = read?.layout === layout && read?.files === files;
    // Nobody has a value to change before something was said of one.
    const edits = read || this.problems.length || settled?.sources.some((source) => source.edits?.length) ? settled : null;
    return html`<div lang=${this.#language.tag} dir=${this.#language.direction} aria-busy=${this.busy}>
      <h2 part="name">${say('forcing.name')}</h2>
      ${this.#sources()}
      <p class="state" role="status">${this.busy ? say('forcing.working') : this.said}</p>
      ${this.problems.length ? html`<section>${this.#remarks('stop', this.problems)}</section>` : nothing}
      ${
        settled
          ? html`<section>
              <h3>${say('forcing.layout')}</h3>
              ${layoutView(
                this.#language,
                files,
                settled,
                !read,
                (index) => {
                  const own = this.proposed.filter(
                    ({ where, severity }) => severity === 'warning' && fileOf(where, this.#names()) === index,
                  );
                  return own.length ? remarksView(this.#language, own, files, this.#names(), null) : nothing;
                },
                this.#change,
                this.#focus,
              )}
              <p>
                <button type="button" part="button" ?disabled=${!this.readForcing || this.busy} @click=${this.#read}>
                  ${say('forcing.read')}
                </button>
              </p>
            </section>`
          : nothing
      }
      ${read ? html`<section>${this.#found(read.read)}</section>` : nothing}
      ${edits ? html`<section>${editView(this.#language, files, edits, this.pen, (pen) => (this.pen = pen), this.#change)}</section>` : nothing}
      ${
        read
          ? html`<section>
              ${this.#plot.render(read.read)} ${current ? nothing : html`<p class="said">${say('forcing.again')}</p>`}
              <p>
                <button type="button" part="button" ?disabled=${!current || this.busy} @click=${this.#use}>${say('forcing.use')}</button>
              </p>
            </section>`
          : nothing
      }
    </div>`;
  }

  #sources(): TemplateResult {
    const say = this.#say;
    return html`<div part="sources" class="sources">
        <label class="drop" @dragover=${(event: DragEvent) => event.preventDefault()} @drop=${this.#dropped}
          ><span>${say('forcing.choose')}</span> <input type="file" multiple @change=${this.#chosen}
        /></label>
        <form @submit=${this.#pastedRows}>
          <label class="field"
            ><span>${say('forcing.paste')}</span> <textarea name="given" rows="2" dir="auto" spellcheck="false"></textarea>
          </label>
          <button part="button">${say('forcing.add')}</button>
        </form>
        <form @submit=${this.#asked}>
          <label class="field"
            ><span>${say('forcing.address')}</span> <input name="given" inputmode="url" autocomplete="off" dir="ltr" .value=${this.src}
          /></label>
          <button part="button">${say('forcing.fetch')}</button>
        </form>
      </div>
      <ul part="files" class="files">
        ${this.files.map(
          (file) =>
            html`<li>
              <bdi>${cleanText(file.name, 80)}</bdi>
              <span>${say('forcing.lines', { count: lineCount(file), size: Math.ceil(file.text.length / 1000) })}</span>
              <button type="button" part="button" @click=${() => (this.files = this.files.filter((other) => other !== file))}>
                ${say('forcing.remove')}<span class="unseen"> ${cleanText(file.name, 80)}</span>
              </button>
            </li>`,
        )}
      </ul>`;
  }

  #found({ findings }: ForcingRead): TemplateResult {
    const all = findings.map(ofFinding);
    return html`<h3 id="found" tabindex="-1">${this.#say('forcing.findings')}</h3>
      ${(['stop', 'warning', 'note'] as const).map((severity) => {
        const own = all.filter((remark) => remark.severity === severity);
        return own.length ? this.#remarks(severity, own) : nothing;
      })}`;
  }

  #remarks(severity: Remark['severity'], remarks: readonly Remark[]): TemplateResult {
    const title = this.#say(`forcing.${severity}s`, { count: remarks.length });
    const list = remarksView(this.#language, remarks, this.files, this.#names(), this.#beginEdit);
    return severity === 'note'
      ? html`<details>
          <summary>${title}</summary>
          ${list}
        </details>`
      : html`<h4>${title}</h4>
          ${list}`;
  }

  #say = (key: ForcingInputKey, values?: Record<string, string | number>): string => this.#language.say(key, values);

  /** What findings call the sources. */
  #names = (): string[] => this.files.map(({ name }, index) => this.layout?.sources[index]?.name || name);

  #focus = (id: string): void => {
    const found = this.renderRoot.querySelector<HTMLElement>(`#${id}`);
    const folded = found?.closest('details');
    if (folded) folded.open = true;
    found?.focus();
  };

  #beginEdit = (file: number, row: number, where: string): void => {
    this.pen = { file, row, position: this.layout ? positionOf(this.layout, file, where) : 1 };
    void this.updateComplete.then(() => this.#focus('editor'));
  };

  #change = (layout: Layout): void => {
    this.layout = layout;
    const detail = { layout, files: this.files };
    this.dispatchEvent(new CustomEvent<LayoutDetail>('rillage-layout', { detail, bubbles: true, composed: true }));
  };

  #use = (): void => {
    if (!this.read) return;
    const { layout } = this.read;
    const { forcing, samples, rainSamples, findings, receipt } = this.read.read;
    this.said = this.#say('forcing.used');
    const detail = { forcing, samples, rainSamples, findings, receipt, layout };
    this.dispatchEvent(new CustomEvent<ForcingDetail>('rillage-forcing', { detail, bubbles: true, composed: true }));
  };

  async #propose(): Promise<void> {
    const { files, layout } = this;
    const names = files.map(({ name }) => name);
    const known = new Set(layout?.sources.map(({ name }, index) => name || names[index]));
    this.problems = [];
    if (!files.length) return void this.#run++;
    if (layout && names.every((name) => known.has(name))) {
      this.#run++;
      if (names.length !== layout.sources.length || this.#names().some((name, index) => name !== names[index]))
        this.#change(mergeLayouts(layout, layout, names));
      return;
    }
    const guess = this.guessLayout;
    if (!guess) return;
    await this.#work(
      () => guess(files),
      ({ layout: proposed, findings }) => {
        this.proposed = findings.map(ofFinding);
        this.#change(mergeLayouts(this.layout, { ...proposed, sources: proposed.sources.map(withColumns(files)) }, names));
      },
    );
  }

  #read = (): void => {
    const { files, layout, readForcing } = this;
    if (!layout || !readForcing) return;
    this.read = null;
    this.problems = [];
    this.said = '';
    void this.#work(
      () => readForcing(files, layout),
      (read) => {
        this.read = { read, files, layout };
        void this.updateComplete.then(() => this.#focus('found'));
      },
    );
  };

  /** Awaits a call of the page's; a later one makes its answer void. */
  async #work<Answer>(call: () => Answer | Promise<Answer>, take: (answer: Answer) => void): Promise<void> {
    const run = ++this.#run;
    this.busy = true;
    // So that the page says that work goes on before a call that does not give way begins.
    await new Promise((painted) => setTimeout(painted, 0));
    try {
      const answer = await call();
      if (run === this.#run) take(answer);
    } catch (error) {
      if (run === this.#run) this.#failed(error);
    }
    if (run === this.#run) this.busy = false;
  }

  #failed(error: unknown): void {
    const { issues, message } = error as { issues?: Issue[]; message?: string };
    this.problems = Array.isArray(issues) ? issues.map(ofIssue) : [];
    this.said = this.problems.length
      ? this.#say('forcing.stops', { count: this.problems.length })
      : this.#say('forcing.failed', { why: cleanText(message, 200) });
  }

  #chosen = ({ target }: Event): void => {
    const input = target as HTMLInputElement;
    void this.#take([...(input.files ?? [])]).then(() => (input.value = ''));
  };

  #dropped = (event: DragEvent): void => {
    event.preventDefault();
    void this.#take([...(event.dataTransfer?.files ?? [])]);
  };

  async #take(chosen: File[]): Promise<void> {
    const fits = chosen.filter(({ size }) => size <= this.#cap());
    const taken = await Promise.all(fits.map(async (file) => ({ name: file.name, text: new Uint8Array(await file.arrayBuffer()) })));
    this.#add(taken);
    const large = chosen.filter((file) => !fits.includes(file)).map(({ name }) => `${cleanText(name, 80)}: ${this.#why('tooLarge')}`);
    if (large.length) this.said = large.join(' ');
  }

  #pastedRows = (event: SubmitEvent): void => {
    const field = givenIn(event);
    if (field.value.trim()) this.#add([{ name: this.#say('forcing.pasted', { count: ++this.#pasted }), text: field.value }]);
    field.value = '';
  };

  #asked = (event: SubmitEvent): void => {
    const address = givenIn(event).value.trim();
    if (address) void this.#fetch(address);
  };

  async #fetch(address: string): Promise<void> {
    this.#fetching?.abort();
    const { signal } = (this.#fetching = new AbortController());
    const name = cleanText(address.replace(/[?#].*$/, '').replace(/^.*\/(?=.)/, ''), 80);
    this.said = this.#say('forcing.working');
    try {
      const came = await fetchBytes(address, { accept: 'text/csv, text/plain, */*', cap: this.#cap(), signal });
      this.said = '';
      if (came) this.#add([{ name, text: came.bytes }]);
    } catch (error) {
      if (signal.aborted) return;
      const { code, status } = error instanceof LoadFailure ? error : { code: 'unreachable' as const, status: 0 };
      this.said = `${name}: ${code === 'html' ? this.#say('forcing.html') : this.#why(code, status)}`;
    }
  }

  #why = (code: LoadFailure['code'], status = 0): string =>
    this.#say(`station.${code}`, { status, megabytes: Math.ceil(this.#cap() / 1e6) });

  #cap = (): number => this.layout?.limits?.bytes ?? byteCap;

  /** Adds files under names that no other has, so that the layout and the findings can tell them apart. */
  #add(files: readonly ForcingFile[]): void {
    const all = [...this.files];
    for (const file of files) {
      const name = file.name.slice(0, 120);
      let own = name;
      for (let count = 2; all.some((other) => other.name === own); count++) own = `${name} (${count})`;
      all.push({ ...file, name: own });
    }
    this.said = all.length > mostFiles ? this.#say('forcing.tooMany', { count: mostFiles }) : '';
    if (all.length > this.files.length && all.length <= mostFiles) this.files = all;
  }
}

/** Where no column says when, nothing is proposed of the others: they are listed by the first row, for the reader to say. */
const withColumns =
  (files: readonly ForcingFile[]) =>
  (source: SourceLayout, index: number): SourceLayout =>
    source.columns.length
      ? source
      : { ...source, columns: namesOf(files[index]!, source).map((name, at) => ({ position: at + 1, name, holds: 'ignored' })) };

function givenIn(event: SubmitEvent): HTMLInputElement {
  event.preventDefault();
  return (event.target as HTMLFormElement).elements.namedItem('given') as HTMLInputElement;
}

// As the SDK bounds them where a layout does not say.
const byteCap = 64_000_000;
const mostFiles = 50;

declare global {
  interface HTMLElementTagNameMap {
    'rillage-forcing-input': RillageForcingInput;
  }
  interface HTMLElementEventMap {
    'rillage-forcing': CustomEvent<ForcingDetail>;
    'rillage-layout': CustomEvent<LayoutDetail>;
  }
}
