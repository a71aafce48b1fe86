import type { ChainDiagnosis } from '../convergence.js';
import type { Guide } from './guide.js';
import type { MoveName, MoveShares, Proposal } from './moves.js';
import type { SavedRandom } from './randomSource.js';
import type { SamplerChoices } from './settings.js';

/** Where a sampler is: looking for possible points, for the mode's region, learning its moves, drawing, or at its end. */
export type SamplerPhase = 'start' | 'search' | 'warmUp' | 'sample' | 'done';

/**
 * `converged`: the stopping rule is met. `capped`: the evaluations allowed ran out first, **not converged**. `noPossiblePoint`: fewer
 * points of finite log density than chains were found.
 */
export type SamplerOutcome = 'converged' | 'capped' | 'noPossiblePoint';

/** Everything a sampler knows, JSON-safe: saved at any moment and read back, it goes on bit for bit. */
export interface SamplerState {
  kind: 'rillage-sampler';
  version: 1;
  choices: SamplerChoices;
  /** State of the seeded generator. */
  readonly random: SavedRandom;
  phase: SamplerPhase;
  outcome: SamplerOutcome | null;
  /** Points evaluated, by phase, and how many of them were impossible (log density −Infinity). */
  tried: Record<Exclude<SamplerPhase, 'done'>, number>;
  impossible: Record<Exclude<SamplerPhase, 'done'>, number>;
  /** Points waiting for their log densities; in warm-up and sampling with what decides on them. */
  pending: { points: number[][]; proposals: Proposal[] } | null;
  /** Generations in the present phase. */
  generation: number;
  population: Member[];
  archive: number[][];
  chains: Member[];
  guide: Guide | null;
  shares: MoveShares;
  moves: Record<MoveName, { tried: number; accepted: number }>;
  /** How the present guide has fared. */
  guideTrial: { tried: number; accepted: number };
  /** By generation since warm-up or sampling began, by chain. */
  history: Member[][];
  /** Generation at which convergence is next looked at. */
  nextCheck: number;
  /** Of each unknown, then of the log density; empty before the first look. */
  diagnosis: ChainDiagnosis[];
  /** How often sampling was sent back to warm-up because the chains disagreed. */
  restarts: number;
}

/** A point and its log density. */
export interface Member {
  point: number[];
  logDensity: number;
}

export const NO_COUNTS = { start: 0, search: 0, warmUp: 0, sample: 0 };
export const NO_MOVES = { difference: { tried: 0, accepted: 0 }, snooker: { tried: 0, accepted: 0 }, guided: { tried: 0, accepted: 0 } };
export const FIRST_SHARES: MoveShares = { difference: 0.9, snooker: 0.1, guided: 0 };
