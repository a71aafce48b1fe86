import { css, html, nothing, type TemplateResult } from 'lit';
import type { Cursor } from './cursor.js';

export const frameMessages = {
  'frame.chart': 'chart',
  'frame.keys':
    'Arrow keys left and right walk the points, up and down the series; Home and End go to the ends; Escape puts the cursor away.',
  'frame.table': 'Data table',
} as const;

/** Everything around a picture that lets it be read without seeing it. */
export interface ChartFrame {
  /** The chart's name, its caption and its accessible name. */
  name: string;
  /** What the picture shows, in a sentence or two. */
  summary: string | TemplateResult;
  /** A second line under the name, such as that the station is invented. */
  note?: string;
  /** Buttons that change the view; the table's is added. */
  buttons: TemplateResult;
  /** The picture; hidden from assistive technology, which has the cursor, summary and table. */
  picture: TemplateResult;
  /** What the cursor stands on, beneath the picture. */
  readout: string | TemplateResult;
  cursor: Cursor;
  onPointerMove: (event: PointerEvent) => void;
  table: TemplateResult;
  showsTable: boolean;
  onToggleTable: () => void;
  say: (key: keyof typeof frameMessages) => string;
}

export function chartFrame(frame: ChartFrame): TemplateResult {
  const { cursor, say } = frame;
  return html`<figure part="frame">
    <figcaption part="name">${frame.name}${frame.note ? html`<span class="note">${frame.note}</span>` : nothing}</figcaption>
    <p part="summary" class="summary">${frame.summary}</p>
    <div class="buttons" part="buttons">
      ${frame.buttons}
      <button type="button" part="button" aria-pressed=${frame.showsTable} @click=${frame.onToggleTable}>${say('frame.table')}</button>
    </div>
    <div
      class="picture"
      part="picture"
      role="application"
      tabindex="0"
      aria-roledescription=${say('frame.chart')}
      aria-label=${frame.name}
      aria-describedby="keys"
      @keydown=${cursor.onKey}
      @blur=${() => cursor.show(null)}
      @pointermove=${frame.onPointerMove}
      @pointerdown=${frame.onPointerMove}
      @pointerleave=${() => cursor.show(null)}
    >
      ${frame.picture}
    </div>
    <p class="readout" part="readout" aria-hidden=${cursor.point !== null}>${frame.readout}</p>
    <p class="unseen" id="keys">${say('frame.keys')}</p>
    <div class="unseen" role="status">${cursor.announcement}</div>
    <div class=${frame.showsTable ? 'table' : 'table printed'}>${frame.table}</div>
  </figure>`;
}

export const frameStyles = css`
  figure {
    margin: 0;
  }
  figcaption {
    font-size: var(--_size-3);
    font-family: var(--_sentence);
    line-height: 1.3;
    text-wrap: balance;
  }
  .note {
    display: block;
    font-size: var(--_size-1);
    font-family: var(--rillage-font, inherit);
    color: var(--_quiet);
  }
  .summary {
    margin-block: 0.5em 0;
    max-inline-size: 68ch;
  }
  .buttons {
    display: flex;
    flex-wrap: wrap;
    align-items: center;
    gap: 0.5rem;
    margin-block: 1rem 0.75rem;
  }
  .buttons.bare {
    margin: 0;
  }
  .picture {
    position: relative;
    touch-action: pan-y;
  }
  .readout {
    margin-block: 0.25rem 0;
    min-block-size: 3em;
    font-size: var(--_size-1);
    color: var(--_quiet);
  }
  .table {
    margin-block-start: 1rem;
  }
  .table.printed {
    display: none;
  }
  @media print {
    .buttons,
    .readout {
      display: none;
    }
    .table.printed {
      display: block;
    }
    .picture {
      break-inside: avoid;
    }
  }
`;
