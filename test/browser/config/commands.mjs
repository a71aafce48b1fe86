import { mkdir } from 'node:fs/promises';
import { dirname } from 'node:path';
import { at } from '../../../demo-site/tools/paths.mjs';

/**
 * `executeServerCommand('emulate', { features: [{ name: 'forced-colors', value: 'active' }], media: 'print' })`: any media feature, through
 * Chromium's own protocol; an empty payload resets. Answers `{ done: false }` in other engines.
 */
export function emulateCommand() {
  // Media emulated in one protocol session are not reset from another, so a page keeps its session.
  const protocols = new WeakMap();
  const protocolOf = async (page) => {
    if (!protocols.has(page)) protocols.set(page, await page.createCDPSession());
    return protocols.get(page);
  };
  return {
    name: 'rillage-emulate',
    async executeCommand({ command, payload, session }) {
      if (command !== 'emulate') return undefined;
      if (!isChromium(session)) return { done: false };
      const protocol = await protocolOf(session.browser.getPage(session.id));
      await protocol.send('Emulation.setEmulatedMedia', { media: payload?.media ?? '', features: payload?.features ?? [] });
      return { done: true };
    },
  };
}

/** `executeServerCommand('viewport', { width: 320, height: 640 })`. Answers `{ done: false }` in WebKit, whose window stays as it is. */
export function viewportCommand() {
  return {
    name: 'rillage-viewport',
    async executeCommand({ command, payload, session }) {
      if (command !== 'viewport') return undefined;
      if (!session.browser.getPage) return { done: false };
      await session.browser.getPage(session.id).setViewport(payload);
      return { done: true };
    },
  };
}

/** `executeServerCommand('screenshot', { name: 'reading-dark' })` writes .cache/screenshots/reading-dark.png, to be looked at. */
export function screenshotCommand() {
  return {
    name: 'rillage-screenshot',
    async executeCommand({ command, payload, session }) {
      if (command !== 'screenshot') return undefined;
      if (!/^[\w-]+$/.test(payload?.name ?? '')) throw new Error("screenshot takes { name } of letters, digits, '-' and '_'");
      if (!session.browser.getPage) return { done: false };
      const path = at(`.cache/screenshots/${payload.name}.png`);
      await mkdir(dirname(path), { recursive: true });
      await session.browser.getPage(session.id).screenshot({ path, fullPage: true });
      return { done: true };
    },
  };
}

function isChromium({ browser }) {
  return Boolean(browser.getPage) && !browser.name?.toLowerCase().includes('firefox');
}
