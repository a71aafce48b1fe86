import { logGamma } from '../../numeric/logGamma.js';
import { logSumExp } from '../leaveOneOut.js';

/** A mixture of multivariate Student-t distributions, as plain data: a picture of the posterior to draw proposals from. */
export interface Guide {
  parts: GuidePart[];
}

export interface GuidePart {
  /** Shares of all parts add up to 1. */
  weight: number;
  degrees: number;
  mean: number[];
  /** Lower triangle L of scale = L Lᵀ, by rows. */
  root: number[][];
  /** L⁻¹, likewise. */
  inverse: number[][];
  /** log density at the mean, weight included, up to a constant of the number of dimensions. */
  logHeight: number;
}

/** One draw. @param random a seeded generator */
export function drawGuide(guide: Guide, random: { uniform(): number; normal(): number }): number[] {
  let rest = random.uniform();
  const part = guide.parts.find(({ weight }) => (rest -= weight) < 0) ?? guide.parts[guide.parts.length - 1];
  const normals = part.mean.map(() => random.normal());
  let chiSquare = 0;
  for (let k = 0; k < part.degrees; k++) chiSquare += random.normal() ** 2;
  const stretch = Math.sqrt(part.degrees / chiSquare);
  return part.mean.map((centre, j) => {
    let sum = 0;
    for (let k = 0; k <= j; k++) sum += part.root[j][k] * normals[k];
    return centre + stretch * sum;
  });
}

/** log density, up to a constant that depends on the number of dimensions alone. */
export function guideLogDensity(guide: Guide, point: readonly number[]): number {
  return logSumExp(guide.parts.map((part) => partLogDensity(part, point)));
}

/** log of a part's weighted density, up to the same constant. */
export function partLogDensity({ mean, inverse, degrees, logHeight }: GuidePart, point: readonly number[]): number {
  const dimensions = mean.length;
  let distance = 0;
  for (let j = 0; j < dimensions; j++) {
    const row = inverse[j];
    let score = 0;
    for (let k = 0; k <= j; k++) score += row[k] * (point[k] - mean[k]);
    distance += score * score;
  }
  return logHeight - ((degrees + dimensions) / 2) * Math.log1p(distance / degrees);
}

/** A part with its height at the mean: weight · Γ((ν + d)/2) / (Γ(ν/2) ν^(d/2) |L|); π^(d/2) is left out. */
export function guidePart(weight: number, degrees: number, mean: number[], root: number[][]): GuidePart {
  const dimensions = mean.length;
  const logDeterminant = root.reduce((sum, row, j) => sum + Math.log(row[j]), 0);
  const tails = logGamma((degrees + dimensions) / 2) - logGamma(degrees / 2) - (dimensions / 2) * Math.log(degrees);
  return { weight, degrees, mean, root, inverse: inverted(root), logHeight: Math.log(weight) + tails - logDeterminant };
}

function inverted(root: readonly number[][]): number[][] {
  const inverse = root.map((row) => row.map(() => 0));
  for (let j = 0; j < root.length; j++) {
    for (let k = 0; k <= j; k++) {
      let sum = j === k ? 1 : 0;
      for (let i = k; i < j; i++) sum -= root[j][i] * inverse[i][k];
      inverse[j][k] = sum / root[j][j];
    }
  }
  return inverse;
}
