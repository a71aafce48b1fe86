import { throwIfAborted } from '../../errors.js';
import type { ChainDiagnosis } from '../convergence.js';
import { diagnoseHistory } from './phases.js';
import type { Sampler } from './sampler.js';
import type { SamplerOutcome, SamplerPhase, SamplerState } from './state.js';

/** Log densities of points, in order; −Infinity where a point is impossible. May spread them over any number of workers. */
export type Evaluate = (points: number[][]) => ArrayLike<number> | Promise<ArrayLike<number>>;

export interface RunSamplerOptions {
  signal?: AbortSignal;
  /** After every generation. */
  onProgress?: (progress: SamplerProgress) => void;
  /** Awaited after every generation: lets a thread with other work breathe, where `evaluate` does not leave it. */
  pause?: () => Promise<void>;
}

/** How far a run is. */
export interface SamplerProgress {
  phase: SamplerPhase;
  /** 0..1, a rough guess: effective draws so far over those wanted. Never falls within a phase. */
  share: number;
  evaluations: number;
  /** Accepted share of the chains' moves, NaN before there are any. */
  acceptance: number;
  /** Greatest R-hat at the last look, NaN before it. */
  rHat: number;
  /** Smallest effective size at the last look, NaN before it. */
  effectiveSize: number;
}

/**
 * Runs a sampler to its end. The sampler's state is at every moment what a saved run needs; on an abort it stays so, and a later call
 * goes on from there with the same draws.
 * @throws RillageError 'aborted', at once when the signal is raised, without waiting for `evaluate`
 */
export async function runSampler(sampler: Sampler, evaluate: Evaluate, options: RunSamplerOptions = {}): Promise<void> {
  const { signal, onProgress, pause } = options;
  while (sampler.state.phase !== 'done') {
    throwIfAborted(signal);
    const answer = evaluate(sampler.propose());
    const logDensities = answer instanceof Promise ? await unlessAborted(answer, signal) : answer;
    sampler.accept(logDensities);
    onProgress?.(samplerProgress(sampler.state));
    if (pause) await pause();
  }
}

/** See {@link SamplerProgress}. */
export function samplerProgress(state: SamplerState): SamplerProgress {
  const { difference, snooker, guided } = state.moves;
  const worst = worstOf(state.diagnosis);
  const evaluations = Object.values(state.tried).reduce((a, b) => a + b, 0);
  const sampled = Math.max(0, Math.min(1, worst.effectiveSize / state.choices.effectiveSize || 0));
  const share = { start: 0, search: 0.02, warmUp: 0.1, sample: 0.2 + 0.79 * sampled, done: 1 }[state.phase];
  const tried = difference.tried + snooker.tried + guided.tried;
  const acceptance = (difference.accepted + snooker.accepted + guided.accepted) / tried;
  return { phase: state.phase, share, evaluations, acceptance, ...worst };
}

/** What a run found, without its draws. */
export interface SamplerSummary {
  /** null while it runs, or was stopped. */
  outcome: SamplerOutcome | null;
  converged: boolean;
  evaluations: number;
  /** Of the points drawn from the prior at the start: how many were impossible. The prior's impossible share. */
  prior: { tried: number; impossible: number };
  /** Of all later points. */
  later: { tried: number; impossible: number };
  /** Accepted share by kind of move, NaN where none was tried. */
  acceptance: Record<'difference' | 'snooker' | 'guided', number>;
  draws: number;
  restarts: number;
  /** Of each unknown on the sampling scale, then of the log density; of the draws as they are now. */
  diagnosis: ChainDiagnosis[];
  best: { point: number[]; logDensity: number } | null;
}

export function summariseSampler(state: SamplerState): SamplerSummary {
  const { tried, impossible, moves } = state;
  const history = drawnHistory(state);
  const members = [...history.flat(), ...state.population];
  const rate = ({ tried, accepted }: { tried: number; accepted: number }): number => (tried > 0 ? accepted / tried : NaN);
  return {
    outcome: state.outcome,
    converged: state.outcome === 'converged',
    evaluations: tried.start + tried.search + tried.warmUp + tried.sample,
    prior: { tried: tried.start, impossible: impossible.start },
    later: {
      tried: tried.search + tried.warmUp + tried.sample,
      impossible: impossible.search + impossible.warmUp + impossible.sample,
    },
    acceptance: { difference: rate(moves.difference), snooker: rate(moves.snooker), guided: rate(moves.guided) },
    draws: history.length * state.choices.chains,
    restarts: state.restarts,
    diagnosis: diagnoseHistory(history),
    best: members.reduce<SamplerSummary['best']>((best, member) => (best && best.logDensity >= member.logDensity ? best : member), null),
  };
}

/**
 * Kept draws, evenly spread over the run.
 * @param count  how many at most; default all. From a run stopped in warm-up: the last half of it, which no diagnosis supports
 * @returns by generation, the chains of one generation side by side
 */
export function keptDraws(state: SamplerState, count = Infinity): { points: number[][]; logDensities: number[] } {
  const all = drawnHistory(state).flat();
  const wanted = Math.min(count, all.length);
  const chosen = Array.from({ length: wanted }, (_, i) => all[Math.floor(((i + 0.5) * all.length) / wanted)]);
  return { points: chosen.map((member) => member.point), logDensities: chosen.map((member) => member.logDensity) };
}

/** Kept draws of one unknown, chain by chain: [chains][generations]. */
export function chainsOf(state: SamplerState, dimension: number): Float64Array[] {
  const history = drawnHistory(state);
  return state.chains.map((_, c) => Float64Array.from(history, (row) => row[c].point[dimension]));
}

function drawnHistory(state: SamplerState): SamplerState['history'] {
  return state.phase === 'warmUp' ? state.history.slice(state.history.length >> 1) : state.history;
}

function worstOf(diagnosis: readonly ChainDiagnosis[]): { rHat: number; effectiveSize: number } {
  if (diagnosis.length === 0) return { rHat: NaN, effectiveSize: NaN };
  return {
    rHat: Math.max(...diagnosis.map((d) => d.rHat)),
    effectiveSize: Math.min(...diagnosis.map((d) => Math.min(d.bulkSize, d.tailSize))),
  };
}

/** The answer, or an error as soon as the signal is raised. */
export function unlessAborted<T>(answer: Promise<T>, signal: AbortSignal | undefined): Promise<T> {
  if (!signal) return answer;
  return new Promise((resolve, reject) => {
    const stop = (): void => {
      try {
        throwIfAborted(signal);
      } catch (error) {
        reject(error as Error);
      }
    };
    signal.addEventListener('abort', stop, { once: true });
    answer.then(resolve, reject).finally(() => signal.removeEventListener('abort', stop));
    stop();
  });
}
