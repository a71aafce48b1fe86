/**
 * The shapes of the public interface: types only, no logic, so that every room may import it and a reader finds all of it in one file.
 * Rates are mm/day, storage mm, ages days, concentrations in the tracer's own unit, times ISO 8601 instants in UTC.
 */

/** The record of water in and out at a constant step. Fluxes are means over the step; concentrations hold over the step. */
export interface Forcing {
  /** ISO 8601 instant at which the first step begins. */
  start: string;
  /** Constant; 1 = daily, 1/24 = hourly. */
  stepDays: number;
  /** [N] mm/day reaching storage: rain, or what the snow store releases. */
  inflow: Float64Array;
  /** [N] mm/day each, by outflow. Usual names: `discharge`, `evapotranspiration`. */
  outflows: Record<string, Float64Array>;
  /** [N] by tracer; ignored where inflow is 0, NaN elsewhere is an error. */
  inflowConcentration: Record<string, Float64Array>;
  /** [N] series that driven parameters may name. */
  drivers?: Record<string, Float64Array>;
}

/** The model: initial storage, one selection function per outflow, tracer rules. */
export interface Catchment {
  /** mm in storage when the record begins. */
  initialStorage: number;
  /** One per outflow, keyed as `Forcing.outflows`. */
  selection: Record<string, Selection>;
  tracers?: Record<string, TracerRule>;
  /** mm: [low, high] that the driver `wetness` scales to 0..1. Without it, the range of storage over the run's first forcing. */
  wetnessRange?: [number, number];
}

export interface TracerRule {
  /** Concentration of the water already in storage; it keeps it. */
  preRecord: number;
  /** By outflow: share of the concentration that leaves with the water; default 1. */
  carriedShare?: Record<string, number>;
  /** First-order decay of what entered in the record. */
  decayPerDay?: number;
  /** First-order approach of what entered in the record. */
  equilibrium?: { concentration: number; ratePerDay: number };
}

/** A parameter: constant, or a piecewise-linear function of a driver (linear between, held beyond). */
export type Amount = number | DrivenAmount;
export interface DrivenAmount {
  /**
   * `storage` (mm), `storageAnomaly` (mm above initial storage), `wetness` (storage scaled to its own range), `discharge` (mm/day),
   * `season` (fraction of the calendar year, 0 on 1 January UTC), or a name in `Forcing.drivers`. Taken at mid-step.
   */
  driver: 'storage' | 'storageAnomaly' | 'wetness' | 'discharge' | 'season' | (string & {});
  at: number[];
  value: number[];
}

/** A cumulative storage selection function Ω(S_T) as plain data: the share of an outflow drawn from the youngest S_T mm. */
export type Selection =
  | { form: 'uniform'; depth?: Amount }
  | { form: 'exponential'; scale: Amount }
  | { form: 'gamma'; shape: Amount; scale: Amount; from?: Amount }
  | { form: 'beta'; a: Amount; b: Amount }
  | { form: 'kumaraswamy'; a: Amount; b: Amount }
  | { form: 'power'; exponent: Amount }
  | { form: 'piecewise'; storage: number[]; share: number[] }
  | { form: 'youngestFirst' }
  | { form: 'oldestFirst' }
  | { form: 'mixture'; parts: { weight: Amount; selection: Selection }[] };

export interface RunOptions {
  /** Relative age width at which old parcels may merge; 0 keeps every age. Default 0.1. */
  ageResolution?: number;
  /** Ages, days. */
  youngerThan?: number[];
  /** 0..1 */
  quantiles?: number[];
  /** Step indices whose whole distributions are kept. Counted from the start of the forcing handed to this call. */
  distributionsAt?: number[];
  /** Step indices whose columns are kept. */
  snapshotsAt?: number[];
  /** Step indices whose inflow is followed through storage (forward distribution). */
  followInflowOf?: number[];
  /** Repeat the record before its start; water it adds stays marked as assumed. */
  spinUp?: { repeats: number };
}

export interface ColumnRun {
  start: string;
  stepDays: number;
  steps: number;
  /** [N] mm at the end of each step. */
  storage: Float64Array;
  outflows: Record<string, OutflowAges>;
  snapshots: Map<number, ColumnSnapshot>;
  followed: Map<number, FollowedInflow>;
  /** Relative to throughput: what is missing between in, out, stored and decayed. */
  closure: { water: number; tracers: Record<string, number> };
  /** Parcels in the column at the end, and the greatest number at any step. */
  parcels: { atEnd: number; most: number };
  checkpoint(): Checkpoint;
}

