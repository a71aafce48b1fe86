import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import gammainc from '@stdlib/math-base-special-gammainc';
import { gammaP, gammaQ } from '../../../packages/sdk/src/numeric/gamma.js';
import { gammaPInverse } from '../../../packages/sdk/src/numeric/gammaInverse.js';
import { logGamma, logGammaOnePlus } from '../../../packages/sdk/src/numeric/logGamma.js';
import checks from '../../checks/special.json' with { type: 'json' };
import { expectAbsolute, expectRelative, spread } from './near.js';

const shape = fc.double({ min: -3, max: 4, noNaN: true }).map((exponent) => 10 ** exponent);

/** Arguments from the far left to the far right of the bulk of the distribution. */
const shapeAndArgument = fc.tuple(shape, fc.double({ min: -1, max: 1, noNaN: true })).map(([a, t]): [number, number] => [a, a * 10 ** t]);

describe('logGamma(x)', () => {
  test('logGamma(x) is ln (x−1)! at whole numbers and ½ ln π at ½', () => {
    let factorial = 1;
    for (let n = 1; n < 20; n++) {
      expectAbsolute(logGamma(n), Math.log(factorial), 2e-14, `logGamma(${n})`);
      factorial *= n;
    }
    expectRelative(logGamma(0.5), Math.log(Math.PI) / 2, 1e-14, 'logGamma(1/2)');
  });

  test('exp(logGamma(1.5)) is the value of the handbook table', () => {
    const table = checks.printed_tables[1];
    expectAbsolute(Math.exp(logGamma(1.5)), table.printed as number, table.tol_abs, table.source);
    expectRelative(Math.exp(logGamma(1.5)), table.expected as number, 1e-14, table.source);
  });

  test('logGamma(x) obeys the duplication formula', () => {
    // Γ(x)Γ(x+½) = 2^(1−2x) √π Γ(2x), DLMF 5.5.5 (number from memory)
    fc.assert(
      fc.property(shape, (x) => {
        const right = (1 - 2 * x) * Math.LN2 + Math.log(Math.PI) / 2 + logGamma(2 * x);
        expectAbsolute(logGamma(x) + logGamma(x + 0.5), right, 1e-14 * (1 + Math.abs(right)) + 2e-15 * x, `x = ${x}`);
      }),
      { seed: 11 },
    );
  });

  test('logGamma(x) is NaN where the function has no real logarithm here, and infinite at infinity', () => {
    for (const x of [0, -0.5, -3, NaN]) expect(logGamma(x)).toBeNaN();
    expect(logGamma(Infinity)).toBe(Infinity);
  });

  test('logGammaOnePlus(x) joins its series to logGamma, and has Euler’s constant as slope at 0', () => {
    for (const x of [0.0099999, 0.01, -0.01, -0.0099999]) expectAbsolute(logGammaOnePlus(x), logGamma(1 + x), 1e-14, `x = ${x}`);
    expectRelative(logGammaOnePlus(1e-12) / 1e-12, -0.5772156649015329, 1e-11, 'slope');
  });
});

