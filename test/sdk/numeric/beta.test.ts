import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import betainc from '@stdlib/math-base-special-betainc';
import { betaI, betaIComplement } from '../../../packages/sdk/src/numeric/beta.js';
import { betaIInverse } from '../../../packages/sdk/src/numeric/betaInverse.js';
import checks from '../../checks/special.json' with { type: 'json' };
import { expectAbsolute, expectRelative, spread } from './near.js';

const shape = fc.double({ min: -2, max: 3, noNaN: true }).map((exponent) => 10 ** exponent);
const argument = fc.double({ min: 0.0001, max: 0.9999, noNaN: true });

describe('betaI(x, a, b), betaIComplement(x, a, b)', () => {
  // The source of the rows stands beside them in special.json.
  const { rows, tol_rel: tolerance } = checks.beta_I;

  test.each(rows)(`betaI($x, $a, $b) and its complement`, ({ a, b, x, I, one_minus_I: complement }) => {
    expectRelative(betaI(x, a, b), I, tolerance, 'I');
    expectRelative(betaIComplement(x, a, b), complement, tolerance, '1 − I');
  });

  test('betaI gives the printed points of the F and t distributions', () => {
    const [, , , , f, t] = checks.printed_tables;
    const points: [number, number][] = [
      [5, 10],
      [1, 10],
      [10, 5],
    ];
    points.forEach(([n1, n2], i) => {
      const value = (f.expected as number[])[i];
      // Q(F | ν1, ν2) = I at ν2/(ν2 + ν1 F), A&S 26.6.2 (number from memory)
      expectRelative(betaI(n2 / (n2 + n1 * value), n2 / 2, n1 / 2), 0.05, 1e-12, f.source);
      expectAbsolute(value, (f.printed as number[])[i], f.tol_abs, f.source);
    });
    const value = t.expected as number;
    expectRelative(betaI(10 / (10 + value * value), 5, 0.5), 0.05, 1e-12, t.source);
  });

  test('betaI(x, a, b) = 1 − betaI(1 − x, b, a) = 1 − betaIComplement(x, a, b)', () => {
    fc.assert(
      fc.property(argument, shape, shape, (x, a, b) => {
        // 1 − x is rounded; the density that turns this into an error of I is below √(a + b)·10 away from the ends.
        const y = 1 - x;
        expectAbsolute(betaI(1 - y, a, b) + betaI(y, b, a), 1, 5e-13, `x = ${x}, a = ${a}, b = ${b}`);
        expectAbsolute(betaI(x, a, b) + betaIComplement(x, a, b), 1, 3e-16, `x = ${x}, a = ${a}, b = ${b}`);
      }),
      { seed: 21, numRuns: 500 },
    );
  });

  test('betaI never decreases in x', () => {
    fc.assert(
      fc.property(argument, argument, shape, shape, (x1, x2, a, b) => {
        expect(betaI(Math.max(x1, x2), a, b)).toBeGreaterThanOrEqual(betaI(Math.min(x1, x2), a, b) * (1 - 1e-12));
      }),
      { seed: 22, numRuns: 500 },
    );
  });

  test('betaI(x, a, b) is x^a at b = 1, and a sum of binomial terms at whole a and b', () => {
    for (let n = 1; n < 100; n++) {
      const x = spread(n, 2);
      const a = 10 ** (2 * spread(n, 3) - 1);
      expectRelative(betaI(x, a, 1), x ** a, 1e-13, `x = ${x}, a = ${a}`);
    }
    // I_x(2, 3) = Σ_(j≥2) C(4, j) x^j (1−x)^(4−j), A&S 26.5.6 (number from memory)
    for (const x of [0.1, 0.4, 0.75]) {
      const y = 1 - x;
      expectRelative(betaI(x, 2, 3), 6 * x * x * y * y + 4 * x ** 3 * y + x ** 4, 1e-14, `x = ${x}`);
    }
  });

  test('betaI and betaIComplement agree with the library @stdlib within 1e-11', () => {
    for (let n = 1; n <= 600; n++) {
      const a = 10 ** (-1 + 3 * spread(n, 2));
      const b = 10 ** (-1 + 3 * spread(n, 3));
      const x = spread(n, 5);
      for (const [received, expected] of [
        [betaI(x, a, b), betainc(x, a, b, true, false)],
        [betaIComplement(x, a, b), betainc(x, a, b, true, true)],
      ]) {
        if (expected > 1e-280) expectRelative(received, expected, 1e-11, `x = ${x}, a = ${a}, b = ${b}`);
      }
    }
  });

  test('betaI and betaIComplement at and beyond the ends of the domain', () => {
    expect([betaI(-1, 2, 3), betaI(0, 2, 3), betaI(1, 2, 3), betaI(2, 2, 3)]).toEqual([0, 0, 1, 1]);
    expect([betaIComplement(0, 2, 3), betaIComplement(1, 2, 3)]).toEqual([1, 0]);
    for (const [x, a, b] of [
      [NaN, 1, 1],
      [0.5, 0, 1],
      [0.5, 1, -1],
      [0.5, Infinity, 1],
    ]) {
      expect(betaI(x, a, b)).toBeNaN();
      expect(betaIComplement(x, a, b)).toBeNaN();
    }
  });
});

describe('betaIInverse(p, a, b)', () => {
  // The source of the rows stands beside them in special.json.
  const { rows, tol_rel: tolerance } = checks.beta_I_inverse;

  test.each(rows)(`betaIInverse($p, $a, $b)`, ({ a, b, p, x }) => {
    expectRelative(betaIInverse(p, a, b), x, tolerance, 'x');
  });

  test('betaI(betaIInverse(p, a, b), a, b) is p again, into both tails', () => {
    const probability = fc.double({ min: -30, max: 30, noNaN: true }).map((t) => 1 / (1 + Math.exp(-t)));
    fc.assert(
      fc.property(shape, shape, probability, (a, b, p) => {
        const x = betaIInverse(p, a, b);
        if (x < 1e-300 || x > 1 - 1e-6) return;
        // The spacing of numbers near x, 2e-16, is a relative change of 1 − x by 2e-16/(1 − x); b and a are the powers.
        const tolerance = 1e-12 + (4e-16 * (a + b)) / (1 - x);
        if (p <= 0.5) expectRelative(betaI(x, a, b), p, tolerance, `p = ${p}, a = ${a}, b = ${b}`);
        else expectRelative(betaIComplement(x, a, b), 1 - p, tolerance, `p = ${p}, a = ${a}, b = ${b}`);
      }),
      { seed: 23, numRuns: 500 },
    );
  });

  test('betaIInverse finds roots from which the iteration starts far away', () => {
    // The value is too small to be a number at the start, and 1 − x is below the spacing at 1.
    expectRelative(betaI(betaIInverse(1e-300, 1e4, 0.9), 1e4, 0.9), 1e-300, 1e-10, 'p = 1e-300');
    expect(betaIInverse(0.3, 5, 0.01)).toBe(1);
  });

  test('betaIInverse at the ends and outside', () => {
    expect([betaIInverse(0, 2, 3), betaIInverse(1, 2, 3)]).toEqual([0, 1]);
    for (const [p, a, b] of [
      [-0.1, 1, 1],
      [1.1, 1, 1],
      [NaN, 1, 1],
      [0.5, 0, 1],
      [0.5, 1, NaN],
    ])
      expect(betaIInverse(p, a, b)).toBeNaN();
  });
});
