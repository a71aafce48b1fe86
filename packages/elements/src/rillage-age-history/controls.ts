import { html, svg, type TemplateResult } from 'lit';
import type { StationHistory } from '@rillage/sdk';
import { hatchPath } from '../shared/hatch.js';
import { cleanText } from '../shared/text.js';
import { changed, type Span } from './frame.js';
import type { AgeHistoryKey } from './messages.js';
import type { Speech } from './panels.js';
import { bandsOf } from './stack.js';
import { bandName } from './words.js';

/** Buttons that choose what is drawn beneath the flow. */
export function companions(speech: Speech, history: StationHistory, chosen: string, choose: (name: string) => void): TemplateResult {
  const choice = (name: string, label: string): TemplateResult =>
    html`<button type="button" part="button" aria-pressed=${chosen === name} @click=${() => choose(name)}><bdi>${label}</bdi></button>`;
  return html`<span role="group" class="buttons bare" aria-label=${speech.say('history.below')}
    >${choice('shares', speech.say('history.shares'))}${choice('median', speech.say('history.median'))}${Object.keys(
      history.concentration,
    ).map((name) => choice(name, cleanText(name, 40)))}</span
  >`;
}

/** Buttons that do what a drag does, and what it does not. */
export function zoomButtons(speech: Speech, span: Span, steps: number, show: (span: Span) => void): TemplateResult {
  const ways: [AgeHistoryKey, Span][] = [
    ['history.closer', changed(span, steps, 0.5)],
    ['history.wider', changed(span, steps, 2)],
    ['history.earlier', changed(span, steps, 1, -0.5)],
    ['history.later', changed(span, steps, 1, 0.5)],
    ['history.all', { from: 0, to: steps }],
  ];
  return html`<span role="group" class="buttons bare" aria-label=${speech.say('history.window')}
    >${ways.map(
      ([key, to]) =>
        html`<button type="button" part="button" ?disabled=${to.from === span.from && to.to === span.to} @click=${() => show(to)}>
          ${speech.say(key)}
        </button>`,
    )}</span
  >`;
}

/** What the colours mean, each with an outline and a word. The table and the cursor say the same to those who do not see it. */
export function legend(speech: Speech, history: StationHistory): TemplateResult {
  return html`<ul class="legend" part="legend" aria-hidden="true">
    ${bandsOf(history).map(
      (band) =>
        html`<li>
          ${svg`<svg viewBox="0 0 16 9">${
            band.className
              ? svg`<rect class=${band.className} x="0.5" y="0.5" width="15" height="8" />`
              : svg`<path class="hatch" d=${hatchPath(0, 0, 16, 9, 4)} /><rect x="0.5" y="0.5" width="15" height="8" fill="none" />`
          }</svg>`}${bandName(speech, band)}
        </li>`,
    )}
  </ul>`;
}
