import { type ChainDiagnosis, diagnoseChains } from '../convergence.js';
import { fitGuide } from './guideFit.js';
import { type MoveRandom, proposeMove } from './moves.js';
import { acceptSearch, chooseChains, hypercube, isSettled, proposeSearch } from './search.js';
import type { Member, SamplerOutcome, SamplerState } from './state.js';

/** Past states join the archive every so many generations (neighbouring ones are much alike). */
const ARCHIVE_EVERY = 4;
/** Warm-up relearns, and asks whether it is over, every so many generations. */
const RELEARN_EVERY = 20;
/** R-hat of the last half of warm-up, from few draws, below which its chains count as mixed. */
const MIXED = 1.1;
/** In sampling, above this after enough generations, warm-up had ended too soon. */
const DISAGREEING = 1.2;
const RESTARTS = 3;

/** The points of the next generation, with every random number that decides on them. */
export function prepare(state: SamplerState, random: MoveRandom): NonNullable<SamplerState['pending']> {
  const { dimensions, population, startSpread } = state.choices;
  if (state.phase === 'start') return { points: hypercube(population, dimensions, startSpread, random), proposals: [] };
  if (state.phase === 'search') return { points: proposeSearch(state.population, random), proposals: [] };
  const proposals = state.chains.map(({ point }) => proposeMove(point, state.archive, state.guide, state.shares, random));
  return { points: proposals.map((proposal) => proposal.point), proposals };
}

/** Takes one generation's log densities into the state. */
export function advance(state: SamplerState, logDensities: ArrayLike<number>, random: MoveRandom): void {
  const { pending, phase } = state;
  if (!pending || phase === 'done') return;
  state.pending = null;
  state.generation++;
  state.tried[phase] += pending.points.length;
  for (let i = 0; i < logDensities.length; i++) if (logDensities[i] === -Infinity) state.impossible[phase]++;
  if (phase === 'start') start(state, pending.points, logDensities);
  else if (phase === 'search') state.population = acceptSearch(state.population, pending.points, logDensities);
  else move(state, pending, logDensities);

  if (state.phase === 'search') {
    const { searchGenerations, dimensions } = state.choices;
    if (state.generation >= searchGenerations || isSettled(state.population, dimensions)) beginChains(state, random);
  } else if (state.phase === 'warmUp') warmUp(state);
  else if (state.phase === 'sample') sample(state);
  if (!isOver(state) && spent(state) >= state.choices.evaluations) finish(state, 'capped');
}

function start(state: SamplerState, points: number[][], logDensities: ArrayLike<number>): void {
  const { population, startRounds, chains } = state.choices;
  points.forEach((point, i) => {
    if (logDensities[i] > -Infinity && state.population.length < population) state.population.push({ point, logDensity: logDensities[i] });
  });
  const found = state.population.length;
  if (found >= population || (state.generation >= startRounds && found >= Math.max(4, chains))) enter(state, 'search');
  else if (state.generation >= startRounds) finish(state, 'noPossiblePoint');
}

function beginChains(state: SamplerState, random: MoveRandom): void {
  const { chains, dimensions } = state.choices;
  state.archive = state.population.map((member) => member.point);
  state.chains = chooseChains(state.population, chains, dimensions, random);
  enter(state, 'warmUp');
}

function move(state: SamplerState, pending: NonNullable<SamplerState['pending']>, logDensities: ArrayLike<number>): void {
  state.chains = state.chains.map((member, c) => {
    const proposal = pending.proposals[c];
    const counts = state.moves[proposal.move];
    counts.tried++;
    if (proposal.move === 'guided') state.guideTrial.tried++;
    // an impossible point: −Infinity is below every threshold
    if (logDensities[c] - member.logDensity + proposal.correction < proposal.threshold) return member;
    counts.accepted++;
    if (proposal.move === 'guided') state.guideTrial.accepted++;
    return { point: proposal.point, logDensity: logDensities[c] };
  });
  state.history.push(state.chains);
  if (state.generation % ARCHIVE_EVERY === 0) state.archive.push(...state.chains.map((member) => member.point));
}

