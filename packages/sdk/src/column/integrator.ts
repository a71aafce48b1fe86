import type { SelectionEvaluator } from '../selection/index.js';

/** Dormand & Prince (1980), J. Comput. Appl. Math. 6, 19: fifth order with an embedded fourth; coefficients from memory, identity tested. */
export const NODES = [0, 1 / 5, 3 / 10, 4 / 5, 8 / 9, 1, 1];
export const STAGES = [
  [],
  [1 / 5],
  [3 / 40, 9 / 40],
  [44 / 45, -56 / 15, 32 / 9],
  [19372 / 6561, -25360 / 2187, 64448 / 6561, -212 / 729],
  [9017 / 3168, -355 / 33, 46732 / 5247, 49 / 176, -5103 / 18656],
  [35 / 384, 0, 500 / 1113, 125 / 192, -2187 / 6784, 11 / 84],
];
export const ERROR_WEIGHTS = [71 / 57600, 0, -71 / 16695, 71 / 1920, -17253 / 339200, 22 / 525, -1 / 40];

const STAGE_COUNT = 7;
const SMALLEST_PART = 1e-7;
/** t ∝ s^4 turns the start Ω ~ S^a, S ~ t of a new boundary into a smooth one for every a down to about 0.3. */
const START_POWER = 4;
/** Boundaries that start above this share of the step's inflow count as near the surface. */
const SHALLOW = 0.3;

/**
 * Carries one boundary of the age-ranked storage through one step: dS/dt = J − Σ F_f Ω_f(S, t), with the depth X_f of each outflow
 * taken from water younger than the boundary. S is never integrated by itself: S = S(0) + J t − Σ X_f, so water closes by construction.
 *
 * Adaptive, with the error of X held below `tolerance` × (total outflow of the step). The bottom of storage is not known here.
 * @source method: the balance followed along its own path; Dormand & Prince 1980
 */
export class StepIntegrator {
  /** [outflows] mm taken from water younger than the boundary over the step. */
  readonly taken: Float64Array;
  /** [outflows] Ω at the boundary at the end of the step. */
  readonly share: Float64Array;
  private readonly count: number;
  private readonly stage: Float64Array;
  private readonly trial: Float64Array;
  private inflow = 0;
  private days = 1;
  private total = 0;
  private totalRate = 0;
  private allowed = 0;
  private largestPart = 1;
  private readonly flux: Float64Array;

  constructor(private readonly evaluator: SelectionEvaluator) {
    this.count = evaluator.names.length;
    this.taken = new Float64Array(this.count);
    this.share = new Float64Array(this.count);
    this.trial = new Float64Array(this.count);
    this.flux = new Float64Array(this.count);
    this.stage = new Float64Array(STAGE_COUNT * this.count);
  }

  /** Sets what all boundaries of a step share. */
  setStep(days: number, inflow: number, flux: Float64Array, totalAtStart: number, tolerance: number, largestPart: number): void {
    let out = 0;
    for (let f = 0; f < this.count; f++) {
      this.flux[f] = flux[f];
      out += flux[f];
    }
    this.days = days;
    this.inflow = inflow;
    this.total = totalAtStart;
    this.totalRate = inflow - out;
    this.allowed = tolerance * out * days;
    this.largestPart = largestPart;
  }

  /**
   * @param start mm, S at the start of the step
   * @returns mm, S at the end of the step; `taken` and `share` hold the rest
   */
  carry(start: number): number {
    const { count, taken, trial, flux, stage, share, inflow, evaluator } = this;
    const span = this.days;
    const power = inflow > 0 && start < SHALLOW * inflow * span ? START_POWER : 1;
    taken.fill(0);
    let depth = start > 0 ? start : 0;
    let offset = 0; // what S was set to beyond start + J t − ΣX, when it was held at 0
    let s = 0;
    let part = this.largestPart;
    let fresh = true;
    for (let tries = 0; s < 1 && tries < 10_000; tries++) {
      if (depth <= 0 && this.holdsAtSurface()) {
        this.slide((1 - s ** power) * span);
        depth = 0;
        break;
      }
      if (part > this.largestPart) part = this.largestPart;
      if (s + part > 1) part = 1 - s;
      let end = 0;
      for (let k = fresh ? 0 : 1; k < STAGE_COUNT; k++) {
        const place = s + NODES[k] * part;
        const time = power === 1 ? place : place ** power;
        const speed = power === 1 ? span : power * place ** (power - 1) * span;
        let reached = start + offset + inflow * time * span;
        for (let f = 0; f < count; f++) {
          let sum = 0;
          const row = STAGES[k];
          for (let j = 0; j < k; j++) sum += row[j] * stage[j * count + f];
          trial[f] = taken[f] + part * sum;
          reached -= trial[f];
        }
        evaluator.evaluate(reached, this.total + this.totalRate * time * span, share);
        for (let f = 0; f < count; f++) stage[k * count + f] = flux[f] * share[f] * speed;
        if (k === STAGE_COUNT - 1) end = reached;
      }
      let error = 0;
      for (let f = 0; f < count; f++) {
        let sum = 0;
        for (let j = 0; j < STAGE_COUNT; j++) sum += ERROR_WEIGHTS[j] * stage[j * count + f];
        error = Math.max(error, Math.abs(sum * part));
      }
      const ratio = error / this.allowed;
      if (ratio > 1 && part > SMALLEST_PART) {
        part *= Math.max(0.15, 0.9 * ratio ** -0.2);
        fresh = true;
        continue;
      }
      if (end < -this.allowed && part > SMALLEST_PART) {
        // come closer to the moment at which it is used up
        part *= Math.max(0.1, (0.95 * depth) / (depth - end));
        fresh = true;
        continue;
      }
      if (end < 0) {
        // used up within this part: all of what was left goes, in the proportion in which it was going
        let before = start + offset + inflow * s ** power * span;
        let gone = 0;
        for (let f = 0; f < count; f++) {
          before -= taken[f];
          gone += trial[f] - taken[f];
        }
        const arrived = inflow * ((s + part) ** power - s ** power) * span;
        const keep = Math.max(0, Math.min(1, (before + arrived) / gone));
        for (let f = 0; f < count; f++) taken[f] += keep * (trial[f] - taken[f]);
        s += part;
        offset = -(start + inflow * s ** power * span);
        for (let f = 0; f < count; f++) offset += taken[f];
        depth = 0;
        if (inflow <= 0) break;
        fresh = true;
        continue;
      }
      for (let f = 0; f < count; f++) {
        taken[f] = trial[f];
        stage[f] = stage[(STAGE_COUNT - 1) * count + f];
      }
      depth = end;
      fresh = false;
      s += part;
      part *= Math.min(5, 0.9 * Math.max(ratio, 1e-6) ** -0.2);
    }
    return depth;
  }

  /** Whether youngest-first outflows take all inflow, so that the boundary stays at depth 0. */
  private holdsAtSurface(): boolean {
    let demand = 0;
    for (let f = 0; f < this.count; f++) demand += this.flux[f] * this.evaluator.youngest[f];
    return demand > 0 && demand >= this.inflow;
  }

  private slide(days: number): void {
    let demand = 0;
    for (let f = 0; f < this.count; f++) demand += this.flux[f] * this.evaluator.youngest[f];
    for (let f = 0; f < this.count; f++) this.taken[f] += (this.inflow * days * this.flux[f] * this.evaluator.youngest[f]) / demand;
    this.evaluator.evaluate(0, this.total, this.share);
  }
}
