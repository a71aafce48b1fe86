import { describe, expect, test } from 'vitest';
import { FORM_NAMES, runColumn, selectionShare, type Selection } from '@rillage/sdk';
import special from '../../checks/special.json';
import checks from '../../checks/steady.json';

const share = (selection: Selection, depth: number, total: number): number => selectionShare(selection, [depth], total)[0];
/** Tables behind costly curves are good to 1e-10; the forms themselves to 1e-12. */
const TABLED = 2e-10;

describe('selectionShare against values from outside', () => {
  test.each(checks.kumaraswamy.rows)('kumaraswamy $a, $b at $x', ({ a, b, x, F, median }) => {
    expect(Math.abs(share({ form: 'kumaraswamy', a, b }, x * 200, 200) - F)).toBeLessThan(TABLED);
    expect(Math.abs(share({ form: 'kumaraswamy', a, b }, median * 200, 200) - 0.5)).toBeLessThan(TABLED);
  });

  test.each(special.gamma_P.rows.filter(({ a, x }) => a >= 0.05 && x > 0 && x < 1e4))('gamma $a at $x', ({ a, x, P }) => {
    expect(Math.abs(share({ form: 'gamma', shape: a, scale: 7 }, 7 * x, 1e9) - P)).toBeLessThan(TABLED);
    expect(Math.abs(share({ form: 'gamma', shape: a, scale: 7, from: 12 }, 12 + 7 * x, 1e9) - P)).toBeLessThan(TABLED);
  });

  test.each(special.beta_I.rows.filter(({ x }) => x > 0 && x < 1))('beta $a, $b at $x', ({ a, b, x, I }) => {
    expect(Math.abs(share({ form: 'beta', a, b }, 350 * x, 350) - I)).toBeLessThan(TABLED);
  });

  const { uniform } = checks.storage_effect;
  test.each(uniform)('uniform draws less from the youngest 20 mm as storage grows: $S mm', ({ S, fraction_from_youngest_20mm }) => {
    expect(share({ form: 'uniform' }, 20, S)).toBeCloseTo(fraction_from_youngest_20mm, 14);
  });

  test.each(checks.storage_effect['gamma fixed scale'])(
    'gamma draws the same whatever storage is: $S mm',
    ({ S, fraction_from_youngest_20mm }) => {
      expect(Math.abs(share({ form: 'gamma', shape: 0.6, scale: 60 }, 20, S) - fraction_from_youngest_20mm)).toBeLessThan(TABLED);
    },
  );

  test.each(checks.storage_effect['gamma, scale=60-0.8(S-160)'])(
    'gamma of scale $scale mm draws more when wet',
    ({ scale, fraction_from_youngest_20mm }) => {
      expect(Math.abs(share({ form: 'gamma', shape: 0.6, scale }, 20, 400) - fraction_from_youngest_20mm)).toBeLessThan(TABLED);
    },
  );
});

describe('runColumn: the storage effect as a driven run shows it', () => {
  const scale = { driver: 'storage' as const, at: [100, 220], value: [108, 12] };
  test.each(checks.storage_effect['gamma, scale=60-0.8(S-160)'])(
    'at $S mm the youngest 20 mm give the stated share',
    ({ S, fraction_from_youngest_20mm }) => {
      // One short step of rain: 20 mm in, 20 mm out of old water, so that storage stays at S and the youngest parcel is 20 mm deep
      const selection: Record<string, Selection> = { stream: { form: 'gamma', shape: 0.6, scale }, drain: { form: 'oldestFirst' } };
      const forcing = {
        start: '2001-01-01T00:00:00Z',
        stepDays: 1,
        inflow: Float64Array.of(20),
        outflows: { stream: Float64Array.of(0), drain: Float64Array.of(20) },
        inflowConcentration: {},
      };
      const snapshot = runColumn({ initialStorage: S, selection }, forcing, { snapshotsAt: [0] }).snapshots.get(0)!;
      expect(snapshot.depth[0]).toBeCloseTo(20, 12);
      expect(Math.abs(snapshot.selection.stream[0] - fraction_from_youngest_20mm)).toBeLessThan(TABLED);
    },
  );
});

describe('selectionShare: what every form has in common', () => {
  const forms: Selection[] = [
    { form: 'uniform' },
    { form: 'uniform', depth: 80 },
    { form: 'exponential', scale: 60 },
    { form: 'gamma', shape: 0.4, scale: 90 },
    { form: 'gamma', shape: 3, scale: 30, from: 25 },
    { form: 'beta', a: 0.5, b: 2 },
    { form: 'beta', a: 3, b: 0.6 },
    { form: 'kumaraswamy', a: 0.3, b: 3 },
    { form: 'power', exponent: 0.3 },
    { form: 'piecewise', storage: [10, 40, 150], share: [0, 0.7, 1] },
    { form: 'youngestFirst' },
    { form: 'oldestFirst' },
    {
      form: 'mixture',
      parts: [
        { weight: 0.25, selection: { form: 'youngestFirst' } },
        { weight: 0.75, selection: { form: 'mixture', parts: [{ weight: 1, selection: { form: 'exponential', scale: 40 } }] } },
      ],
    },
  ];

  test('forms: every form is among them', () => {
    expect([...new Set(forms.map(({ form }) => form))].sort()).toEqual([...FORM_NAMES].sort());
  });

  test.each(forms)('%o increases from 0 to 1 over storage', (selection) => {
    const depth = Float64Array.from({ length: 401 }, (_, i) => i);
    const result = selectionShare(selection, depth, 400);
    expect(result[0]).toBe(0);
    expect(result[400]).toBe(1);
    // tables are good to 1e-10, so that a fall of as much may hide in them
    for (let i = 1; i <= 400; i++) expect(result[i] - result[i - 1]).toBeGreaterThan(-TABLED);
  });

  test('mixture is the weighted sum of its parts', () => {
    const a: Selection = { form: 'gamma', shape: 0.5, scale: 40 };
    const b: Selection = { form: 'beta', a: 2, b: 2 };
    const parts = [
      { weight: 0.3, selection: a },
      { weight: 0.7, selection: b },
    ];
    for (const mm of [0.5, 20, 130, 399]) {
      expect(share({ form: 'mixture', parts }, mm, 400)).toBeCloseTo(0.3 * share(a, mm, 400) + 0.7 * share(b, mm, 400), 12);
    }
  });
});
