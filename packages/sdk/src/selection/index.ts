import type { Selection } from '../contract.js';
import { RillageError } from '../errors.js';
import { SelectionEvaluator } from './evaluator.js';

export { SelectionEvaluator, type ActivePiece, type DriverSource } from './evaluator.js';
export { FORM_NAMES } from './forms.js';
export { middleOfStep, seasonFraction } from './season.js';

/**
 * Ω(S_T) of one selection with constant parameters: the share of the outflow drawn from the youngest `depth` mm.
 * @param depth [K] mm
 * @param total mm, total storage
 * @returns [K] shares 0..1
 * @throws RillageError as `runColumn` does for a selection; `driver-needed` if a parameter is driven
 */
export function selectionShare(selection: Selection, depth: ArrayLike<number>, total: number): Float64Array {
  const evaluator = new SelectionEvaluator(['outflow'], { outflow: selection }, true);
  if (!evaluator.steady) {
    throw new RillageError({
      code: 'driver-needed',
      path: 'selection.outflow',
      expected: 'constant parameters',
      received: `drivers ${evaluator.drivers.join(', ')}`,
      hint: 'Put numbers in place of the driven parameters, one set for each state of the driver.',
    });
  }
  const out = new Float64Array(1);
  return Float64Array.from(depth, (mm) => {
    evaluator.evaluate(mm, total, out);
    return mm <= 0 ? 0 : mm >= total ? 1 : out[0];
  });
}
