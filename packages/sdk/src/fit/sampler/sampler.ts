import { RillageError } from '../../errors.js';
import { advance, prepare } from './phases.js';
import { openRandom } from './randomSource.js';
import { type SamplerSettings, settle } from './settings.js';
import { FIRST_SHARES, NO_COUNTS, NO_MOVES, type SamplerState } from './state.js';

/** A search and sampling run as a machine that never calls the density itself. */
export interface Sampler {
  /** The whole state, as it is now. Copy it (it is JSON-safe) to save. */
  readonly state: SamplerState;
  /** Points whose log densities are wanted next, [M][dimensions]; the same ones until they are accepted; none when done. */
  propose(): number[][];
  /** Takes their log densities, in the same order: −Infinity for an impossible point. @throws RillageError 'shape' | 'log-density' */
  accept(logDensities: ArrayLike<number>): void;
}

/**
 * Opens a new run, or one that was saved.
 *
 * Start: a Latin hypercube. Search: differential evolution until the population is spread like the posterior. Warm-up: chains with
 * moves learnt from past states; its draws are dropped. Sampling: the same moves, until R-hat and effective sizes meet the settings or
 * the evaluations run out. All random numbers are drawn when points are proposed, so that it does not matter who evaluates them.
 *
 * @param from  settings of a new run, or a state; a state handed in is not changed
 * @throws RillageError 'setting' | 'unknown-field' | 'sampler-state'
 * @source ter Braak & Vrugt (2008), Statistics and Computing 18:435–446; stopping: Vehtari et al. (2021), Bayesian Analysis 16:667–718
 */
export function openSampler(from: SamplerSettings | SamplerState): Sampler {
  const state = 'kind' in from ? reopened(from) : firstState(from);
  const random = openRandom(state.random);
  // read when asked for: it is large, and changes with every number drawn
  Object.defineProperty(state, 'random', { enumerable: true, get: () => random.state() });
  return {
    state,
    propose: () => {
      if (state.phase === 'done') return [];
      state.pending ??= prepare(state, random);
      return state.pending.points;
    },
    accept: (logDensities) => {
      if (!state.pending) throw new RillageError({ code: 'shape', path: 'logDensities', expected: 'a call to propose() first' });
      checkDensities(logDensities, state.pending.points.length);
      advance(state, logDensities, random);
    },
  };
}

function firstState(settings: SamplerSettings): SamplerState {
  const choices = settle(settings);
  return {
    kind: 'rillage-sampler',
    version: 1,
    choices,
    random: { seed: choices.seed },
    phase: 'start',
    outcome: null,
    tried: { ...NO_COUNTS },
    impossible: { ...NO_COUNTS },
    pending: null,
    generation: 0,
    population: [],
    archive: [],
    chains: [],
    guide: null,
    shares: { ...FIRST_SHARES },
    moves: structuredClone(NO_MOVES),
    guideTrial: { tried: 0, accepted: 0 },
    history: [],
    nextCheck: 0,
    diagnosis: [],
    restarts: 0,
  };
}

function reopened(state: SamplerState): SamplerState {
  if (state.kind !== 'rillage-sampler' || state.version !== 1) {
    throw new RillageError({ code: 'sampler-state', expected: 'a state of version 1 saved by this sampler' });
  }
  return structuredClone(state);
}

function checkDensities(logDensities: ArrayLike<number>, expected: number): void {
  if (logDensities.length !== expected) {
    throw new RillageError({ code: 'shape', path: 'logDensities', expected: `${expected} values`, received: String(logDensities.length) });
  }
  for (let i = 0; i < expected; i++) {
    if (Number.isNaN(logDensities[i]) || logDensities[i] === Infinity) {
      throw new RillageError({
        code: 'log-density',
        path: `logDensities[${i}]`,
        expected: 'a number or −Infinity',
        received: String(logDensities[i]),
      });
    }
  }
}
