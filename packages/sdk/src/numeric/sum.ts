/**
 * Sum with the rounding of every addition carried along, as accurate as if summed in twice the precision and rounded once.
 *
 * @param values [n] any unit
 * @returns their sum in the same unit; 0 if n = 0; NaN or infinite where the plain sum is
 * @source A. Neumaier 1974, Zeitschrift für Angewandte Mathematik und Mechanik 54 (from memory)
 */
export function sum(values: ArrayLike<number>): number {
  let total = 0;
  let carry = 0;
  for (let i = 0; i < values.length; i++) {
    const value = values[i];
    const next = total + value;
    carry += Math.abs(total) >= Math.abs(value) ? total - next + value : value - next + total;
    total = next;
  }
  // An infinite total leaves NaN in the carry.
  return Number.isFinite(total) ? total + carry : total;
}
