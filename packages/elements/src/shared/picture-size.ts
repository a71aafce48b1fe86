import type { ReactiveController, ReactiveControllerHost } from 'lit';

/**
 * The width an element has for its picture and the size of its small text, both in CSS px, kept as the page changes. The text's size is read
 * once there is text, then whenever the element's box changes: reading it on every update would lay the page out each time.
 */
export class PictureSize implements ReactiveController {
  width = 640;
  em = 13;
  #read = false;
  #observer: ResizeObserver | undefined;

  constructor(
    private readonly host: ReactiveControllerHost & HTMLElement,
    private readonly text = '.readout',
  ) {
    host.addController(this);
  }

  hostConnected(): void {
    // A frame later, so that a change of height cannot call the observer within its own round.
    this.#observer = new ResizeObserver(() => requestAnimationFrame(() => this.#measure()));
    this.#observer.observe(this.host);
  }

  hostDisconnected(): void {
    this.#observer?.disconnect();
    this.#observer = undefined;
  }

  hostUpdated(): void {
    if (!this.#read) this.#measure();
  }

  #measure(): void {
    if (!this.host.isConnected) return;
    const text = this.host.shadowRoot?.querySelector(this.text);
    this.#read = Boolean(text);
    const width = Math.round(this.host.clientWidth);
    const em = text ? parseFloat(getComputedStyle(text).fontSize) || 13 : 13;
    if (!(width > 0) || (width === this.width && em === this.em)) return;
    Object.assign(this, { width, em });
    this.host.requestUpdate();
  }
}
