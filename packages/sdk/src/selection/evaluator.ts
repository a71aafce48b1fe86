import type { Catchment } from '../contract.js';
import { RillageError, type Issue } from '../errors.js';
import { AmountTable, drivenValue, inDomain, type DrivenSlot } from './amount.js';
import type { Curve, Piece } from './curve.js';
import { CurveTable } from './curveTable.js';
import { compileForm } from './forms.js';

const WEIGHT_TOLERANCE = 1e-9;

/** Gives the value of a driver at the middle of the step at hand. */
export type DriverSource = (driver: string) => number;

/** One piece of one outflow's selection, with the numbers it has in the step at hand. */
export interface ActivePiece {
  readonly piece: Piece;
  readonly outflow: number;
  readonly steady: boolean;
  readonly limit: 'youngest' | 'oldest' | null;
  readonly curve: Curve | null;
  readonly table: CurveTable | null;
  readonly overTotal: boolean;
  weight: number;
  inverseScale: number;
  from: number;
  p: number;
  q: number;
}

/** The selections of a catchment, ready to be evaluated: Ω_f(S_T) of every outflow at one depth and one total storage. */
export class SelectionEvaluator {
  readonly pieces: readonly ActivePiece[];
  /** By outflow: weight of its youngest-first part in this step. */
  readonly youngest: Float64Array;
  readonly steady: boolean;
  /** Names of the drivers in use. */
  readonly drivers: readonly string[];
  private readonly amounts: AmountTable;
  private readonly mixtures: { outflow: number; name: string }[];

  constructor(
    readonly names: readonly string[],
    selection: Catchment['selection'],
    /** Without tables: every curve is evaluated itself. */
    private readonly exact = false,
  ) {
    const issues: Issue[] = [];
    this.amounts = new AmountTable(issues);
    const compiled = names.map((name) => compileForm(selection[name], `selection.${name}`, this.amounts, []));
    if (issues.length > 0) throw new RillageError(issues);
    this.steady = this.amounts.driven.length === 0;
    this.drivers = [...new Set(this.amounts.driven.map((entry) => entry.amount.driver))];
    this.pieces = compiled.flatMap((list, outflow) => list.map((one) => this.activate(one, outflow)));
    this.youngest = new Float64Array(names.length);
    this.mixtures = names
      .map((name, outflow) => ({ name, outflow }))
      .filter((_entry, index) => compiled[index].some((one) => one.weights.length > 0));
    if (this.steady) this.setNumbers(0);
    else this.fillNumbers();
  }

  /** Sets every driven parameter for one step. @throws RillageError `parameter-domain` or `mixture-weights`, naming the step */
  setStep(step: number, source: DriverSource): void {
    if (this.steady) return;
    const values = this.amounts.values;
    for (const entry of this.amounts.driven) {
      const driver = source(entry.amount.driver);
      const value = drivenValue(entry.amount, driver);
      if (!inDomain(value, entry.domain)) throw outsideDomain(entry, step, driver, value);
      values[entry.slot] = value;
    }
    this.setNumbers(step);
  }

  /**
   * Ω_f(depth) of every outflow.
   * @param depth mm, S_T; 0 and below give 0, but for the youngest-first part, which takes from any depth
   * @param total mm, total storage at that moment
   * @param out [outflows] shares 0..1
   */
  evaluate(depth: number, total: number, out: Float64Array): void {
    for (let f = 0; f < out.length; f++) out[f] = this.youngest[f];
    if (depth <= 0) return;
    for (const active of this.pieces) {
      if (active.limit !== null) {
        if (active.limit === 'oldest' && depth >= total) out[active.outflow] += active.weight;
        continue;
      }
      const x = active.overTotal ? depth / total : (depth - active.from) * active.inverseScale;
      const share = active.table !== null ? active.table.share(x) : active.curve!.share(x, active.p, active.q);
      out[active.outflow] += active.weight * share;
    }
  }

  /** Every pair of shape parameters that a piece may come near: the constants, or the values a driven one is given. */
  shapesOf(active: ActivePiece): [number, number][] {
    const of = (slot: number): number[] => {
      if (slot < 0) return [NaN];
      return this.amounts.driven.find((entry) => entry.slot === slot)?.amount.value ?? [this.amounts.values[slot]];
    };
    return of(active.piece.p).flatMap((p) => of(active.piece.q).map((q): [number, number] => [p, q]));
  }

  private activate(piece: Piece, outflow: number): ActivePiece {
    const constant = (slot: number): boolean => this.amounts.isConstant(slot);
    const values = this.amounts.values;
    const curve = piece.curve;
    const shapeFixed = constant(piece.p) && constant(piece.q);
    const table =
      curve !== null && curve.costly && shapeFixed && !this.exact
        ? new CurveTable(curve, values[piece.p], piece.q < 0 ? NaN : values[piece.q])
        : null;
    const steady = [...piece.weights, piece.scale, piece.from].every(constant) && shapeFixed;
    const overTotal = curve?.over === 'total';
    return { piece, outflow, steady, limit: piece.limit, curve, table, overTotal, weight: 1, inverseScale: 1, from: 0, p: NaN, q: NaN };
  }

  private setNumbers(step: number): void {
    this.fillNumbers();
    for (const mixture of this.mixtures) this.checkWeights(mixture, step);
  }

  private fillNumbers(): void {
    const values = this.amounts.values;
    this.youngest.fill(0);
    for (const active of this.pieces) {
      const { piece } = active;
      let weight = 1;
      for (const slot of piece.weights) weight *= values[slot];
      active.weight = weight;
      if (piece.scale >= 0) active.inverseScale = 1 / values[piece.scale];
      if (piece.from >= 0) active.from = values[piece.from];
      if (piece.p >= 0) active.p = values[piece.p];
      if (piece.q >= 0) active.q = values[piece.q];
      if (active.limit === 'youngest') this.youngest[active.outflow] += weight;
    }
  }

  private checkWeights(mixture: { outflow: number; name: string }, step: number): void {
    let sum = 0;
    for (const active of this.pieces) if (active.outflow === mixture.outflow) sum += active.weight;
    if (Math.abs(sum - 1) <= WEIGHT_TOLERANCE) return;
    throw new RillageError({
      code: 'mixture-weights',
      path: `selection.${mixture.name}`,
      ...(this.steady ? {} : { step }),
      expected: 'weights that add up to 1',
      received: String(sum),
    });
  }
}

function outsideDomain(entry: DrivenSlot, step: number, driver: number, value: number): RillageError {
  return new RillageError({
    code: 'parameter-domain',
    path: entry.path,
    step,
    expected: entry.domain.words,
    received: `${value} where ${entry.amount.driver} is ${driver}`,
    hint: 'Change the values of the driven parameter, or the places they belong to, so that it stays inside its domain on every step.',
  });
}
