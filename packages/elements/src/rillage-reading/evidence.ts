import { html, nothing, type TemplateResult } from 'lit';
import type { Reading } from '@rillage/sdk';
import { age, date, number, percent } from '../shared/format.js';
import { cleanText } from '../shared/text.js';
import type { DetailsSpeech } from './details.js';
import { headline } from './headline.js';

type Part = TemplateResult | typeof nothing;

/** Against the same season of earlier years, where the history reaches that far. */
export function trend(speech: DetailsSpeech, reading: Reading): Part {
  const { trend: it } = reading;
  const now = it && headline(reading, it.days);
  if (!it || !now || now.share === null || reading.status === 'withheld') return nothing;
  const values = {
    how: speech.say(`reading.${it.direction}`),
    share: percent(speech, now.share),
    usual: percent(speech, it.usualShare),
    age: age(speech, now.days),
    years: it.years,
  };
  return html`<p part="trend" class="trend">${speech.say('reading.trend', values)}</p>`;
}

/** How sure, and the rules that led there. */
export function confidence(speech: DetailsSpeech, reading: Reading): TemplateResult {
  const key = words[reading.confidence] ?? words.notAssessed;
  return html`<div part="confidence" class="pair">
    <p class="head">${speech.say('reading.confidence')}</p>
    <div>
      <p>${speech.say(key)}</p>
      ${
        reading.confidenceBecause.length
          ? html`<ul lang=${speech.speaks(reading.language) ? nothing : cleanText(reading.language, 20)} dir="auto">
              ${reading.confidenceBecause.map((because) => html`<li>${cleanText(because)}</li>`)}
            </ul>`
          : nothing
      }
    </div>
  </div>`;
}

/** Record, samples, method and sources, so that a number can be traced. */
export function evidence(speech: DetailsSpeech, { evidence: it }: Reading, timeZone: string): TemplateResult {
  const day = (instant: string): string => date(speech.tag, instant, { dateStyle: 'long' }, timeZone);
  // The record ends at the first instant of the next day.
  const to = day(new Date(Date.parse(it.recordTo) - 1).toISOString());
  const samples =
    it.samples && it.lastSample
      ? speech.say('reading.samplesLast', { count: it.samples, date: day(it.lastSample) })
      : it.samples
        ? number(speech.tag, {}).format(it.samples)
        : speech.say('reading.samplesNone');
  const sources = Array.isArray(it.sources) ? it.sources.slice(0, 20) : [];
  return html`<div part="evidence" class="pair">
    <p class="head">${speech.say('reading.evidence')}</p>
    <dl>
      <div>
        <dt>${speech.say('reading.record')}</dt>
        <dd>${speech.say('amount.span', { low: day(it.recordFrom), high: to })}</dd>
      </div>
      <div>
        <dt>${speech.say('reading.samples')}</dt>
        <dd>${samples}</dd>
      </div>
      <div>
        <dt>${speech.say('reading.method')}</dt>
        <dd><bdi>${cleanText(it.method)}</bdi> <bdi>(${cleanText(it.version, 40)})</bdi></dd>
      </div>
      ${
        sources.length
          ? html`<div>
              <dt>${speech.say('reading.sources')}</dt>
              <dd>
                ${sources.map((source) => html`<span class="source"><bdi>${cleanText(source?.name, 80)}</bdi> <code>${cleanText(source?.sha256, 64).slice(0, 12)}</code></span>`)}
              </dd>
            </div>`
          : nothing
      }
    </dl>
  </div>`;
}

const words = {
  firm: 'reading.firm',
  tentative: 'reading.tentative',
  withheld: 'reading.confidenceWithheld',
  notAssessed: 'reading.confidenceNotAssessed',
} as const;
