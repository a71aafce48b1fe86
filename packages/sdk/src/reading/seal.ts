import { sha256Hex } from '../numeric/hash.js';
import { canonicalJson } from './canonicalJson.js';

/**
 * A station's or an excerpt's content with its seal: sha-256, in hex, of the UTF-8 bytes of the canonical JSON of everything else. It shows damage and careless
 * edits; it is no signature, since anyone can compute it.
 */
export function seal<Content extends object>(content: Content): Content & { seal: string } {
  return { ...content, seal: sealOf(content) };
}

/** The seal that the content should carry; a `seal` in it is left out of account. */
export function sealOf(content: object): string {
  const { seal: _ignored, ...rest } = content as Record<string, unknown>;
  return sha256Hex(new TextEncoder().encode(canonicalJson(rest)));
}
