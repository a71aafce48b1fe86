import { html, type TemplateResult } from 'lit';
import type { Reading } from '@rillage/sdk';
import { age, ageSpan, olderThan, percent, percentSpan } from '../shared/format.js';
import type { DetailsSpeech } from './details.js';
import { strip, type Strip } from './strip.js';

/** The numbers behind the sentence as a table: each share with its range in figures and drawn. */
export function numbers(speech: DetailsSpeech, reading: Reading): TemplateResult {
  return html`<table part="table">
    <caption class="unseen">
      ${speech.say('reading.table')}
    </caption>
    <thead>
      <tr>
        <th scope="col">${speech.say('reading.what')}</th>
        <th scope="col">${speech.say('reading.share')}</th>
        <th scope="col">${speech.say('reading.range')}</th>
      </tr>
    </thead>
    <tbody>
      ${reading.younger.map((younger) => share(speech, younger))} ${older(speech, reading)} ${median(speech, reading)}
    </tbody>
  </table>`;
}

function share(speech: DetailsSpeech, { days, share: value, unplaced, range }: Reading['younger'][number]): TemplateResult {
  const text = percent(speech, value);
  const drawn: Strip | null = value === null ? null : { share: value, unplaced, range, days };
  const amount = value !== null && unplaced > 0.005 ? speech.say('reading.atLeast', { share: text }) : text;
  return row(speech.say('reading.within', { age: age(speech, days) }), amount, percentSpan(speech, range), drawn);
}

function older(speech: DetailsSpeech, { olderThanRecord: { share: value, range } }: Reading): TemplateResult {
  return row(
    speech.say('reading.olderRow'),
    percent(speech, value),
    percentSpan(speech, range),
    value === null ? null : { share: value, unplaced: 0, range, days: null },
  );
}

function median(speech: DetailsSpeech, { median: it }: Reading): TemplateResult {
  const label = speech.say('reading.medianRow');
  if (!it) return row(label, speech.say('amount.unknown'), speech.say('amount.unassessed'), null);
  const value = it.beyondRecord ? olderThan(speech, it.days) : age(speech, it.days);
  const range = it.range ? ageSpan(speech, it.range.low, it.range.high, it.range.highBeyondRecord) : speech.say('amount.unassessed');
  return row(label, value, range, null);
}

const row = (label: string, value: string, range: string, drawn: Strip | null): TemplateResult =>
  html`<tr>
    <th scope="row">${label}${drawn ? strip(drawn) : ''}</th>
    <td>${value}</td>
    <td>${range}</td>
  </tr>`;
