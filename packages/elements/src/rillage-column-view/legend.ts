import { html, svg, type TemplateResult } from 'lit';
import { classLimits, rampPosition } from '../shared/age-ramp.js';
import { hatchPath } from '../shared/hatch.js';
import { number } from '../shared/format.js';
import type { Tint } from './bitmap.js';
import type { Speech } from './words.js';

/** What the tints mean, each with an outline and a word, the hatched ground last. */
export function legend(speech: Speech, tint: Tint, colourAt: (along: number) => string): TemplateResult {
  const entries =
    tint.of === 'age'
      ? [
          ...limits.map((key, index) => ({
            along: (rampPosition(classLimits[index]!) - 0.5) / 5,
            label: speech.say('column.upTo', { age: speech.say(key) }),
          })),
          { along: 1, label: speech.say('column.older') },
        ]
      : [0, 0.25, 0.5, 0.75, 1].map((along) => ({
          along,
          label: number(speech.tag, { maximumSignificantDigits: 3 }).format(tint.low + along * (tint.high - tint.low)),
        }));
  return html`<ul class="legend" part="legend">
    ${entries.map(
      ({ along, label }) =>
        html`<li>
          ${svg`<svg viewBox="0 0 16 9" aria-hidden="true"><rect class="swatch" x="0.5" y="0.5" width="15" height="8" fill=${colourAt(Math.max(0, along))} /></svg>`}${label}
        </li>`,
    )}
    <li>
      ${svg`<svg viewBox="0 0 16 9" aria-hidden="true"><path class="hatch" d=${hatchPath(0, 0, 16, 9, 4)} /><rect x="0.5" y="0.5" width="15" height="8" fill="none" /></svg>`}${speech.say('column.preRecord')}
    </li>
  </ul>`;
}

const limits = ['column.week', 'column.month', 'column.season', 'column.year', 'column.tenYears'] as const;
