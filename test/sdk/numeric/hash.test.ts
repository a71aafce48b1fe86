import { createHash } from 'node:crypto';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { sha256Hex } from '../../../packages/sdk/src/numeric/hash.js';

const bytes = (text: string): Uint8Array => new TextEncoder().encode(text);

/** Vectors of the FIPS 180-4 example files of NIST (from memory; node:crypto below confirms them). */
const published: [string, string][] = [
  ['', 'e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855'],
  ['abc', 'ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad'],
  ['abcdbcdecdefdefgefghfghighijhijkijkljklmklmnlmnomnopnopq', '248d6a61d20638b8e5c026930c3e6039a33ce45964ff2167f6ecedd419db06c1'],
  ['a'.repeat(1_000_000), 'cdc76e5c9914fb9281a1c7e284d73e67f1809a48a497200e046d39ccc7112cd0'],
];

describe('sha256Hex(bytes)', () => {
  test.each(published)('sha256Hex of a published message (%#)', (message, digest) => {
    expect(sha256Hex(bytes(message))).toBe(digest);
  });

  test('sha256Hex is that of node:crypto for every length around the block and for random bytes', () => {
    const check = (message: Uint8Array): void => {
      expect(sha256Hex(message)).toBe(createHash('sha256').update(message).digest('hex'));
    };
    for (let length = 0; length < 200; length++) check(Uint8Array.from({ length }, (_, i) => (i * 37 + length) & 255));
    fc.assert(fc.property(fc.uint8Array({ maxLength: 2000 }), check), { seed: 71, numRuns: 50 });
  });

  test('sha256Hex leaves its input alone, and reads a view from its own offset', () => {
    const whole = bytes('xxabc');
    expect(sha256Hex(whole.subarray(2))).toBe(published[1][1]);
    expect(whole).toEqual(bytes('xxabc'));
  });
});
