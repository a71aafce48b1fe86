import { describe, expect, it } from 'vitest';
import { RillageError } from '../../../packages/sdk/src/errors.js';
import { canonicalJson } from '../../../packages/sdk/src/reading/canonicalJson.js';

describe('canonicalJson(value)', () => {
  // RFC 8785, section 3.2.2, the example object (from memory).
  it('writes the example of RFC 8785 as printed', () => {
    const value = {
      numbers: [333333333.33333329, 1e30, 4.5, 2e-3, 0.000000000000000000000000001],
      string: '\u20ac$\u000F\u000aA\'\u0042\u0022\u005c\\"/',
      literals: [null, true, false],
    };
    expect(canonicalJson(value)).toBe(
      '{"literals":[null,true,false],"numbers":[333333333.3333333,1e+30,4.5,0.002,1e-27],"string":"€$\\u000f\\nA\'B\\"\\\\\\\\\\"/"}',
    );
  });

  // RFC 8785, section 3.2.3, the sorting example (from memory).
  it('sorts keys by UTF-16 code units', () => {
    const keys = ['\u20ac', '\r', '\ufb33', '1', '\ud83d\ude00', '\u0080', '\u00f6'];
    const text = canonicalJson(Object.fromEntries(keys.map((key) => [key, 0])));
    expect(Object.keys(JSON.parse(text) as object)).toHaveLength(7);
    expect([...text.matchAll(/("(?:[^"\\]|\\.)*"):/gu)].map((match) => JSON.parse(match[1] as string) as string)).toEqual([
      '\r',
      '1',
      '\u0080',
      '\u00f6',
      '\u20ac',
      '\ud83d\ude00',
      '\ufb33',
    ]);
  });

  it('writes typed arrays as arrays and leaves undefined fields out', () => {
    expect(canonicalJson({ b: Float64Array.of(1, 0.1), a: undefined, c: Uint8Array.of(1, 0) })).toBe('{"b":[1,0.1],"c":[1,0]}');
  });

  it.each([
    [{ a: [1, NaN] }, 'a[1]'],
    [{ a: { b: Infinity } }, 'a.b'],
    [{ f: () => 1 }, 'f'],
  ])('refuses what has no JSON form: %o', (value, path) => {
    expect(() => canonicalJson(value)).toThrowError(RillageError);
    try {
      canonicalJson(value);
    } catch (error) {
      expect(error).toMatchObject({ code: 'not-json', path });
    }
  });
});