function warmUp(state: SamplerState): void {
  if (state.generation % RELEARN_EVERY !== 0) return;
  const recent = state.history.slice(state.history.length >> 1);
  learn(state, recent);
  const longest = Math.max(state.choices.population, (recent.length * state.chains.length) / ARCHIVE_EVERY);
  state.archive = state.archive.slice(-Math.ceil(longest));
  state.diagnosis = diagnoseHistory(recent);
  const mixed = state.generation >= 2 * RELEARN_EVERY && state.diagnosis.every(({ rHat }) => rHat <= MIXED);
  if (!mixed && spent(state) < state.choices.evaluations / 2) return;
  enter(state, 'sample');
  state.nextCheck = 2 * RELEARN_EVERY;
}

function sample(state: SamplerState): void {
  // rarer and rarer, so that the chain forgets that its moves were learnt from itself (diminishing adaptation)
  if (isDoubling(state.generation / RELEARN_EVERY)) learn(state, state.history);
  if (state.generation < state.nextCheck) return;
  state.nextCheck = state.generation + Math.max(RELEARN_EVERY, Math.ceil(0.1 * state.generation));
  state.diagnosis = diagnoseHistory(state.history);
  const { rHat, effectiveSize } = state.choices;
  if (state.diagnosis.every((d) => d.rHat <= rHat && d.bulkSize >= effectiveSize && d.tailSize >= effectiveSize)) {
    finish(state, 'converged');
  } else if (state.restarts < RESTARTS && state.generation >= 5 * RELEARN_EVERY && !state.diagnosis.every((d) => d.rHat <= DISAGREEING)) {
    const recent = state.history.slice(state.history.length >> 1);
    state.restarts++;
    enter(state, 'warmUp');
    state.history = recent;
    learn(state, recent);
  }
}

/** The guide from the chains' recent states, and how often it is used from how often it was accepted. */
function learn(state: SamplerState, recent: readonly Member[][]): void {
  const guide = fitGuide(state.chains.map((_, c) => recent.map((row) => row[c].point)));
  if (!guide) return;
  const { tried, accepted } = state.guideTrial;
  const rate = tried < 20 ? 0.2 : accepted / tried;
  const guided = rate > 0.25 ? 0.6 : rate > 0.1 ? 0.3 : 0.1;
  state.guide = guide;
  state.shares = { guided, snooker: 0.1 * (1 - guided), difference: 0.9 * (1 - guided) };
  state.guideTrial = { tried: 0, accepted: 0 };
}

/** 2, 4, 8, … */
function isDoubling(x: number): boolean {
  return x >= 2 && Number.isInteger(Math.log2(x));
}

/** Diagnosis of each unknown, then of the log density. */
export function diagnoseHistory(history: readonly Member[][]): ChainDiagnosis[] {
  const chains = history[0]?.length ?? 0;
  const dimensions = history[0]?.[0]?.point.length ?? 0;
  return Array.from({ length: dimensions + 1 }, (_, j) =>
    diagnoseChains(
      Array.from({ length: chains }, (_, c) => Float64Array.from(history, (row) => (j < dimensions ? row[c].point[j] : row[c].logDensity))),
    ),
  );
}

function enter(state: SamplerState, phase: SamplerState['phase']): void {
  state.phase = phase;
  state.generation = 0;
  state.history = [];
}

function finish(state: SamplerState, outcome: SamplerOutcome): void {
  if (outcome === 'capped' && state.phase === 'sample' && state.history.length >= 4) state.diagnosis = diagnoseHistory(state.history);
  state.phase = 'done';
  state.outcome = outcome;
}

/** Apart from the compiler's narrowing: a phase may have been left by a call above. */
function isOver(state: SamplerState): boolean {
  return state.phase === 'done';
}

function spent(state: SamplerState): number {
  const { tried } = state;
  return tried.start + tried.search + tried.warmUp + tried.sample;
}
