import { describe, expect, test } from 'vitest';
import { runColumn, type Forcing, type Selection } from '@rillage/sdk';
import checks from '../../checks/steady.json';
import { shareAt, youngerThan } from '../column/support/stormRecord.js';

// Under constant fluxes the column younger than the record is the steady one, so that P(T) stands in a snapshot at the record's end.
const every = { ageResolution: 0 };
/** Every-age mode: 1e-6 for smooth forms, 1e-5 where a selection has a corner or a limit. */
const SMOOTH = 1e-6;
const CORNERED = 1e-5;

function constantForcing(steps: number, stepDays: number, inflow: number, outflows: Record<string, number>): Forcing {
  const flat = (value: number): Float64Array => new Float64Array(steps).fill(value);
  return {
    start: '2001-01-01T00:00:00Z',
    stepDays,
    inflow: flat(inflow),
    outflows: Object.fromEntries(Object.entries(outflows).map(([name, value]) => [name, flat(value)])),
    inflowConcentration: {},
  };
}

/** Ages at the end of a record of `steps` steps; the oldest parcel's edge is its length. */
function endOf(steps: number, days: number, initialStorage: number, flow: number, selection: Selection, options = {}) {
  const forcing = constantForcing(steps, days / steps, flow, { stream: flow });
  return runColumn({ initialStorage, selection: { stream: selection } }, forcing, {
    ...every,
    snapshotsAt: [steps - 1],
    ...options,
  }).snapshots.get(steps - 1)!;
}

const beta = (a: number, b: number): Selection => ({ form: 'beta', a, b });
const kumaraswamy = (a: number, b: number): Selection => ({ form: 'kumaraswamy', a, b });
const { S, F, cases } = checks.steady.closed_forms;
const table = cases as Record<string, { T: number; P: number }[]>;
const expressed: [string, Selection, number][] = [
  ['uniform: P=1-exp(-FT/S)', { form: 'uniform' }, SMOOTH],
  ['power k=1/2: P=1+W0(-exp(-1-FT/(2S)))', { form: 'power', exponent: 0.5 }, SMOOTH],
  ['power k=2: P=tanh(FT/S)^2', { form: 'power', exponent: 2 }, SMOOTH],
  ['beta/Kumaraswamy(1,b=2): P=1-[1+(b-1)FT/S]^(-b/(b-1))', beta(1, 2), SMOOTH],
  ['beta/Kumaraswamy(1,b=2): P=1-[1+(b-1)FT/S]^(-b/(b-1))', kumaraswamy(1, 2), SMOOTH],
  ['beta/Kumaraswamy(1,b=4): same formula', beta(1, 4), SMOOTH],
  ['beta/Kumaraswamy(1,b=4): same formula', kumaraswamy(1, 4), SMOOTH],
  ['beta/Kumaraswamy(1,b=1/2): P=min(1,FT/(2S)) (uniform ages on [0,2S/F])', beta(1, 0.5), SMOOTH],
  ['beta/Kumaraswamy(1,b=1/2): P=min(1,FT/(2S)) (uniform ages on [0,2S/F])', kumaraswamy(1, 0.5), SMOOTH],
  ['exponential selection, scale b=50 over unbounded S_T (mean infinite): P=1-1/(1+FT/b)', { form: 'exponential', scale: 50 }, SMOOTH],
  // exponential piston flow with η = 1.5: nothing from the youngest S(1 − 1/η) = 100 mm, uniform below
  [
    'exponential piston flow eta=1.5: P=0 for T<tau(1-1/eta), else 1-exp(-eta T/tau+eta-1)',
    { form: 'piecewise', storage: [100, 300], share: [0, 1] },
    CORNERED,
  ],
  ['piston: P=0 for T<S/F, 1 after', { form: 'oldestFirst' }, CORNERED],
];

describe.each(expressed)('runColumn under constant fluxes, %s: %o', (name, selection, tolerance) => {
  // T = 1, 5, 10 are edges of daily steps; 30 to 1200 of steps of 15 days
  test.each([
    [10, 10],
    [80, 1200],
  ])('snapshots: P(T) after %i steps in %i days', (steps, days) => {
    const snapshot = endOf(steps, days, S, F, selection);
    const width = days / steps;
    const rows = table[name].filter(({ T }) => T % width === 0 && T <= days);
    expect(rows.length).toBeGreaterThanOrEqual(3);
    for (const { T, P } of rows) {
      const { storage, share } = youngerThan(snapshot, T, 'stream');
      // Where storage is just used up, Ω ends in a jump or an infinite slope and an error of 1e-10 of storage decides it: storage is held to instead.
      if (P === 1 && T * F <= S * 2) expect(Math.abs(storage - S)).toBeLessThan(SMOOTH * S);
      else expect(Math.abs(share - P)).toBeLessThan(tolerance);
    }
  });
});

test('closed_forms: every case is expressed by a form above', () => {
  expect(Object.keys(table).sort()).toEqual([...new Set(expressed.map(([name]) => name))].sort());
});