export interface OutflowAges {
  /** [N] mm/day, as given. */
  flow: Float64Array;
  /** By age in days: [N] share of the step's outflow volume known to be younger at the step's end. Add `preRecordShare` for the upper bound where the record is shorter than the age. NaN without outflow. */
  youngerShare: Map<number, Float64Array>;
  /** By probability. `days` is the age, or the record's own age where `beyondRecord` is 1 (a lower bound); 2 marks an age that rests on spin-up water. */
  quantiles: Map<number, { days: Float64Array; beyondRecord: Uint8Array }>;
  /** [N] share of the outflow from water in storage before the record (and before any spin-up). */
  preRecordShare: Float64Array;
  /** [N] share from water that spin-up added; all zero without spin-up. */
  assumedShare: Float64Array;
  /** By step: cumulative share of the step's outflow volume younger than each age, increasing; the last value is 1 − preRecordShare. */
  distributions: Map<number, AgeDistribution>;
  /** By tracer: [N] flow-weighted mean over the step; NaN without outflow. */
  concentration: Record<string, Float64Array>;
}

export interface AgeDistribution {
  ageDays: Float64Array;
  youngerShare: Float64Array;
}

/** The column at the end of a step, youngest first. */
export interface ColumnSnapshot {
  step: number;
  /** mm */
  storage: number;
  /** [K] days, age of the younger edge of each parcel. */
  youngestAge: Float64Array;
  /** [K] days, age of the older edge. */
  oldestAge: Float64Array;
  /** [K] mm */
  depth: Float64Array;
  /** By tracer: [K] */
  concentration: Record<string, Float64Array>;
  /** [K] 1 where spin-up added the parcel. */
  assumed: Uint8Array;
  /** By outflow: [K] Ω at the older edge of each parcel, at the step's end. */
  selection: Record<string, Float64Array>;
  /** mm of pre-record water below the last parcel. */
  preRecordDepth: number;
}

/** What became of one step's inflow. */
export interface FollowedInflow {
  step: number;
  /** mm that entered in that step. */
  entered: number;
  /** By outflow: [N − step] mm that had left by the end of each step since. */
  left: Record<string, Float64Array>;
  /** [N − step] mm still stored at the end of each step. */
  stored: Float64Array;
}

/** A run's whole state at the end of its last step; JSON-safe. Made by `ColumnRun.checkpoint()`, read by `resumeColumn`. */
export interface Checkpoint {
  kind: 'rillage-checkpoint';
  version: 1;
  /** Steps since the record began. */
  steps: number;
  recordStart: string;
  stepDays: number;
  catchment: Catchment;
  ageResolution: number;
  /** Engine state: numbers only. Its fields are no part of the public interface. */
  state: Record<string, number | (number | null)[]>;
}

/** What is shared by every call that may take long. */
export interface CallOptions {
  signal?: AbortSignal;
  /** Called with a share 0..1 at most every 50 ms or so. */
  onProgress?: (progress: { done: number; phase?: string }) => void;
}

export type Severity = 'note' | 'warning' | 'stop';

/** One thing the intake noticed. */
export interface Finding {
  code: string;
  severity: Severity;
  /** Column, series or place in the forcing. */
  where: string;
  /** Rows in the text, from 1 (the first twenty of them). */
  rows?: number[];
  /** How many values it concerns. */
  count?: number;
  /** What was seen, in words. */
  seen: string;
  /** What was done about it, in words. */
  done: string;
  /** How to settle it, in words. */
  settle?: string;
}

/** Every assumption the intake made, with a hash of its source, so that it can be run again. */
export interface Receipt {
  kind: 'rillage-receipt';
  version: 1;
  /** sha-256 of the source texts' UTF-8 bytes, hex, in the order given. */
  sources: { name: string; sha256: string; bytes: number }[];
  /** The layout as settled, every default written out. */
  layout: unknown;
  acts: Finding[];
}

/** A laboratory value. */
export interface Sample {
  tracer: string;
  /** Of what: an outflow's name. Default `discharge`. */
  of?: string;
  /** ISO instants; a grab sample has equal ones. */
  from: string;
  to: string;
  value: number;
  unit: string;
  /** Stated standard error in the same unit. */
  error?: number;
  /** `below`: the value is a detection limit and the truth is below it. */
  censored?: 'below' | 'above';
}

/** 5 to 95 % over the draws of a fit and over its alternatives. */
export interface Range {
  low: number;
  high: number;
}

export interface ShareYounger {
  /** Age limit, days. */
  days: number;
  /** 0..1, known to be younger; null where nothing can be said. */
  share: number | null;
  /** Share that cannot be placed on either side because the record is shorter than `days`: the truth lies in [share, share + unplaced]. */
  unplaced: number;
  /** null: not assessed. */
  range: Range | null;
}

export interface MedianAge {
  days: number;
  /** The median is older than `days`; all that is known. */
  beyondRecord: boolean;
  /** null: not assessed. `highBeyondRecord`: the upper end is a lower bound. */
  range: (Range & { highBeyondRecord: boolean }) | null;
}

