import { css } from 'lit';

export const fitPanelStyles = css`
  h2,
  h3 {
    margin: 0;
    font: inherit;
    font-family: var(--_sentence);
    line-height: 1.3;
  }
  h2 {
    font-size: var(--_size-3);
  }
  h3 {
    font-size: var(--_size-2);
    font-weight: 600;
    margin-block: 1.75rem 0.5rem;
  }
  .choices {
    display: grid;
    grid-template-columns: repeat(auto-fit, minmax(min(100%, 20rem), 1fr));
    gap: 0.75rem 2.5rem;
    margin-block: 1rem;
  }
  fieldset {
    border: 0;
    border-block-start: 1px solid var(--_ink);
    margin: 0;
    padding: 0.5rem 0 0;
    min-inline-size: 0;
  }
  legend {
    padding: 0;
    padding-inline-end: 0.5em;
  }
  .tick,
  .sign label {
    display: flex;
    align-items: center;
    gap: 0.6em;
    min-block-size: 28px;
    font-size: var(--_size-1);
    overflow-wrap: anywhere;
  }
  input,
  select {
    font: inherit;
    color: inherit;
    background: var(--_paper);
    border: 1px solid var(--_ink);
    border-radius: 0;
    min-block-size: max(24px, 1.9em);
    max-inline-size: 100%;
    box-sizing: border-box;
  }
  input[type='checkbox'] {
    flex: none;
    inline-size: 24px;
    block-size: 24px;
    margin: 0;
    accent-color: var(--_ink);
  }
  input[type='number'] {
    inline-size: 7.5em;
  }
  [aria-invalid='true'] {
    border-width: 3px;
  }
  summary {
    cursor: pointer;
    min-block-size: 24px;
    font-size: var(--_size-1);
  }
  .prior {
    display: flex;
    flex-wrap: wrap;
    align-items: center;
    gap: 0.3rem 1rem;
    border-block-end: 1px solid var(--_hairline);
    padding-block: 0.4rem;
    font-size: var(--_size-1);
  }
  .prior > span {
    flex: 1 1 14rem;
    overflow-wrap: anywhere;
  }
  .prior label {
    display: flex;
    align-items: center;
    gap: 0.4em;
  }
  .actions {
    display: flex;
    flex-wrap: wrap;
    align-items: center;
    gap: 0.5rem 1rem;
    margin-block: 1rem;
  }
  progress {
    inline-size: min(100%, 16rem);
    accent-color: var(--_ink);
  }
  .state {
    margin-block: 0.5rem;
  }
  .grave {
    border-inline-start: 3px solid var(--_ink);
    padding-inline-start: 0.75rem;
  }
  .note {
    margin: 0.4rem 0;
    font-size: var(--_size-1);
    color: var(--_quiet);
  }
  ul {
    margin: 0.25rem 0;
    padding-inline-start: 1.25rem;
    font-size: var(--_size-1);
    overflow-wrap: anywhere;
  }
  .wide {
    overflow-x: auto;
  }
  .wide > * {
    min-inline-size: 36rem;
  }
  .strip {
    display: block;
    direction: ltr;
  }
  .strip line,
  .rule {
    stroke: var(--_hairline);
    stroke-width: 1;
  }
  .strip line {
    stroke: var(--_ink);
  }
  .strip rect {
    fill: var(--_ink);
  }
  figure {
    margin: 0.75rem 0 0;
  }
  figcaption {
    font-size: var(--_size-1);
  }
  .scatter {
    display: block;
    inline-size: 100%;
    block-size: auto;
    direction: ltr;
  }
  .scatter text {
    font-size: 12px;
    fill: var(--_quiet);
  }
  .ranges {
    stroke: var(--_quiet);
    stroke-width: 1;
    opacity: 0.55;
  }
  .dots {
    fill: none;
    stroke: var(--_ink);
    stroke-width: 1.2;
  }
  .sign {
    display: grid;
    gap: 0.5rem;
    max-inline-size: 40rem;
  }
  @media (forced-colors: active) {
    .strip line,
    .rule,
    .ranges,
    .dots {
      stroke: CanvasText;
      opacity: 1;
    }
    .strip rect {
      fill: CanvasText;
    }
  }
  @media print {
    .choices,
    .actions,
    details,
    .sign button {
      display: none;
    }
  }
`;
