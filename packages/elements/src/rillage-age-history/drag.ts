import type { ReactiveController, ReactiveControllerHost } from 'lit';
import type { Frame, Span } from './frame.js';

/** A drag across the picture that chooses a span of time; less than a few pixels is a click and chooses nothing. */
export class SpanDrag implements ReactiveController {
  /** px: where it began and where it is. */
  at: { from: number; to: number } | null = null;

  constructor(
    private readonly host: ReactiveControllerHost & HTMLElement,
    private readonly frame: () => Frame | null,
    private readonly chosen: (span: Span) => void,
  ) {
    host.addController(this);
  }

  hostDisconnected(): void {
    this.#stop();
  }

  /** @param x  px, within the panels */
  follow(event: PointerEvent, x: number): void {
    if (event.type === 'pointerdown' && event.button === 0) {
      this.at = { from: x, to: x };
      addEventListener('pointerup', this.#end);
      addEventListener('pointercancel', this.#end);
    } else if (this.at && event.buttons & 1) this.at = { ...this.at, to: x };
    else return;
    this.host.requestUpdate();
  }

  #end = (event: Event): void => {
    const drag = this.at;
    const frame = this.frame();
    this.#stop();
    this.host.requestUpdate();
    if (!drag || !frame || event.type === 'pointercancel' || Math.abs(drag.to - drag.from) < leastDrag) return;
    this.chosen({ from: frame.stepAt(Math.min(drag.from, drag.to)), to: frame.stepAt(Math.max(drag.from, drag.to)) + 1 });
  };

  #stop(): void {
    this.at = null;
    removeEventListener('pointerup', this.#end);
    removeEventListener('pointercancel', this.#end);
  }
}

// px
const leastDrag = 8;
