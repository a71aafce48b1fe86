import type { Fit, FittedAlternative } from './fit.js';

/** A fit without its draws and residuals, small enough for a station file, with the facts that a reading's confidence rests on. */
export interface FitSummary {
  kind: 'rillage-fit-summary';
  version: 1;
  seed: number;
  converged: boolean;
  inputDoubtInRange: boolean;
  /** Samples miss their 90 % predictive intervals more often than chance allows, for any tracer. */
  coverageTooNarrow: boolean;
  /** Left out where no tracer has a seasonal cycle. */
  crossCheckAgrees?: boolean;
  sampleSpanDays: number;
  evaluations: number;
  impossibleShare: number;
  parameters: { path: string; before: number[]; after: number[]; verdict: string; words: string }[];
  tracers: Record<string, { count: number; nse: number | null; kge2012: number | null; coverage50: number; coverage90: number }>;
  alternatives: Pick<FittedAlternative, 'name' | 'weight' | 'outcome' | 'ages'>[];
}

/** What a station keeps of its fit: pass it as `fit` to `makeStation`. */
export function fitSummary(fit: Fit): FitSummary {
  const { seed, converged, inputDoubtInRange, evaluations, impossibleShare, crossCheck, samples } = fit;
  return {
    kind: 'rillage-fit-summary',
    version: 1,
    seed,
    converged,
    inputDoubtInRange,
    coverageTooNarrow: Object.values(fit.tracers).some(({ coverage90 }) => coverage90.verdict === 'tooNarrow'),
    ...(crossCheck.length === 0 ? {} : { crossCheckAgrees: crossCheck.every(({ agrees }) => agrees) }),
    sampleSpanDays: (Date.parse(samples.last) - Date.parse(samples.first)) / 86_400_000,
    evaluations,
    impossibleShare,
    parameters: fit.parameters.map(({ path, before, after, verdict, words }) => ({ path, before, after, verdict, words })),
    tracers: Object.fromEntries(
      Object.entries(fit.tracers).map(([tracer, { count, nse, kge2012, coverage50, coverage90 }]) => [
        tracer,
        { count, nse: orNull(nse), kge2012: orNull(kge2012), coverage50: coverage50.share, coverage90: coverage90.share },
      ]),
    ),
    alternatives: fit.alternatives.map(({ name, weight, outcome, ages }) => ({ name, weight, outcome, ages })),
  };
}

/** A score of a constant tracer is not a number, and JSON has no word for that. */
function orNull(score: number): number | null {
  return Number.isFinite(score) ? score : null;
}
