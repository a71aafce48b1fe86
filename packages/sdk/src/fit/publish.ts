import type { Finding } from '../contract.js';
import { quantileSorted } from '../numeric/quantile.js';
import { crossChecks, youngThresholds } from './crossCheck.js';
import { diagnoseParameters, diagnoseTracers } from './diagnosis.js';
import { AGE_LIMITS, shareOut, thinned, weigh, type EvaluatedAlternative } from './evaluateDraws.js';
import type { DrawAges } from './evaluator.js';
import type { AlternativeAges, Fit, FitState, FittedAlternative, Quantiles } from './fit.js';
import type { CheckedProblem } from './problem.js';

/** Alternatives below this weight do not decide whether the fit counts as converged. */
const COUNTS = 0.01;
/** Members of the mixture that tracers are diagnosed on. */
const MIXTURE = 400;

/** The fit as it is handed over. @param state  of a fit that was stopped; null otherwise */
export function publish(checked: CheckedProblem, evaluated: readonly EvaluatedAlternative[], seed: number, state: FitState | null): Fit {
  const partial = state !== null;
  const weights = partial ? evaluated.map(() => 1 / evaluated.length) : weigh(evaluated);
  const alternatives = evaluated.map((one, k) => fittedAlternative(one, weights[k]));
  const leading = alternatives[weights.indexOf(Math.max(...weights))];
  const counts = shareOut(
    weights,
    evaluated.map((one) => one.evaluations.length),
    MIXTURE,
  );
  const mixture = evaluated.flatMap((one, k) =>
    thinned(one.evaluations.length, counts[k]).map((d) => ({ model: one.model, point: one.points[d], evaluation: one.evaluations[d] })),
  );
  const ageCounts = shareOut(
    weights,
    evaluated.map((one) => one.ages.length),
    Math.max(...evaluated.map((one) => one.ages.length)),
  );
  const ages = evaluated.flatMap((one, k) => thinned(one.ages.length, ageCounts[k]).map((d) => one.ages[d]));
  const thresholds = partial ? [] : youngThresholds(checked);
  const behind = (values: number[]): number[] => values.slice(AGE_LIMITS.length);
  const tried = evaluated.reduce((sum, { summary }) => sum + summary.prior.tried, 0);
  const { samples } = checked;
  return {
    kind: 'rillage-fit',
    version: 1,
    seed,
    converged: !partial && alternatives.every(({ weight, outcome }) => weight < COUNTS || outcome === 'converged'),
    partial,
    evaluations: evaluated.reduce((sum, { summary }) => sum + summary.evaluations, 0),
    impossibleShare: tried > 0 ? evaluated.reduce((sum, { summary }) => sum + summary.prior.impossible, 0) / tried : 0,
    parameters: leading.parameters,
    tracers: diagnoseTracers(mixture, seed),
    predictive: leading.predictive,
    crossCheck: crossChecks(
      thresholds,
      ages.map(({ youngerByFlow, youngerByTime }) => ({ byFlow: behind(youngerByFlow), byTime: behind(youngerByTime) })),
    ),
    alternatives,
    samples: { count: samples.length, first: samples[0].from, last: samples[samples.length - 1].to },
    findings: [...checked.findings, ...findingsOf(alternatives)],
    inputDoubtInRange: !partial && alternatives.every(({ weight, widened }) => weight < COUNTS || widened !== null),
    state,
  };
}

function fittedAlternative(one: EvaluatedAlternative, weight: number): FittedAlternative {
  const { model, summary, points } = one;
  const { name, filling } = model.checked.alternatives[model.index];
  const draws = points.map((z) => model.values(z));
  const impossible = summary.outcome === 'noPossiblePoint';
  return {
    name,
    filling,
    weight,
    outcome: impossible ? 'impossible' : summary.converged ? 'converged' : 'notConverged',
    evaluations: summary.evaluations,
    impossibleShare: summary.prior.tried > 0 ? summary.prior.impossible / summary.prior.tried : 0,
    parameters: draws.length === 0 ? [] : diagnoseParameters(model.priors, points, draws, summary.diagnosis),
    draws,
    predictive: one.predictive,
    ages: one.ages.length === 0 ? null : agesTable(one.ages),
    widened: one.widened,
  };
}

function agesTable(ages: readonly DrawAges[]): AlternativeAges {
  const over = (of: (draw: DrawAges) => number): Quantiles => {
    const sorted = Float64Array.from(ages, of).sort();
    return [quantileSorted(sorted, 0.05), quantileSorted(sorted, 0.5), quantileSorted(sorted, 0.95)];
  };
  return {
    younger: Object.fromEntries(AGE_LIMITS.map((days, k) => [String(days), over(({ younger }) => younger[k])])),
    medianDays: over(({ medianDays }) => medianDays),
    medianBeyondRecord: ages.filter(({ beyondRecord }) => beyondRecord).length / ages.length,
    preRecordShare: over(({ preRecordShare }) => preRecordShare),
  };
}

function findingsOf(alternatives: readonly FittedAlternative[]): Finding[] {
  return alternatives.flatMap(({ name, outcome, impossibleShare, predictive }): Finding[] => {
    const about = { severity: 'warning' as const, where: name };
    const found: Finding[] = [];
    if (outcome === 'impossible') found.push({ code: 'fit-impossible', ...about, seen: 'no run is possible', done: 'It has no weight.' });
    if (outcome === 'notConverged') {
      const settle = 'Allow more evaluations, or free fewer unknowns.';
      found.push({ code: 'not-converged', ...about, seen: 'the chains have not converged', done: 'Not to be published.', settle });
    }
    if (outcome !== 'impossible' && impossibleShare > 0) {
      const seen = `${(100 * impossibleShare).toFixed(0)} % of the prior allows no run`;
      found.push({ code: 'impossible-share', ...about, severity: 'note', seen, done: 'Those points count as impossible.' });
    }
    if (predictive !== null && predictive.unreliable > 0) {
      const seen = `${predictive.unreliable} samples that move the fit by themselves`;
      found.push({
        code: 'influential-samples',
        ...about,
        severity: 'note',
        count: predictive.unreliable,
        seen,
        done: 'Kept; weights lean on them.',
      });
    }
    return found;
  });
}
