import { contentSecurityPolicy } from '../../demo-site/policy.mjs';

export const title = 'A person reads a stream’s age on the portal';

/** From the list to the stream's own page, by keyboard; then the same without scripts, on a phone's width, and without a network. */
export async function walk({ tally, site, browser }) {
  const sentence = firstSentence(site.printed);

  const visit = await browser.open(site.address);
  await tally.check(
    'the portal comes under the strict policy',
    () => visit.response.headers()['content-security-policy'] === contentSecurityPolicy,
  );
  await tally.check('the list says the reading that npm start printed, with its range', () =>
    visit.until(escaped(sentence), '#streams li'),
  );
  await tally.check('every stream says an age, or that none is given and why', async () => {
    for (const item of await visit.page.$$('#streams li')) {
      const id = await item.$eval('a', (link) => link.pathname);
      await visit.until(
        /fell as rain within the last|No age is given for .*: there was no outflow/,
        `#streams li:has(a[href$="${id.split('/').at(-1)}"])`,
      );
    }
  });
  await tally.check('no number stands without its range or the word that it was not assessed', async () => {
    const text = await visit.shown('#streams');
    const shares = text.match(/(litres? in 100?|Half of the water is older)[^.;]*[.;]/g) ?? [];
    const bare = shares.filter((share) => !/likely|range not assessed|older than \S+ to \S+/.test(share));
    if (shares.length < 6 || bare.length > 0) throw new Error(`${shares.length} shares; without a range: ${bare.join(' | ')}`);
  });
  await tally.check('the page says that all is invented, and what it must not be used for', async () => {
    await visit.until(/invented/);
    await visit.until(/not a basis for drinking-water, bathing or emergency decisions/);
  });

  await tally.check('the first stream is reached by keyboard alone', async () => {
    for (let press = 0; press < 10; press += 1) {
      await visit.page.keyboard.press('Tab');
      if (await visit.page.evaluate(() => document.activeElement.closest('#streams') !== null)) break;
    }
    await Promise.all([visit.page.waitForNavigation({ waitUntil: 'networkidle0' }), visit.page.keyboard.press('Enter')]);
    if (!visit.page.url().endsWith('/stations/thessle-brook.html')) throw new Error(`it led to ${visit.page.url()}`);
  });
  await tally.check('its page says the same sentence, the date, the record, the samples and the caution', async () => {
    for (const words of [
      escaped(sentence),
      /Data to the end of 31 March 2025/,
      /1 April 2015 to 31 March 2025/,
      /\d+ water samples|Samples \d+/,
      /not a basis for/,
    ])
      await visit.until(words);
  });
  await tally.check('the ages and the flow by age are drawn, and said in words', async () => {
    await visit.until(/How old the water in the stream is.*Half of the water is older than/, 'rillage-age-plot');
    await visit.until(/The flow of the stream by the age of its water/, 'rillage-age-history');
    for (const tag of ['rillage-age-plot', 'rillage-age-history']) {
      const paths = await visit.page.$eval(tag, (element) => element.shadowRoot.querySelectorAll('path').length);
      if (paths < 5) throw new Error(`${tag} has ${paths} paths`);
    }
  });
  await tally.check('the page loads the excerpt, never the station’s file, and nothing from elsewhere', async () => {
    const loaded = await visit.page.evaluate(() => performance.getEntriesByType('resource').map(({ name }) => new URL(name).pathname));
    if (!loaded.includes('/data/thessle-brook-public.json') || loaded.includes('/data/thessle-brook.json'))
      throw new Error(loaded.join(' '));
    if (visit.elsewhere.length > 0) throw new Error(visit.elsewhere.join(' '));
  });
  await tally.check('nothing complained', () => {
    if (visit.complaints.length > 0) throw new Error(visit.complaints.join('\n'));
  });

  await tally.check('without a network the page left open reads on, from its copy, and says so', async () => {
    await visit.page.setOfflineMode(true);
    await visit.page.$eval('rillage-station', (station) => station.reload());
    await visit.until(/No connection\. Shown is the copy kept on/);
    await visit.until(escaped(sentence));
  });
  await visit.close();

  const plain = await browser.open(site.address, { scripts: false });
  await tally.check('without scripts it is a list of links that work', async () => {
    const links = await plain.page.$$eval('#streams h2 a', (all) => all.map((link) => link.href));
    if (links.length < 4) throw new Error(`${links.length} links`);
    for (const link of links) if ((await fetch(link)).status !== 200) throw new Error(`${link} is not there`);
  });
  await plain.close();

  for (const path of ['', 'stations/thessle-brook.html', 'stations/tessen-sike.html', 'embed.html']) {
    const read = await browser.open(new URL(path, site.address).href);
    await tally.check(`axe finds nothing wrong with ${path || 'the list'}, by day and by night`, async () => {
      for (const value of ['light', 'dark']) {
        await read.page.emulateMediaFeatures([{ name: 'prefers-color-scheme', value }]);
        await read.expectAccessible();
      }
    });
    await read.close();
  }

  const phone = await browser.open(site.address, { width: 320 });
  await tally.check('nothing is wider than a phone of 320 px', async () => {
    await phone.until(escaped(sentence));
    for (const path of ['', 'stations/thessle-brook.html', 'stations/tessen-sike.html', 'embed.html']) {
      await phone.page.goto(new URL(path, site.address).href, { waitUntil: 'networkidle0' });
      const over = await phone.page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);
      if (over > 0) throw new Error(`${path || 'the list'} is ${over} px too wide`);
    }
  });
  await phone.close();
}

/** The terminal wraps; a page does not. */
function firstSentence(printed) {
  const found = /About [^.]*fell as rain within\s+the\s+last[^.]*\./.exec(printed.replace(/\s+/g, ' '))?.[0];
  if (!found) throw new Error(`npm start printed no sentence:\n${printed}`);
  return found;
}

const escaped = (text) => new RegExp(text.replace(/[.*+?^${}()|[\]\\]/g, '\\$&'));
