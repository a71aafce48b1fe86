import type { AgeDistribution, ColumnSnapshot, Forcing, Selection } from '../../../../packages/sdk/src/contract.js';
import timeVarying from '../../../checks/timeVarying.json';

/** The thirty steps with storms, dry days and emptying that the values in test/checks/timeVarying.json belong to. */
export const STEPS = 30;
export const everyStep: number[] = Array.from({ length: STEPS }, (_, k) => k);
export const INITIAL_STORAGE = timeVarying.forcing.initial_storage_mm;
export const INITIAL_CONCENTRATION = timeVarying.forcing.initial_conc;
/** Range of what fell on wet steps, in the tracer's unit. */
export const INPUT_RANGE = 39;

export interface StormCase {
  storage_mm: number[];
  stream_conc_step_mean: number[];
  stream_volume_initial?: number[];
  evap_volume_initial?: number[];
  younger_storage_mm?: number[][];
  stream_volume_by_entry?: number[][];
  evap_volume_by_entry?: number[][];
  stream_age_cdf_step_end?: number[][];
}

const { cases } = timeVarying;
const gamma = (shape: number, scale: number): Selection => ({ form: 'gamma', shape, scale });
const exponential = (scale: number): Selection => ({ form: 'exponential', scale });
const power = (exponent: number): Selection => ({ form: 'power', exponent });

/** By case: its values from outside, and the selections of stream and evapotranspiration that they state in words. */
export const stormCases: Record<string, { values: StormCase; stream: Selection; evap: Selection; smooth: boolean }> = {
  A_uniform: { values: cases.A_uniform, stream: { form: 'uniform' }, evap: { form: 'uniform' }, smooth: true },
  B_gamma: { values: cases.B_gamma, stream: gamma(0.6, 60), evap: gamma(1.5, 25), smooth: true },
  C_gamma_tv: {
    values: cases.C_gamma_tv,
    // scale = 60 − 0.8 (S_mid − 160): the inverse storage effect
    stream: { form: 'gamma', shape: 0.6, scale: { driver: 'storage', at: [100, 220], value: [108, 12] } },
    evap: gamma(1.5, 25),
    smooth: true,
  },
  D_beta: { values: cases.D_beta, stream: { form: 'beta', a: 0.5, b: 1.5 }, evap: { form: 'uniform' }, smooth: true },
  E_kumaraswamy: { values: cases.E_kumaraswamy, stream: { form: 'kumaraswamy', a: 0.6, b: 1.1 }, evap: power(0.8), smooth: true },
  F_exponential: { values: cases.F_exponential, stream: exponential(40), evap: exponential(40), smooth: true },
  G_power_half: { values: cases.G_power_half, stream: power(0.5), evap: power(0.5), smooth: true },
  H_gamma_loc: {
    values: cases.H_gamma_loc,
    stream: { form: 'gamma', shape: 0.8, scale: 50, from: 10 },
    evap: exponential(30),
    smooth: false,
  },
  P_piston: { values: cases.P_piston, stream: { form: 'oldestFirst' }, evap: { form: 'oldestFirst' }, smooth: false },
};

export function stormForcing(): Forcing {
  const { rain_mm, stream_mm, evap_mm, rain_conc } = timeVarying.forcing;
  return {
    start: '2001-03-01T00:00:00Z',
    stepDays: 1,
    inflow: Float64Array.from(rain_mm),
    outflows: { stream: Float64Array.from(stream_mm), evap: Float64Array.from(evap_mm) },
    inflowConcentration: { tracer: Float64Array.from(rain_conc) },
  };
}

const ROUNDING = 1e-9;

/** mm in storage younger than an age that is a parcel edge, and Ω of the outflow there. */
export function youngerThan(snapshot: ColumnSnapshot, age: number, outflow: string): { storage: number; share: number } {
  let storage = 0;
  let share = 0;
  for (let i = 0; i < snapshot.depth.length && snapshot.oldestAge[i] <= age + ROUNDING; i++) {
    storage += snapshot.depth[i];
    share = snapshot.selection[outflow][i];
  }
  return { storage, share };
}

/** Cumulative share at an age that is an edge of the distribution. */
export function shareAt(distribution: AgeDistribution, age: number): number {
  let share = 0;
  for (let i = 0; i < distribution.ageDays.length && distribution.ageDays[i] <= age + ROUNDING; i++) share = distribution.youngerShare[i];
  return share;
}

/** Greatest absolute difference of two series; NaN anywhere gives NaN, so that no comparison passes by accident. */
export function worst(actual: ArrayLike<number>, expected: ArrayLike<number>): number {
  let most = actual.length === expected.length ? 0 : NaN;
  for (let i = 0; i < actual.length; i++) {
    const difference = Math.abs(actual[i] - expected[i]);
    if (!(difference <= most)) most = Number.isNaN(most) ? NaN : difference;
  }
  return most;
}
