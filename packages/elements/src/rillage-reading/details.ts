import { html, nothing, type TemplateResult } from 'lit';
import type { Reading } from '@rillage/sdk';
import type { AmountKey } from '../shared/format.js';
import type { Language } from '../shared/language.js';
import { detailsMessages, type DetailsKey } from './details-messages.js';
import { confidence, evidence, trend } from './evidence.js';
import { numbers } from './numbers.js';

export interface DetailsSpeech extends Pick<Language<DetailsKey>, 'tag' | 'speaks'> {
  say: (key: DetailsKey, values?: Record<string, string | number>) => string;
}

/** What the full form says beneath the sentence. A part of its own: the sentence is read first, and the compact form never needs it. */
export function details(language: Language<AmountKey>, reading: Reading, timeZone: string): TemplateResult {
  const speech: DetailsSpeech = {
    tag: language.tag,
    speaks: (other) => language.speaks(other),
    say: (key, values) => language.sayFrom(detailsMessages, key, values),
  };
  return html`${trend(speech, reading)} ${reading.status === 'given' ? numbers(speech, reading) : nothing} ${confidence(speech, reading)}
  ${evidence(speech, reading, timeZone)}`;
}
