import type { ReactiveController, ReactiveControllerHost } from 'lit';

/** Detail of `rillage-cursor`: the moment an element points at, null where its cursor was put away. */
export interface SharedCursor {
  /** ISO instant. */
  at: string | null;
}

/**
 * Links the cursors of the elements in one station. Each says `rillage-cursor`, which bubbles; the others hear it at the station around them.
 * Without a station the event is for the page alone.
 */
export class CursorLink implements ReactiveController {
  #station: HTMLElement | null = null;

  constructor(
    private readonly host: ReactiveControllerHost & HTMLElement,
    private readonly heard: (at: string | null) => void,
  ) {
    host.addController(this);
  }

  hostConnected(): void {
    this.#station = stationAround(this.host);
    this.#station?.addEventListener('rillage-cursor', this.#hear);
  }

  hostDisconnected(): void {
    this.#station?.removeEventListener('rillage-cursor', this.#hear);
    this.#station = null;
  }

  say(at: string | null): void {
    this.host.dispatchEvent(new CustomEvent<SharedCursor>('rillage-cursor', { detail: { at }, bubbles: true, composed: true }));
  }

  #hear = (event: HTMLElementEventMap['rillage-cursor']): void => {
    if (event.composedPath()[0] === this.host) return;
    const at: unknown = (event.detail as Partial<SharedCursor> | null)?.at;
    if (at === null || (typeof at === 'string' && Number.isFinite(Date.parse(at)))) this.heard(at);
  };
}

/** The nearest station above, through shadow roots; a page may have given it another prefix. */
function stationAround(start: Node): HTMLElement | null {
  for (let node: Node | null = start.parentNode; node; node = node instanceof ShadowRoot ? node.host : node.parentNode) {
    if (node instanceof HTMLElement && node.localName.endsWith('-station')) return node;
  }
  return null;
}

declare global {
  interface HTMLElementEventMap {
    'rillage-cursor': CustomEvent<SharedCursor>;
  }
}
