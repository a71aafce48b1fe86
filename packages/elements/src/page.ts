import { defined, defineWithPrefix } from './shared/define.js';
import { everySpeakerReads } from './shared/language.js';
import { putMessages, type Messages } from './shared/messages.js';

/**
 * Defines every element of the file or package it came with under a prefix of the page's own, where `rillage-` is taken, such as by another
 * copy: `defineAll({ prefix: 'agency' })` gives `agency-station` and so on. A tag that is taken is left as it is, with a warning. Under
 * `rillage-` itself the import has defined them.
 * @returns the tags that this call defined
 */
export function defineAll({ prefix = 'rillage' }: { prefix?: string } = {}): string[] {
  return prefix === 'rillage' ? [] : defineWithPrefix(prefix, Object.fromEntries(defined));
}

/** Replaces single messages of a language, or brings a whole one; everything on the page follows. */
export function addMessages(language: string, messages: Messages): void {
  putMessages(language, messages);
  everySpeakerReads();
}
