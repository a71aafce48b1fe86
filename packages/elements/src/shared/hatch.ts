/**
 * Water older than the record is never a colour: it is hatched. The strokes over a rectangle as path data, drawn rather than taken from a
 * pattern, since `url(#…)` fills break on pages with a `<base>`.
 */
export function hatchPath(x: number, y: number, width: number, height: number, gap = 6): string {
  const strokes: string[] = [];
  const first = Math.floor((x + y) / gap) * gap;
  for (let sum = first; sum <= x + width + y + height; sum += gap) {
    // The stroke x + y = sum, cut to the rectangle.
    const left = Math.max(x, sum - y - height);
    const right = Math.min(x + width, sum - y);
    if (right > left) strokes.push(`M${round(left)} ${round(sum - left)}L${round(right)} ${round(sum - right)}`);
  }
  return strokes.join('');
}

const round = (value: number): number => Math.round(value * 10) / 10;
