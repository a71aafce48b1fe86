import { html, nothing, type TemplateResult } from 'lit';
import type { Finding, Issue } from '@rillage/sdk';
import { cleanText } from '../shared/text.js';
import { lineName, type Speech } from './field-view.js';
import { lineAt, type ForcingFile } from './text-rows.js';

/** A finding, or a problem that stopped the reading, in one shape. */
export interface Remark {
  severity: 'stop' | 'warning' | 'note';
  code: string;
  where: string;
  rows: number[];
  count: number;
  /** What is said of it, each under its word. The texts are the SDK's, in English. */
  said: [label: 'expected' | 'seen' | 'done' | 'settle', text: string | undefined][];
}

export const ofFinding = ({ severity, code, where, rows = [], count = rows.length, seen, done, settle }: Finding): Remark => ({
  ...{ severity, code, where, rows, count },
  said: [
    ['seen', seen],
    ['done', done],
    ['settle', settle],
  ],
});

export const ofIssue = ({ code, path = '', row, expected, received, hint }: Issue): Remark => ({
  ...{ severity: 'stop', code, where: path, rows: row === undefined ? [] : [row], count: 1 },
  said: [
    ['expected', expected],
    ['seen', received],
    ['settle', hint],
  ],
});

/** The file that a place names, by the longest name it begins with; -1 for the record as a whole. */
export function fileOf(where: string, names: readonly string[]): number {
  const fits = (name: string): boolean => where === name || (where.startsWith(name) && /^[:.]/.test(where.slice(name.length)));
  return names.reduce((best, name, index) => (name !== '' && fits(name) && !(names[best]!?.length > name.length) ? index : best), -1);
}

/** Remarks with the lines they concern beside them. `change` begins the change of a value in a line. */
export function remarksView(
  speech: Speech,
  remarks: readonly Remark[],
  files: readonly ForcingFile[],
  names: readonly string[],
  change: ((file: number, row: number, where: string) => void) | null,
): TemplateResult {
  return html`<ul class="remarks">
    ${remarks.map(({ code, where, rows, count, said }) => {
      const index = fileOf(where, names);
      const file = files[index];
      const line = (row: number): TemplateResult =>
        html`<li>
          <span>${lineName(speech, row)}</span> <code dir="ltr">${file ? cleanText(lineAt(file, row), 120) : nothing}</code>
          ${
            file && change && code !== 'remarks'
              ? html`<button type="button" part="button" @click=${() => change(index, row, where)}>${speech.say('forcing.change')}</button>`
              : nothing
          }
        </li>`;
      return html`<li part="finding">
        <div>
          <p><bdi>${cleanText(where, 200)}</bdi> <code>${cleanText(code, 60)}</code></p>
          <dl>
            ${said.map(([label, text]) =>
              text
                ? html`<div>
                    <dt>${speech.say(`forcing.${label}`)}</dt>
                    <dd lang="en" dir="ltr">${cleanText(text, 500)}</dd>
                  </div>`
                : nothing,
            )}
          </dl>
        </div>
        ${
          rows.length
            ? html`<div>
                <ul class="lines">
                  ${rows.slice(0, fewLines).map(line)}
                </ul>
                ${
                  count > fewLines
                    ? html`<details>
                        <summary>${speech.say('forcing.more', { count, shown: rows.length })}</summary>
                        <ul class="lines">
                          ${rows.slice(fewLines).map(line)}
                        </ul>
                      </details>`
                    : nothing
                }
              </div>`
            : nothing
        }
      </li>`;
    })}
  </ul>`;
}

const fewLines = 2;
