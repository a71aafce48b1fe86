import { sha256Hex, sha256Words } from './hash.js';
import { MersenneTwister } from './mersenneTwister.js';

/** Where a stream of random numbers stands, as plain JSON. */
export interface RandomState {
  generator: 'mt19937';
  /** Names the stream; {@link Random.split} derives new names from it. */
  name: string;
  /** Words of the state already handed out, 0 to 624. */
  used: number;
  /** The 624 words of the state, eight hexadecimal digits each. */
  words: string;
}

/**
 * Seeded random numbers: the same seed gives the same numbers on every machine. Not for secrets.
 *
 * A whole number ≥ 0 seeds the generator as Python's `random.seed` does, so `uniform`, `normal` and `integer` give that library's
 * `random`, `normalvariate` and `randrange`; a text seeds it through its SHA-256.
 */
export class Random {
  private constructor(
    private readonly name: string,
    private readonly source: MersenneTwister,
  ) {}

  /** @param seed a text, or a whole number (of a negative or broken number its text is taken) */
  static fromSeed(seed: number | string): Random {
    const whole = typeof seed === 'number' && Number.isSafeInteger(seed) && seed >= 0;
    const name = `${typeof seed}:${seed}`;
    if (!whole) return new Random(name, MersenneTwister.fromKey(wordsOf(name)));
    return new Random(name, MersenneTwister.fromKey(seed < 2 ** 32 ? [seed] : [seed >>> 0, Math.floor(seed / 2 ** 32)]));
  }

  static fromState(state: RandomState): Random {
    const words = Array.from({ length: 624 }, (_, i) => parseInt(state.words.slice(8 * i, 8 * i + 8), 16));
    return new Random(state.name, MersenneTwister.fromState(words, state.used));
  }

  state(): RandomState {
    const words = Array.from(this.source.words, (word) => word.toString(16).padStart(8, '0')).join('');
    return { generator: 'mt19937', name: this.name, used: this.source.used, words };
  }

  /**
   * A new stream, independent of this one and of those with other labels. It depends on the name of this stream and the label
   * alone, not on how many numbers have been drawn, and does not move this stream.
   */
  split(label: string | number): Random {
    const name = sha256Hex(bytesOf(JSON.stringify([this.name, String(label)])));
    return new Random(name, MersenneTwister.fromKey(wordsOf(name)));
  }

  /** Uniform on [0, 1), a multiple of 2^−53. */
  uniform(): number {
    const high = this.source.next() >>> 5;
    return (high * 2 ** 26 + (this.source.next() >>> 6)) / 2 ** 53;
  }

  /** Standard normal, by the ratio of uniforms of A. J. Kinderman and J. F. Monahan 1977. */
  normal(): number {
    for (;;) {
      const u = this.uniform();
      const v = 1 - this.uniform();
      const z = (NORMAL_RATIO * (u - 0.5)) / v;
      if ((z * z) / 4 <= -Math.log(v)) return z;
    }
  }

  /**
   * A whole number from 0 to n − 1, each equally likely.
   *
   * @param n whole, 1 ≤ n ≤ 2^32
   * @returns NaN if n is not such a number
   */
  integer(n: number): number {
    if (!(Number.isInteger(n) && n >= 1 && n <= 2 ** 32)) return NaN;
    // Draw just enough bits and again while they exceed n: no number is favoured.
    const bits = n === 2 ** 32 ? 33 : 32 - Math.clz32(n);
    for (;;) {
      const drawn = bits > 32 ? this.source.next() : this.source.next() >>> (32 - bits);
      if (drawn < n) return drawn;
    }
  }

  /**
   * Gamma variable of the given shape and scale 1 (mean and variance are the shape).
   *
   * @param shape > 0, dimensionless
   * @returns a number ≥ 0; NaN unless the shape is a finite number > 0
   * @source G. Marsaglia and W. W. Tsang 2000, ACM Transactions on Mathematical Software 26 (from memory)
   */
  gamma(shape: number): number {
    if (!(shape > 0 && shape < Infinity)) return NaN;
    if (shape < 1) return this.gamma(shape + 1) * (1 - this.uniform()) ** (1 / shape);
    const d = shape - 1 / 3;
    const c = 1 / Math.sqrt(9 * d);
    for (;;) {
      const z = this.normal();
      const v = (1 + c * z) ** 3;
      if (v > 0 && Math.log(1 - this.uniform()) < 0.5 * z * z + d * (1 - v + Math.log(v))) return d * v;
    }
  }
}

/** 4·e^(−½)/√2, the width of the region from which the ratio is drawn. */
const NORMAL_RATIO = (4 * Math.exp(-0.5)) / Math.SQRT2;

function wordsOf(name: string): Uint32Array {
  return sha256Words(bytesOf(name));
}

function bytesOf(text: string): Uint8Array {
  return new TextEncoder().encode(text);
}
