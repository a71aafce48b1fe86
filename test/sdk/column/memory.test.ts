import { describe, expect, test } from 'vitest';
import { runColumn, type Catchment, type Forcing } from '@rillage/sdk';
import { benchCatchment, benchOptions, syntheticForcing } from '../../bench/forcing.mjs';

const run = (years: number, stepDays = 1) =>
  runColumn(benchCatchment as Catchment, syntheticForcing({ years, stepDays }) as Forcing, benchOptions);

describe('runColumn, default: memory flat in the number of steps', () => {
  const five = run(5);
  const twenty = run(20);

  test('parcels grow with the logarithm of the record at most', () => {
    // 5 % of age: 1/0.05 parcels for each factor e of age, 20 ln 4 = 28 more, beside those of the last twenty steps
    expect(twenty.parcels.most).toBeLessThan(five.parcels.most + 60);
    expect(twenty.parcels.most).toBeLessThan(400);
  });

  test('checkpoint as text: 20 years within twice 5 years', () => {
    const size = (of: typeof five): number => JSON.stringify(of.checkpoint()).length;
    expect(size(twenty)).toBeLessThan(2 * size(five));
  });

  test('nothing is kept that was not asked for', () => {
    expect(twenty.snapshots.size + twenty.followed.size + twenty.outflows.discharge.distributions.size).toBe(0);
    expect(twenty.outflows.discharge.youngerShare.size).toBe(benchOptions.youngerThan.length);
  });

  test('hourly steps hold parcels of the same order', () => {
    // 0.6 % of an outflow at most in a merged parcel, 167 for each of two outflows, and 20 ln(8766 / 20) = 122 by age
    expect(run(1, 1 / 24).parcels.most).toBeLessThan(2 * 167 + 122);
  });
});
