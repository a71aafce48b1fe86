import type { ActivePiece, SelectionEvaluator } from '../selection/index.js';

/** Error allowed in the share of an outflow taken above a boundary by one look-up. */
const TOLERANCE = 4e-4;
/** As in the fast pass: how far Ω seen at mid-step is extrapolated to the step's end. */
const AHEAD = 0.8;
const SAMPLES = 160;

/**
 * One midpoint look-up a boundary for every other smooth selection (beta, Kumaraswamy, power, driven shapes, three outflows and more),
 * wherever it is accurate enough; elsewhere the integrator is needed. How sharply Ω bends is bounded without regard to scale: |Ω''| ≤
 * sharpness / d² and Ω' ≤ steepness / d, with d the distance from the surface, or from the bottom where that is nearer.
 */
export class SmoothPass {
  /** [outflows] what `move` found. */
  readonly taken: Float64Array;
  readonly share: Float64Array;
  private readonly middle: Float64Array;

  private constructor(
    private readonly evaluator: SelectionEvaluator,
    private readonly sharpness: number,
    private readonly steepness: number,
    private readonly hasBottom: boolean,
  ) {
    this.taken = new Float64Array(evaluator.names.length);
    this.share = new Float64Array(evaluator.names.length);
    this.middle = new Float64Array(evaluator.names.length);
  }

  /** null where a selection has corners or is a limit. */
  static for(evaluator: SelectionEvaluator): SmoothPass | null {
    if (evaluator.pieces.some((active) => active.curve === null || active.curve.cornered)) return null;
    let sharpness = 0;
    let steepness = 0;
    for (const active of evaluator.pieces) {
      for (const [p, q] of evaluator.shapesOf(active)) {
        const bound = bendOf(active, p, q);
        sharpness = Math.max(sharpness, bound.sharpness);
        steepness = Math.max(steepness, bound.steepness);
      }
    }
    return new SmoothPass(
      evaluator,
      sharpness,
      steepness,
      evaluator.pieces.some((active) => active.overTotal),
    );
  }

  /** Whether one look-up will do for a boundary at `depth`; rates in mm/day, of this step and the last. */
  serves(depth: number, total: number, rate: number, lastRate: number, out: number, days: number): boolean {
    const distance = this.hasBottom ? Math.min(depth, total - depth) : depth;
    const reach = rate * days;
    if (!(distance > reach)) return false;
    const bend = (this.sharpness * reach * reach) / 24;
    const lag = (1 - AHEAD) * 0.25 * this.steepness * this.steepness * out * days * days * (rate + lastRate);
    return bend + lag <= TOLERANCE * distance * distance;
  }

  /** Moves parcel i's older edge, at `depth` mm, by one midpoint step; `lastShare` are Ω expected at the start of the step. */
  move(
    depth: number,
    i: number,
    lastShare: readonly Float64Array[],
    inflow: number,
    flux: Float64Array,
    days: number,
    totalAtMiddle: number,
  ): void {
    let drain = 0;
    for (let f = 0; f < flux.length; f++) drain += flux[f] * lastShare[f][i];
    this.evaluator.evaluate(depth + 0.5 * days * (inflow - drain), totalAtMiddle, this.middle);
    for (let f = 0; f < flux.length; f++) {
      this.taken[f] = flux[f] * days * this.middle[f];
      this.share[f] = this.middle[f] + AHEAD * (this.middle[f] - lastShare[f][i]);
    }
  }
}

/** Greatest d²|G''| and d G' of a curve with d = min(x, 1 − x) over total storage, x over depth; sampled evenly in the logarithm. */
function bendOf(active: ActivePiece, p: number, q: number): { sharpness: number; steepness: number } {
  const curve = active.curve!;
  let sharpness = 0;
  let steepness = 0;
  const look = (x: number, d: number): void => {
    const step = 0.01 * d;
    const bend = Math.abs(curve.density(x + step, p, q) - curve.density(x - step, p, q)) / (2 * step);
    if (Number.isFinite(bend)) sharpness = Math.max(sharpness, d * d * bend);
    const slope = curve.density(x, p, q);
    if (Number.isFinite(slope)) steepness = Math.max(steepness, d * slope);
  };
  for (let n = 0; n < SAMPLES; n++) {
    const d = 10 ** (-5 + (active.overTotal ? 4.7 : 8) * (n / (SAMPLES - 1)));
    if (active.overTotal) {
      look(d, d);
      look(1 - d, d);
    } else look(d * Math.max(curve.centre(p, q), 1e-3), d * Math.max(curve.centre(p, q), 1e-3));
  }
  return { sharpness, steepness };
}
