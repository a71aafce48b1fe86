import { executeServerCommand } from '@web/test-runner-commands';

/** A media feature and its value, such as `{ name: 'prefers-color-scheme', value: 'dark' }` or `{ name: 'forced-colors', value: 'active' }`. */
export interface MediaFeature {
  name: string;
  value: string;
}

/**
 * Emulates media, until called again; `emulate()` resets. Chromium only.
 * @returns false in an engine that cannot
 */
export function emulate(features: MediaFeature[] = [], media: '' | 'print' | 'screen' = ''): Promise<boolean> {
  return done('emulate', { features, media });
}

/**
 * Sets the size of the page, until the end of the test file.
 * @returns false in an engine that cannot (WebKit)
 */
export function viewport(width: number, height = 800): Promise<boolean> {
  return done('viewport', { width, height });
}

/** Writes .cache/screenshots/NAME.png of the whole page, to be looked at. */
export function screenshot(name: string): Promise<boolean> {
  return done('screenshot', { name });
}

async function done(command: string, payload: object): Promise<boolean> {
  return (await executeServerCommand<{ done: boolean }, object>(command, payload)).done;
}
