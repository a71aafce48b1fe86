import fc from 'fast-check';
import type { Forcing, Selection } from '../../../../packages/sdk/src/contract.js';

/** Runs per property: small records, few of them, always the same ones. */
export const FEW = { numRuns: 25, seed: 20_010_301, endOnFailure: true };

const between = (min: number, max: number): fc.Arbitrary<number> => fc.double({ min, max, noNaN: true, noDefaultInfinity: true });

/** Selections without corners. */
export const smoothSelection: fc.Arbitrary<Selection> = fc.oneof(
  fc.constant<Selection>({ form: 'uniform' }),
  fc.record({ form: fc.constant('exponential' as const), scale: between(10, 300) }),
  fc.record({ form: fc.constant('gamma' as const), shape: between(0.3, 3), scale: between(10, 200) }),
  fc.record({ form: fc.constant('beta' as const), a: between(0.4, 3), b: between(0.6, 3) }),
  fc.record({ form: fc.constant('kumaraswamy' as const), a: between(0.4, 3), b: between(0.6, 3) }),
  fc.record({ form: fc.constant('power' as const), exponent: between(0.4, 3) }),
);

const corneredSelection: fc.Arbitrary<Selection> = fc.oneof(
  fc.constant<Selection>({ form: 'youngestFirst' }),
  fc.constant<Selection>({ form: 'oldestFirst' }),
  fc.record({ form: fc.constant('uniform' as const), depth: between(20, 200) }),
  fc.record({ form: fc.constant('gamma' as const), shape: between(0.5, 3), scale: between(10, 200), from: between(1, 40) }),
  between(5, 60).map((mm): Selection => ({ form: 'piecewise', storage: [mm, 2 * mm, 6 * mm], share: [0, 0.6, 1] })),
);

export const anySelection: fc.Arbitrary<Selection> = fc.oneof(
  smoothSelection,
  corneredSelection,
  fc.record({ a: smoothSelection, b: corneredSelection, weight: fc.constantFrom(0.25, 0.5, 0.75) }).map(({ a, b, weight }): Selection => ({
    form: 'mixture',
    parts: [
      { weight, selection: a },
      { weight: 1 - weight, selection: b },
    ],
  })),
);

export interface Weather {
  inflow: number[];
  stream: number[];
  evap: number[];
  concentration: number[];
}

/** `steps` days with dry spells and storms; every outflow may stop. Storage of 400 mm never runs out in 24 of them. */
export function weather(steps = 24): fc.Arbitrary<Weather> {
  const series = (arbitrary: fc.Arbitrary<number>): fc.Arbitrary<number[]> => fc.array(arbitrary, { minLength: steps, maxLength: steps });
  const mostlyDry = fc.oneof(
    { weight: 3, arbitrary: fc.constant(0) },
    { weight: 3, arbitrary: between(0.1, 8) },
    { weight: 1, arbitrary: between(20, 60) },
  );
  const flow = fc.oneof(
    { weight: 6, arbitrary: between(0.2, 6) },
    { weight: 1, arbitrary: between(6, 12) },
    { weight: 1, arbitrary: fc.constant(0) },
  );
  const evap = fc.oneof({ weight: 5, arbitrary: between(0.1, 4) }, { weight: 1, arbitrary: fc.constant(0) });
  return fc.record({ inflow: series(mostlyDry), stream: series(flow), evap: series(evap), concentration: series(between(0, 40)) });
}

export const STORAGE = 400;

export function forcingOf({ inflow, stream, evap, concentration }: Weather): Forcing {
  return {
    start: '2001-03-01T00:00:00Z',
    stepDays: 1,
    inflow: Float64Array.from(inflow),
    outflows: { stream: Float64Array.from(stream), evap: Float64Array.from(evap) },
    inflowConcentration: { tracer: Float64Array.from(concentration) },
  };
}
