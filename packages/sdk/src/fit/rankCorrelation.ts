/**
 * Spearman's rank correlation: the correlation of the ranks, ties averaged.
 * @returns −1..1; NaN for fewer than three pairs or where all of a series is one value
 * @throws nothing; the shorter length counts
 * @source Spearman (1904); checked against a printed example in the tests
 */
export function rankCorrelation(a: ArrayLike<number>, b: ArrayLike<number>): number {
  const count = Math.min(a.length, b.length);
  if (count < 3) return NaN;
  const first = ranks(a, count);
  const second = ranks(b, count);
  const middle = (count - 1) / 2;
  let together = 0;
  let own = 0;
  let other = 0;
  for (let i = 0; i < count; i++) {
    together += (first[i] - middle) * (second[i] - middle);
    own += (first[i] - middle) ** 2;
    other += (second[i] - middle) ** 2;
  }
  return own > 0 && other > 0 ? together / Math.sqrt(own * other) : NaN;
}

function ranks(values: ArrayLike<number>, count: number): Float64Array {
  const order = Array.from({ length: count }, (_value, i) => i).sort((i, j) => values[i] - values[j] || i - j);
  const result = new Float64Array(count);
  for (let first = 0; first < count;) {
    let last = first;
    while (last + 1 < count && values[order[last + 1]] === values[order[first]]) last++;
    for (let k = first; k <= last; k++) result[order[k]] = (first + last) / 2;
    first = last + 1;
  }
  return result;
}
