import type { Reading, Station, StationExcerpt } from '@rillage/sdk';
import type { ReactiveController, ReactiveControllerHost } from 'lit';

export type StationState = 'empty' | 'loading' | 'ready' | 'stale' | 'offline' | 'withheld' | 'failed';

/** What a station hands to the elements inside it. */
export interface StationView {
  /** The most serious of what holds; the data may be there in any of them but `empty` and `loading`. */
  state: StationState;
  /** The file as it came: a station, or its public excerpt. */
  station: Station | StationExcerpt | null;
  reading: Reading | null;
  stale: boolean;
  offline: boolean;
}

/** Detail of `rillage-station-wanted`: an element asks the nearest station above it to be kept informed. */
export interface StationWanted {
  /** Called at once and on every change. */
  receive: (view: StationView) => void;
  /** The station that answers sets this; the asker calls it to be left alone. */
  release?: () => void;
}

/**
 * Keeps an element informed by the station around it, whichever of the two is upgraded, connected or moved first. The element asks with
 * `rillage-station-wanted`, which bubbles to the nearest station; a station that arrives later says `rillage-station-available`, and all ask again.
 */
export class StationLink implements ReactiveController {
  view: StationView | null = null;
  #release: (() => void) | undefined;

  constructor(private readonly host: ReactiveControllerHost & HTMLElement) {
    host.addController(this);
  }

  hostConnected(): void {
    document.addEventListener('rillage-station-available', this.#ask);
    this.#ask();
  }

  hostDisconnected(): void {
    document.removeEventListener('rillage-station-available', this.#ask);
    this.#release?.();
    this.#release = undefined;
  }

  #ask = (): void => {
    this.#release?.();
    const detail: StationWanted = { receive: this.#receive };
    this.host.dispatchEvent(new CustomEvent('rillage-station-wanted', { detail, bubbles: true, composed: true }));
    this.#release = detail.release;
    if (!detail.release && this.view) this.#set(null);
  };

  #receive = (view: StationView): void => this.#set(view);

  #set(view: StationView | null): void {
    if (view === this.view) return;
    this.view = view;
    this.host.requestUpdate();
  }
}

declare global {
  interface HTMLElementEventMap {
    'rillage-station-wanted': CustomEvent<StationWanted>;
    'rillage-station-available': CustomEvent<null>;
    'rillage-station-change': CustomEvent<StationView>;
  }
}
