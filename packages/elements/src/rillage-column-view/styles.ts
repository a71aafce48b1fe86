import { css } from 'lit';

export const columnViewStyles = css`
  canvas,
  svg {
    display: block;
    inline-size: 100%;
    block-size: auto;
    direction: ltr;
  }
  canvas {
    position: absolute;
    inset: 0;
    block-size: 100%;
    pointer-events: none;
  }
  svg {
    position: relative;
    overflow: visible;
  }
  .picture {
    cursor: ew-resize;
  }
  text {
    font-size: var(--_size-1);
    fill: var(--_ink);
    stroke: var(--_paper);
    stroke-width: 4;
    stroke-linejoin: round;
    paint-order: stroke;
  }
  .small {
    font-size: calc(0.9 * var(--_size-1));
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
  .ink,
  .edge,
  .ground {
    fill: none;
    stroke: var(--_ink);
  }
  .hatch.open {
    opacity: 0.4;
  }
  .flow {
    fill: color-mix(in srgb, var(--_ink) 22%, var(--_paper));
    stroke: var(--_ink);
    stroke-width: 0.75;
    stroke-linejoin: round;
  }
  /* Bands have the same colours by day and night, so their lines have too. */
  .year {
    fill: none;
    stroke: rgb(255 255 255 / 0.72);
    stroke-width: 0.9;
  }
  .plain .year {
    stroke: var(--_ink);
  }
  .layer {
    shape-rendering: crispEdges;
  }
  .cut {
    stroke: var(--_ink);
    stroke-width: 1.75;
  }
  .cut.under {
    stroke: var(--_paper);
    stroke-width: 5;
  }
  .grip,
  .half {
    fill: var(--_ink);
    stroke: var(--_paper);
    stroke-width: 1;
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
    .layer,
    .swatch {
      fill: Canvas;
    }
    .year {
      stroke: CanvasText;
    }
  }
`;
