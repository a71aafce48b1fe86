import { type ReadingOptions } from './makeReading.js';

/** What the rules of a reading want to know of the fit behind it. */
export type FitFacts = Pick<
  ReadingOptions,
  'converged' | 'inputDoubtInRange' | 'sampleSpanDays' | 'coverageTooNarrow' | 'crossCheckAgrees'
>;

const FLAGS = ['converged', 'inputDoubtInRange', 'coverageTooNarrow', 'crossCheckAgrees'] as const;

/** The facts in a station's `fit` (made by `fitSummary`), with the caller's own laid over them. Anything else in it is passed over. */
export function fitFacts(fit: unknown, own: FitFacts): FitFacts {
  const stored = typeof fit === 'object' && fit !== null ? (fit as Record<string, unknown>) : {};
  const facts: FitFacts = {};
  for (const key of FLAGS) {
    const value = own[key] ?? stored[key];
    if (typeof value === 'boolean') facts[key] = value;
  }
  const span = own.sampleSpanDays ?? stored['sampleSpanDays'];
  if (typeof span === 'number') facts.sampleSpanDays = span;
  return facts;
}
