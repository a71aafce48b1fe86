/**
 * The words nearest to `text` by edit distance (insert, delete, replace, swap of neighbours; Damerau 1964), best first, without regard to case.
 * @returns at most `limit` words whose distance is no more than half the text's length, and never more than 3
 */
export function nearestWords(text: string, words: Iterable<string>, limit = 3): string[] {
  const wanted = text.slice(0, 40).toLowerCase();
  const reach = Math.min(3, Math.max(1, Math.floor(wanted.length / 2)));
  const near: { word: string; distance: number }[] = [];
  for (const word of words) {
    if (Math.abs(word.length - wanted.length) > reach) continue;
    const distance = editDistance(wanted, word.toLowerCase());
    if (distance <= reach) near.push({ word, distance });
  }
  return near
    .sort((a, b) => a.distance - b.distance)
    .slice(0, limit)
    .map(({ word }) => word);
}

/** Least number of inserted, deleted, replaced or swapped neighbouring characters that turns `a` into `b`. */
export function editDistance(a: string, b: string): number {
  let beforeLast: number[] = [];
  let last = Array.from({ length: b.length + 1 }, (_, column) => column);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const same = a[i - 1] === b[j - 1];
      let least = Math.min(last[j] + 1, row[j - 1] + 1, last[j - 1] + (same ? 0 : 1));
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) least = Math.min(least, beforeLast[j - 2] + 1);
      row.push(least);
    }
    beforeLast = last;
    last = row;
  }
  return last[b.length];
}
