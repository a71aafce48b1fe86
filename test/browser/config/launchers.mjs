import { spawn } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';
import { chromeLauncher, puppeteerCore } from '@web/test-runner-chrome';
import { ensureEngine } from './find.mjs';

const webkitPort = 4455;

/** The test runner's launcher for one engine. */
export const launchers = {
  chromium: () =>
    chromeLauncher({
      concurrency: 1,
      launchOptions: { executablePath: ensureEngine('chromium'), headless: true, userDataDir: profile(), args: quietChromium },
    }),
  // Stock Firefox through WebDriver BiDi, which puppeteer-core speaks; no driver program is needed.
  firefox: () =>
    chromeLauncher({
      concurrency: 1,
      puppeteer: puppeteerCore,
      launchOptions: {
        browser: 'firefox',
        executablePath: ensureEngine('firefox'),
        headless: true,
        userDataDir: profile(),
        extraPrefsFirefox: quietFirefox,
      },
    }),
  webkit: async () => {
    const { webdriverLauncher } = await import('@web/test-runner-webdriver');
    return webdriverLauncher({
      protocol: 'http',
      hostname: '127.0.0.1',
      port: webkitPort,
      path: '/',
      logLevel: 'warn',
      connectionRetryCount: 5,
      capabilities: {
        browserName: 'MiniBrowser',
        'wdio:enforceWebDriverClassic': true,
        'webkitgtk:browserOptions': { binary: ensureEngine('webkit'), args: ['--automation'] },
      },
    });
  },
};

/** A display and WebKit's driver, alive as long as the runner. Ended by handle. */
export function webkitHost() {
  const children = [];
  const start = async (command, args, env) => {
    children.push(spawn(command, args, { stdio: 'ignore', env: { ...process.env, ...env } }));
    await wait(800);
  };
  return {
    name: 'webkit-host',
    async serverStart() {
      await start('Xvfb', [':97', '-screen', '0', '1280x900x24', '-nolisten', 'tcp'], {});
      await start('WebKitWebDriver', ['--host=127.0.0.1', `--port=${webkitPort}`], webkitEnvironment);
    },
    serverStop() {
      for (const child of children.reverse()) child.kill('SIGTERM');
    },
  };
}

const quietChromium = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
  '--disable-dev-shm-usage',
];

const quietFirefox = {
  'app.update.enabled': false,
  'datareporting.healthreport.uploadEnabled': false,
  'network.captive-portal-service.enabled': false,
  'network.connectivity-service.enabled': false,
};

const webkitEnvironment = {
  DISPLAY: ':97',
  LANG: 'C',
  LC_ALL: 'C',
  LIBGL_ALWAYS_SOFTWARE: '1',
  WEBKIT_DISABLE_COMPOSITING_MODE: '1',
  NO_AT_BRIDGE: '1',
};

/** A profile folder of its own for each browser, removed when the runner ends. */
function profile() {
  const folder = mkdtempSync(join(tmpdir(), 'rillage-browser-'));
  process.once('exit', () => rmSync(folder, { recursive: true, force: true, maxRetries: 3 }));
  return folder;
}
