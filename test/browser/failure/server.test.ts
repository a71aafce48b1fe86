import { answering, framed, station, type Frame } from './frame.js';

/* Over a real network, each in a page that starts afresh: what a cache keeps, it keeps in the browser's own storage. */
describe('a server that answers', () => {
  let page: Frame | undefined;
  afterEach(() => page?.remove());
  const open = (src: string): Frame => (page = framed(station(src)));
  const sentence = 'About 23 litres in 100';

  it('with the station: reading and picture', async () => {
    await open(answering('good')).shows(sentence, 'Half of the water is older than');
  });

  const refusals: [string, string, RegExp][] = [
    ['with a page', 'page', /the address gives a web page, not a station file/],
    ['with a page that claims to be a file', 'page-as-json', /the address gives a web page/],
    ['that there is no file', 'missing', /there is no file at this address/],
    ['with an error', 'failing', /answered with an error \(500\)/],
    ['with nothing in it', 'empty', /the answer is empty/],
    ['not at all', 'nothing', /cannot be reached/],
    ['with half a file', 'truncated', /incomplete or damaged/],
    ['and breaks off', 'broken', /incomplete or damaged|cannot be reached/],
    ['with more than is read', 'oversized', /larger than 5 MB/],
  ];
  for (const [how, answer, words] of refusals) {
    it(`${how}: says so, and leaves the page’s own words`, async () => {
      await open(answering(answer)).shows(words, 'Call the office.', 'A picture of the ages.');
    });
  }

  it('that the copy still holds (304): the copy, with nothing to excuse', async () => {
    const src = answering('tagged');
    await open(src).shows(sentence);
    page!.remove();
    const shown = await open(src).shows(sentence);
    if (/No connection|could not be loaded|Kept copy/.test(shown)) throw new Error(shown);
  });

  it('not at all, to a reader who was here before: the kept copy, said to be one', async () => {
    const src = answering('once-then-nothing');
    await open(src).shows(sentence);
    await settle();
    page!.remove();
    await open(src).shows(sentence, /No connection. Shown is the copy kept on/, 'Kept copy', 'Half of the water is older than');
  });

  it('with a page, to a reader who was here before: the earlier copy, and why', async () => {
    const src = answering('once-then-page');
    await open(src).shows(sentence);
    await settle();
    page!.remove();
    await open(src).shows(sentence, /The newest data could not be loaded: the address gives a web page/);
  });
});

/** Storage is written after the reading is shown. */
const settle = (): Promise<void> => new Promise((done) => setTimeout(done, 300));
