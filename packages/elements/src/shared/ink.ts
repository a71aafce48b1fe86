import { css } from 'lit';

/** Classes `age-1` to `age-6` fill with the ramp; in forced colours the outline and the label carry it alone. */
export const inkStyles = css`
  .hatch {
    fill: none;
    stroke: var(--_ink);
    stroke-width: 1;
    opacity: 0.7;
  }
  .age-1 {
    fill: var(--_age-1);
  }
  .age-2 {
    fill: var(--_age-2);
  }
  .age-3 {
    fill: var(--_age-3);
  }
  .age-4 {
    fill: var(--_age-4);
  }
  .age-5 {
    fill: var(--_age-5);
  }
  .age-6 {
    fill: var(--_age-6);
  }
  @media (forced-colors: active) {
    svg {
      forced-color-adjust: none;
    }
    .age-1,
    .age-2,
    .age-3,
    .age-4,
    .age-5,
    .age-6 {
      fill: Canvas;
    }
    .hatch {
      opacity: 1;
    }
  }
`;
