import type { Catchment, Checkpoint, ColumnRun, Forcing, RunOptions } from '../contract.js';
import { middleOfStep, seasonFraction, SelectionEvaluator } from '../selection/index.js';
import { planTracer, type TracerPlan } from '../tracers/parcelTracer.js';
import { ColumnState } from './columnState.js';
import { ColumnStep } from './columnStep.js';
import { InflowClock } from './inflowClock.js';
import { Recorder } from './recorder.js';
import { moveTracer, TracerLedger } from './tracerPass.js';
import { parseInstant } from './validate.js';

export const DEFAULT_AGE_RESOLUTION = 0.1;
/** Steps between passes that merge parcels and thin the clock; counted from the record's start, so that it never depends on who runs it. */
const MERGE_EVERY = 8;
const THIN_EVERY = 64;
/** Share of storage below which pre-record water counts as running short, and share of an outflow that counts as a lump. */
const NEARLY_GONE = 0.9;
const LUMP = 0.1;
/**
 * A parcel that is enriched or reacts is no longer alike within itself. Steps whose inflow feeds a large share of an outflow are cut into
 * parts for such tracers, so that a storm becomes several parcels: parts per share of the outflow, and at most.
 */
const PARTS_PER_SHARE = { default: 12, everyAge: 24 };
const MOST_PARTS = { default: 6, everyAge: 12 };

/** A run in progress: `advance` any number of steps at a time, then `finish`. The same bits however it is cut. */
export class ColumnRunner {
  readonly state: ColumnState;
  readonly clock: InflowClock | null;
  readonly ledgers: TracerLedger[];
  readonly step: ColumnStep;
  readonly evaluator: SelectionEvaluator;
  readonly names: readonly string[];
  readonly plans: readonly TracerPlan[];
  /** Steps of the record before this forcing. */
  before = 0;
  entered = 0;
  /** mm in and out since the record (or its spin-up) began, with the storage it began with. */
  balance: { initial: number; in: number; out: number };
  wetness: readonly [number, number];
  most = 0;
  private done = 0;
  private readonly recorder: Recorder;
  private readonly flux: Float64Array;
  /** [tracers][outflows] mass that left in the step. */
  private readonly masses: Float64Array[];
  private readonly preTaken: Float64Array;
  private readonly share: Float64Array;
  private takenBefore = new Float64Array(0);
  private readonly inputs: Float64Array[];
  private readonly fluxes: Float64Array[];
  private readonly reacts: boolean;
  private readonly limited: boolean;
  private readonly startMilliseconds: number;
  private middleStorage = 0;
  private at = 0;

  constructor(
    readonly catchment: Catchment,
    readonly forcing: Forcing,
    readonly options: RunOptions,
    readonly ageResolution: number,
    readonly recordStart: string,
    initialStorage: number,
  ) {
    this.names = Object.keys(catchment.selection);
    const tracers = Object.entries(catchment.tracers ?? {});
    this.plans = tracers.map(([name, rule]) => planTracer(name, rule, this.names));
    this.evaluator = new SelectionEvaluator(this.names, catchment.selection);
    this.state = new ColumnState(this.names.length, tracers.length, initialStorage);
    this.step = new ColumnStep(this.evaluator, ageResolution === 0);
    this.clock = ageResolution > 0 ? new InflowClock() : null;
    this.ledgers = this.plans.map(() => new TracerLedger());
    this.recorder = new Recorder(
      this.names,
      tracers.map(([name]) => name),
      forcing.inflow.length,
      forcing.stepDays,
      options,
    );
    this.flux = new Float64Array(this.names.length);
    this.masses = this.plans.map(() => new Float64Array(this.names.length));
    this.preTaken = new Float64Array(this.names.length);
    this.share = new Float64Array(this.names.length);
    this.inputs = this.plans.map((plan) => forcing.inflowConcentration[plan.name]);
    this.fluxes = this.names.map((name) => forcing.outflows[name]);
    this.limited = this.evaluator.pieces.some((active) => active.limit !== null);
    this.reacts = this.plans.some((plan) => !plan.conservative);
    this.startMilliseconds = parseInstant(forcing.start);
    this.balance = { initial: initialStorage, in: 0, out: 0 };
    this.wetness = [0, 1];
  }

  get stepsLeft(): number {
    return this.forcing.inflow.length - this.done;
  }

  /** Runs the record once without recording, its last step ending at step 0: water that it adds is assumed. */
  spinUp(repeats: number): void {
    const steps = this.forcing.inflow.length;
    for (let repeat = repeats; repeat > 0; repeat--) {
      for (let k = 0; k < steps; k++) this.advanceOne(k, -repeat * steps + k, -1);
    }
    this.state.merge(0, 0, 0);
    this.state.assumed = this.state.count;
  }

  advance(steps: number): void {
    const end = Math.min(this.done + steps, this.forcing.inflow.length);
    for (let k = this.done; k < end; k++) {
      const time = this.before + k;
      const follow = this.recorder.followIndex(k);
      if (follow >= 0) this.recorder.startFollowing(k, this.forcing.inflow[k] * this.forcing.stepDays);
      this.advanceOne(k, time, follow);
      this.recorder.record(k, time + 1, this.state, this.clock, this.flux, this.preTaken);
      for (let t = 0; t < this.plans.length; t++) this.recorder.recordConcentration(k, t, this.masses[t], this.flux);
      if (this.recorder.follows.length > 0) this.recorder.recordFollowed(k, this.state);
      this.recorder.recordSnapshot(k, time + 1, this.state, this.evaluator);
      this.tidy(time + 1);
    }
    this.done = end;
  }

