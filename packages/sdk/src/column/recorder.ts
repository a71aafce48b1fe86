import type { AgeDistribution, ColumnRun, ColumnSnapshot, FollowedInflow, OutflowAges, RunOptions } from '../contract.js';
import type { SelectionEvaluator } from '../selection/index.js';
import type { ColumnState } from './columnState.js';
import type { InflowClock } from './inflowClock.js';
import { firstYoungerThan, shareAfter, timeOfAmount, timeOfShare } from './observe.js';

export const BEYOND_RECORD = 1;
export const ON_ASSUMED_WATER = 2;

/** What a run keeps: the series that were asked for, and whole columns and distributions at chosen steps. */
export class Recorder {
  readonly storage: Float64Array;
  readonly outflows: Record<string, OutflowAges> = Object.create(null) as Record<string, OutflowAges>;
  readonly snapshots = new Map<number, ColumnSnapshot>();
  readonly followed = new Map<number, FollowedInflow>();
  readonly follows: readonly number[];
  private readonly ages: readonly number[];
  private readonly quantiles: readonly number[];
  private readonly distributionsAt: ReadonlySet<number>;
  private readonly snapshotsAt: ReadonlySet<number>;
  /** By age: the first parcel wholly younger, and the share of the one before it that is. */
  private readonly firsts: Int32Array;
  private readonly partial: Float64Array;
  /** By age: where in the clock it lay. */
  private readonly places: Int32Array;
  private readonly byOutflow: OutflowAges[];
  private readonly shareSeries: Float64Array[][];
  private readonly quantileSeries: { days: Float64Array; beyondRecord: Uint8Array }[][];
  private readonly concentrations: Float64Array[][];
  private readonly share: Float64Array;

  constructor(
    private readonly names: readonly string[],
    private readonly tracerNames: readonly string[],
    private readonly steps: number,
    private readonly stepDays: number,
    options: RunOptions,
  ) {
    this.storage = new Float64Array(steps);
    this.ages = [...new Set(options.youngerThan ?? [])];
    this.quantiles = [...new Set(options.quantiles ?? [])];
    this.distributionsAt = new Set(options.distributionsAt ?? []);
    this.snapshotsAt = new Set(options.snapshotsAt ?? []);
    this.follows = [...new Set(options.followInflowOf ?? [])];
    this.firsts = new Int32Array(this.ages.length);
    this.partial = new Float64Array(this.ages.length);
    this.places = new Int32Array(this.ages.length);
    this.share = new Float64Array(names.length);
    for (const name of names) {
      const concentration = Object.create(null) as Record<string, Float64Array>;
      for (const tracer of tracerNames) concentration[tracer] = new Float64Array(steps);
      this.outflows[name] = {
        flow: new Float64Array(steps),
        youngerShare: new Map(this.ages.map((age) => [age, new Float64Array(steps)])),
        quantiles: new Map(this.quantiles.map((p) => [p, { days: new Float64Array(steps), beyondRecord: new Uint8Array(steps) }])),
        preRecordShare: new Float64Array(steps),
        assumedShare: new Float64Array(steps),
        distributions: new Map<number, AgeDistribution>(),
        concentration,
      };
    }
    this.byOutflow = names.map((name) => this.outflows[name]);
    this.shareSeries = this.byOutflow.map((out) => this.ages.map((age) => out.youngerShare.get(age)!));
    this.quantileSeries = this.byOutflow.map((out) => this.quantiles.map((p) => out.quantiles.get(p)!));
    this.concentrations = this.byOutflow.map((out) => tracerNames.map((tracer) => out.concentration[tracer]));
  }

  /** Index by which a parcel of this step is followed, −1 if it is not. */
  followIndex(step: number): number {
    return this.follows.length === 0 ? -1 : this.follows.indexOf(step);
  }

  startFollowing(step: number, entered: number): void {
    const left: Record<string, Float64Array> = Object.create(null) as Record<string, Float64Array>;
    for (const name of this.names) left[name] = new Float64Array(this.steps - step);
    this.followed.set(step, { step, entered, left, stored: new Float64Array(this.steps - step) });
  }

  /**
   * Books step k of the run, which ends `now` steps after the record began.
   * @param flux      [outflows] mm/day
   * @param preTaken  [outflows] mm
   */
  record(k: number, now: number, state: ColumnState, clock: InflowClock | null, flux: Float64Array, preTaken: Float64Array): void {
    this.storage[k] = state.total;
    const { ages, quantiles, stepDays } = this;
    for (let a = 0; a < ages.length; a++) {
      const time = now - ages[a] / stepDays;
      const first = (this.firsts[a] = firstYoungerThan(state, time, this.firsts[a]));
      this.partial[a] = first > 0 ? shareAfter(state, clock, first - 1, time, this.places[a]) : 0;
      if (clock !== null) this.places[a] = clock.place;
    }
    for (let f = 0; f < this.byOutflow.length; f++) {
      const out = this.byOutflow[f];
      const amount = flux[f] * stepDays;
      out.flow[k] = flux[f];
      if (!(amount > 0)) {
        this.recordNothing(k, f);
        continue;
      }
      out.preRecordShare[k] = preTaken[f] / amount;
      if (state.assumed > 0) {
        const newer = state.assumed < state.count ? state.cumulative[f][state.assumed] : 0;
        out.assumedShare[k] = (state.cumulative[f][0] - newer) / amount;
      }
      for (let a = 0; a < ages.length; a++) {
        const first = this.firsts[a];
        const whole = first < state.count ? state.cumulative[f][first] : 0;
        const cut = this.partial[a] > 0 ? this.partial[a] * state.takenFrom(f, first - 1) : 0;
        this.shareSeries[f][a][k] = (whole + cut) / amount;
      }
      for (let q = 0; q < quantiles.length; q++) {
        const series = this.quantileSeries[f][q];
        const time = timeOfAmount(state, clock, f, quantiles[q] * amount);
        const beyond = Number.isNaN(time);
        series.days[k] = (beyond ? now : now - time) * stepDays;
        series.beyondRecord[k] = beyond ? BEYOND_RECORD : time < 0 ? ON_ASSUMED_WATER : 0;
      }
      if (this.distributionsAt.has(k)) out.distributions.set(k, distributionOf(state, clock, f, now, stepDays, amount));
    }
  }

