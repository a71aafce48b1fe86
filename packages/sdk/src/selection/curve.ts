/**
 * What a form of selection compiles to: weighted pieces, each a limit (youngest or oldest water first) or a curve G over a normalised
 * depth x. x is S_T / S for curves over total storage and (S_T − from) / scale for curves over depth.
 */
export interface Curve {
  readonly name: string;
  readonly over: 'total' | 'depth';
  /** G(x), 0 for x ≤ 0; x ≤ 1 for curves over total storage. */
  share(x: number, p: number, q: number): number;
  /** dG/dx; may be infinite at an end. */
  density(x: number, p: number, q: number): number;
  /** Costly enough to be tabulated when its parameters are constant. */
  readonly costly: boolean;
  /** Has corners: no smooth table, no midpoint steps. */
  readonly cornered: boolean;
  /** x around which most of the curve happens; places the nodes of tables. */
  centre(p: number, q: number): number;
}

export interface Piece {
  /** Slots whose product is the weight. */
  readonly weights: readonly number[];
  readonly limit: 'youngest' | 'oldest' | null;
  readonly curve: Curve | null;
  /** Slots; −1 where not used. */
  readonly scale: number;
  readonly from: number;
  readonly p: number;
  readonly q: number;
}
