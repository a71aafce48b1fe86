import { Random, type RandomState } from '../../numeric/random.js';

/** A saved stream of random numbers, or the seed of a new one. */
export type SavedRandom = RandomState | { seed: number };

/** Opens a stream where it was saved, or from its seed. */
export function openRandom(saved: SavedRandom): Random {
  return 'seed' in saved ? Random.fromSeed(saved.seed) : Random.fromState(saved);
}
