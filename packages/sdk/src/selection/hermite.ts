/**
 * Cubic Hermite value at fraction t of the interval that begins at `base`: nodes hold value and slope × interval width, the next node
 * `stride` further on.
 */
export function hermite(nodes: Float64Array, base: number, stride: number, t: number): number {
  const a = nodes[base];
  const d = nodes[base + 1];
  const e = nodes[base + stride + 1];
  const rise = nodes[base + stride] - a;
  return a + t * (d + t * (3 * rise - 2 * d - e + t * (d + e - 2 * rise)));
}