/** The public statement for one moment. Everything a page shows, and what it rests on. */
export interface Reading {
  kind: 'rillage-reading';
  version: 1;
  station?: { id: string; name: string; invented?: boolean };
  /** The outflow it speaks of, usually `discharge`. */
  of: string;
  /** The data's time: ISO instant at the end of the step. */
  at: string;
  stepDays: number;
  status: 'given' | 'withheld';
  /** Reasons, when withheld; codes are stable. */
  withheld: {
    code: 'noOutflow' | 'recordTooShort' | 'storageRunsDown' | 'preRecordDominates' | 'fitNotConverged' | 'notAssessed' | (string & {});
    because: string;
  }[];
  /** `notAssessed` for a reading from a single run. */
  confidence: 'firm' | 'tentative' | 'withheld' | 'notAssessed';
  /** The rules that led there, in words. */
  confidenceBecause: string[];
  younger: ShareYounger[];
  median: MedianAge | null;
  olderThanRecord: { share: number | null; range: Range | null };
  /** Share resting on spin-up water, 0 without spin-up. */
  assumedShare: number;
  /** Against the same season (± 15 days) of earlier years in the history: the youngest-month share. null where the history is too short. */
  trend: { direction: 'younger' | 'older' | 'usual'; days: number; usualShare: number; years: number } | null;
  language: string;
  /** One to four plain sentences. */
  sentence: string;
  /** The same, one by one; the first can stand alone as a headline. */
  sentences?: string[];
  caution: string;
  evidence: {
    recordFrom: string;
    recordTo: string;
    samples: number | null;
    lastSample: string | null;
    method: string;
    /** Version of the SDK that made it. */
    version: string;
    sources: { name: string; sha256: string }[];
  };
}

/** An age distribution with its range, as the age plot draws it. */
export interface DistributionWithRange extends AgeDistribution {
  of: string;
  at: string;
  /** null: not assessed. Same length as `ageDays`. */
  low: Float64Array | number[] | null;
  high: Float64Array | number[] | null;
  preRecordShare: number;
  preRecordRange: Range | null;
  /** Days from the record's start to `at`: the curve ends here. */
  recordDays: number;
}

/** A run and how much it counts. A fit's draws are many of them. */
export interface WeightedRun {
  /** Not negative; only the ratios matter. */
  weight: number;
  run: ColumnRun;
}

/** What a reading or a station is made from: a single run, or runs with weights over the same steps. */
export type ReadingSource = ColumnRun | readonly WeightedRun[];

/** One value a step, oldest first; bounded in length. null where there was no outflow. */
export interface StationHistory {
  /** ISO instant at which the first kept step begins. */
  start: string;
  stepDays: number;
  /** mm/day */
  flow: (number | null)[];
  /** Share younger than each age, keyed by days as text: `"7"`, `"30"`, `"90"`, `"365"`. */
  younger: Record<string, (number | null)[]>;
  /** 5–95 % of the same, when assessed. */
  youngerLow?: Record<string, (number | null)[]>;
  youngerHigh?: Record<string, (number | null)[]>;
  medianDays: (number | null)[];
  medianLow?: (number | null)[];
  medianHigh?: (number | null)[];
  /** 1 where `medianDays` is a lower bound. */
  medianBeyondRecord: (0 | 1)[];
  preRecordShare: (number | null)[];
  /** By tracer, simulated. */
  concentration: Record<string, (number | null)[]>;
}

/** The last rows of the forcing as they were used, so that rows sent again can be told from rows that contradict. */
export interface StationRows {
  /** ISO instant at which the first kept row begins. */
  start: string;
  inflow: number[];
  outflows: Record<string, number[]>;
}

/** One member of an ensemble: a draw's catchment with its running state. */
export interface StationMember {
  weight: number;
  checkpoint: Checkpoint;
}

/** One gauge as a file. Versioned JSON, bounded in size, sealed by a hash of its canonical content. */
export interface Station {
  kind: 'rillage-station';
  version: 1;
  id: string;
  name: string;
  /** True for invented demo data; shown wherever the station is. */
  invented?: boolean;
  description?: string;
  latitude?: number;
  areaKm2?: number;
  /** The outflow its readings speak of. */
  of: string;
  /** At least one. One: a single run, ranges not assessed. */
  members: StationMember[];
  /** Summary of the fit that made the members; absent for a single run. */
  fit?: unknown;
  history: StationHistory;
  /** At most 400 steps. */
  recent?: StationRows;
  /** mm since the record began. */
  balance?: { inflow: number; outflow: number };
  distribution: DistributionWithRange;
  reading: Reading;
  receipt?: Receipt;
  samples?: { count: number; last: string | null };
  signedOff?: { by: string; at: string };
  /** sha-256 over the canonical JSON of everything else. */
  seal: string;
}

/**
 * What of a station the public is shown: all that the elements draw from, nothing that a morning's work continues from. A small file to lay
 * beside the page, while the station itself stays with the service.
 */
export interface StationExcerpt extends Omit<Station, 'kind' | 'members' | 'fit' | 'recent' | 'balance' | 'receipt'> {
  kind: 'rillage-excerpt';
  /** Seal of the station that it was taken from. */
  stationSeal: string;
}