describe('runColumn under constant fluxes: storage and share at an age', () => {
  /** Deep enough that unbounded forms never meet the bottom. */
  const DEEP = 20_000;
  test.each(checks.steady.gamma_by_age.rows)('gamma $shape, $scale mm at $T d', ({ shape, scale, F: flow, T, S_T, P }) => {
    const snapshot = endOf(12, T, DEEP, flow, { form: 'gamma', shape, scale });
    const { storage, share } = youngerThan(snapshot, T, 'stream');
    expect(Math.abs(share - P)).toBeLessThan(SMOOTH);
    expect(Math.abs(storage - S_T)).toBeLessThan(SMOOTH * flow * T);
  });

  test.each(checks.steady.gamma_by_storage.rows)('gamma $shape, $scale mm at $S_T mm', ({ shape, scale, F: flow, S_T, T, P }) => {
    const { storage, share } = youngerThan(endOf(12, T, DEEP, flow, { form: 'gamma', shape, scale }), T, 'stream');
    expect(Math.abs(share - P)).toBeLessThan(SMOOTH);
    expect(Math.abs(storage - S_T)).toBeLessThan(SMOOTH * flow * T);
  });

  test.each(checks.steady.beta_by_storage.rows)('beta $a, $b at $S_T mm', ({ a, b, S: total, F: flow, S_T, T, P }) => {
    const { storage, share } = youngerThan(endOf(12, T, total, flow, beta(a, b)), T, 'stream');
    expect(Math.abs(share - P)).toBeLessThan(SMOOTH);
    expect(Math.abs(storage - S_T)).toBeLessThan(SMOOTH * flow * T);
  });

  test.each(checks.steady.kumaraswamy_by_storage.rows)('kumaraswamy $a, $b at $S_T mm', ({ a, b, S: total, F: flow, S_T, T, P }) => {
    const { storage, share } = youngerThan(endOf(12, T, total, flow, kumaraswamy(a, b)), T, 'stream');
    expect(Math.abs(share - P)).toBeLessThan(SMOOTH);
    expect(Math.abs(storage - S_T)).toBeLessThan(SMOOTH * flow * T);
  });

  test.each(checks.steady.two_outflows.rows)('two outflows at $S_T mm', ({ S_T, T, P_Q, P_E }) => {
    const forcing = constantForcing(12, T / 12, 3, { stream: 1.8, evap: 1.2 });
    const selection: Record<string, Selection> = {
      stream: { form: 'gamma', shape: 0.6, scale: 60 },
      evap: { form: 'exponential', scale: 25 },
    };
    const snapshot = runColumn({ initialStorage: DEEP, selection }, forcing, { ...every, snapshotsAt: [11] }).snapshots.get(11)!;
    const stream = youngerThan(snapshot, T, 'stream');
    expect(Math.abs(stream.share - P_Q)).toBeLessThan(SMOOTH);
    expect(Math.abs(youngerThan(snapshot, T, 'evap').share - P_E)).toBeLessThan(SMOOTH);
    expect(Math.abs(stream.storage - S_T)).toBeLessThan(SMOOTH * 3 * T);
  });
});

test('runColumn: Q m_Q + E m_E = S, with both means from step volumes', () => {
  // In a steady step the share younger than T_k is the mean of P over T_k−1 … T_k, so that Σ (1 − share) Δ is the integral of 1 − P.
  const steps = 700;
  const stepDays = 10; // e^(−E T / S) of storage is still unknown at T = 7000 d: 7e-13
  const { mQ, mE } = checks.steady.mean_age_identity;
  const catchment = { initialStorage: 300, selection: { stream: beta(0.5, 1.5), evap: { form: 'uniform' } as const } };
  const run = runColumn(catchment, constantForcing(steps, stepDays, 3, { stream: 1.8, evap: 1.2 }), {
    ...every,
    distributionsAt: [steps - 1],
  });
  const mean = (outflow: string): number => {
    const distribution = run.outflows[outflow].distributions.get(steps - 1)!;
    let sum = 0;
    for (let k = 1; k <= steps; k++) sum += (1 - shareAt(distribution, k * stepDays)) * stepDays;
    return sum;
  };
  const [stream, evap] = [mean('stream'), mean('evap')];
  // 1e-6 of share over the 7000 days that are summed up would be 7e-3 d; the method does far better
  expect(Math.abs(stream - mQ)).toBeLessThan(1e-4);
  expect(Math.abs(evap - mE)).toBeLessThan(1e-4);
  expect(Math.abs(1.8 * stream + 1.2 * evap - 300)).toBeLessThan(3e-4);
});

test('runColumn: weights of discrete convolution under uniform selection', () => {
  const { S: total, F: flow, dt, w } = checks.discrete_uniform_weights;
  const steps = w.length;
  const run = runColumn(
    { initialStorage: total, selection: { stream: { form: 'uniform' } } },
    constantForcing(steps, dt, flow, { stream: flow }),
    {
      ...every,
      distributionsAt: [steps - 1],
    },
  );
  const distribution = run.outflows.stream.distributions.get(steps - 1)!;
  w.forEach((weight, n) => {
    expect(Math.abs(shareAt(distribution, (n + 1) * dt) - shareAt(distribution, n * dt) - weight)).toBeLessThan(1e-8);
  });
});
