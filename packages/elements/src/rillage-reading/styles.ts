import { css } from 'lit';

export const readingStyles = css`
  p,
  dl,
  ul {
    margin: 0;
  }
  .head {
    font-weight: 600;
  }
  .name {
    font-size: var(--_size-2);
    font-weight: 600;
    margin-block-end: 0.1em;
  }
  .invented {
    font-size: var(--_size-1);
    color: var(--_quiet);
  }
  .sentence {
    font-family: var(--_sentence);
    font-size: var(--_size-5);
    line-height: 1.22;
    letter-spacing: -0.008em;
    max-inline-size: 26em;
    margin-block: 0.45em 0;
    text-wrap: pretty;
  }
  .compact .sentence {
    font-size: var(--_size-4);
    line-height: 1.3;
  }
  .rest {
    font-family: var(--_sentence);
    font-size: var(--_size-3);
    line-height: 1.45;
    max-inline-size: 36em;
    margin-block-start: 0.8em;
    text-wrap: pretty;
  }
  .compact .rest {
    font-size: var(--_size-2);
  }
  .date {
    margin-block-start: 1em;
    font-size: var(--_size-1);
    color: var(--_quiet);
  }
  .date strong {
    color: var(--_ink);
  }
  .old .sentence,
  .old .rest {
    color: var(--_quiet);
    border-inline-start: 3px double var(--_ink);
    padding-inline-start: 0.6em;
  }
  .trend {
    margin-block-start: 1.5em;
    max-inline-size: 68ch;
  }
  table {
    inline-size: 100%;
    border-collapse: collapse;
    margin-block: 2em;
  }
  th,
  td {
    font-weight: normal;
    text-align: start;
    vertical-align: top;
    padding-block: 0.55em;
    padding-inline: 0 1.25em;
    border-block-end: 1px solid var(--_hairline);
  }
  th:last-child,
  td:last-child {
    padding-inline-end: 0;
  }
  thead th {
    font-size: var(--_size-1);
    color: var(--_quiet);
    border-block-end-color: var(--_ink);
    padding-block: 0 0.35em;
  }
  tbody th {
    inline-size: 60%;
  }
  .pair {
    display: grid;
    grid-template-columns: minmax(8rem, 1fr) minmax(0, 4fr);
    gap: 0.25em 1.5em;
    padding-block: 0.9em;
    border-block-end: 1px solid var(--_hairline);
  }
  .date + .pair {
    margin-block-start: 1.5em;
  }
  ul {
    padding-inline-start: 1.1em;
    list-style: '– ';
    color: var(--_quiet);
  }
  dl > div {
    display: flex;
    flex-wrap: wrap;
    gap: 0 0.75em;
  }
  dt {
    color: var(--_quiet);
    min-inline-size: 5.5em;
  }
  dd {
    margin: 0;
    flex: 1 1 12em;
    min-inline-size: 0;
  }
  .source {
    display: block;
  }
  code {
    font-size: var(--_size-1);
    color: var(--_quiet);
  }
  .caution {
    margin-block-start: 1.25em;
    font-size: var(--_size-1);
    font-weight: 600;
    max-inline-size: 75ch;
  }
  .full .caution {
    font-size: var(--_size-2);
  }
  @container (max-width: 34rem) {
    th,
    td {
      padding-inline-end: 0.75em;
    }
    tbody th {
      inline-size: 50%;
    }
    th,
    td {
      overflow-wrap: anywhere;
    }
    td {
      font-size: var(--_size-1);
    }
    .pair {
      grid-template-columns: minmax(0, 1fr);
    }
  }
  @media print {
    tr,
    .pair,
    .sentence {
      break-inside: avoid;
    }
  }
`;
