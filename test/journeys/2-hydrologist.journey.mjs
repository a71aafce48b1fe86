import { mkdtemp, readdir, readFile, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { readStation, writeStation } from '@rillage/sdk';

export const title = 'A hydrologist takes an agency’s files to a signed station file at the desk';

const PATIENCE_MILLISECONDS = 400_000;

/**
 * The invented agency's files at the desk: settled, read, mended, fitted, kept through a reload, signed off, saved. Two years, one tracer and
 * one selection under narrow priors, so that the fit ends within the patience of a test.
 */
export async function walk({ tally, site, browser }) {
  const desk = await browser.open(new URL('desk.html', site.address).href);
  const { page } = desk;
  await page.evaluate(addHands);
  // a pattern goes to the page as its source
  const hand = (name, ...args) =>
    page.evaluate(
      (of, given) => globalThis.hands[of](...given),
      name,
      args.map((each) => (each instanceof RegExp ? each.source : each)),
    );

  await tally.check('the files come in, and what they do not say is asked for first', async () => {
    await page.click('#bring');
    await desk.until(/Still to be said: Zone of the clock.*Catchment area.*Latitude/, '#intake');
  });
  await tally.check('what is open is answered in the fields it names', async () => {
    await hand('fill', '#intake', /^Zone of the clock/, 'UTC');
    await hand('fill', '#intake', /^Catchment area/, '23.4');
    await hand('fill', '#intake', /^Latitude/, '51.3');
    await hand('fill', '#intake', /^First day/, '2022-04-01');
    await hand('fill', '#intake', /^Ends before/, '2024-04-01');
    await hand('fill', '#intake', /^times$/, '0.66');
    await desk.until(/Nothing is open/, '#intake');
  });
  await tally.check('the reading stops at the gaps, beside the rows they concern, and goes on once a rule is given', async () => {
    await hand('press', '#intake', /^Confirm and read$/);
    await desk.until(/Stops the reading/, '#intake');
    for (const series of ['precipitation', 'lowest temperature', 'highest temperature', 'discharge'])
      await hand('fill', '#intake', new RegExp(`^Gaps: ${series}`), series === 'precipitation' ? 'zero' : 'linear');
    await hand('fill', '#intake', /^Rain without a sample/, 'amountWeightedMean');
    await hand('press', '#intake', /^Confirm and read$/);
    await desk.until(/mm of rain, .* mm of flow/, '#intake');
  });
  await tally.check('a picture and a table of what was read', async () => {
    await desk.until(/What was noticed/, '#intake');
    if ((await hand('count', '#intake', 'svg, canvas')) === 0) throw new Error('no picture');
  });
  await tally.check('the record is handed to the fit, which proposes what to try', async () => {
    await hand('press', '#intake', /^Use this record$/);
    await desk.until(/Fit to the samples of.*d18O.*gamma, its scale following storage/, '#panel');
  });
  await tally.check('the reader narrows the choices', async () => {
    for (const tracer of ['d2H', 'chloride']) await hand('tick', '#panel', new RegExp(`^${tracer}$`), false);
    await hand('tick', '#panel', /^gamma, its scale following storage$/, false);
    await hand('prior', '#panel', 'discharge · shape', [0.4, 0.9]);
    await hand('prior', '#panel', 'discharge · scale', [200, 3000]);
    await hand('prior', '#panel', 'evapotranspiration · scale', [50, 250]);
  });
  await tally.check('a fit is stopped half way, says so, and cannot be signed', async () => {
    await hand('press', '#panel', /^Fit$/);
    await desk.until(/done, gamma, steady.*runs/, '#panel');
    await hand('press', '#panel', /^Stop$/);
    await desk.until(/Stopped half way.*must not be published/, '#panel');
    await desk.until(/Only a finished, converged fit can be signed off/, '#panel');
  });
  await tally.check('the work is there after a reload', async () => {
    await page.reload({ waitUntil: 'networkidle0' });
    await page.evaluate(addHands);
    await desk.until(/Stopped half way/, '#panel');
    await desk.until(/Nothing is open/, '#intake');
  });
  await tally.check('the fit goes on, and ends with a verdict for each unknown', async () => {
    await hand('press', '#panel', /^Go on$/);
    await waitFor(() => hand('text', '#panel'), /converged after/);
    const text = await desk.shown('#panel');
    for (const unknown of ['initialStorage', 'discharge · shape', 'discharge · scale', 'd18O · preRecord', 'errors · d18O · constant'])
      if (!new RegExp(`${unknown} \\S+ to \\S+ \\S+ to \\S+ (not |weakly )?informed by these data`).test(text))
        throw new Error(
          `no verdict for ${unknown}: ${text.slice(text.indexOf('What the samples say'), text.indexOf('What the samples say') + 900)}`,
        );
    if (!/d18O: \d+ of \d+ samples lie in their 5 to 95 % range/.test(text)) throw new Error('no word of the samples');
  });
  await tally.check('signed by name and date, the station stands as the public will read it', async () => {
    await hand('fill', '#panel', /^Name$/, 'A. Hydrologist (invented)');
    await hand('press', '#panel', /^Sign off this fit$/);
    await waitFor(() => desk.shown('#shown').catch(() => ''), /fell as rain within the last 30 days \(likely between/);
  });
  await tally.check('the file saved is a station that the SDK reads, with members, receipt, fit and sign-off', async () => {
    const saved = await download(page, '#save');
    const station = readStation(saved);
    if (station.members.length < 2 || !station.receipt || !station.fit) throw new Error('something is missing');
    if (station.signedOff.by !== 'A. Hydrologist (invented)') throw new Error(JSON.stringify(station.signedOff));
    if (writeStation(station) !== saved) throw new Error('it does not write back as it was');
  });
  await tally.check('nothing was complained of, and nothing asked for elsewhere', () => {
    // the saved file has an address of the page's own, a date field its browser's picture
    const fetched = desk.elsewhere.filter((url) => !/^(blob|data):/.test(url));
    if (desk.complaints.length + fetched.length > 0) throw new Error([...desk.complaints, ...fetched].join('\n'));
  });
  await desk.close();
}

/** Presses a link that saves a file. @returns the file's text */
async function download(page, selector) {
  const folder = await mkdtemp(join(tmpdir(), 'rillage-desk-'));
  const protocol = await page.createCDPSession();
  const saved = new Promise((done, failed) => {
    protocol.on('Browser.downloadProgress', ({ state }) => {
      if (state === 'completed') done();
      if (state === 'canceled') failed(new Error('the download was cancelled'));
    });
  });
  await protocol.send('Browser.setDownloadBehavior', {
    behavior: 'allow',
    browserContextId: page.browserContext().id,
    downloadPath: folder,
    eventsEnabled: true,
  });
  try {
    await page.click(selector);
    await saved;
    const [name] = await readdir(folder);
    return await readFile(join(folder, name), 'utf8');
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}

async function waitFor(look, words) {
  const end = Date.now() + PATIENCE_MILLISECONDS;
  let text = '';
  while (Date.now() < end) {
    text = await look();
    if (words.test(text)) return;
    await new Promise((done) => setTimeout(done, 200));
  }
  throw new Error(`never showed ${words}; it showed: ${text.slice(-1500)}`);
}

/** Runs in the page: what a hand does to an element's fields and buttons, found by the words beside them. */
function addHands() {
  const words = (node) => node.textContent.replace(/\s+/g, ' ').trim();
  const inside = (host) => document.querySelector(host).shadowRoot;
  const one = (found, pattern) => {
    if (found === undefined) throw new Error(`nothing is called ${pattern}`);
    return found;
  };
  const field = (host, pattern) => {
    const label = [...inside(host).querySelectorAll('label')].find((each) => pattern.test(labelWords(each)));
    const own = one(label, pattern);
    return own.control ?? own.querySelector('input, select, textarea');
  };
  const labelWords = (label) => {
    const copy = label.cloneNode(true);
    for (const control of copy.querySelectorAll('select, option')) control.remove();
    return words(copy);
  };
  const regular = (source) => new RegExp(source);
  globalThis.hands = {
    fill(host, pattern, value) {
      const control = field(host, regular(pattern));
      control.value = value;
      if (control.localName === 'select' && control.value !== value) throw new Error(`no choice ${value}`);
      for (const type of ['input', 'change']) control.dispatchEvent(new Event(type, { bubbles: true, composed: true }));
    },
    tick(host, pattern, on) {
      const control = field(host, regular(pattern));
      if (control.checked !== on) control.click();
    },
    press(host, pattern) {
      const button = [...inside(host).querySelectorAll('button')].find((each) => regular(pattern).test(words(each)));
      one(button, pattern).click();
    },
    prior(host, name, numbers) {
      const group = [...inside(host).querySelectorAll('[role="group"]')].find((each) => each.ariaLabel === name);
      numbers.forEach((value, index) => {
        const control = one(group, name).querySelectorAll('input')[index];
        control.value = String(value);
        control.dispatchEvent(new Event('change', { bubbles: true }));
      });
    },
    count: (host, selector) => inside(host).querySelectorAll(selector).length,
    text: (host) => words(inside(host)),
  };
}
