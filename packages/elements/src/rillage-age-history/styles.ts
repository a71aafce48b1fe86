import { css } from 'lit';

export const ageHistoryStyles = css`
  .picture > svg {
    display: block;
    inline-size: 100%;
    block-size: auto;
    direction: ltr;
    overflow: visible;
  }
  text {
    font-size: var(--_size-1);
    fill: var(--_ink);
    stroke: var(--_paper);
    stroke-width: 4;
    stroke-linejoin: round;
    paint-order: stroke;
  }
  .end {
    text-anchor: end;
  }
  .middle {
    text-anchor: middle;
  }
  [dir='rtl'] text {
    direction: rtl;
    text-anchor: end;
  }
  [dir='rtl'] text.end {
    text-anchor: start;
  }
  [dir='rtl'] text.middle {
    text-anchor: middle;
  }
  /* A table of many columns scrolls by itself on a narrow page; the page does not. */
  .table {
    overflow-x: auto;
  }
  th,
  td {
    overflow-wrap: normal;
  }
  .hair {
    stroke: var(--_hairline);
    stroke-width: 0.75;
  }
  .tick {
    stroke: var(--_ink);
  }
  .line {
    fill: none;
    stroke: var(--_ink);
    stroke-width: 1.75;
    stroke-linejoin: round;
  }
  .line.thin {
    stroke-width: 0.9;
  }
  .between {
    fill: none;
    stroke: none;
  }
  .between.near {
    stroke: var(--_ink);
    stroke-width: 0.6;
  }
  .band {
    fill: color-mix(in srgb, var(--_ink) 30%, var(--_paper));
    stroke: var(--_ink);
    stroke-width: 0.75;
  }
  .bottle {
    fill: var(--_paper);
    stroke: var(--_ink);
    stroke-width: 1.1;
  }
  .cursor {
    stroke: var(--_ink);
    stroke-width: 1.5;
  }
  .cursor.under {
    stroke: var(--_paper);
    stroke-width: 4;
  }
  .chosen {
    fill: var(--_ink);
    opacity: 0.15;
    stroke: var(--_ink);
  }
  .legend {
    display: flex;
    flex-wrap: wrap;
    gap: 0.25em 1.1em;
    list-style: none;
    margin: 0.75em 0 0;
    padding: 0;
    font-size: var(--_size-1);
  }
  .legend svg {
    display: inline-block;
    direction: inherit;
    inline-size: 1.6em;
    block-size: 0.9em;
    vertical-align: -0.05em;
    margin-inline-end: 0.35em;
  }
  .legend rect {
    stroke: var(--_ink);
  }
  @media (forced-colors: active) {
    .between {
      stroke: CanvasText;
      stroke-width: 0.6;
    }
    .band {
      fill: Canvas;
    }
  }
`;
