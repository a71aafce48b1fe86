import { css, html, type ReactiveController, type ReactiveControllerHost, type TemplateResult } from 'lit';
import { rampPosition } from './age-ramp.js';

/** Names of the colours a canvas may ask for; each stands for the private custom property of the theme. */
export type PaintName = 'ink' | 'paper' | 'quiet' | 'hairline' | 'age-1' | 'age-2' | 'age-3' | 'age-4' | 'age-5' | 'age-6';
export type Paints = Record<PaintName, string>;

/**
 * Colours as the browser computes them, for canvases, which know neither custom properties nor forced colours. A host renders `probe` and
 * `probeStyles`; the colours are read afresh, and the host is told, when the colour scheme, forced colours, print, the pixel ratio or the page's theme changes.
 */
export class PaintWatch implements ReactiveController {
  #stop: (() => void)[] = [];
  #rearm: (() => void) | undefined;

  constructor(
    private readonly host: ReactiveControllerHost & HTMLElement,
    private readonly changed: () => void = () => host.requestUpdate(),
  ) {
    host.addController(this);
  }

  hostConnected(): void {
    for (const query of ['(prefers-color-scheme: dark)', '(forced-colors: active)', 'print']) this.#listen(query);
    this.#listenToRatio();
    const theme = new MutationObserver(() => this.changed());
    const attributeFilter = ['class', 'style', 'data-theme'];
    theme.observe(document.documentElement, { attributes: true, attributeFilter });
    if (document.body) theme.observe(document.body, { attributes: true, attributeFilter });
    this.#stop.push(() => theme.disconnect());
  }

  hostDisconnected(): void {
    this.#stop.forEach((stop) => stop());
    this.#stop = [];
    this.#rearm?.();
    this.#rearm = undefined;
  }

  /** The computed colours; ink on paper of the browser's defaults where the probe is not rendered yet. */
  read(): Paints {
    const found: Partial<Paints> = {};
    for (const name of names) {
      const probe = this.host.shadowRoot?.querySelector(`.probe-${name}`);
      found[name] = probe ? getComputedStyle(probe).color : name === 'paper' ? '#ffffff' : '#000000';
    }
    return found as Paints;
  }

  #listen(query: string): void {
    const list = matchMedia(query);
    const changed = (): void => this.changed();
    list.addEventListener('change', changed);
    this.#stop.push(() => list.removeEventListener('change', changed));
  }

  /** A media query names one ratio, so it is set again at the new one after each change. */
  #listenToRatio(): void {
    this.#rearm?.();
    const list = matchMedia(`(resolution: ${devicePixelRatio}dppx)`);
    const changed = (): void => {
      this.#listenToRatio();
      this.changed();
    };
    list.addEventListener('change', changed, { once: true });
    this.#rearm = () => list.removeEventListener('change', changed);
  }
}

/** The colour of an age, mixed between computed ramp colours; falls back to the nearest where a colour is not plain `rgb()`. */
export function agePaint(paints: Paints, days: number): string {
  const position = rampPosition(days);
  const lower = Math.min(4, Math.floor(position));
  const [young, old] = [channels(paints[`age-${lower + 1}` as PaintName]), channels(paints[`age-${lower + 2}` as PaintName])];
  if (!young || !old) return paints[`age-${Math.round(position) + 1}` as PaintName];
  const share = position - lower;
  return `rgb(${young.map((channel, index) => Math.round(channel + share * (old[index]! - channel))).join(' ')})`;
}

const names: PaintName[] = ['ink', 'paper', 'quiet', 'hairline', 'age-1', 'age-2', 'age-3', 'age-4', 'age-5', 'age-6'];

/** Unseen elements whose computed colours are read. */
export const probe: TemplateResult = html`<span hidden aria-hidden="true"
  ><i class="probe-ink"></i><i class="probe-paper"></i><i class="probe-quiet"></i><i class="probe-hairline"></i><i class="probe-age-1"></i
  ><i class="probe-age-2"></i><i class="probe-age-3"></i><i class="probe-age-4"></i><i class="probe-age-5"></i><i class="probe-age-6"></i
></span>`;

export const probeStyles = css`
  .probe-ink {
    color: var(--_ink);
  }
  .probe-paper {
    color: var(--_paper);
  }
  .probe-quiet {
    color: var(--_quiet);
  }
  .probe-hairline {
    color: var(--_hairline);
  }
  .probe-age-1 {
    color: var(--_age-1);
  }
  .probe-age-2 {
    color: var(--_age-2);
  }
  .probe-age-3 {
    color: var(--_age-3);
  }
  .probe-age-4 {
    color: var(--_age-4);
  }
  .probe-age-5 {
    color: var(--_age-5);
  }
  .probe-age-6 {
    color: var(--_age-6);
  }
`;

function channels(colour: string): number[] | null {
  const match = /^rgba?\((\d+), (\d+), (\d+)/.exec(colour);
  return match && match.slice(1, 4).map(Number);
}
