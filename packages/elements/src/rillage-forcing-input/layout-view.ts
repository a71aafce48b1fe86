import { html, nothing, type TemplateResult } from 'lit';
import type { Layout } from '@rillage/sdk';
import { cleanText } from '../shared/text.js';
import { columnFields, recordFields, sourceFields, type Field } from './fields.js';
import { fieldsView, labelOf, type Speech } from './field-view.js';
import { lineAt, namesOf, type ForcingFile } from './text-rows.js';

/** A group of fields with the place they are of. */
interface Group {
  id: string;
  place: string;
  fields: Field[];
}

/** How the files are read: what is open first, in words; then the whole record, then each file with its columns, folded away once it is read. */
export function layoutView(
  speech: Speech,
  files: readonly ForcingFile[],
  layout: Layout,
  unfolded: boolean,
  remarks: (file: number) => TemplateResult | typeof nothing,
  change: (layout: Layout) => void,
  focus: (id: string) => void,
): TemplateResult {
  const whole: Group = { id: 'whole', place: speech.say('forcing.whole'), fields: recordFields(layout) };
  const heads = layout.sources.map((source, index) => (files[index] ? namesOf(files[index], source) : []));
  const sources = layout.sources.map((source, index) => ({
    own: { id: `file-${index}`, place: cleanText(source.name || files[index]?.name, 80), fields: sourceFields(layout, index) },
    columns: source.columns.map(({ position, name }, place): Group => ({
      id: `file-${index}-${place}`,
      place: `${position}: ${cleanText(name || heads[index]![position - 1], 60)}`,
      fields: columnFields(layout, index, place),
    })),
  }));
  const open = [
    whole,
    ...sources.flatMap(({ own, columns }) => [own, ...columns.map((group) => ({ ...group, place: `${own.place}, ${group.place}` }))]),
  ].flatMap(({ id, place, fields }) =>
    fields.flatMap((field, index) => (field.open ? [{ id: `${id}-${index}`, place, label: labelOf(speech, field) }] : [])),
  );
  return html`${
      open.length
        ? html`<div class="said" part="open">
            <p>${speech.say('forcing.open')}</p>
            <ul>
              ${open.map(
                ({ id, place, label }) =>
                  html`<li>
                    <button type="button" class="plain" part="button" @click=${() => focus(id)}>${label} – <bdi>${place}</bdi></button>
                  </li>`,
              )}
            </ul>
          </div>`
        : html`<p>${speech.say('forcing.settled')}</p>`
    }
    <fieldset>
      <legend>${whole.place}</legend>
      ${fieldsView(speech, whole.id, whole.fields, change)}
    </fieldset>
    ${sources.map(({ own, columns }, index) => {
      const { splitAt = ',' } = layout.sources[index]!;
      const marks: Record<string, string> = { blanks: speech.say('forcing.blanks'), '\t': speech.say('forcing.tab') };
      const file = files[index];
      return html`<details ?open=${unfolded}>
        <summary><bdi>${own.place}</bdi></summary>
        <p class="note">${speech.say('forcing.split', { mark: marks[splitAt] ?? `“${splitAt}”` })}</p>
        ${
          file
            ? html`<pre tabindex="0" aria-label=${speech.say('forcing.head')} dir="ltr">
${Array.from({ length: 6 }, (_, line) => `${cleanText(lineAt(file, line + 1), 200)}\n`)}</pre>
                ${remarks(index)}`
            : nothing
        }
        ${fieldsView(speech, own.id, own.fields, change)}
        ${columns.map(
          ({ id, place, fields }) =>
            html`<fieldset class="column">
              <legend><bdi>${place}</bdi></legend>
              ${fieldsView(speech, id, fields, change)}
            </fieldset>`,
        )}
      </details>`;
    })}`;
}
