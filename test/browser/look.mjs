/**
 * Pictures of the portal's pages to be looked at: wide, 360 and 320 px, light, dark, forced colours, print, other languages, large text.
 * `node test/browser/look.mjs [name …]` writes .cache/looks/*.png from the built site and, with --fixture, the fixture's station.
 */
import { mkdir, readFile } from 'node:fs/promises';
import puppeteer from 'puppeteer-core';
import { at } from '../../demo-site/tools/paths.mjs';
import { serveFolder } from '../../demo-site/tools/static-server.mjs';
import { findEngine } from './config/find.mjs';

const dark = [{ name: 'prefers-color-scheme', value: 'dark' }];
const forced = [{ name: 'forced-colors', value: 'active' }];
const pages = {
  list: 'index.html',
  chalk: 'stations/ambrel-spring.html',
  clay: 'stations/ottering-beck.html',
  dry: 'stations/tessen-sike.html',
  embed: 'embed.html',
};
/** One stream's page, and each other page in the six ways that matter most. */
const looks = {
  wide: { width: 1280 },
  'wide-dark': { width: 1280, features: dark },
  'phone-360': { width: 360 },
  'phone-360-dark': { width: 360, features: dark },
  'phone-320': { width: 320 },
  forced: { width: 900, features: forced },
  'forced-dark': { width: 900, features: [...forced, ...dark] },
  'reading-360': { width: 360, only: 'rillage-reading' },
  'reading-320-arabic': { width: 320, lang: 'ar', only: 'rillage-reading' },
  'plot-320': { width: 320, only: 'rillage-age-plot' },
  'plot-arabic': { width: 700, lang: 'ar', only: 'rillage-age-plot' },
  'plot-forced': { width: 700, features: forced, only: 'rillage-age-plot' },
  german: { width: 900, lang: 'de' },
  arabic: { width: 900, lang: 'ar' },
  'arabic-320': { width: 320, lang: 'ar' },
  'large-text': { width: 360, fontSize: '200%' },
  drops: { width: 900, only: 'rillage-age-plot', plot: { view: 'drops' } },
  density: { width: 900, only: 'rillage-age-plot', plot: { view: 'density' } },
  linear: { width: 900, only: 'rillage-age-plot', plot: { scale: 'linear' } },
  table: { width: 900, only: 'rillage-age-plot', plot: { table: true } },
  cursor: {
    width: 900,
    only: 'rillage-age-plot',
    keys: ['Home', 'ArrowRight', 'ArrowRight', 'ArrowRight', 'ArrowRight', 'ArrowRight', 'ArrowRight', 'ArrowRight', 'ArrowRight'],
  },
  bare: { width: 900, change: bare },
  withheld: { width: 900, change: withheld },
  compact: { width: 360, reading: { form: 'compact' } },
  stale: { width: 900, station: { staleAfter: '3' } },
  missing: { width: 900, change: () => null },
  'no-script': { width: 900, script: false },
  print: { width: 794, print: true },
};
for (const [name, page] of Object.entries(pages)) {
  Object.assign(looks, {
    [name]: { page, width: 1280 },
    [`${name}-dark`]: { page, width: 1280, features: dark },
    [`${name}-360`]: { page, width: 360 },
    [`${name}-360-dark`]: { page, width: 360, features: dark },
    [`${name}-print`]: { page, width: 794, print: true },
    [`${name}-no-script`]: { page, width: 900, script: false },
  });
}

const folder = at('.cache/looks');
await mkdir(folder, { recursive: true });
const server = await serveFolder(at('demo-site/public'), 0);
const browser = await puppeteer.launch({
  executablePath: findEngine('chromium'),
  args: [
    '--no-sandbox',
    '--disable-gpu',
    '--disable-quic',
    '--no-first-run',
    '--disable-background-networking',
    '--disable-sync',
    '--disable-dev-shm-usage',
  ],
});
const wanted = process.argv.slice(2).filter((name) => !name.startsWith('--'));
const fixture = process.argv.includes('--fixture');
try {
  for (const [name, look] of Object.entries(looks)) {
    if (wanted.length === 0 || wanted.includes(name)) await take(name, look);
  }
} finally {
  await browser.close();
  server.close();
  server.closeAllConnections();
}

