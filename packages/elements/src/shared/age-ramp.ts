/**
 * Colour means age and nothing else: six colours, light to dark, one for each class of age. The classes end at a week, a month, a season,
 * a year and ten years; the custom property `--rillage-age-N` holds the colour of the N-th.
 */
export const classLimits = [7, 30, 91, 365, 3652] as const;

/** Number 1..6 of the class an age lies in; an age at a limit still belongs to the younger class. */
export function ageClass(days: number): number {
  const index = classLimits.findIndex((limit) => days <= limit);
  return index < 0 ? 6 : index + 1;
}

/** Position 0..5 along the ramp for smooth colouring: a whole number in the middle (on a log scale) of each class, linear in log age between. */
export function rampPosition(days: number): number {
  if (!(days > middles[0]!)) return 0;
  for (let index = 1; index < middles.length; index++) {
    const [young, old] = [middles[index - 1]!, middles[index]!];
    if (days <= old) return index - 1 + Math.log(days / young) / Math.log(old / young);
  }
  return 5;
}

/** Colours by default. Each area also has an ink outline and a label, since no ramp passes 3:1 at both ends. */
export const rampDefaults = ['#e4e1ac', '#89d298', '#12a7a7', '#01729f', '#323981', '#30114a'] as const;

// Geometric middles of the classes, the first from one day, the last up to thirty years.
const edges = [1, ...classLimits, 10957];
const middles = edges.slice(1).map((older, index) => Math.sqrt(older * edges[index]!));
