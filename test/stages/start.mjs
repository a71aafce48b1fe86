import { at } from '../../demo-site/tools/paths.mjs';
import { contentSecurityPolicy } from '../../demo-site/policy.mjs';
import { integrityOf } from '../../demo-site/tools/library.mjs';
import { startSite } from '../journeys/site.mjs';
import { expectSuccess, runNode } from './tally.mjs';

/** The newcomer's command: prints a reading, serves the pages and says where. */
export async function start(tally) {
  await tally.check('npm start prints a reading', async () => {
    const printed = expectSuccess(await runNode(at('demo-site/start.mjs'), ['--no-serve'], { timeoutMs: 120_000 }));
    if (!/invented/i.test(printed)) throw new Error(`it does not say that the catchment is invented:\n${printed}`);
    if (!/\bolder\b|\byounger\b|\bdays\b|\bmonths?\b/i.test(printed) || /NaN|undefined/.test(printed))
      throw new Error(`no reading in:\n${printed}`);
    console.log(printed.trim().replace(/^/gm, '  | '));
  });
  await tally.check('npm start serves the site and says where', async () => {
    const site = await startSite();
    try {
      await checkSite(site.address);
    } finally {
      await site.stop();
    }
  });
}

async function checkSite(address) {
  const page = await fetch(address);
  const text = await page.text();
  if (page.status !== 200 || !/<title>/i.test(text)) throw new Error(`${address} answered ${page.status} and no page`);
  if (page.headers.get('content-security-policy') !== contentSecurityPolicy) throw new Error('the page came without the strict policy');
  const hashes = await (await fetch(new URL('lib/integrity.json', address))).json();
  for (const name of Object.keys(hashes)) {
    const answer = await fetch(new URL(`lib/${name}`, address));
    if (answer.status !== 200) throw new Error(`lib/${name} answered ${answer.status}`);
    await answer.arrayBuffer();
    if (integrityOf(at(`demo-site/public/lib/${name}`)) !== hashes[name]) throw new Error(`the hash of lib/${name} is another`);
  }
  const told = [...text.matchAll(/src="(?:\.?\/)?lib\/([\w.-]+)"[^>]*integrity="([^"]+)"/g)];
  for (const [, name, hash] of told) if (hashes[name] !== hash) throw new Error(`the page states an old hash of lib/${name}`);
}
