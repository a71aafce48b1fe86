/**
 * Seeded random numbers for the invented data, kept apart from the SDK's so that the truth never comes from the code under test.
 * 32-bit counter mixed by multiply and shift; good enough for weather, not for cryptography.
 */
export function seededRandom(seed) {
  let state = seed >>> 0;
  let spare = null;

  function uniform() {
    state = (state + 0x9e3779b9) >>> 0;
    let mixed = state ^ (state >>> 16);
    mixed = Math.imul(mixed, 0x21f0aaad);
    mixed ^= mixed >>> 15;
    mixed = Math.imul(mixed, 0x735a2d97);
    mixed ^= mixed >>> 15;
    return ((mixed >>> 0) + 0.5) / 4294967296;
  }

  /** Standard normal, by the polar method (Marsaglia & Bray 1964). */
  function normal() {
    if (spare !== null) {
      const kept = spare;
      spare = null;
      return kept;
    }
    for (;;) {
      const u = 2 * uniform() - 1;
      const v = 2 * uniform() - 1;
      const square = u * u + v * v;
      if (square > 0 && square < 1) {
        const scale = Math.sqrt((-2 * Math.log(square)) / square);
        spare = v * scale;
        return u * scale;
      }
    }
  }

  /** Gamma with the given shape and scale (Marsaglia & Tsang 2000; shapes below 1 by the power trick). */
  function gamma(shape, scale) {
    if (shape < 1) return gamma(shape + 1, scale) * uniform() ** (1 / shape);
    const d = shape - 1 / 3;
    const c = 1 / Math.sqrt(9 * d);
    for (;;) {
      const x = normal();
      const v = (1 + c * x) ** 3;
      if (v > 0 && Math.log(uniform()) < 0.5 * x * x + d - d * v + d * Math.log(v)) return d * v * scale;
    }
  }

  return { uniform, normal, gamma };
}
