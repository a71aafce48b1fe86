import { until } from '../elements/help.js';

export interface Frame {
  /** The frame's window; its document can be read where the sandbox shares the page's origin. */
  frame: HTMLIFrameElement;
  /** Waits for text, shown by the page or inside its elements, that has all of these. */
  shows: (...words: (string | RegExp)[]) => Promise<string>;
  remove: () => void;
}

export interface FrameOptions {
  /** Of the iframe; none: a page of the same origin. */
  sandbox?: string;
  /** A script that runs before the elements are there. */
  before?: string;
  /** A script of the page, a module, instead of the elements. */
  module?: string;
}

const base = new URL('../../../', import.meta.url).href;

/** A page of its own in a frame, with the single-file build, and whatever has been taken away from it. */
export function framed(body: string, { sandbox, before = '', module }: FrameOptions = {}): Frame {
  const frame = document.createElement('iframe');
  if (sandbox !== undefined) frame.setAttribute('sandbox', sandbox);
  const source = module ? `>${module}` : ` src="${base}packages/elements/dist/rillage-elements.min.js">`;
  frame.srcdoc = `<!doctype html><html lang="en"><head><base href="${base}"><script>${before}</script></head>
    <body>${body}<script>${report}</script><script type="module"${source}</script></body></html>`;
  let last = '';
  addEventListener('message', (event: MessageEvent<{ shown?: string }>) => {
    if (event.source === frame.contentWindow && event.data.shown !== undefined) last = event.data.shown;
  });
  document.body.append(frame);
  const shows = async (...words: (string | RegExp)[]): Promise<string> => {
    const holds = (): boolean => words.every((word) => (typeof word === 'string' ? last.includes(word) : word.test(last)));
    await until(holds, `shown: ${words.join(' and ')}`, 10_000).catch((reason: Error) => {
      throw new Error(`${reason.message}; shown was: ${last}`);
    });
    return last;
  };
  return { frame, shows, remove: () => frame.remove() };
}

/** What a reader sees, said to the page outside every 50 ms: text of elements with a shadow tree is that tree's, slots theirs. */
const report = `
const shown = (node) => {
  if (node.nodeType === 3) return node.data;
  if (node.nodeType !== 1 || ['script', 'style'].includes(node.localName)) return '';
  // A slot has no box of its own and counts as invisible.
  if (node.localName !== 'slot' && !node.checkVisibility()) return '';
  const inside = node.localName === 'slot' ? node.assignedNodes() : [...(node.shadowRoot ?? node).childNodes];
  return inside.map(shown).join(' ');
};
setInterval(() => parent.postMessage({ shown: shown(document.body).replace(/\\s+/g, ' ').trim() }, '*'), 50);`;

let count = 0;
/** An address at the misbehaving server that no other test uses. */
export const answering = (how: string): string => new URL(`/answers/${how}/${Date.now()}-${count++}.json`, location.href).href;

/** Station, reading and plot as a page has them, each with words of the page inside. */
export const station = (src: string, inside = ''): string =>
  `<rillage-station src="${src}" stale-after="never">${inside}<rillage-reading>Call the office.</rillage-reading>
    <rillage-age-plot>A picture of the ages.</rillage-age-plot></rillage-station>`;
