import { css } from 'lit';

export const agePlotStyles = css`
  svg {
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
  /* The picture runs from young at the left to old at the right in every language; its words keep their own direction. */
  [dir='rtl'] text {
    direction: rtl;
  }
  [dir='rtl'] .end {
    text-anchor: start;
  }
  .hair {
    stroke: var(--_hairline);
    stroke-width: 0.75;
  }
  .tick {
    stroke: var(--_ink);
  }
  .ink {
    stroke: var(--_ink);
    stroke-width: 0.9;
  }
  .ground {
    fill: var(--_paper);
    stroke: var(--_ink);
  }
  .ground.faint {
    stroke-dasharray: 3 3;
  }
  .hatch.faint {
    opacity: 0.3;
  }
  .line {
    fill: none;
    stroke: var(--_ink);
    stroke-width: 2;
    stroke-linejoin: round;
  }
  .line.thin {
    stroke-width: 1.1;
  }
  .range {
    stroke: var(--_ink);
    stroke-width: 1.1;
  }
  .cursor {
    fill: none;
    stroke: var(--_ink);
    stroke-width: 1.75;
  }
`;
