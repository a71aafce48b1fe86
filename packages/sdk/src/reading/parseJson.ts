import { RillageError } from '../errors.js';

const MEGABYTE = 1_000_000;
/** Keys that could reach an object's prototype when a host copies the data carelessly. */
const FORBIDDEN_KEYS = ['__proto__', 'constructor', 'prototype'];
const DEEPEST = 64;

export interface ParseOptions {
  /** What the text should be, for messages: `a station`. */
  what: string;
  /** Bytes; longer texts are refused unread. Default 20 MB. */
  maxBytes?: number;
}

export const DEFAULT_MAX_BYTES = 20 * MEGABYTE;

/**
 * JSON from outside as plain data, in time linear in its length.
 * @throws RillageError 'not-text', 'too-large', 'empty-file', 'html-instead', 'truncated', 'not-json', 'too-deep', 'forbidden-key'
 */
export function parseJson(text: unknown, { what, maxBytes = DEFAULT_MAX_BYTES }: ParseOptions): unknown {
  if (typeof text !== 'string') throw new RillageError({ code: 'not-text', expected: `the text of ${what}`, received: typeof text });
  // A UTF-16 code unit is at least one byte of UTF-8, so the length is a cheap first bound; only short texts are counted exactly.
  if (text.length > maxBytes || (text.length > maxBytes / 3 && utf8Bytes(text) > maxBytes)) {
    throw new RillageError({
      code: 'too-large',
      expected: `${what} of at most ${maxBytes / MEGABYTE} MB`,
      received: `${(text.length / MEGABYTE).toFixed(1)} million characters`,
      hint: 'If the file is right, pass a higher maxBytes.',
    });
  }
  const body = text.charCodeAt(0) === 0xfeff ? text.slice(1) : text;
  const first = body.trimStart().slice(0, 200);
  if (first === '')
    throw new RillageError({ code: 'empty-file', expected: what, received: 'nothing', hint: 'The file or the answer is empty.' });
  if (first.startsWith('<')) {
    throw new RillageError({
      code: 'html-instead',
      expected: `${what} in JSON`,
      received: first.slice(0, 60),
      hint: 'The server answered with a page, often its error or login page; check the address.',
    });
  }
  let value: unknown;
  try {
    value = JSON.parse(body);
  } catch (cause) {
    const truncated = endsInside(body);
    throw new RillageError(
      truncated
        ? {
            code: 'truncated',
            expected: `all of ${what}`,
            received: `${body.length} characters that end in the middle`,
            hint: 'Fetch or copy the file again.',
          }
        : { code: 'not-json', expected: `${what} in JSON`, received: first.slice(0, 60) },
      { cause },
    );
  }
  refuseKeys(value, what);
  return value;
}

/** Whether a text stops before its outermost bracket closes; true for every cut that leaves at least the opening one. */
function endsInside(text: string): boolean {
  let depth = 0;
  let inString = false;
  for (let i = 0; i < text.length; i += 1) {
    const code = text.charCodeAt(i);
    if (inString) {
      if (code === 0x5c) i += 1;
      else if (code === 0x22) inString = false;
    } else if (code === 0x22) inString = true;
    else if (code === 0x7b || code === 0x5b) depth += 1;
    else if (code === 0x7d || code === 0x5d) {
      depth -= 1;
      if (depth <= 0) return false;
    }
  }
  return inString || depth > 0;
}

function refuseKeys(root: unknown, what: string): void {
  const waiting: { value: unknown; depth: number }[] = [{ value: root, depth: 0 }];
  for (let next = waiting.pop(); next; next = waiting.pop()) {
    const { value, depth } = next;
    if (typeof value !== 'object' || value === null) continue;
    if (depth > DEEPEST) throw new RillageError({ code: 'too-deep', expected: `${what} with at most ${DEEPEST} levels`, received: 'more' });
    if (Array.isArray(value)) {
      for (const item of value) if (typeof item === 'object' && item !== null) waiting.push({ value: item, depth: depth + 1 });
      continue;
    }
    for (const key of Object.keys(value)) {
      if (FORBIDDEN_KEYS.includes(key)) {
        throw new RillageError({
          code: 'forbidden-key',
          path: key,
          expected: `${what} without that key`,
          received: key,
          hint: 'Such a key is never written; do not use this file.',
        });
      }
      waiting.push({ value: (value as Record<string, unknown>)[key], depth: depth + 1 });
    }
  }
}

function utf8Bytes(text: string): number {
  return new TextEncoder().encode(text).length;
}
