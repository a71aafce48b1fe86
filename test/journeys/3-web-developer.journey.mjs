import { createServer } from 'node:http';
import { readFile } from 'node:fs/promises';
import { integrityOf } from '../../demo-site/tools/library.mjs';
import { at } from '../../demo-site/tools/paths.mjs';

export const title = 'A web developer pastes the snippet into a page of their own';

/** Reads the embed page, tries its controls, copies two lines and a header, and serves them from another server. */
export async function walk({ tally, site, browser }) {
  const embed = await browser.open(new URL('embed.html', site.address).href);
  const { page } = embed;
  const textOf = (selector) => page.$eval(selector, (element) => element.textContent.trim());

  const [header, ...value] = (await textOf('#policy-header')).split(': ');
  const policy = value.join(': ');
  await tally.check('the header to paste is the one the page itself came with', () => {
    if (header !== 'Content-Security-Policy' || embed.response.headers()['content-security-policy'] !== policy)
      throw new Error(`${header}: ${policy}`);
  });
  await tally.check('hashes and sizes are those of the files', async () => {
    const rows = await page.$$eval('#files ~ .wide tbody tr', (all) => all.map((row) => [...row.children].map((cell) => cell.textContent)));
    if (rows.length < 4) throw new Error(`${rows.length} rows`);
    for (const [name, , kb, , hash] of rows) {
      const path = at(`demo-site/public/lib/${name}`);
      if (hash !== integrityOf(path)) throw new Error(`${name} has another hash`);
      if (kb !== ((await readFile(path)).length / 1000).toFixed(1)) throw new Error(`${name} has another size than ${kb} kB`);
    }
  });

  await tally.check('a control changes snippet and result alike: length and language', async () => {
    await embed.until(/About .* fell as rain/, '#demo-reading .live');
    if (/What it rests on/.test(await embed.shown('#demo-reading .live'))) throw new Error('compact shows more than it should');
    await page.select('#demo-reading select[data-sets="form"]', '');
    await embed.until(/What it rests on/, '#demo-reading .live');
    if (/form=/.test(await textOf('#demo-reading .snippet'))) throw new Error('the snippet states a default');
    await page.select('#demo-reading select[data-sets="lang"]', 'de');
    await embed.until(/Liter/, '#demo-reading .live');
    await embed.until(/lang="de"/, '#demo-reading .snippet');
  });
  await tally.check('… stream, and the age of the data', async () => {
    await page.select('#demo-reading select[data-sets="lang"]', '');
    await page.select('#demo-reading select[data-sets="src"]', './data/tessen-sike-public.json');
    await embed.until(/No age is given for/, '#demo-reading .live');
    await embed.until(/src="\/water\/tessen-sike-public\.json"/, '#demo-reading .snippet');
    await page.select('#demo-reading select[data-sets="stale-after"]', '');
    await embed.until(/These data are old/, '#demo-reading .live');
  });
  await tally.check('… the picture’s view, also by the picture’s own button', async () => {
    await page.select('#demo-picture select[data-sets="view"]', 'drops');
    await embed.until(/view="drops"/, '#demo-picture .snippet');
    await page.$eval('#demo-picture rillage-age-plot', (plot) =>
      [...plot.shadowRoot.querySelectorAll('button')].find((button) => button.textContent.trim() === 'By age').click(),
    );
    await embed.until(/view="density"/, '#demo-picture .snippet');
    const chosen = await page.$eval('#demo-picture select[data-sets="view"]', (select) => select.value);
    if (chosen !== 'density') throw new Error(`the control stays at ${chosen}`);
  });
  await tally.check('… colours, as the browser computes them', async () => {
    await page.select('#look', 'look-slate');
    const ink = await page.$eval(
      '#demo-colours rillage-reading',
      (element) => getComputedStyle(element.shadowRoot.querySelector('.sentence')).color,
    );
    if (ink !== 'rgb(242, 239, 230)') throw new Error(ink);
    await embed.until(/--rillage-ink: (#f2efe6|rgb\(242, 239, 230\))/, '#demo-colours .snippet');
  });
  await tally.check('… words', async () => {
    await page.$eval('#date-words', (field) => {
      field.value = 'As it was on {date}';
      field.dispatchEvent(new Event('input'));
    });
    await embed.until(/As it was on 31 March 2025/, '#demo-words .live');
    await embed.until(/'As it was on \{date\}'/, '#demo-words .snippet');
  });
  await tally.check('… events, of a dry stream', async () => {
    await page.click('#demo-events button[data-src*="tessen"]');
    await embed.until(/withheld, data to 2025-04-01/, '#said');
  });
  await tally.check('… and tags under a prefix of their own', async () => {
    await embed.until(/Nothing has defined these tags yet/, '#prefixed');
    await page.click('#define');
    await embed.until(/About .* fell as rain/, '#prefixed');
    await embed.until(/defineAll\(\{ prefix: 'office' \}\)/, '#demo-prefix .snippet');
  });
  await tally.check('every element is described, attribute by attribute', async () => {
    const { modules } = JSON.parse(await readFile(at('packages/elements/custom-elements.json'), 'utf8'));
    const tags = modules.flatMap(({ declarations }) => declarations.map(({ tagName }) => tagName)).filter(Boolean);
    for (const tag of tags)
      await page.$eval(`details#${tag}`, (details) => details.querySelectorAll('dt').length > 0 || Promise.reject(new Error('empty')));
  });
  // A second definition of a prefix warns by design; nothing here defines one twice.
  await tally.check('the embed page breaks no rule of its own policy', () => {
    if (embed.complaints.length > 0) throw new Error(embed.complaints.join('\n'));
  });

  await tally.check('an address without a file is said in words, and the page’s own stay', async () => {
    await page.click('#demo-events button[data-src*="no-such"]');
    await embed.until(/there is no file at this address.*Call the office/, '#demo-events .live');
  });

  const [script, tag] = (await textOf('#two-lines')).split('\n');
  const own = await serveOwnPage(
    `<!doctype html><html lang="en"><head><title>Own page</title>${script}</head><body>${tag}</body></html>`,
    policy,
  );
  try {
    const visit = await browser.open(own.address);
    await tally.check('the two lines work in an empty page on another server, under the header alone', async () => {
      await visit.until(/Thessle Brook at Marrowgate.*About .* fell as rain within the last 30 days \(likely between/);
      await visit.until(/not a basis for drinking-water/);
    });
    await tally.check('the old record looks old there, as it must', () => visit.until(/These data are old: they end on/));
    await tally.check('nothing is fetched from elsewhere and nothing complains', () => {
      const wrong = [...visit.elsewhere, ...visit.complaints];
      if (wrong.length > 0) throw new Error(wrong.join('\n'));
    });
    await visit.close();

    own.spoilLibrary();
    const spoilt = await browser.open(own.address);
    await tally.check('a file that is not the one of the hash is refused, and the page’s own words stand', async () => {
      await spoilt.until(/^Call the office\.$/);
      if (!spoilt.complaints.some((each) => /integrity/.test(each))) throw new Error(spoilt.complaints.join('\n') || 'no complaint');
    });
    await spoilt.close();
  } finally {
    await own.stop();
    await embed.close();
  }
}

/** The developer's own server: an empty page with the two lines, the library and the data copied where the lines say. */
async function serveOwnPage(html, policy) {
  let spoilt = false;
  const server = createServer(async (request, response) => {
    const { pathname } = new URL(request.url, 'http://localhost');
    const [, folder, name] = /^\/(lib|water)\/([\w.-]+)$/.exec(pathname) ?? [];
    if (pathname === '/') {
      response.writeHead(200, { 'Content-Type': 'text/html; charset=utf-8', 'Content-Security-Policy': policy });
      return response.end(html);
    }
    const body = name ? await readFile(at(`demo-site/public/${folder === 'lib' ? 'lib' : 'data'}/${name}`)).catch(() => null) : null;
    // Browsers ask for an icon that nobody named.
    if (!body) return response.writeHead(pathname === '/favicon.ico' ? 204 : 404).end();
    response.writeHead(200, { 'Content-Type': folder === 'lib' ? 'text/javascript' : 'application/json' });
    return response.end(spoilt && folder === 'lib' ? `${body}\n// changed on its way` : body);
  });
  await new Promise((settle) => server.listen(0, '127.0.0.1', settle));
  return {
    address: `http://localhost:${server.address().port}/`,
    spoilLibrary: () => (spoilt = true),
    stop: () =>
      new Promise((settle) => {
        server.close(settle);
        server.closeAllConnections();
      }),
  };
}
