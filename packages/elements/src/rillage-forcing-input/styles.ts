import { css } from 'lit';

export const forcingInputStyles = css`
  h2,
  h3,
  h4,
  legend {
    margin: 0;
    padding: 0;
    font: inherit;
    line-height: 1.3;
    overflow-wrap: anywhere;
  }
  h2,
  h3 {
    font-size: var(--_size-3);
    font-family: var(--_sentence);
  }
  h4,
  legend {
    font-weight: 600;
  }
  h4 {
    margin-block-start: 0.75rem;
  }
  h3:focus {
    outline: none;
  }
  p {
    margin-block: 0.5em;
    max-inline-size: 68ch;
  }
  section {
    border-block-start: 1px solid var(--_ink);
    margin-block-start: 2rem;
    padding-block-start: 0.75rem;
  }
  ul {
    list-style: none;
    margin: 0;
    padding: 0;
  }
  fieldset {
    border: 0;
    margin: 1.25rem 0 0;
    padding: 0;
    min-inline-size: 0;
  }
  .column {
    border-block-start: 1px solid var(--_hairline);
    margin-block-start: 0.75rem;
  }
  .column > legend {
    padding-inline-end: 0.5em;
    font-size: var(--_size-1);
  }
  .sources {
    display: grid;
    grid-template-columns: repeat(auto-fit, minmax(min(100%, 16rem), 1fr));
    gap: 1rem 2rem;
    margin-block: 0.75rem;
  }
  .drop {
    display: block;
    border: 1px dashed var(--_ink);
    padding: 0.75rem;
  }
  .drop input {
    display: block;
    margin-block-start: 0.5rem;
  }
  .fields {
    display: grid;
    grid-template-columns: repeat(auto-fill, minmax(min(100%, 10.5rem), 1fr));
    align-items: end;
    gap: 0.5rem 1.25rem;
    margin-block: 0.5rem;
  }
  .field {
    display: block;
    font-size: var(--_size-1);
    min-inline-size: 0;
  }
  .wide {
    grid-column: span 2;
  }
  @container (max-width: 30rem) {
    .fields {
      grid-template-columns: repeat(auto-fill, minmax(min(100%, 8rem), 1fr));
    }
    .wide {
      grid-column: auto;
    }
  }
  .field.open {
    border-inline-start: 4px solid var(--_ink);
    padding-inline-start: 0.5rem;
  }
  input,
  select,
  textarea {
    font: inherit;
    font-size: var(--_size-1);
    color: inherit;
    background: var(--_paper);
    max-inline-size: 100%;
    min-block-size: max(24px, 1.9em);
  }
  .field > :is(input:not([type='checkbox']), select, textarea) {
    display: block;
    inline-size: 100%;
    border: 1px solid var(--_ink);
    border-radius: 0;
    padding: 0.2em 0.4em;
  }
  input[type='checkbox'] {
    display: block;
    inline-size: 24px;
    margin: 0;
    accent-color: var(--_ink);
  }
  form > .field + button {
    margin-block-start: 0.5rem;
  }
  .plain {
    border: 0;
    padding-inline: 0;
    text-align: start;
    text-decoration: underline;
  }
  .said {
    border-inline-start: 4px solid var(--_ink);
    padding-inline-start: 0.75rem;
    margin-block: 0.75rem;
  }
  .said p {
    margin: 0;
    font-weight: 600;
  }
  .note,
  .state {
    font-size: var(--_size-1);
  }
  .note {
    color: var(--_quiet);
  }
  .state {
    min-block-size: 1.5em;
    font-weight: 600;
  }
  .files li,
  .lines li {
    display: flex;
    flex-wrap: wrap;
    align-items: baseline;
    gap: 0.25em 1em;
    font-size: var(--_size-1);
    padding-block: 0.25em;
  }
  .files li,
  .remarks > li {
    border-block-end: 1px solid var(--_hairline);
  }
  .remarks > li {
    display: grid;
    grid-template-columns: repeat(auto-fit, minmax(min(100%, 20rem), 1fr));
    gap: 0 2rem;
    padding-block: 0.6rem;
    font-size: var(--_size-1);
  }
  .remarks p {
    margin: 0;
  }
  .remarks button {
    justify-self: start;
  }
  dl,
  dd {
    margin: 0;
  }
  dl > div {
    display: flex;
    gap: 0.6em;
  }
  dt {
    color: var(--_quiet);
    flex: 0 0 6em;
  }
  dd {
    overflow-wrap: anywhere;
  }
  code,
  pre {
    font-size: 0.95em;
    overflow-wrap: anywhere;
    unicode-bidi: isolate;
  }
  pre {
    margin-block: 0.5rem;
    overflow-x: auto;
    font-size: var(--_size-1);
    line-height: 1.4;
  }
  section > details {
    border-block-start: 1px solid var(--_hairline);
    margin-block-start: 0.75rem;
    padding-block-start: 0.5rem;
  }
  section > details > summary {
    font-weight: 600;
  }
  summary {
    min-block-size: 24px;
    cursor: pointer;
  }
  .rain {
    stroke: var(--_ink);
    fill: none;
  }
  .gap {
    stroke: var(--_ink);
    stroke-width: 6;
  }
  @media print {
    .sources,
    .fields input[type='file'],
    form {
      display: none;
    }
  }
`;
