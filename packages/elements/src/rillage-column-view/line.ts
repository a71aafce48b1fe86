import type { ReactiveController, ReactiveControllerHost } from 'lit';
import { msPerDay } from '../shared/format.js';
import { nearestColumn, timeOf, type Frame } from './geometry.js';
import type { SectionData } from './section-type.js';

/** What the line needs of its element. */
export interface LineHost extends ReactiveControllerHost, HTMLElement {
  at: string | null;
}

/**
 * The line through the section: keys, buttons and pointer move it among the kept moments. It moves at once; what is said of it in the polite
 * live region follows when it rests, so that a held key does not queue up speech.
 */
export class SectionLine implements ReactiveController {
  /** What the live region holds. */
  announcement = '';
  #timer: ReturnType<typeof setTimeout> | undefined;

  constructor(
    private readonly host: LineHost,
    private readonly see: () => { section: SectionData; frame: Frame } | null,
    private readonly say: { moved: (at: string) => void; describe: () => string },
  ) {
    host.addController(this);
  }

  hostDisconnected(): void {
    clearTimeout(this.#timer);
    this.announcement = '';
  }

  /** Index of the kept moment it stands at; the last where no moment is set. */
  place(section: SectionData): number {
    const time = this.host.at === null ? NaN : Date.parse(this.host.at);
    return Number.isFinite(time) ? nearestColumn(section, time) : section.columns.length - 1;
  }

  /** Moves by some days, by at least one kept moment. */
  move(days: number): void {
    const section = this.see()?.section;
    if (section) this.#go(section, this.#away(section, days));
  }

  /** Listener for `keydown` on the picture. */
  readonly onKey = (event: KeyboardEvent): void => {
    const section = this.see()?.section;
    if (!section || event.ctrlKey || event.metaKey || event.altKey) return;
    const place = this.place(section);
    const places: Record<string, () => number> = {
      ArrowRight: () => place + 1,
      ArrowUp: () => place + 1,
      ArrowLeft: () => place - 1,
      ArrowDown: () => place - 1,
      PageUp: () => this.#away(section, season),
      PageDown: () => this.#away(section, -season),
      Home: () => 0,
      End: () => section.columns.length - 1,
    };
    if (!Object.hasOwn(places, event.key)) return;
    event.preventDefault();
    event.stopPropagation();
    this.#go(section, places[event.key]!());
  };

  /** Listener for `pointerdown` and `pointermove`: a press on the section places the line, a drag takes it along. */
  readonly onPointer = (event: PointerEvent): void => {
    const seen = this.see();
    const picture = event.currentTarget as HTMLElement;
    if (!seen || !(event.buttons & 1)) return;
    const { left, right, from, to, width } = seen.frame;
    const box = picture.getBoundingClientRect();
    const x = ((event.clientX - box.left) / box.width) * width;
    if (event.type === 'pointerdown') {
      // The cut beside the section is no place for the line.
      this.#dragging = x > left - reach && x < right + reach;
      if (this.#dragging) capture(picture, event.pointerId);
    }
    if (this.#dragging) this.#go(seen.section, nearestColumn(seen.section, from + ((x - left) / (right - left)) * (to - from)));
  };
  #dragging = false;

  #away(section: SectionData, days: number): number {
    const place = this.place(section);
    const there = nearestColumn(section, timeOf(section, section.columns[place]!) + days * msPerDay);
    return days < 0 ? Math.min(place - 1, there) : Math.max(place + 1, there);
  }

  #go(section: SectionData, wanted: number): void {
    const place = Math.max(0, Math.min(section.columns.length - 1, wanted));
    if (place === this.place(section)) return;
    const at = new Date(timeOf(section, section.columns[place]!)).toISOString();
    this.host.at = at;
    this.say.moved(at);
    clearTimeout(this.#timer);
    this.#timer = setTimeout(() => {
      this.announcement = this.say.describe();
      this.host.requestUpdate();
    }, restMs);
  }
}

/** So that a drag may leave the picture; a pointer that has just been lifted cannot be captured. */
function capture(picture: HTMLElement, pointer: number): void {
  try {
    picture.setPointerCapture(pointer);
  } catch {
    // The press alone has placed the line.
  }
}

/** Days of a long move. */
export const season = 91;
const restMs = 250;
// px to either side of the section that still take hold of the line
const reach = 24;
