import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { erf, erfc, normalCdf, normalQuantile } from '../../../packages/sdk/src/numeric/normal.js';
import values from '../../checks/numericValues.json' with { type: 'json' };
import checks from '../../checks/special.json' with { type: 'json' };
import { expectAbsolute, expectRelative } from './near.js';

describe('normalCdf(z), erf(x), erfc(x)', () => {
  test.each(values.normal)('normalCdf($z), erf($z), erfc($z) are the 40-digit values', (row) => {
    // Γ(½) is known to 2e-15 here, the cancelling 1 − P is used down to 0.06, and z² in the exponent is rounded.
    const tolerance = 2e-14 + 4e-16 * row.z ** 2;
    expectRelative(normalCdf(row.z), row.cdf, tolerance, 'cdf');
    expectRelative(erf(row.z), row.erf, 5e-15, 'erf');
    expectRelative(erfc(row.z), row.erfc, tolerance, 'erfc');
  });

  test('erf(x) is the printed table', () => {
    const table = checks.printed_tables[0];
    [0.5, 1, 2].forEach((x, i) => expectAbsolute(erf(x), (table.printed as number[])[i], table.tol_abs, table.source));
  });

  test('normalCdf and erf at the ends', () => {
    expect([normalCdf(-Infinity), normalCdf(Infinity), normalCdf(-40), normalCdf(NaN)]).toEqual([0, 1, 0, NaN]);
    expect([erf(-Infinity), erf(Infinity), erf(1e-200), erfc(-Infinity), erfc(Infinity)]).toEqual([
      -1,
      1,
      1e-200 * (2 / Math.sqrt(Math.PI)),
      2,
      0,
    ]);
  });
});

describe('normalQuantile(p)', () => {
  test.each(values.normalQuantile)('normalQuantile($p) is the 40-digit value', ({ p, z }) => {
    expectAbsolute(normalQuantile(p), z, 2e-15 * (1 + Math.abs(z)), 'z');
  });

  test('normalQuantile is odd about ½ and inverts normalCdf', () => {
    expect(normalQuantile(0.5)).toBeCloseTo(0, 15);
    fc.assert(
      fc.property(fc.double({ min: -37, max: 0, noNaN: true }), (z) => {
        const p = normalCdf(z);
        expectAbsolute(normalQuantile(p), z, 4e-15 * (1 - z), `z = ${z}`);
        const upper = 1 - p;
        expect(normalQuantile(upper) + normalQuantile(1 - upper) || 0).toBe(0);
      }),
      { seed: 31 },
    );
  });

  test('normalQuantile at the ends and outside', () => {
    expect([normalQuantile(0), normalQuantile(1)]).toEqual([-Infinity, Infinity]);
    for (const p of [-0.1, 1.1, NaN]) expect(normalQuantile(p)).toBeNaN();
  });
});
