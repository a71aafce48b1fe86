import { css } from 'lit';

export const explorerStyles = css`
  h2 {
    margin: 0;
    font: inherit;
    font-size: var(--_size-3);
    font-family: var(--_sentence);
    line-height: 1.3;
  }
  .note {
    margin: 0;
    font-size: var(--_size-1);
    color: var(--_quiet);
  }
  .controls {
    display: grid;
    grid-template-columns: repeat(auto-fit, minmax(min(100%, 17rem), 1fr));
    gap: 0.75rem 2.5rem;
    margin-block: 1rem 0.75rem;
  }
  fieldset {
    border: 0;
    border-block-start: 1px solid var(--_ink);
    margin: 0;
    padding: 0.5rem 0 0;
    min-inline-size: 0;
  }
  legend {
    max-inline-size: 100%;
    overflow-wrap: anywhere;
    padding: 0;
    padding-inline-end: 0.5em;
  }
  .row {
    display: flex;
    flex-wrap: wrap;
    align-items: baseline;
    justify-content: space-between;
    gap: 0 1em;
    font-size: var(--_size-1);
    margin-block-start: 0.4rem;
  }
  .row > span {
    flex: 1 1 0;
    min-inline-size: 60%;
  }
  input {
    flex: 1 0 100%;
    inline-size: 100%;
    min-block-size: 24px;
    margin: 0;
    accent-color: var(--_ink);
  }
  select {
    font: inherit;
    color: inherit;
    background: var(--_paper);
    border: 1px solid var(--_ink);
    border-radius: 0;
    min-block-size: max(24px, 1.9em);
    max-inline-size: 100%;
  }
  .state {
    min-block-size: 1.6em;
    margin-block: 0.25rem 1.5rem;
    font-size: var(--_size-1);
  }
  ::slotted(*) {
    margin-block-end: 3rem;
  }
  @media print {
    .controls input,
    .state {
      display: none;
    }
  }
`;
