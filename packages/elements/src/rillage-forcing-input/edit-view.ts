import { html, nothing, type TemplateResult } from 'lit';
import type { CellEditLayout, Layout } from '@rillage/sdk';
import { cleanText } from '../shared/text.js';
import { lineName, type Speech } from './field-view.js';
import { setAt } from './fields.js';
import { cellsAt, lineAt, lineCount, namesOf, type ForcingFile } from './text-rows.js';

/** Where a reader is about to change a value: file by its place, line (0: none yet) and column from 1. */
export interface Pen {
  file: number;
  row: number;
  position: number;
}

/** Chooses a line and a cell of it, takes another value and a reason, and lists the changes, each of which can be taken back. */
export function editView(
  speech: Speech,
  files: readonly ForcingFile[],
  layout: Layout,
  pen: Pen,
  move: (pen: Pen) => void,
  change: (layout: Layout) => void,
): TemplateResult {
  const source = layout.sources[pen.file];
  const file = files[pen.file];
  const cells = source && file ? cellsAt(file, pen.row, source.splitAt, source.remarkMark) : null;
  const names = source && file ? namesOf(file, source) : [];
  const chosen = (event: Event): number => Number((event.target as HTMLInputElement).value);
  const record = (event: SubmitEvent): void => {
    event.preventDefault();
    const form = event.target as HTMLFormElement;
    const [value, why] = ['value', 'why'].map((name) => (form.elements.namedItem(name) as HTMLInputElement).value.trim()) as [
      string,
      string,
    ];
    change(withEdit(layout, pen.file, { row: pen.row, position: pen.position, value, ...(why ? { why } : {}) }));
    form.reset();
  };
  return html`<form part="editor" @submit=${record}>
      <h3 id="editor" tabindex="-1">${speech.say('forcing.edit')}</h3>
      <p class="note">${speech.say('forcing.aboutEdit')}</p>
      <div class="fields">
        <label class="field"
          ><span>${speech.say('forcing.file')}</span>
          <select @change=${(event: Event) => move({ ...pen, file: chosen(event), position: positionOf(layout, chosen(event), '') })}>
            ${files.map(({ name }, index) => html`<option value=${index} .selected=${index === pen.file}>${cleanText(name, 60)}</option>`)}
          </select></label
        >
        <label class="field"
          ><span>${speech.say('forcing.line')}</span>
          <input
            type="number"
            min="1"
            max=${file ? lineCount(file) : 1}
            .value=${pen.row ? String(pen.row) : ''}
            @change=${(event: Event) => move({ ...pen, row: chosen(event) })}
        /></label>
        ${
          cells
            ? html`<label class="field"
                  ><span>${speech.say('forcing.column')}</span>
                  <select @change=${(event: Event) => move({ ...pen, position: chosen(event) })}>
                    ${Array.from({ length: Math.max(cells.length, names.length) }, (_, index) => {
                      const text = cleanText(`${names[index] ?? index + 1}: ${cells[index] ?? ''}`, 60);
                      return html`<option value=${index + 1} .selected=${index + 1 === pen.position}>${text}</option>`;
                    })}
                  </select></label
                >
                <label class="field"
                  ><span>${speech.say('forcing.value')}</span> <input name="value" maxlength="200" autocomplete="off" dir="auto"
                /></label>
                <label class="field wide"
                  ><span>${speech.say('forcing.why')}</span> <input name="why" maxlength="400" autocomplete="off" dir="auto"
                /></label>`
            : nothing
        }
      </div>
      <p role="status">
        ${cells ? html`<code dir="ltr">${cleanText(lineAt(file!, pen.row), 200)}</code>` : pen.row ? speech.say('forcing.noLine') : nothing}
      </p>
      <p><button part="button" ?disabled=${!cells}>${speech.say('forcing.record')}</button></p>
    </form>
    <ul class="remarks">
      ${layout.sources.flatMap(({ edits = [], splitAt, remarkMark }, index) =>
        edits.map((edit) => {
          const before = files[index] && cellsAt(files[index], edit.row, splitAt, remarkMark)?.[edit.position - 1];
          const place = `${cleanText(files[index]?.name, 60)}, ${lineName(speech, edit.row)}`;
          const values = { place, before: `“${cleanText(before ?? '', 60)}”`, after: `“${cleanText(edit.value, 60)}”` };
          return html`<li part="edit">
            <p><bdi>${speech.say('forcing.edited', values)}</bdi> <bdi>${cleanText(edit.why ?? '', 400)}</bdi></p>
            <button type="button" part="button" @click=${() => change(withoutEdit(layout, index, edit))}>
              ${speech.say('forcing.back')}
            </button>
          </li>`;
        }),
      )}
    </ul>`;
}

/** Column of a line that a finding's place names by its header, else the first that is read. */
export function positionOf(layout: Layout, index: number, where: string): number {
  const columns = layout.sources[index]?.columns ?? [];
  const named = columns.find(({ name, position }) => where.endsWith(`: ${name || `column ${position}`}`));
  return (named ?? columns.find(({ holds }) => holds !== 'ignored'))?.position ?? 1;
}

/** The layout with one more edit of a source, in place of one of the same cell. */
export function withEdit(layout: Layout, index: number, edit: CellEditLayout): Layout {
  const others = (layout.sources[index]?.edits ?? []).filter(({ row, position }) => row !== edit.row || position !== edit.position);
  return setAt(layout, ['sources', index, 'edits'], [...others, edit]);
}

export function withoutEdit(layout: Layout, index: number, edit: CellEditLayout): Layout {
  return setAt(
    layout,
    ['sources', index, 'edits'],
    (layout.sources[index]?.edits ?? []).filter((other) => other !== edit),
  );
}
