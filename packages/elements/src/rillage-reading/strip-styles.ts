import { css } from 'lit';

export const stripStyles = css`
  .strip {
    display: block;
    inline-size: 100%;
    block-size: 12px;
    margin-block: 0.3em 0.15em;
    overflow: visible;
  }
  [dir='rtl'] .strip {
    transform: scaleX(-1);
  }
  .strip .axis {
    stroke: var(--_hairline);
  }
  .strip .point {
    stroke: var(--_ink);
    stroke-width: 2;
  }
  .strip rect {
    stroke: var(--_ink);
  }
  .strip .ground {
    fill: var(--_paper);
  }
  .strip .unplaced {
    stroke-dasharray: 2 2;
  }
`;
