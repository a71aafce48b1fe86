import { css } from 'lit';

/** For elements with buttons. */
export const buttonStyles = css`
  button {
    font: inherit;
    font-size: var(--_size-1);
    color: inherit;
    background: none;
    border: 1px solid var(--_ink);
    border-radius: 0;
    padding: 0.25em 0.75em;
    min-block-size: max(24px, 1.9em);
    min-inline-size: 24px;
    cursor: pointer;
  }
  button[aria-pressed='true'] {
    background: var(--_ink);
    color: var(--_paper);
  }
  button:disabled {
    border-color: var(--_hairline);
    color: var(--_quiet);
    cursor: default;
  }
  @media (forced-colors: active) {
    button[aria-pressed='true'] {
      forced-color-adjust: none;
      background: Highlight;
      color: HighlightText;
    }
  }
  @media print {
    button {
      display: none;
    }
  }
`;
