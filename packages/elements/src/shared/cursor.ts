import type { ReactiveController, ReactiveControllerHost } from 'lit';

/** What a cursor walks over. Points of a series are numbered from 0, left to right. */
export interface Walk {
  series: number;
  points: (series: number) => number;
  /** What is announced at a point. */
  describe: (series: number, point: number) => string;
  /** Where the series differ in their points: the point of `to` that lies at `point` of `from`. Default: the same number. */
  across?: (from: number, to: number, point: number) => number;
}

/**
 * A cursor over a chart: left and right walk the points, up and down the series, Home and End go to the ends, Escape puts it away.
 * Keys move at once; the words follow a moment later in a polite live region, so that a held key does not queue up speech.
 */
export class Cursor implements ReactiveController {
  series = 0;
  /** null where the cursor is away. */
  point: number | null = null;
  /** What the live region holds. */
  announcement = '';
  #timer: ReturnType<typeof setTimeout> | undefined;

  constructor(
    private readonly host: ReactiveControllerHost & HTMLElement,
    private readonly walk: () => Walk,
  ) {
    host.addController(this);
  }

  hostDisconnected(): void {
    clearTimeout(this.#timer);
    this.point = null;
    this.announcement = '';
  }

  /** Listener for `keydown` on the focusable chart. */
  readonly onKey = (event: KeyboardEvent): void => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    const walk = this.walk();
    const last = walk.points(this.series) - 1;
    if (last < 0) return;
    const steps: Record<string, () => void> = {
      ArrowRight: () => this.#to(this.point === null ? 0 : Math.min(last, this.point + 1)),
      ArrowLeft: () => this.#to(this.point === null ? last : Math.max(0, this.point - 1)),
      ArrowDown: () => this.#toSeries(Math.min(walk.series - 1, this.series + 1)),
      ArrowUp: () => this.#toSeries(Math.max(0, this.series - 1)),
      Home: () => this.#to(0),
      End: () => this.#to(last),
      Escape: () => this.#to(null),
    };
    if (!Object.hasOwn(steps, event.key) || (event.key === 'Escape' && this.point === null)) return;
    event.preventDefault();
    event.stopPropagation();
    steps[event.key]!();
    this.#announce();
  };

  /** Moves without announcing, for a pointer. */
  show(point: number | null, series = this.series): void {
    if (point === this.point && series === this.series) return;
    this.series = series;
    this.#to(point);
  }

  #to(point: number | null): void {
    this.point = point;
    this.host.requestUpdate();
  }

  #toSeries(series: number): void {
    const { points, across } = this.walk();
    const point = this.point ?? 0;
    const landing = across && series !== this.series ? across(this.series, series, point) : point;
    this.series = series;
    this.#to(Math.max(0, Math.min(points(series) - 1, landing)));
  }

  #announce(): void {
    clearTimeout(this.#timer);
    this.#timer = setTimeout(() => {
      this.announcement = this.point === null ? '' : this.walk().describe(this.series, this.point);
      this.host.requestUpdate();
    }, restMs);
  }
}

const restMs = 120;
