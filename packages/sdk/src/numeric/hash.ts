/**
 * SHA-256 of some bytes, synchronously (the platform's own digest is asynchronous and missing from insecure pages).
 *
 * @param bytes message, below 2^53 bits; not changed
 * @returns 64 lower-case hexadecimal digits
 * @source FIPS 180-4; the constants are computed from their definition there
 */
export function sha256Hex(bytes: Uint8Array): string {
  return Array.from(sha256Words(bytes), (word) => word.toString(16).padStart(8, '0')).join('');
}

/** The same as eight 32-bit words, the first digits first. */
export function sha256Words(bytes: Uint8Array): Uint32Array {
  const padded = new Uint8Array((((bytes.length + 8) >>> 6) + 1) << 6);
  padded.set(bytes);
  padded[bytes.length] = 0x80;
  const view = new DataView(padded.buffer);
  view.setUint32(padded.length - 8, Math.floor(bytes.length / 2 ** 29));
  view.setUint32(padded.length - 4, bytes.length << 3);

  const [initial, round] = (constants ??= rootsOfPrimes());
  const hash = Uint32Array.from(initial);
  const w = new Int32Array(64);
  for (let offset = 0; offset < padded.length; offset += 64) {
    for (let i = 0; i < 16; i++) w[i] = view.getInt32(offset + 4 * i);
    for (let i = 16; i < 64; i++) {
      const early = w[i - 15];
      const late = w[i - 2];
      w[i] = w[i - 16] + w[i - 7] + (turn(early, 7) ^ turn(early, 18) ^ (early >>> 3)) + (turn(late, 17) ^ turn(late, 19) ^ (late >>> 10));
    }
    let [a, b, c, d, e, f, g, h] = hash;
    for (let i = 0; i < 64; i++) {
      const first = (h + (turn(e, 6) ^ turn(e, 11) ^ turn(e, 25)) + ((e & f) ^ (~e & g)) + round[i] + w[i]) | 0;
      const second = (turn(a, 2) ^ turn(a, 13) ^ turn(a, 22)) + ((a & b) ^ (a & c) ^ (b & c));
      h = g;
      g = f;
      f = e;
      e = (d + first) | 0;
      d = c;
      c = b;
      b = a;
      a = (first + second) | 0;
    }
    [a, b, c, d, e, f, g, h].forEach((word, i) => (hash[i] += word));
  }
  return hash;
}

let constants: [initial: Uint32Array, round: Uint32Array] | undefined;

/** The first 32 bits of the fractional parts of the square roots of 8 primes and of the cube roots of 64. */
function rootsOfPrimes(): [Uint32Array, Uint32Array] {
  const initial = new Uint32Array(8);
  const round = new Uint32Array(64);
  let found = 0;
  for (let n = 2; found < 64; n++) {
    let divisor = 2;
    while (n % divisor !== 0) divisor++;
    if (divisor < n) continue;
    // A double holds 52 bits after a root below 8, well more than the 32 wanted.
    if (found < 8) initial[found] = (Math.sqrt(n) % 1) * 2 ** 32;
    round[found++] = (Math.cbrt(n) % 1) * 2 ** 32;
  }
  return [initial, round];
}

function turn(word: number, by: number): number {
  return (word >>> by) | (word << (32 - by));
}
