/** A cumulative curve as given: share younger at increasing ages. It starts from nothing at age zero and ends at the last age. */
export interface Curve {
  ages: ArrayLike<number>;
  shares: ArrayLike<number>;
}

/** Share younger than an age, linear between points; beyond the last point it stays there, since nothing is known of older water. */
export function shareAt({ ages, shares }: Curve, age: number): number {
  const after = firstAbove(ages, age);
  if (after === ages.length) return shares[ages.length - 1] ?? 0;
  const [age0, share0] = after ? [ages[after - 1]!, shares[after - 1]!] : [0, 0];
  const width = ages[after]! - age0;
  return width > 0 ? share0 + ((shares[after]! - share0) * (age - age0)) / width : shares[after]!;
}

/** Age by which a share is reached; Infinity where the curve ends below it. */
export function ageAt({ ages, shares }: Curve, share: number): number {
  let index = 0;
  while (index < shares.length && shares[index]! < share) index++;
  if (index === shares.length) return Infinity;
  const [age0, share0] = index ? [ages[index - 1]!, shares[index - 1]!] : [0, 0];
  const rise = shares[index]! - share0;
  return rise > 0 ? age0 + ((ages[index]! - age0) * (share - share0)) / rise : ages[index]!;
}

function firstAbove(values: ArrayLike<number>, value: number): number {
  let low = 0;
  let high = values.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (values[middle]! < value) low = middle + 1;
    else high = middle;
  }
  return low;
}