  finish(checkpoint: () => Checkpoint): ColumnRun {
    return {
      start: this.forcing.start,
      stepDays: this.forcing.stepDays,
      ...this.recorder.result(),
      closure: this.closure(),
      parcels: { atEnd: this.state.count, most: this.most },
      checkpoint,
    };
  }

  /** Water and tracers of one step; `state.taken`, `preTaken` and `masses` hold what left in all of it. */
  private advanceOne(k: number, time: number, follow: number): void {
    const { state, forcing, flux, evaluator } = this;
    const inflow = forcing.inflow[k];
    let out = 0;
    for (let f = 0; f < flux.length; f++) {
      flux[f] = this.fluxes[f][k];
      out += flux[f];
    }
    this.at = k;
    this.middleStorage = state.total + 0.5 * (inflow - out) * forcing.stepDays;
    if (!evaluator.steady) evaluator.setStep(k, this.driver);
    for (const mass of this.masses) mass.fill(0);
    this.preTaken.fill(0);
    this.step.careful = this.oneParcelDecides();
    const parts = this.reacts && inflow > 0 ? this.partsFor(inflow * forcing.stepDays) : 1;
    const days = forcing.stepDays / parts;
    if (parts > 1) this.takenBefore.fill(0);
    for (let part = 0; part < parts; part++) {
      if (inflow > 0) {
        const before = this.entered;
        this.entered += inflow * days;
        state.append(time + part / parts, time + (part + 1) / parts, before, this.entered, follow);
        this.clock?.add(time + part / parts, time + (part + 1) / parts, before, this.entered);
      }
      if (this.reacts) state.keepBefore(inflow * days);
      this.step.advance(state, inflow > 0, inflow, flux, days);
      const { preTaken } = this.step;
      for (let t = 0; t < this.plans.length; t++) {
        moveTracer(state, this.plans[t], t, this.ledgers[t], inflow * days, this.inputs[t][k], days, preTaken, this.masses[t]);
      }
      for (let f = 0; f < preTaken.length; f++) this.preTaken[f] += preTaken[f];
      if (parts > 1) this.takenBefore = state.addTaken(this.takenBefore, part === parts - 1);
    }
    if (state.count > this.most) this.most = state.count;
    this.balance.in += inflow * forcing.stepDays;
    this.balance.out += out * forcing.stepDays;
    if (time < 0) this.tidy(time + 1);
  }

  private tidy(now: number): void {
    if (now % MERGE_EVERY === 0) this.state.merge(now, this.step.careful ? 0 : this.ageResolution, this.step.largestMerged);
    if (now % THIN_EVERY === 0) this.clock?.thin();
  }

  /**
   * Whether the youngest or the oldest parcel alone can feed a good share of an outflow: with a limit among the selections, or once
   * pre-record water runs out under selections that reach below the bottom. Then merged parcels would show, so none are made.
   */
  private oneParcelDecides(): boolean {
    const { state, evaluator } = this;
    if (this.limited) return true;
    if (state.preRecord > NEARLY_GONE * state.total) return false;
    evaluator.evaluate(state.total * (1 - 1e-9), state.total, this.share);
    return this.share.some((share) => 1 - share > LUMP);
  }

  private partsFor(depth: number): number {
    const mode = this.ageResolution === 0 ? 'everyAge' : 'default';
    this.evaluator.evaluate(depth, this.state.total, this.share);
    let share = 0;
    for (let f = 0; f < this.share.length; f++) if (this.share[f] > share) share = this.share[f];
    return Math.max(1, Math.min(MOST_PARTS[mode], Math.ceil(PARTS_PER_SHARE[mode] * share)));
  }

  private readonly driver = (name: string): number => {
    switch (name) {
      case 'storage':
        return this.middleStorage;
      case 'storageAnomaly':
        return this.middleStorage - this.catchment.initialStorage;
      case 'wetness':
        return (this.middleStorage - this.wetness[0]) / (this.wetness[1] - this.wetness[0]);
      case 'season':
        return seasonFraction(middleOfStep(this.startMilliseconds, this.forcing.stepDays, this.at));
      case 'discharge':
        return this.forcing.outflows['discharge'][this.at];
      default:
        return this.forcing.drivers![name][this.at];
    }
  };

  private closure(): ColumnRun['closure'] {
    const { state, balance } = this;
    let stored = state.preRecord;
    for (let i = 0; i < state.count; i++) stored += state.depth[i];
    const throughput = Math.max(balance.in, balance.out, Number.MIN_VALUE);
    const tracers: Record<string, number> = Object.create(null) as Record<string, number>;
    this.plans.forEach((plan, t) => {
      const ledger = this.ledgers[t];
      let mass = state.preRecord * plan.preRecord;
      let size = Math.abs(mass);
      for (let i = 0; i < state.count; i++) {
        const part = state.depth[i] * state.concentration[t * state.capacity + i];
        mass += part;
        size += Math.abs(part);
      }
      const missing = balance.initial * plan.preRecord + ledger.entered + ledger.held - ledger.left - ledger.reacted - mass;
      tracers[plan.name] = Math.abs(missing) / Math.max(Math.abs(ledger.entered), Math.abs(ledger.left), size, Number.MIN_VALUE);
    });
    return { water: Math.abs(balance.initial + balance.in - balance.out - stored) / throughput, tracers };
  }
}
