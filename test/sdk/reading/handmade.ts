import { type Checkpoint, type ColumnRun, type Forcing, type OutflowAges } from '../../../packages/sdk/src/contract.js';

export interface Handmade {
  steps?: number;
  start?: string;
  stepDays?: number;
  /** mm/day, every step; or by step. */
  flow?: number | ((step: number) => number);
  shares?: Record<number, number | ((step: number) => number)>;
  median?: number;
  beyond?: 0 | 1 | 2;
  preRecord?: number;
  assumed?: number;
  initialStorage?: number;
  storage?: number;
  /** Steps of record before these; the run then looks resumed. */
  stepsBefore?: number;
  outflow?: string;
}

const DAY_MS = 86_400_000;

/** A run whose numbers are written down, not computed: for tests of what is said about them. */
export function handmadeRun(given: Handmade = {}): ColumnRun {
  const { steps = 1461, start = '2021-03-15T00:00:00Z', stepDays = 1, preRecord = 0.1, assumed = 0, beyond = 0, stepsBefore = 0 } = given;
  const shares = given.shares ?? { 7: 0.12, 30: 0.3, 90: 0.45, 365: 0.7 };
  const name = given.outflow ?? 'discharge';
  const constant = (value: number | ((step: number) => number)): Float64Array =>
    Float64Array.from({ length: steps }, (_, i) => (typeof value === 'number' ? value : value(i)));
  const flow = constant(given.flow ?? 1.5);
  const wet = (series: Float64Array): Float64Array => series.map((value, i) => ((flow[i] as number) > 0 ? value : NaN));
  const outflow: OutflowAges = {
    flow,
    youngerShare: new Map(Object.entries(shares).map(([age, value]) => [Number(age), wet(constant(value))])),
    quantiles: new Map([[0.5, { days: wet(constant(given.median ?? 330)), beyondRecord: new Uint8Array(steps).fill(beyond) }]]),
    preRecordShare: wet(constant(preRecord)),
    assumedShare: wet(constant(assumed)),
    distributions: new Map([
      [
        steps - 1,
        { ageDays: Float64Array.of(0, 7, 30, 90, 365, 1461), youngerShare: Float64Array.of(0, 0.12, 0.3, 0.45, 0.7, 1 - preRecord) },
      ],
    ]),
    concentration: { d18O: wet(constant(-8.2)) },
  };
  const initialStorage = given.initialStorage ?? 1000;
  const checkpoint: Checkpoint = {
    kind: 'rillage-checkpoint',
    version: 1,
    steps: stepsBefore + steps,
    recordStart: new Date(Date.parse(start) - stepsBefore * stepDays * DAY_MS).toISOString().replace('.000Z', 'Z'),
    stepDays,
    catchment: { initialStorage, selection: { [name]: { form: 'gamma', shape: 0.6, scale: 400 } } },
    ageResolution: 0.05,
    state: { storage: 1000, depths: [1, 2, 3] },
  };
  return {
    start,
    stepDays,
    steps,
    storage: constant(given.storage ?? 990),
    outflows: { [name]: outflow },
    snapshots: new Map(),
    followed: new Map(),
    closure: { water: 0, tracers: {} },
    parcels: { atEnd: 3, most: 3 },
    checkpoint: () => structuredClone(checkpoint),
  };
}

/** The forcing that such a run would have gone through. */
export function handmadeForcing(run: ColumnRun): Forcing {
  return {
    start: run.start,
    stepDays: run.stepDays,
    inflow: new Float64Array(run.steps).fill(2),
    outflows: Object.fromEntries(Object.entries(run.outflows).map(([name, { flow }]) => [name, flow.slice()])),
    inflowConcentration: { d18O: new Float64Array(run.steps).fill(-8) },
  };
}
