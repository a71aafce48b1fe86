import type { LitElement } from 'lit';
import type { DistributionWithRange, Reading, Station } from '@rillage/sdk';

const network = window.fetch.bind(window);

/** A station of the fixture's own making, fresh for each test. */
export async function fixture(): Promise<Station> {
  const response = await network(new URL('../../fixtures/station.json', import.meta.url));
  return (await response.json()) as Station;
}

export async function parts(): Promise<{ station: Station; reading: Reading; distribution: DistributionWithRange }> {
  const station = await fixture();
  return { station, reading: station.reading, distribution: station.distribution };
}

/** Puts an element on the page with properties set, and waits for it to have rendered. */
export async function mount<Tag extends keyof HTMLElementTagNameMap>(
  tag: Tag,
  properties: Partial<HTMLElementTagNameMap[Tag]> = {},
  into: Element = stage(),
): Promise<HTMLElementTagNameMap[Tag]> {
  const element = Object.assign(document.createElement(tag), properties);
  into.append(element);
  await settled(element);
  return element;
}

/** A place on the page that `clear` empties. */
export function stage(): Element {
  let place = document.querySelector('#stage');
  if (!place) {
    place = document.createElement('main');
    place.id = 'stage';
    document.body.append(place);
  }
  return place;
}

export function clear(): void {
  document.querySelector('#stage')?.remove();
  document.documentElement.removeAttribute('lang');
  document.documentElement.removeAttribute('dir');
}

export async function settled(...elements: Element[]): Promise<void> {
  for (const element of elements) await (element as LitElement).updateComplete;
  await pause(0);
  for (const element of elements) {
    await (element as LitElement).updateComplete;
    await until(() => !element.shadowRoot?.querySelector('[aria-busy="true"]'), 'every part has come');
    await (element as LitElement).updateComplete;
  }
}

export const pause = (milliseconds: number): Promise<void> => new Promise((done) => setTimeout(done, milliseconds));

/** Waits for something to become true; the last failure's words otherwise. */
export async function until(holds: () => unknown, what: string, milliseconds = 5000): Promise<void> {
  const end = performance.now() + milliseconds;
  while (!holds()) {
    if (performance.now() > end) throw new Error(`not in ${milliseconds} ms: ${what}`);
    await pause(15);
  }
}

/** All text that an element shows, its shadow root's. */
export function shown(element: Element): string {
  const root = element.shadowRoot!;
  const clone = [...root.children].filter((child) => child.localName !== 'style');
  return clone
    .map((child) => child.textContent)
    .join(' ')
    .replace(/\s+/g, ' ')
    .trim();
}

export const part = (element: Element, name: string): HTMLElement | null => element.shadowRoot!.querySelector(`[part~="${name}"]`);

/** Answers instead of the network, and a record of what was asked. */
export function answering(answer: (request: { url: string; headers: Headers; signal: AbortSignal }) => Response | Promise<Response>): {
  asked: { url: string; headers: Headers; signal: AbortSignal }[];
  stop: () => void;
} {
  const real = window.fetch;
  const asked: { url: string; headers: Headers; signal: AbortSignal }[] = [];
  window.fetch = async (input, init) => {
    const request = { url: String(input), headers: new Headers(init?.headers), signal: init!.signal! };
    asked.push(request);
    return answer(request);
  };
  return { asked, stop: () => void (window.fetch = real) };
}

export const json = (value: unknown, headers: Record<string, string> = {}): Response =>
  new Response(typeof value === 'string' ? value : JSON.stringify(value), { headers: { 'content-type': 'application/json', ...headers } });

let count = 0;
/** An address no other test uses, so that no test meets another's kept copy. */
export const address = (): string => `./station-${Date.now()}-${count++}.json`;
