import { describe, expect, test } from 'vitest';
import { enrichment, growingProfile, meanOfDecay, planTracer } from '../../../packages/sdk/src/tracers/parcelTracer.js';

describe('planTracer(name, rule, outflows)', () => {
  test('carried shares default to 1 and keep the outflows’ order', () => {
    const plan = planTracer('chloride', { preRecord: 3, carriedShare: { evap: 0.25 } }, ['stream', 'evap']);
    expect([...plan.carried]).toEqual([1, 0.25]);
    expect(plan.conservative).toBe(false);
    expect(planTracer('oxygen', { preRecord: -8 }, ['stream', 'evap']).conservative).toBe(true);
  });

  test('decay and equilibrium add up: c′ = −d c + r (c_eq − c) approaches r c_eq / (d + r) at d + r', () => {
    const plan = planTracer('silica', { preRecord: 0, decayPerDay: 0.1, equilibrium: { concentration: 12, ratePerDay: 0.3 } }, ['stream']);
    expect(plan.rate).toBeCloseTo(0.4, 15);
    expect(plan.target).toBeCloseTo(9, 13);
  });
});

test('meanOfDecay(x) is (1 − e^(−x)) / x, also at 0', () => {
  expect(meanOfDecay(0)).toBe(1);
  expect(meanOfDecay(1e-9)).toBeCloseTo(1 - 5e-10, 15);
  expect(meanOfDecay(1)).toBeCloseTo(0.6321205588285577, 15); // 1 − 1/e
  expect(meanOfDecay(1e-6)).toBeCloseTo(1 - 1e-6 / 2 + 1e-12 / 6, 15); // series to third order
});

describe('enrichment(before, after, kept) is (before / after)^kept', () => {
  // the rational form errs by k(1 − k²)x³/12 where the share x = 0.08 at most is taken: 1.6e-5
  test.each([
    [10, 9.9, 0],
    [10, 9.9, 1],
    [10, 9.5, 0.5],
    [10, 9.24, 0.3],
    [10, 2, 0.7],
    [10, 9.99, 0.5],
  ])('%d mm to %d mm with %d kept', (before, after, kept) => {
    expect(Math.abs(enrichment(before, after, kept) / (before / after) ** kept - 1)).toBeLessThan(2e-5);
  });

  test('solute is conserved at both ends: nothing kept, everything kept', () => {
    expect(enrichment(7, 6.8, 0)).toBe(1);
    expect(enrichment(7, 6.8, 1) * 6.8).toBeCloseTo(7, 13);
  });
});

describe('growingProfile(g, K t) solves t D′ + g D + K t D = g', () => {
  // Own check: the equation is integrated with the classical fourth-order step from a small t, where D = 1 − K t / (g + 1).
  test.each([
    [1, 0.05],
    [1.4, 0.5],
    [3, 2],
    [0.6, 0.2],
  ])('g = %d, K t = %d', (g, kt) => {
    const slope = (t: number, d: number): number => (g - g * d) / t - kt * d;
    const steps = 20_000;
    let t = 1e-4;
    let d = 1 - (kt * t) / (g + 1);
    let mean = t * (1 - (kt * t) / (2 * (g + 1)));
    const h = (1 - t) / steps;
    for (let k = 0; k < steps; k++) {
      const a = slope(t, d);
      const b = slope(t + h / 2, d + (h / 2) * a);
      const c = slope(t + h / 2, d + (h / 2) * b);
      const e = slope(t + h, d + h * c);
      const next = d + (h / 6) * (a + 2 * b + 2 * c + e);
      mean += (h / 2) * (d + next);
      d = next;
      t += h;
    }
    const out = new Float64Array(2);
    growingProfile(g, kt, out);
    expect(out[0]).toBeCloseTo(d, 7);
    expect(out[1]).toBeCloseTo(mean, 7);
  });
});
