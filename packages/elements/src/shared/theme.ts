import { css, unsafeCSS } from 'lit';
import { rampDefaults } from './age-ramp.js';

/**
 * Custom properties a page may set, each with a default from the reader's system: paper and ink as a pair, so that the text is legible on any page.
 * Private `--_` names keep a page's own values from being overwritten by ours.
 */
export const theme = css`
  :host {
    --_ink: var(--rillage-ink, CanvasText);
    --_paper: var(--rillage-paper, Canvas);
    --_quiet: var(--rillage-quiet, color-mix(in srgb, var(--_ink) 74%, var(--_paper)));
    --_hairline: var(--rillage-hairline, color-mix(in srgb, var(--_ink) 34%, var(--_paper)));
    --_sentence: var(--rillage-font-sentence, ui-serif, 'Iowan Old Style', Charter, 'Source Serif 4', Georgia, serif);
    --_size-1: var(--rillage-size-1, 0.8125rem);
    --_size-2: var(--rillage-size-2, 1rem);
    --_size-3: var(--rillage-size-3, 1.25rem);
    --_size-4: var(--rillage-size-4, clamp(1.4375rem, 1.05rem + 1.7cqi, 2rem));
    --_size-5: var(--rillage-size-5, clamp(1.9rem, 1.2rem + 3.2cqi, 2.75rem));
    ${unsafeCSS(rampDefaults.map((colour, index) => `--_age-${index + 1}: var(--rillage-age-${index + 1}, ${colour});`).join('\n'))}
    display: block;
    container-type: inline-size;
    color: var(--_ink);
    background: var(--_paper);
    font-family: var(--rillage-font, inherit);
    font-size: var(--_size-2);
    line-height: 1.5;
    font-variant-numeric: tabular-nums lining-nums;
    overflow-wrap: break-word;
  }
  :host([hidden]) {
    display: none;
  }
  *,
  *::before {
    box-sizing: border-box;
  }
  :focus-visible {
    outline: 2px solid var(--_ink);
    outline-offset: 2px;
  }
  .unseen {
    position: absolute;
    inline-size: 1px;
    block-size: 1px;
    overflow: hidden;
    clip-path: inset(50%);
    white-space: nowrap;
  }
`;
