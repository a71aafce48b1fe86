import { css, html, nothing, type ReactiveController, type ReactiveControllerHost, type TemplateResult } from 'lit';
import type { Language } from './language.js';

export const tableMessages = {
  'table.page': 'Rows {from} to {to} of {count}',
  'table.previous': 'Previous rows',
  'table.next': 'Next rows',
  'table.thinned': 'Printed: {shown} of {count} rows.',
} as const;

/** A table's content as text: the first column heads each row. */
export interface TableContent {
  caption: string;
  columns: string[];
  rows: string[][];
}

/** A data table, 25 rows a page, with buttons between pages. On paper it prints whole, thinned where it is long. */
export class DataTable implements ReactiveController {
  #page = 0;
  #printing = false;

  constructor(
    private readonly host: ReactiveControllerHost & HTMLElement,
    private readonly language: Language<keyof typeof tableMessages>,
  ) {
    host.addController(this);
  }

  hostConnected(): void {
    addEventListener('beforeprint', this.#print);
    addEventListener('afterprint', this.#screen);
  }

  hostDisconnected(): void {
    removeEventListener('beforeprint', this.#print);
    removeEventListener('afterprint', this.#screen);
  }

  render({ caption, columns, rows }: TableContent): TemplateResult {
    const pages = Math.max(1, Math.ceil(rows.length / rowsAPage));
    this.#page = Math.min(this.#page, pages - 1);
    const from = this.#page * rowsAPage;
    const shown = this.#printing ? thinned(rows) : rows.slice(from, from + rowsAPage);
    return html`
      <table part="table">
        <caption>
          ${caption}
        </caption>
        <thead>
          <tr>
            ${columns.map((column) => html`<th scope="col">${column}</th>`)}
          </tr>
        </thead>
        <tbody>
          ${shown.map(
            (row) =>
              html`<tr>
                ${row.map((cell, index) => (index ? html`<td>${cell}</td>` : html`<th scope="row">${cell}</th>`))}
              </tr>`,
          )}
        </tbody>
      </table>
      ${
        this.#printing && shown.length < rows.length
          ? html`<p class="rows">${this.language.say('table.thinned', { shown: shown.length, count: rows.length })}</p>`
          : nothing
      }
      ${
        pages > 1
          ? html`<p class="rows">
              <button type="button" part="button" ?disabled=${this.#page === 0} @click=${() => this.#turn(-1)}>
                ${this.language.say('table.previous')}
              </button>
              <span role="status"
                >${this.language.say('table.page', { from: from + 1, to: Math.min(from + rowsAPage, rows.length), count: rows.length })}</span
              >
              <button type="button" part="button" ?disabled=${this.#page === pages - 1} @click=${() => this.#turn(1)}>
                ${this.language.say('table.next')}
              </button>
            </p>`
          : nothing
      }
    `;
  }

  #turn(by: number): void {
    this.#page += by;
    this.host.requestUpdate();
  }

  #print = (): void => this.#setPrinting(true);
  #screen = (): void => this.#setPrinting(false);
  #setPrinting(printing: boolean): void {
    this.#printing = printing;
    this.host.requestUpdate();
  }
}

export const tableStyles = css`
  table {
    inline-size: 100%;
    border-collapse: collapse;
    font-size: var(--_size-1);
    text-align: start;
  }
  caption {
    text-align: start;
    padding-block-end: 0.5em;
  }
  th,
  td {
    border-block-end: 1px solid var(--_hairline);
    padding: 0.35em 1em 0.35em 0;
    padding-inline: 0 1em;
    font-weight: normal;
    text-align: start;
    vertical-align: baseline;
    overflow-wrap: anywhere;
  }
  thead th {
    border-block-end-color: var(--_ink);
    color: var(--_quiet);
    vertical-align: bottom;
  }
  .rows {
    display: flex;
    flex-wrap: wrap;
    align-items: center;
    gap: 0.5em 1em;
    margin-block: 0.75em 0;
    font-size: var(--_size-1);
  }
  @media print {
    tr {
      break-inside: avoid;
    }
  }
`;

const rowsAPage = 25;
const mostPrinted = 40;

/** At most forty rows, evenly spaced, the first and the last among them. */
function thinned(rows: string[][]): string[][] {
  if (rows.length <= mostPrinted) return rows;
  return Array.from({ length: mostPrinted }, (_, index) => rows[Math.round((index * (rows.length - 1)) / (mostPrinted - 1))]!);
}
