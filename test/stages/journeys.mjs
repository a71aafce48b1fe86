import { readdirSync } from 'node:fs';
import { pathToFileURL } from 'node:url';
import { at } from '../../demo-site/tools/paths.mjs';
import { ensureEngine } from '../browser/config/find.mjs';
import { openBrowser } from '../journeys/browser.mjs';
import { startSite } from '../journeys/site.mjs';

/**
 * Whole journeys through the site as `npm start` serves it, in a real browser: every test/journeys/*.journey.mjs, in order of name. A journey
 * exports `title` and `walk({ tally, site, browser })`; it counts one check for each thing a person would notice.
 */
export async function journeys(tally) {
  let browser;
  let site;
  try {
    await tally.check('chromium is installed', () => void ensureEngine('chromium'));
    await tally.check('npm start serves the site', async () => void (site = await startSite()));
    if (!site) return;
    browser = await openBrowser();
    for (const name of readdirSync(at('test/journeys'))
      .filter((each) => each.endsWith('.journey.mjs'))
      .sort()) {
      const { title, walk } = await import(pathToFileURL(at(`test/journeys/${name}`)).href);
      console.log(`  ${title}`);
      await walk({ tally, site, browser }).catch((reason) => tally.fail(title, reason instanceof Error ? reason.message : String(reason)));
    }
  } finally {
    await browser?.close();
    await site?.stop();
  }
}
