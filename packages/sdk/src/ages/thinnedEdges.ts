/**
 * Which lower edges to keep of a column's layers so that at most `most` are left and a picture of it loses least: edges evenly spaced along
 * m = depth / total depth + log((1 + oldest age) / (1 + youngest of all)) / the same over the whole column, each counting half.
 * @param depth      [K] mm, youngest first
 * @param oldestAge  [K] days, not falling
 * @returns          increasing counts of layers, one past the last of each group; the last is K. All of 1..K where K ≤ most
 */
export function thinnedEdges(depth: ArrayLike<number>, oldestAge: ArrayLike<number>, most: number): number[] {
  const count = depth.length;
  if (count <= most) return Array.from({ length: count }, (_, index) => index + 1);
  let total = 0;
  for (let index = 0; index < count; index++) total += depth[index];
  const first = Math.log1p(oldestAge[0]);
  const span = Math.log1p(oldestAge[count - 1]) - first;
  const ends: number[] = [];
  let bottom = 0;
  for (let index = 0; index < count; index++) {
    bottom += depth[index];
    const along = 0.5 * (total > 0 ? bottom / total : 1) + 0.5 * (span > 0 ? (Math.log1p(oldestAge[index]) - first) / span : 1);
    const left = count - index - 1;
    const room = most - ends.length;
    // An edge is kept once the measure has passed the next even mark, or where the groups left would otherwise be more than the layers.
    if (left === 0 || (room > 1 && (along * most >= ends.length + 1 || left < room))) ends.push(index + 1);
  }
  return ends;
}
