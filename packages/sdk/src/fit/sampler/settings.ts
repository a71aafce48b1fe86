import { type Issue, shorten, throwIfAny } from '../../errors.js';

/** What a caller may choose. Everything but `dimensions` and `seed` has a default. */
export interface SamplerSettings {
  /** Number of unknowns, 1 or more. */
  dimensions: number;
  /** Whole number; the same seed gives the same draws, whoever evaluates the points. */
  seed: number;
  /** Chains side by side, 3 or more; also how many points a generation asks for. Default 4. */
  chains?: number;
  /** Members of the start search, and points the sampler starts to learn from. Default max(24, 6 × dimensions), at least 2 × chains. */
  population?: number;
  /** Generations of the start search at most. Default 100. */
  searchGenerations?: number;
  /** Evaluations in all at most, search included. Default 40 000. */
  evaluations?: number;
  /** Latin-hypercube rounds at most while too few possible points are found. Default 20. */
  startRounds?: number;
  /** Converged when R-hat of every unknown and of the log density is at or below this. Default 1.01. */
  rHat?: number;
  /** … and their bulk and tail effective sizes at or above this. Default 400. */
  effectiveSize?: number;
  /** Standard deviation of the start points, which are normal about 0. Default 1, the scale on which priors are standard normal. */
  startSpread?: number;
}

export type SamplerChoices = Required<SamplerSettings>;

const LEAST: Record<keyof SamplerSettings, number> = {
  dimensions: 1,
  seed: 0,
  chains: 3,
  population: 8,
  searchGenerations: 0,
  evaluations: 1,
  startRounds: 1,
  rHat: 1,
  effectiveSize: 1,
  startSpread: Number.MIN_VALUE,
};
const NOT_WHOLE = new Set<string>(['rHat', 'startSpread', 'effectiveSize']);

/** Settings with the defaults filled in. @throws RillageError 'unknown-field' | 'setting', a batch */
export function settle(settings: SamplerSettings): SamplerChoices {
  const issues: Issue[] = [];
  for (const [key, value] of Object.entries(settings) as [keyof SamplerSettings, unknown][]) {
    if (!Object.hasOwn(LEAST, key)) issues.push({ code: 'unknown-field', path: key, expected: `one of ${Object.keys(LEAST).join(', ')}` });
    else if (value !== undefined && !isSound(key, value)) {
      const kind = NOT_WHOLE.has(key) ? 'a number' : 'a whole number';
      issues.push({ code: 'setting', path: key, expected: `${kind}, ${LEAST[key]} or more`, received: shorten(value) });
    }
  }
  for (const key of ['dimensions', 'seed'] as const) {
    if (settings[key] === undefined) issues.push({ code: 'setting', path: key, expected: 'a whole number', received: 'nothing' });
  }
  throwIfAny(issues);
  const chains = settings.chains ?? 4;
  return {
    dimensions: settings.dimensions,
    seed: settings.seed,
    chains,
    population: Math.max(settings.population ?? Math.max(24, 6 * settings.dimensions), 2 * chains),
    searchGenerations: settings.searchGenerations ?? 100,
    evaluations: settings.evaluations ?? 40_000,
    startRounds: settings.startRounds ?? 20,
    rHat: settings.rHat ?? 1.01,
    effectiveSize: settings.effectiveSize ?? 400,
    startSpread: settings.startSpread ?? 1,
  };
}

function isSound(key: keyof SamplerSettings, value: unknown): boolean {
  return typeof value === 'number' && Number.isFinite(value) && value >= LEAST[key] && (NOT_WHOLE.has(key) || Number.isInteger(value));
}
