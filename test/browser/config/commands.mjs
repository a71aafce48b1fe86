import { mkdir } from 'node:fs/promises';
import { dirname } from 'node:path';
import { at } from '../../../demo-site/tools/paths.mjs';

/**
 * `executeCommand('emulate', { features: [{ name: 'forced-colors', value: 'active' }], media: 'print' })`: any media feature, through
 * Chromium's own protocol; undefined payload resets. Returns false in other engines.
 */
export function emulateCommand() {
  return {
    name: 'rillage-emulate',
    async executeCommand({ command, payload, session }) {
      if (command !== 'emulate') return undefined;
      if (session.browser.name?.toLowerCase().includes('firefox') || !session.browser.getPage) return { done: false };
      const protocol = await session.browser.getPage(session.id).createCDPSession();
      await protocol.send('Emulation.setEmulatedMedia', { media: payload?.media ?? '', features: payload?.features ?? [] });
      return { done: true };
    },
  };
}

/** `executeCommand('screenshot', { name: 'reading-dark' })` writes .cache/screenshots/reading-dark.png, to be looked at. */
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
