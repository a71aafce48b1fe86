const SIZE = 624;
const SHIFT = 397;

/**
 * The generator MT19937 of M. Matsumoto and T. Nishimura 1998 (ISO/IEC 14882 `mt19937`): 32-bit words of period 2^19937 − 1.
 *
 * Chosen over smaller generators because its output is fixed by a published standard and produced by most numerical environments,
 * so that a run can be followed elsewhere word for word. Its price is a state of 624 words.
 */
export class MersenneTwister {
  /** [624] the state; copy it to keep it. */
  readonly words: Uint32Array;
  /** How many words of the state have been handed out, 0 to 624. */
  used: number;

  private constructor(words: Uint32Array, used: number) {
    this.words = words;
    this.used = used;
  }

  /** From one 32-bit seed, by the standard's own rule. */
  static fromSeed(seed: number): MersenneTwister {
    const words = new Uint32Array(SIZE);
    words[0] = seed;
    for (let i = 1; i < SIZE; i++) words[i] = Math.imul(1812433253, mixed(words[i - 1])) + i;
    return new MersenneTwister(words, SIZE);
  }

  /** From a key of one or more 32-bit words, by the `init_by_array` of the authors' own program of 2002. */
  static fromKey(key: ArrayLike<number>): MersenneTwister {
    const generator = MersenneTwister.fromSeed(19650218);
    const { words } = generator;
    let i = 1;
    for (let k = 0; k < Math.max(SIZE, key.length); k++) {
      const j = k % key.length;
      words[i] = (words[i] ^ Math.imul(mixed(words[i - 1]), 1664525)) + key[j] + j;
      i = advance(words, i);
    }
    for (let k = 1; k < SIZE; k++) {
      words[i] = (words[i] ^ Math.imul(mixed(words[i - 1]), 1566083941)) - i;
      i = advance(words, i);
    }
    words[0] = 0x80000000;
    return generator;
  }

  /** From words and count kept earlier; the words are copied. */
  static fromState(words: ArrayLike<number>, used: number): MersenneTwister {
    return new MersenneTwister(Uint32Array.from(words), used);
  }

  /** The next word, 0 to 2^32 − 1. */
  next(): number {
    if (this.used >= SIZE) this.renew();
    let y = this.words[this.used++];
    y ^= y >>> 11;
    y ^= (y << 7) & 0x9d2c5680;
    y ^= (y << 15) & 0xefc60000;
    return (y ^ (y >>> 18)) >>> 0;
  }

  private renew(): void {
    const { words } = this;
    for (let i = 0; i < SIZE; i++) {
      const y = (words[i] & 0x80000000) | (words[(i + 1) % SIZE] & 0x7fffffff);
      words[i] = words[(i + SHIFT) % SIZE] ^ (y >>> 1) ^ (y & 1 ? 0x9908b0df : 0);
    }
    this.used = 0;
  }
}

function mixed(word: number): number {
  return word ^ (word >>> 30);
}

function advance(words: Uint32Array, i: number): number {
  if (i + 1 < SIZE) return i + 1;
  words[0] = words[SIZE - 1];
  return 1;
}