describe('gammaP(a, x), gammaQ(a, x)', () => {
  // The source of the rows stands beside them in special.json.
  const { rows, tol_rel: tolerance } = checks.gamma_P;

  test.each(rows)(`gammaP($a, $x) and gammaQ($a, $x)`, ({ a, x, P, Q }) => {
    expectRelative(gammaP(a, x), P, tolerance, 'P');
    expectRelative(gammaQ(a, x), Q, tolerance, 'Q');
  });

  test('gammaP and gammaQ give the printed tables of erf and chi-square', () => {
    const [erf, , chi] = checks.printed_tables;
    [0.5, 1, 2].forEach((x, i) => {
      expectAbsolute(gammaP(0.5, x * x), (erf.printed as number[])[i], erf.tol_abs, erf.source);
      expectRelative(gammaP(0.5, x * x), (erf.expected as number[])[i], 1e-13, erf.source);
    });
    [1, 2, 5, 10].forEach((nu, i) => {
      expectAbsolute(gammaQ(nu / 2, nu / 2), (chi.printed as number[])[i], chi.tol_abs, chi.source);
      expectRelative(gammaQ(nu / 2, nu / 2), (chi.expected as number[])[i], 1e-13, chi.source);
    });
  });

  test('gammaP + gammaQ = 1', () => {
    fc.assert(
      fc.property(shapeAndArgument, ([a, x]) => expectAbsolute(gammaP(a, x) + gammaQ(a, x), 1, 3e-13, `a = ${a}, x = ${x}`)),
      { seed: 12, numRuns: 500 },
    );
  });

  test('gammaP never decreases in x', () => {
    fc.assert(
      fc.property(shapeAndArgument, fc.double({ min: 1e-9, max: 0.5, noNaN: true }), ([a, x], more) => {
        expect(gammaP(a, x * (1 + more))).toBeGreaterThanOrEqual(gammaP(a, x) * (1 - 1e-13 * (1 + a)));
      }),
      { seed: 13, numRuns: 500 },
    );
  });

  test('gammaP(a, x) − gammaP(a + 1, x) = x^a e^(−x)/Γ(a+1) across every method', () => {
    // DLMF 8.8.5 (number from memory); it ties neighbouring shapes that different methods may serve.
    for (let n = 1; n <= 400; n++) {
      const a = 60 * spread(n, 2);
      const x = 90 * spread(n, 3);
      const factor = Math.exp(a * Math.log(x) - x - logGamma(a + 1));
      expectAbsolute(gammaP(a, x) - gammaP(a + 1, x), factor, 5e-14, `a = ${a}, x = ${x}`);
    }
  });

  test('gammaP and gammaQ agree with the library @stdlib within 1e-12, or 1e-16 absolute', () => {
    for (let n = 1; n <= 600; n++) {
      const a = 10 ** (-2 + 5 * spread(n, 2));
      const x = a * 10 ** (1.2 * (2 * spread(n, 5) - 1));
      for (const [received, expected] of [
        [gammaP(a, x), gammainc(x, a, true, false)],
        [gammaQ(a, x), gammainc(x, a, true, true)],
      ]) {
        // Values below 1e-280 are left to the rows above: there the library itself goes through the logarithm.
        if (expected > 1e-280) expectAbsolute(received, expected, 1e-12 * expected + 1e-16, `a = ${a}, x = ${x}`);
      }
    }
  });

  test('gammaP and gammaQ at and beyond the ends of the domain', () => {
    expect([gammaP(2, 0), gammaP(2, -1), gammaP(2, Infinity)]).toEqual([0, 0, 1]);
    expect([gammaQ(2, 0), gammaQ(2, -1), gammaQ(2, Infinity), gammaQ(2, 1e6)]).toEqual([1, 1, 0, 0]);
    for (const [a, x] of [
      [0, 1],
      [-1, 1],
      [NaN, 1],
      [1, NaN],
      [Infinity, 1],
    ]) {
      expect(gammaP(a, x)).toBeNaN();
      expect(gammaQ(a, x)).toBeNaN();
    }
  });
});

describe('gammaPInverse(a, p)', () => {
  // The source of the rows stands beside them in special.json.
  const { rows, tol_rel: tolerance } = checks.gamma_P_inverse;

  test.each(rows)(`gammaPInverse($a, $p)`, ({ a, p, x }) => {
    expectRelative(gammaPInverse(a, p), x, tolerance, 'x');
  });

  test('2·gammaPInverse(ν/2, 0.95) is the printed 5 % point of chi-square', () => {
    const table = checks.printed_tables[3];
    [1, 2, 5, 10].forEach((nu, i) => {
      expectAbsolute(2 * gammaPInverse(nu / 2, 0.95), (table.printed as number[])[i], table.tol_abs, table.source);
      expectRelative(2 * gammaPInverse(nu / 2, 0.95), (table.expected as number[])[i], 1e-13, table.source);
    });
  });

  test('gammaP(a, gammaPInverse(a, p)) is p again, into both tails', () => {
    const probability = fc.double({ min: -30, max: 30, noNaN: true }).map((t) => 1 / (1 + Math.exp(-t)));
    fc.assert(
      fc.property(shape, probability, (a, p) => {
        const x = gammaPInverse(a, p);
        if (x < 1e-300) return;
        // Rounding x by 1e-16 moves P by about √a times that, ln P in the tail by about as much again times 8.
        const tolerance = 1e-13 + 2e-15 * Math.sqrt(a);
        if (p <= 0.5) expectRelative(gammaP(a, x), p, tolerance, `a = ${a}`);
        else expectRelative(gammaQ(a, x), 1 - p, tolerance, `a = ${a}`);
      }),
      { seed: 14, numRuns: 500 },
    );
  });

  test('gammaPInverse at the ends, below the smallest number and outside', () => {
    expect([gammaPInverse(2, 0), gammaPInverse(2, 1), gammaPInverse(0.001, 1e-9)]).toEqual([0, Infinity, 0]);
    for (const [a, p] of [
      [0, 0.5],
      [1, -0.1],
      [1, 1.1],
      [1, NaN],
      [NaN, 0.5],
    ])
      expect(gammaPInverse(a, p)).toBeNaN();
  });
});
