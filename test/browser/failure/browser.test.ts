import { expect } from 'chai';
import { fixture, until } from '../elements/help.js';
import { answering, framed, station, type Frame } from './frame.js';

const sentence = 'About 23 litres in 100';
const child = async (): Promise<string> =>
  `<script type="application/json">${JSON.stringify(await fixture()).replaceAll('<', '\\u003c')}</script>`;

describe('a browser without', () => {
  let page: Frame | undefined;
  afterEach(() => page?.remove());

  it('scripts: the page’s own words, in sight', async () => {
    page = framed(station(answering('good')), { sandbox: 'allow-same-origin' });
    await until(() => page!.frame.contentDocument?.querySelector('rillage-age-plot'), 'the page is there');
    const { contentDocument } = page.frame;
    for (const [tag, words] of [
      ['rillage-reading', 'Call the office.'],
      ['rillage-age-plot', 'A picture of the ages.'],
    ] as const) {
      const element = contentDocument!.querySelector<HTMLElement>(tag)!;
      expect(element.shadowRoot).to.equal(null);
      expect(element.innerText).to.equal(words);
      expect(element.checkVisibility()).to.equal(true);
    }
  });

  const storages: [string, string][] = [
    ['storage, the name not being there', "Object.defineProperty(window, 'indexedDB', { get: () => undefined });"],
    [
      'storage, asking for it being refused',
      "Object.defineProperty(window, 'indexedDB', { get() { throw new DOMException('no', 'SecurityError'); } });",
    ],
    ['storage, opening it throwing at once', "IDBFactory.prototype.open = () => { throw new DOMException('no', 'SecurityError'); };"],
    [
      'storage, reading it throwing at once',
      "IDBDatabase.prototype.transaction = () => { throw new DOMException('no', 'InvalidStateError'); };",
    ],
    ['storage, opening it never answering', 'IDBFactory.prototype.open = () => ({});'],
  ];
  for (const [what, before] of storages) {
    it(`${what}: the reading all the same`, async () => {
      page = framed(station(answering('good')), { before });
      await page.shows(sentence, 'Half of the water is older than');
    });
  }

  it('an origin, whose storage throws: the reading from the network', async () => {
    page = framed(station(answering('good')), { sandbox: 'allow-scripts' });
    await page.shows(sentence, 'Half of the water is older than');
  });

  it('an origin or a network: the reading that the page carries, said not to be the newest', async () => {
    page = framed(station(answering('nothing'), await child()), { sandbox: 'allow-scripts' });
    await page.shows(sentence, /the server cannot be reached. Shown is an earlier copy/);
  });

  it('a canvas: words and table of every picture', async () => {
    const history = '<rillage-age-history>The flow by age.</rillage-age-history>';
    page = framed(
      `<rillage-station stale-after="never">${await child()}<rillage-age-plot table></rillage-age-plot>${history}</rillage-station>`,
      {
        before: 'HTMLCanvasElement.prototype.getContext = () => null; window.OffscreenCanvas = undefined;',
      },
    );
    await page.shows(
      'Half of the water is older than',
      'Data table',
      'The flow of the stream by the age of its water',
      'Older than the record',
    );
  });

  it('a valid language of its own: the reading in the page’s', async () => {
    page = framed(station(answering('good')), { before: "Object.defineProperty(navigator, 'language', { value: 'x_y z' });" });
    await page.shows(sentence, 'Half of the water is older than');
  });
});

/** Run here and, by its text, in the frame. */
async function compute(sdk: typeof import('@rillage/sdk'), worker: string | false): Promise<string> {
  const forcing = {
    start: '2020-01-01T00:00:00Z',
    stepDays: 1,
    inflow: Float64Array.from({ length: 400 }, (_value, k) => (k % 3 === 0 ? 9 : 0)),
    outflows: { discharge: new Float64Array(400).fill(2) },
    inflowConcentration: {},
  };
  const catchment = { initialStorage: 600, selection: { discharge: { form: 'gamma' as const, shape: 0.6, scale: 250 } } };
  const run = await sdk.runColumnInBackground(catchment, forcing, { youngerThan: [30] }, { worker });
  return [...run.outflows['discharge']!.youngerShare.get(30)!].join();
}

describe('a page without an origin, which may not start a worker from an address', () => {
  it('computes in slices, to the same bits', async () => {
    const base = new URL('../../../packages/sdk/dist/', import.meta.url).href;
    const worker = JSON.stringify(`${base}workers/rillage-worker.min.js`);
    const module = `import * as sdk from '${base}rillage-sdk.min.js';
      const compute = ${compute.toString()};
      let refused = false;
      try { new Worker(${worker}, { type: 'module' }); } catch { refused = true; }
      document.body.append(refused ? 'worker refused ' : 'worker allowed ', await compute(sdk, ${worker}).catch(String));`;
    const page = framed('', { sandbox: 'allow-scripts', module });
    const shown = await page.shows(/worker (refused|allowed) .*\d/);
    page.remove();
    // Firefox refuses with an event instead of at once; either way the answer is the same.
    if (/Chrome/.test(navigator.userAgent)) expect(shown).to.contain('worker refused');
    const here = await compute(await import('@rillage/sdk'), false);
    expect(shown.replace(/^worker \w+ /, '')).to.equal(here);
  });
});
