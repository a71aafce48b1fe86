import type { AmountTable } from './amount.js';
import type { Piece } from './curve.js';

/** What a form's file provides: its name, the fields its plain data may have, and how it compiles to pieces. */
export interface FormDefinition {
  readonly form: string;
  readonly fields: readonly string[];
  compile(data: Readonly<Record<string, unknown>>, path: string, amounts: AmountTable, weights: readonly number[]): Piece[];
}

/** A piece with every optional slot unused. */
export function piece(weights: readonly number[], part: Partial<Piece>): Piece {
  return { weights, limit: null, curve: null, scale: -1, from: -1, p: -1, q: -1, ...part };
}
