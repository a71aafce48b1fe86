import { quantileSorted } from '../numeric/quantile.js';
import { Random } from '../numeric/random.js';
import type { ChainDiagnosis } from './convergence.js';
import { drawMeasured } from './likelihood.js';
import { klingGupta2009, klingGupta2012, nashSutcliffe } from './metrics.js';
import type { Evaluation, FitModel } from './model.js';
import { meanOver } from './sampleWindow.js';
import { rankCorrelation } from './rankCorrelation.js';
import { autocorrelation, intervalCoverage, type Coverage } from './predictive.js';
import { priorQuantile } from './priorMath.js';
import type { PlacedPrior } from './priorPaths.js';
import type { Prior } from './priors.js';

export interface ParameterDiagnosis {
  path: string;
  prior: Prior;
  /** [5, 50, 95 %] */
  before: [number, number, number];
  after: [number, number, number];
  /** 1 − posterior sd / prior sd on the scale on which the prior is standard normal: 0 nothing learnt, 1 all. */
  narrowed: number;
  verdict: 'informed' | 'weaklyInformed' | 'notInformed';
  /** The verdict in words. */
  words: string;
  rHat: number;
  bulkSize: number;
  tailSize: number;
}

/** Narrowing from which a parameter counts as informed, as weakly informed. Judgement; no source prescribes them. */
const INFORMED = 0.5;
const WEAKLY = 0.15;
const WORDS = {
  informed: 'informed by these data',
  weaklyInformed: 'weakly informed by these data',
  notInformed: 'not informed by these data',
};

/**
 * What the data did to each prior.
 * @param points  [draws][unknowns] on the sampling scale
 * @param draws   the same in the parameters' own units
 */
export function diagnoseParameters(
  priors: readonly PlacedPrior[],
  points: readonly number[][],
  draws: readonly number[][],
  chains: readonly ChainDiagnosis[],
): ParameterDiagnosis[] {
  return priors.map(({ path, prior }, j) => {
    const mean = points.reduce((sum, z) => sum + z[j], 0) / points.length;
    const variance = points.reduce((sum, z) => sum + (z[j] - mean) ** 2, 0) / Math.max(1, points.length - 1);
    const narrowed = 1 - Math.sqrt(variance);
    const sorted = Float64Array.from(draws, (draw) => draw[j]).sort();
    const verdict = narrowed >= INFORMED ? 'informed' : narrowed >= WEAKLY ? 'weaklyInformed' : 'notInformed';
    const { rHat = NaN, bulkSize = NaN, tailSize = NaN } = chains[j] ?? {};
    return {
      path,
      prior,
      before: [priorQuantile(prior, 0.05), priorQuantile(prior, 0.5), priorQuantile(prior, 0.95)],
      after: [quantileSorted(sorted, 0.05), quantileSorted(sorted, 0.5), quantileSorted(sorted, 0.95)],
      narrowed,
      verdict,
      words: WORDS[verdict],
      rHat,
      bulkSize,
      tailSize,
    };
  });
}

export interface TracerDiagnosis {
  count: number;
  nse: number;
  kge2009: number;
  kge2012: number;
  coverage50: Coverage;
  coverage90: Coverage;
  /** By sample, in time order: instant, flow (mm/day), measured, predictive median and 5 to 95 %. */
  residuals: { at: string; flow: number; measured: number; median: number; low: number; high: number }[];
  /** Of measured − median at lags 1 to 5, in samples; NaN where there are too few. */
  autocorrelation: number[];
  /** Rank correlation of measured − median with time, and with flow: 0 where nothing is left to explain. */
  withTime: number;
  withFlow: number;
}

/** A draw of the published mixture. */
export interface Member {
  model: FitModel;
  point: readonly number[];
  evaluation: Evaluation;
}

const LAGS = 5;

/** Measured against simulated, tracer by tracer; empty without members. Predictive draws add the error model's scatter. */
export function diagnoseTracers(members: readonly Member[], seed: number): Record<string, TracerDiagnosis> {
  const result: Record<string, TracerDiagnosis> = {};
  if (members.length === 0) return result;
  const random = Random.fromSeed(seed).split('predictive');
  const errors = members.map(({ model, point }) => model.settled(model.values(point)).errors);
  const { samples, windows, forcing } = members[0].model;
  for (const tracer of new Set(samples.map((sample) => sample.tracer))) {
    const rows = samples.flatMap((sample, s) => {
      if (sample.tracer !== tracer || sample.censored !== undefined || Number.isNaN(members[0].evaluation.simulated[s])) return [];
      const predictive = Float64Array.from(members, ({ evaluation }, d) =>
        drawMeasured(errors[d][tracer], evaluation.simulated[s], sample.error ?? 0, random),
      ).sort();
      const plain = Float64Array.from(members, ({ evaluation }) => evaluation.simulated[s]).sort();
      const flow = forcing.outflows[sample.of ?? 'discharge'];
      return [
        {
          at: sample.to,
          flow: meanOver(windows[s], new Float64Array(flow.length).fill(1), flow),
          measured: sample.value,
          simulated: quantileSorted(plain, 0.5),
          ends: ENDS.map((p) => quantileSorted(predictive, p)),
        },
      ];
    });
    result[tracer] = diagnoseRows(rows);
  }
  return result;
}

const ENDS = [0.05, 0.25, 0.5, 0.75, 0.95];

function diagnoseRows(rows: { at: string; flow: number; measured: number; simulated: number; ends: number[] }[]): TracerDiagnosis {
  const measured = rows.map((row) => row.measured);
  const simulated = rows.map((row) => row.simulated);
  const end = (k: number): number[] => rows.map((row) => row.ends[k]);
  const misses = rows.map((row) => row.measured - row.simulated);
  const correlations = rows.length > 2 * LAGS ? Array.from(autocorrelation(misses, LAGS)).slice(1) : new Array<number>(LAGS).fill(NaN);
  return {
    count: rows.length,
    nse: nashSutcliffe(measured, simulated),
    kge2009: klingGupta2009(measured, simulated),
    kge2012: klingGupta2012(measured, simulated),
    coverage50: intervalCoverage(measured, end(1), end(3), 0.5),
    coverage90: intervalCoverage(measured, end(0), end(4), 0.9),
    residuals: rows.map(({ at, flow, measured: value, ends }) => ({
      at,
      flow,
      measured: value,
      median: ends[2],
      low: ends[0],
      high: ends[4],
    })),
    autocorrelation: correlations,
    withTime: rankCorrelation(
      misses,
      rows.map((_row, k) => k),
    ),
    withFlow: rankCorrelation(
      misses,
      rows.map((row) => row.flow),
    ),
  };
}
