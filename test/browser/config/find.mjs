import { spawnSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { delimiter, join } from 'node:path';

/** What each engine needs on this machine, and the Debian packages that bring it. */
const engines = {
  chromium: {
    variable: 'CHROME_PATH',
    names: ['chromium', 'chromium-browser', 'google-chrome', 'google-chrome-stable', 'chrome'],
    paths: ['/Applications/Google Chrome.app/Contents/MacOS/Google Chrome', '/Applications/Chromium.app/Contents/MacOS/Chromium'],
    packages: ['chromium'],
  },
  firefox: {
    variable: 'FIREFOX_PATH',
    names: ['firefox-esr', 'firefox'],
    paths: ['/Applications/Firefox.app/Contents/MacOS/firefox'],
    packages: ['firefox-esr'],
  },
  webkit: {
    variable: 'WEBKIT_PATH',
    names: ['MiniBrowser'],
    paths: ['x86_64', 'aarch64'].map((machine) => `/usr/lib/${machine}-linux-gnu/webkit2gtk-4.1/MiniBrowser`),
    also: ['WebKitWebDriver', 'Xvfb'],
    packages: ['webkit2gtk-driver', 'xvfb'],
  },
};

/** The engines to test in: BROWSERS, a list with commas, or Chromium. */
export function enginesWanted() {
  const asked = (process.env.BROWSERS ?? 'chromium').split(',').map((name) => name.trim());
  for (const name of asked) {
    if (!(name in engines)) throw new Error(`BROWSERS names '${name}'; known: ${Object.keys(engines).join(', ')}`);
  }
  return asked;
}

/** The engine's executable, or undefined where it, or a program it is driven with, is not installed. */
export function findEngine(name) {
  const { variable, names, paths, also = [] } = engines[name];
  if (also.some((each) => onPath(each) === undefined)) return undefined;
  const given = process.env[variable];
  if (given) return existsSync(given) ? given : undefined;
  return names.map(onPath).find((path) => path !== undefined) ?? paths.find((path) => existsSync(path));
}

/**
 * The engine's executable; installed first where it is missing, this is Debian and this is root.
 * @throws Error that says exactly what to install
 */
export function ensureEngine(name) {
  const { variable, packages } = engines[name];
  const found = findEngine(name);
  if (found) return found;
  const install = `apt-get update && apt-get install -y --no-install-recommends ${packages.join(' ')}`;
  const byHand = `${name} was not found. On Debian, as root: ${install}. Elsewhere install it and set ${variable} to its executable.`;
  if (process.getuid?.() !== 0 || onPath('apt-get') === undefined) throw new Error(byHand);
  console.log(`${name} was not found; installing Debian's: ${packages.join(' ')}`);
  const { status } = spawnSync('sh', ['-c', install], {
    stdio: ['ignore', 'inherit', 'inherit'],
    env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' },
    timeout: 300_000,
  });
  const installed = status === 0 ? findEngine(name) : undefined;
  if (!installed) throw new Error(`installing failed. ${byHand}`);
  return installed;
}

function onPath(name) {
  return (process.env.PATH ?? '')
    .split(delimiter)
    .map((folder) => join(folder, name))
    .find((path) => existsSync(path));
}
