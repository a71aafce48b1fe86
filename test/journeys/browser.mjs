import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import puppeteer from 'puppeteer-core';
import { at } from '../../demo-site/tools/paths.mjs';
import { ensureEngine } from '../browser/config/find.mjs';

const quiet = ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking', '--disable-sync'];

/** Chromium with a profile of its own. @returns `open(url, options?)`, `close()` */
export async function openBrowser() {
  const userDataDir = mkdtempSync(join(tmpdir(), 'rillage-journey-'));
  const browser = await puppeteer.launch({
    executablePath: ensureEngine('chromium'),
    userDataDir,
    args: [...quiet, '--disable-component-update', '--disable-dev-shm-usage'],
  });
  return {
    open: (url, options) => openPage(browser, url, options),
    async close() {
      await browser.close();
      rmSync(userDataDir, { recursive: true, force: true, maxRetries: 3 });
    },
  };
}

/**
 * A page of a new visitor: nothing kept, nothing known.
 * @param options `scripts: false` for a browser without them; `width`, px
 * @returns `page` (puppeteer's), `response`, `complaints` (errors, refused rules, failed requests), `shown()`, `until()`,
 *          `expectAccessible()`, `close()`
 */
async function openPage(browser, url, { scripts = true, width = 1100 } = {}) {
  const context = await browser.createBrowserContext();
  const page = await context.newPage();
  const complaints = [];
  page.on('console', (message) => ['error', 'warn'].includes(message.type()) && complaints.push(message.text()));
  page.on('pageerror', (error) => complaints.push(error.message));
  page.on('requestfailed', (request) => {
    const why = request.failure()?.errorText;
    // Chromium's word for a request that the page gave up, or whose answer (304) has nothing left to read.
    if (why !== 'net::ERR_ABORTED') complaints.push(`${request.url()} ${why}`);
  });
  const elsewhere = [];
  page.on('request', (request) => {
    if (new URL(request.url()).host !== new URL(url).host) elsewhere.push(request.url());
  });
  await page.setViewport({ width, height: 900 });
  await page.setJavaScriptEnabled(scripts);
  const response = await page.goto(url, { waitUntil: 'networkidle0' });
  const shown = (selector = 'body') => page.$eval(selector, shownText);
  /** Waits until what is shown fits, within ten seconds. @returns it */
  const until = async (words, selector = 'body') => {
    const end = Date.now() + 10_000;
    for (;;) {
      const text = await shown(selector);
      if (words.test(text)) return text;
      if (Date.now() > end) throw new Error(`${selector} never showed ${words}; it showed: ${text.slice(0, 600)}`);
      await new Promise((done) => setTimeout(done, 50));
    }
  };
  return {
    page,
    response,
    complaints,
    elsewhere,
    shown,
    until,
    expectAccessible: () => expectAccessible(page),
    close: () => context.close(),
  };
}

/** Fails where axe finds anything wrong with the page, shadow trees included: WCAG 2.2 A and AA and good practice. The policy does not bind the protocol. */
async function expectAccessible(page) {
  await page.evaluate(readFileSync(at('node_modules/axe-core/axe.min.js'), 'utf8'));
  const found = await page.evaluate(async () => {
    const { violations } = await globalThis.axe.run(document, { resultTypes: ['violations'] });
    return violations.map(({ id, help, nodes }) => `${id}: ${help}: ${nodes.map(({ target }) => target.join(' ')).join(', ')}`);
  });
  if (found.length > 0) throw new Error(found.join('\n'));
}

/** Runs in the page: the text a reader sees, through shadow trees and slots. */
function shownText(root) {
  const textOf = (node) => {
    if (node.nodeType === 3) return node.data;
    if (node.nodeType !== 1 || ['script', 'style', 'noscript'].includes(node.localName)) return '';
    // A slot has no box of its own and counts as invisible.
    if (node.localName !== 'slot' && !node.checkVisibility()) return '';
    const inside = node.localName === 'slot' ? node.assignedNodes() : [...(node.shadowRoot ?? node).childNodes];
    return inside.map(textOf).join(' ');
  };
  return textOf(root).replace(/\s+/g, ' ').trim();
}
