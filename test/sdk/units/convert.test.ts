import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { RillageError } from '../../../packages/sdk/src/errors.js';
import { convert } from '../../../packages/sdk/src/units/convert.js';
import {
  deltaFromRatio,
  deuteriumExcess,
  meteoricWaterLine,
  ratioFromDelta,
  REFERENCE_RATIO,
} from '../../../packages/sdk/src/units/isotopes.js';
import { loadPerHectare } from '../../../packages/sdk/src/units/load.js';
import { nitrateAsIon, nitrateAsNitrogen } from '../../../packages/sdk/src/units/nitrate.js';
import { decayPerDay, TRITIUM_HALF_LIFE, TRITIUM_UNIT } from '../../../packages/sdk/src/units/tritium.js';

const read = (name: string) => JSON.parse(readFileSync(new URL(`../../checks/${name}.json`, import.meta.url), 'utf8'));
const { units } = read('units'); // exact definitions; see the file's source
const { isotopes } = read('isotopes');
const near = (actual: number, expected: number, relative = 1e-12): void =>
  expect(Math.abs(actual - expected)).toBeLessThanOrEqual(relative * Math.abs(expected));

describe('convert, against exact definitions', () => {
  test.each([
    ['[ft_i]', 'm', 1, units.ft_m],
    ['[mi_i]', 'm', 1, units.mi_m],
    ['[in_i]', 'mm', 1, units.in_mm],
    ['m3/s', '[ft_i]3/s', 1, units.m3s_in_cfs],
    ['[ft_i]3/s', 'm3/s', 1, units.cfs_in_m3s],
  ])('%s to %s', (from, to, value, expected) => near(convert(value, from, to), expected));

  test.each([
    [2.5, 'm3/s', 41.2, units.examples[0].mm_per_day],
    [100, '[ft_i]3/s', 50 * 2.589988110336, units.examples[1].mm_per_day],
    [1, 'm3/s', 1, units.m3s_over_1km2_in_mm_per_day],
  ])('%d %s over %d km² in mm/d', (value, from, areaKm2, expected) => near(convert(value, from, 'mm/d', { areaKm2 }), expected));

  test('there and back is the value', () =>
    near(convert(convert(3.7, 'm3/s', 'mm/d', { areaKm2: 12 }), 'mm/d', 'm3/s', { areaKm2: 12 }), 3.7));

  test.each([
    ['mmm/d', 'mm/d', 'unit-unknown'],
    ['mm/d', 'mg/L', 'unit-mismatch'],
    ['m3/s', 'mm/d', 'area-missing'],
  ])('%s to %s is %s', (from, to, code) => {
    expect(() => convert(1, from, to)).toThrow(RillageError);
    expect(() => convert(1, from, to)).toThrow(expect.objectContaining({ code }));
  });

  test('an unknown unit suggests near ones', () => {
    try {
      convert(1, 'm3/sec.', 'm3/s');
    } catch (error) {
      expect((error as RillageError).hint).toMatch(/m3\/s/);
      return;
    }
  });
});

describe('isotopes, nitrate, tritium, load', () => {
  const { VSMOW, delta_examples: examples, tol_abs_permil: tolerance } = isotopes;
  test('REFERENCE_RATIO is VSMOW', () => {
    expect(REFERENCE_RATIO['18O'].value).toBe(VSMOW.R18);
    expect(REFERENCE_RATIO['2H'].value).toBe(VSMOW.R2);
  });
  test('deltaFromRatio and ratioFromDelta', () => {
    expect(Math.abs(deltaFromRatio(examples[0].R18, '18O') - examples[0].d18O)).toBeLessThan(tolerance);
    expect(Math.abs(deltaFromRatio(examples[1].R2, '2H') - examples[1].d2H)).toBeLessThan(tolerance);
    near(ratioFromDelta(examples[2].d18O, '18O'), examples[2].R18);
    near(ratioFromDelta(examples[3].d2H, '2H'), examples[3].R2);
    near(ratioFromDelta(VSMOW.SLAP_d18O, '18O'), examples[4].SLAP_R18);
    near(ratioFromDelta(VSMOW.SLAP_d2H, '2H'), examples[4].SLAP_R2);
  });
  test('meteoricWaterLine and deuteriumExcess (Craig 1961)', () => {
    for (const row of isotopes.gmwl_craig) expect(meteoricWaterLine(row.d18O)).toBeCloseTo(row.d2H, 9);
    for (const row of isotopes.d_excess) expect(deuteriumExcess(row.d2H, row.d18O)).toBeCloseTo(row.d, 9);
  });
  test('decayPerDay and TRITIUM_UNIT', () => {
    expect(TRITIUM_HALF_LIFE.value).toBe(isotopes.tritium.half_life_d);
    near(decayPerDay(isotopes.tritium.half_life_d), isotopes.tritium.lambda_per_d);
    near(Math.exp(-decayPerDay(4500) * 10 * 365.25), isotopes.tritium.remaining_after_10yr);
    near(decayPerDay(isotopes.radon222.half_life_d), isotopes.radon222.lambda_per_d);
    near(TRITIUM_UNIT.value, isotopes.tritium.TU_Bq_per_kg, 1e-6);
  });
  test('nitrateAsNitrogen, nitrateAsIon', () => {
    near(nitrateAsNitrogen(50), isotopes.nitrate['50_mgNO3_as_N']);
    near(nitrateAsIon(10), isotopes.nitrate['10_mgN_as_NO3']);
  });
  test('loadPerHectare', () => near(loadPerHectare(450, 4.5), isotopes.load.example.kgN_per_ha));
});
