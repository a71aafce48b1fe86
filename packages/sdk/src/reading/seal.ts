import { sha256Hex } from '../numeric/hash.js';
import { canonicalJson } from './canonicalJson.js';

/**
 * A station's or an excerpt's content with its seal: sha-256, in hex, of the UTF-8 bytes of the canonical JSON of everything else. It shows
 * damage and careless edits; it is no signature, since anyone can compute it. It is made when first looked at, such as by writing the file: a
 * morning's work on many members would else be mostly hashing.
 */
export function seal<Content extends object>(content: Content): Content & { seal: string } {
  let made: string | undefined;
  const get = (): string => (made ??= sealOf(content));
  return Object.defineProperty({ ...content } as Content & { seal: string }, 'seal', { enumerable: true, configurable: true, get });
}

/** The seal that the content should carry; a `seal` in it is left out of account. */
export function sealOf(content: object): string {
  return sha256Hex(new TextEncoder().encode(canonicalJson(withoutSeal(content))));
}

/** The content alone; its seal is not looked at. */
export function withoutSeal<Content extends object>(sealed: Content): Omit<Content, 'seal'> {
  const content = Object.entries(Object.getOwnPropertyDescriptors(sealed)).filter(([key]) => key !== 'seal');
  return Object.defineProperties({}, Object.fromEntries(content)) as Omit<Content, 'seal'>;
}