  recordConcentration(k: number, tracer: number, mass: Float64Array, flux: Float64Array): void {
    for (let f = 0; f < this.concentrations.length; f++)
      this.concentrations[f][tracer][k] = flux[f] > 0 ? mass[f] / (flux[f] * this.stepDays) : NaN;
  }

  /** Books the followed parcels; called after `record`. */
  recordFollowed(k: number, state: ColumnState): void {
    for (let index = 0; index < this.follows.length; index++) {
      const step = this.follows[index];
      if (step > k) continue;
      const entry = this.followed.get(step);
      if (entry === undefined) continue;
      const place = k - step;
      for (let f = 0; f < this.names.length; f++) {
        const series = entry.left[this.names[f]];
        if (place > 0) series[place] = series[place - 1];
      }
      for (let i = 0; i < state.count; i++) {
        if (state.followed[i] !== index) continue;
        for (let f = 0; f < this.names.length; f++) entry.left[this.names[f]][place] += state.takenFrom(f, i);
        entry.stored[place] += state.depth[i];
      }
    }
  }

  recordSnapshot(k: number, now: number, state: ColumnState, evaluator: SelectionEvaluator): void {
    if (!this.snapshotsAt.has(k)) return;
    const count = state.count;
    const youngest = (from: Float64Array): Float64Array => Float64Array.from({ length: count }, (_value, i) => from[count - 1 - i]);
    const ageOf = (time: number): number => (now - time) * this.stepDays;
    const concentration = Object.create(null) as Record<string, Float64Array>;
    this.tracerNames.forEach((name, t) => (concentration[name] = youngest(state.concentration.subarray(t * state.capacity))));
    const selection = Object.create(null) as Record<string, Float64Array>;
    for (const name of this.names) selection[name] = new Float64Array(count);
    const depth = youngest(state.depth);
    let edge = 0;
    for (let i = 0; i < count; i++) {
      edge += depth[i];
      evaluator.evaluate(edge, state.total, this.share);
      const atBottom = edge >= state.total * (1 - 1e-12);
      this.names.forEach((name, f) => (selection[name][i] = atBottom ? 1 : edge > 0 ? this.share[f] : 0));
    }
    this.snapshots.set(k, {
      step: k,
      storage: state.total,
      youngestAge: youngest(state.entryEnd).map(ageOf),
      oldestAge: youngest(state.entryStart).map(ageOf),
      depth,
      concentration,
      assumed: Uint8Array.from({ length: count }, (_value, i) => (count - 1 - i < state.assumed ? 1 : 0)),
      selection,
      preRecordDepth: state.preRecord,
    });
  }

  result(): Pick<ColumnRun, 'steps' | 'storage' | 'outflows' | 'snapshots' | 'followed'> {
    return { steps: this.steps, storage: this.storage, outflows: this.outflows, snapshots: this.snapshots, followed: this.followed };
  }

  private recordNothing(k: number, f: number): void {
    const out = this.byOutflow[f];
    out.preRecordShare[k] = NaN;
    out.assumedShare[k] = NaN;
    for (const series of this.shareSeries[f]) series[k] = NaN;
    for (const series of this.quantileSeries[f]) series.days[k] = NaN;
  }
}

/** Cumulative shares at both edges of every parcel, youngest first; flat over ages at which nothing fell. */
function distributionOf(
  state: ColumnState,
  clock: InflowClock | null,
  f: number,
  now: number,
  stepDays: number,
  amount: number,
): AgeDistribution {
  const age: number[] = [];
  const share: number[] = [];
  let reached = 0;
  for (let i = state.count - 1; i >= 0; i--) {
    const younger = (now - state.entryEnd[i]) * stepDays;
    if (age.length === 0 || younger > age[age.length - 1]) {
      age.push(younger);
      share.push(reached);
    }
    const above = reached;
    reached = state.cumulative[f][i] / amount;
    // how what is left lies within a merged parcel
    for (let q = 3; clock !== null && q > 0 && !state.curves.isOne(i); q--) {
      age.push((now - timeOfShare(state, clock, i, 1 - q / 4)) * stepDays);
      share.push(above + (1 - q / 4) * (reached - above));
    }
    age.push((now - state.entryStart[i]) * stepDays);
    share.push(reached);
  }
  return { ageDays: Float64Array.from(age), youngerShare: Float64Array.from(share) };
}
