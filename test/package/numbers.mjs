/**
 * Compares what two engines printed, number by number.
 * The language lets `Math.exp`, `Math.log` and `Math.pow` differ between engines in the last place, and Node and Deno ship different
 * ones; 400 steps may gather that to some 1e-13. A difference of 1e-11 is of another kind and fails.
 * @returns how many numbers, and the largest relative difference
 * @throws Error where the shapes differ, a number is missing, or the difference is too large
 */
export function compareNumbers(textA, textB, tolerance = 1e-11) {
  const a = flatten(JSON.parse(textA));
  const b = flatten(JSON.parse(textB));
  if (a.length !== b.length) throw new Error(`one printed ${a.length} numbers, the other ${b.length}`);
  let largest = 0;
  for (const [index, value] of a.entries()) {
    const other = b[index];
    // JSON has no NaN; both must lack the same ones.
    if ((value === null) !== (other === null)) throw new Error(`number ${index} is ${value} in one and ${other} in the other`);
    if (value !== null) largest = Math.max(largest, Math.abs(value - other) / Math.max(1e-9, Math.abs(value), Math.abs(other)));
  }
  const finite = a.filter((value) => value !== null).length;
  if (finite < a.length / 2) throw new Error(`only ${finite} of ${a.length} numbers are numbers`);
  if (!(largest <= tolerance)) throw new Error(`the largest relative difference is ${largest}`);
  return { count: finite, largest };
}

const flatten = (value) => (value !== null && typeof value === 'object' ? Object.values(value).flatMap(flatten) : [value]);
