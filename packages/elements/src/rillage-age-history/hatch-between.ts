/**
 * Hatching between two edges that change along x, as path data: diagonal strokes as everywhere, each cut where it leaves the area.
 * @param edges  places increasing in x, px, with the upper and the lower edge there; linear between
 */
export function hatchBetween(edges: [x: number, top: number, bottom: number][], gap = 6): string {
  if (edges.length < 2) return '';
  const left = Math.round(edges[0]![0]);
  const columns = Math.max(1, Math.round(edges[edges.length - 1]![0]) - left);
  const tops = new Float64Array(columns + 1);
  const bottoms = new Float64Array(columns + 1);
  let next = 1;
  let [highest, lowest] = [Infinity, -Infinity];
  for (let column = 0; column <= columns; column++) {
    const x = left + column;
    while (next < edges.length - 1 && edges[next]![0] < x) next++;
    const [before, after] = [edges[next - 1]!, edges[next]!];
    const along = Math.max(0, Math.min(1, (x - before[0]) / (after[0] - before[0] || 1)));
    tops[column] = before[1] + along * (after[1] - before[1]);
    bottoms[column] = before[2] + along * (after[2] - before[2]);
    highest = Math.min(highest, tops[column]!);
    lowest = Math.max(lowest, bottoms[column]!);
  }
  const strokes: string[] = [];
  const first = Math.ceil((left + highest) / gap) * gap;
  for (let sum = first; sum <= left + columns + lowest; sum += gap) {
    let since = -1;
    for (let column = Math.max(0, Math.floor(sum - lowest - left)); column <= columns + 1; column++) {
      const y = sum - left - column;
      const inside = column <= columns && y >= tops[column]! && y <= bottoms[column]!;
      if (inside && since < 0) since = column;
      if (inside || since < 0) {
        if (y < highest) break;
        continue;
      }
      const end = column - 1;
      if (end > since) strokes.push(`M${left + since} ${Math.round(sum - left - since)}L${left + end} ${Math.round(sum - left - end)}`);
      since = -1;
    }
  }
  return strokes.join('');
}
