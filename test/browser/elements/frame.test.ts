import { fixture, until } from './help.js';

/** A page of its own in a sandboxed frame: an origin like no other, where storage throws and the network refuses. */
async function sandboxed(body: string): Promise<{ frame: HTMLIFrameElement; told: string[] }> {
  const bundle = await (await fetch(new URL('../../../packages/elements/dist/rillage-elements.min.js', import.meta.url))).text();
  const report = `setInterval(() => { const all = [...document.querySelectorAll('*')].map((e) => e.shadowRoot?.textContent ?? '').join(' ');
    parent.postMessage({ told: all }, '*') }, 50)`;
  const frame = document.createElement('iframe');
  frame.setAttribute('sandbox', 'allow-scripts');
  frame.srcdoc = `<!doctype html><html lang="en"><body>${body}<script type="module">${bundle.replaceAll('</script', '<\\/script')}</script><script>${report}</script></body></html>`;
  const told: string[] = [];
  addEventListener('message', (event: MessageEvent<{ told?: string }>) => {
    if (event.source === frame.contentWindow && event.data.told !== undefined) told.push(event.data.told.replace(/\s+/g, ' '));
  });
  document.body.append(frame);
  return { frame, told };
}

const child = (value: unknown): string => `<script type="application/json">${JSON.stringify(value).replaceAll('<', '\\u003c')}</script>`;

describe('in a sandboxed frame', () => {
  it('a JSON child is read and shown, without storage', async () => {
    const { frame, told } = await sandboxed(
      `<rillage-station>${child(await fixture())}<rillage-reading></rillage-reading><rillage-age-plot></rillage-age-plot></rillage-station>`,
    );
    await until(() => told.some((text) => text.includes('About 23 litres') && text.includes('Half of the water is older than')), 'shown');
    frame.remove();
  });

  it('a refused network leaves the child’s reading, and says that it is not the newest', async () => {
    const src = new URL('../../fixtures/nothing-here.json', import.meta.url).href;
    const { frame, told } = await sandboxed(
      `<rillage-station src="${src}">${child(await fixture())}<rillage-reading></rillage-reading></rillage-station>`,
    );
    await until(
      () => told.some((text) => text.includes('About 23 litres') && /No connection|could not be loaded/.test(text)),
      'shown',
      8000,
    );
    frame.remove();
  });
});