async function take(name, look) {
  const context = await browser.createBrowserContext();
  const page = await context.newPage();
  page.on('console', (message) => ['error', 'warn'].includes(message.type()) && console.log(`${name}: ${message.text()}`));
  page.on('pageerror', (error) => console.log(`${name}: ${error.message}`));
  await page.setViewport({ width: look.width, height: 800, deviceScaleFactor: look.width < 500 ? 2 : 1 });
  await page.setJavaScriptEnabled(look.script !== false);
  await emulate(page, look.features ?? []);
  if (look.change || fixture) await answerWith(page, look.change ?? ((station) => station));
  await page.goto(`http://127.0.0.1:${server.address().port}/${look.page ?? 'stations/thessle-brook.html'}`, { waitUntil: 'networkidle0' });
  if (look.script !== false && !look.page) await page.evaluate(setUp, look);
  for (const key of look.keys ?? []) await page.keyboard.press(key);
  if (look.keys) await new Promise((settled) => setTimeout(settled, 300));
  if (look.print) await page.pdf({ path: `${folder}/${name}.pdf`, format: 'A4', printBackground: true });
  if (look.print) await page.emulateMediaType('print');
  const part = look.only ? await page.$(look.only) : null;
  await (part ?? page).screenshot({ path: `${folder}/${name}.png`, ...(part ? {} : { fullPage: true }) });
  const overflow =
    look.script === false ? 0 : await page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);
  console.log(`${name}: ${folder}/${name}.png${overflow > 0 ? `, ${overflow} px too wide` : ''}`);
  await context.close();
}

/** Runs in the page. */
async function setUp({ lang, fontSize, plot, reading, station, keys }) {
  if (lang) document.documentElement.lang = lang;
  if (lang === 'ar') document.documentElement.dir = 'rtl';
  if (fontSize) document.documentElement.style.fontSize = fontSize;
  Object.assign(document.querySelector('rillage-age-plot'), plot ?? {});
  Object.assign(document.querySelector('rillage-reading'), reading ?? {});
  Object.assign(document.querySelector('rillage-station'), station ?? {});
  await new Promise((settled) => setTimeout(settled, 500));
  if (keys) document.querySelector('rillage-age-plot').shadowRoot.querySelector('.picture').focus();
}

async function emulate(page, features) {
  const protocol = await page.createCDPSession();
  await protocol.send('Emulation.setEmulatedMedia', { media: '', features });
}

async function answerWith(page, change) {
  const station = JSON.parse(await readFile(at('test/fixtures/station.json'), 'utf8'));
  const body = change(station);
  await page.setRequestInterception(true);
  page.on('request', (request) => {
    if (!request.url().endsWith('/data/thessle-brook-public.json')) return request.continue();
    return request.respond(
      body ? { status: 200, contentType: 'application/json', body: JSON.stringify(body) } : { status: 404, body: 'not here' },
    );
  });
}

/** As from a single run: nothing assessed. */
function bare(station) {
  const { reading, distribution } = station;
  for (const younger of reading.younger) younger.range = null;
  reading.median.range = null;
  reading.olderThanRecord.range = null;
  Object.assign(reading, { confidence: 'notAssessed', confidenceBecause: [], sentences: [], sentence: '', trend: null });
  Object.assign(distribution, { low: null, high: null, preRecordRange: null });
  return station;
}

function withheld(station) {
  const sentence =
    'No age is given for 14 March 2025: the last bottle analysed is from August, and the record cannot carry a statement this far.';
  Object.assign(station.reading, {
    ...{ status: 'withheld', confidence: 'withheld', median: null, trend: null, sentence, sentences: [sentence] },
    withheld: [{ code: 'samplesTooOld', because: 'the last bottle analysed is from August' }],
  });
  return station;
}
