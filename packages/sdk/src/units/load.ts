/**
 * Mass leaving a hectare with a depth of water: kg/ha = mm × mg/L / 100, since 1 mm over 1 ha is 10 m3.
 * @param depthMm mm
 * @param milligramPerLitre mg/L
 * @returns kg/ha
 * @source unit identity
 */
export function loadPerHectare(depthMm: number, milligramPerLitre: number): number {
  return (depthMm * milligramPerLitre) / 100;
}
