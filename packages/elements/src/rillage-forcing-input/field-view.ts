import { html, nothing, type TemplateResult } from 'lit';
import type { Layout } from '@rillage/sdk';
import { number } from '../shared/format.js';
import type { Language } from '../shared/language.js';
import { cleanText } from '../shared/text.js';
import type { Field, FieldValue } from './fields.js';
import { forcingInputMessages, type ForcingInputKey } from './messages.js';

export type Speech = Language<ForcingInputKey>;

/** A word of ours where there is one, else the name as it came. */
export function word(speech: Speech, name: string): string {
  const key = `is.${name === 'refuse' ? 'stop' : name}`;
  return Object.hasOwn(forcingInputMessages, key) ? speech.say(key as ForcingInputKey) : cleanText(name, 60);
}

/** `Line 12`, as an editor counts. */
export const lineName = (speech: Speech, row: number): string => `${speech.say('forcing.line')} ${number(speech.tag, {}).format(row)}`;

export const labelOf = (speech: Speech, { label, series }: Field): string =>
  speech.say(label, series === undefined ? {} : { series: word(speech, series) });

/** Native controls, each under its label; an open one is marked by a line and a word. */
export function fieldsView(speech: Speech, id: string, fields: readonly Field[], change: (layout: Layout) => void): TemplateResult {
  return html`<div class="fields">
    ${fields.map(
      (field, index) =>
        html`<label class=${field.open ? 'field open' : 'field'}
          ><span>${labelOf(speech, field)}${field.open ? html` <b>(${speech.say('forcing.toSay')})</b>` : nothing}</span> ${control(
            speech,
            `${id}-${index}`,
            field,
            change,
          )}</label
        >`,
    )}
  </div>`;
}

function control(
  speech: Speech,
  id: string,
  { value, kind, options, usual, with: changed }: Field,
  change: (layout: Layout) => void,
): TemplateResult {
  const give = (given: FieldValue): void => change(changed(given));
  if (options) {
    return html`<select id=${id} @change=${(event: Event) => give((event.target as HTMLSelectElement).value)}>
      ${options.map((name, index) => html`<option value=${name} .selected=${value == null ? index === 0 : name === value}>${word(speech, name)}</option>`)}
    </select>`;
  }
  if (kind === 'flag') {
    return html`<input
      id=${id}
      type="checkbox"
      .checked=${value === true}
      @change=${(event: Event) => give((event.target as HTMLInputElement).checked)}
    />`;
  }
  const text = Array.isArray(value) ? value.join('; ') : String(value ?? '');
  const given = ({ target }: Event): void => {
    const { value: answer } = target as HTMLInputElement;
    const plain = answer.trim();
    if (kind === 'list')
      give(
        plain
          .split(';')
          .map((mark) => mark.trim())
          .filter(Boolean),
      );
    else if (plain === '') give(undefined);
    else give(kind === 'number' ? Number(plain) : plain);
  };
  const type = kind === 'number' ? 'number' : kind === 'day' && /^$|^\d{4}-\d\d-\d\d$/.test(text) ? 'date' : 'text';
  return html`<input
      id=${id}
      type=${type}
      step="any"
      list=${usual ? `${id}-usual` : nothing}
      autocomplete="off"
      dir="auto"
      .value=${text}
      @change=${given}
    />${usual ? html`<datalist id=${`${id}-usual`}>${usual.map((name) => html`<option value=${name}></option>`)}</datalist>` : nothing}`;
}
