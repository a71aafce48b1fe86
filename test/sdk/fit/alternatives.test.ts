import { existsSync } from 'node:fs';
import { beforeAll, describe, expect, test } from 'vitest';
import {
  fitCatchment,
  fitMembers,
  fitSummary,
  makeReading,
  makeStation,
  READING_RUN_OPTIONS,
  RillageError,
  runDraws,
  runDrawsInBackground,
  updateStation,
  whatWouldHelp,
  type Fit,
  type FitProblem,
  type FitState,
  type Forcing,
} from '@rillage/sdk';
import { checkProblem } from '../../../packages/sdk/src/fit/problem.js';
import { catchmentOf, syntheticProblem, TRUTH } from './synthetic.js';

const { problem: single, truth, forcing } = syntheticProblem();
const uncovered = 'amountWeightedMean' as const;
const problem: FitProblem = {
  ...single,
  otherCatchments: {
    wellMixed: {
      ...catchmentOf(0),
      selection: {
        discharge: { form: 'uniform' },
        evapotranspiration: { form: 'exponential', scale: { prior: 'uniform', low: 20, high: 90 } },
      },
    },
  },
  fillings: [
    { rule: 'seasonalPlusResidual', uncovered },
    { rule: 'randomRedistribution', uncovered, seed: 2 },
  ],
};
const quick = { seed: 5, workers: 0, effectiveSize: 60, rHat: 1.1, draws: 120, redistributions: 30 };
const entry = new URL('../../../packages/sdk/dist/workers/worker-entry.js', import.meta.url);
const codeOf = async (work: () => unknown): Promise<string> => {
  try {
    await work();
  } catch (error) {
    if (error instanceof RillageError) return error.code;
    throw error;
  }
  return 'none';
};

describe('fitCatchment over two selections and two fillings', () => {
  let fit: Fit;
  beforeAll(async () => {
    fit = await fitCatchment(problem, quick);
  }, 180_000);

  test('names every alternative, with weights that add up to 1 and next to none for the wrong selection', () => {
    expect(fit.alternatives.map(({ name }) => name)).toEqual([
      'catchment, seasonalPlusResidual',
      'catchment, randomRedistribution 2',
      'wellMixed, seasonalPlusResidual',
      'wellMixed, randomRedistribution 2',
    ]);
    expect(fit.alternatives.reduce((sum, { weight }) => sum + weight, 0)).toBeCloseTo(1, 9);
    expect(fit.alternatives[2].weight + fit.alternatives[3].weight).toBeLessThan(0.1);
    expect(fit.converged).toBe(true);
    expect(fit.inputDoubtInRange).toBe(true);
  });

  test('the table carries today’s ages of each', () => {
    const ages = fit.alternatives[0].ages!;
    expect(Object.keys(ages.younger)).toEqual(['7', '30', '90', '365']);
    const share = truth.outflows['discharge'].youngerShare.get(30)!;
    const today = share[share.length - 1];
    expect(ages.younger['30'][0]).toBeLessThan(today);
    expect(ages.younger['30'][2]).toBeGreaterThan(today);
  });

  test('fitMembers follow the weights, and only catchments without priors come back', () => {
    const members = fitMembers(fit, problem, 50);
    expect(members.reduce((sum, { weight }) => sum + weight, 0)).toBeCloseTo(1, 12);
    fit.alternatives.forEach(({ weight }, k) => {
      const own = members.filter(({ alternative }) => alternative === k).reduce((sum, member) => sum + member.weight, 0);
      expect(Math.abs(own - weight)).toBeLessThan(0.05);
    });
    expect(JSON.stringify(members)).not.toContain('prior"');
  });

  test('the reading from its runs holds the truth, and says by which rules it is sure or not', () => {
    const reading = makeReading(runDraws(fit, problem, READING_RUN_OPTIONS, 40), {
      ...fitSummary(fit),
      samples: { count: 67, last: fit.samples.last },
    });
    const { range } = reading.younger.find(({ days }) => days === 30)!;
    const share = truth.outflows['discharge'].youngerShare.get(30)!;
    expect(range!.low).toBeLessThanOrEqual(share[share.length - 1]);
    expect(range!.high).toBeGreaterThanOrEqual(share[share.length - 1]);
    expect(reading.confidenceBecause.length).toBeGreaterThan(0);
    const doubtful = makeReading(runDraws(fit, problem, READING_RUN_OPTIONS, 40), {
      converged: true,
      inputDoubtInRange: true,
      coverageTooNarrow: true,
      crossCheckAgrees: false,
      sampleSpanDays: 90,
      samples: { count: 9, last: fit.samples.last },
    });
    expect(doubtful.confidence).toBe('tentative');
    expect(doubtful.confidenceBecause).toEqual(
      expect.arrayContaining([expect.stringContaining('few'), expect.stringContaining('outside what'), expect.stringContaining('seasons')]),
    );
  });

  test('a station keeps the facts of its fit through the mornings', () => {
    const last = forcing.inflow.length - 1;
    const head = cut(forcing, 0, last);
    const source = runDraws(fit, { ...problem, forcing }, READING_RUN_OPTIONS, 10);
    expect(source.length).toBe(10);
    const station = makeStation({
      id: 'a',
      name: 'A',
      forcing: head,
      source: runDrawsOn(head),
      fit: { ...fitSummary(fit), converged: false },
    });
    expect(station.reading.withheld.map(({ code }) => code)).toContain('fitNotConverged');
    const next = updateStation(station, cut(forcing, last, last + 1));
    expect(next.reading.withheld.map(({ code }) => code)).toContain('fitNotConverged');
  });

  function runDrawsOn(head: Forcing) {
    return runDraws(
      fit,
      { ...problem, forcing: head, samples: problem.samples.slice(0, -1) },
      { ...READING_RUN_OPTIONS, distributionsAt: [head.inflow.length - 1] },
      10,
    );
  }

  test('whatWouldHelp: more samples narrow more, and nothing narrows below nothing', async () => {
    const plans = await whatWouldHelp(fit, problem, { counts: [4, 40], members: 60 });
    const of = (when: string, count: number) => plans.find((plan) => plan.when === when && plan.count === count)!;
    expect(plans.length).toBe(6);
    expect(of('anyFlow', 40).narrowed).toBeGreaterThan(of('anyFlow', 4).narrowed);
    expect(of('anyFlow', 40).younger.after).toBeLessThan(of('anyFlow', 40).younger.before);
    expect(plans.map(({ narrowed }) => narrowed)).toEqual(plans.map(({ narrowed }) => narrowed).sort((a, b) => b - a));
    expect(await whatWouldHelp(fit, problem, { counts: [4, 40], members: 60 })).toEqual(plans);
  });

  test('a fit stopped half way and resumed gives the same draws, through JSON', async () => {
    const controller = new AbortController();
    const first = await fitCatchment(problem, {
      ...quick,
      signal: controller.signal,
      onProgress: ({ done }) => {
        if (done > 0.3) controller.abort();
      },
    });
    expect(first.partial).toBe(true);
    expect(first.alternatives.length).toBeLessThan(4);
    const resume = JSON.parse(JSON.stringify(first.state)) as FitState;
    const second = await fitCatchment(problem, { ...quick, resume });
    expect(second.alternatives.map(({ draws }) => draws)).toEqual(fit.alternatives.map(({ draws }) => draws));
    expect(second.alternatives.map(({ weight }) => weight)).toEqual(fit.alternatives.map(({ weight }) => weight));
    expect(await codeOf(() => fitCatchment({ ...problem, samples: problem.samples.slice(1) }, { ...quick, resume }))).toBe('fit-mismatch');
    expect(await codeOf(() => fitCatchment(problem, { ...quick, seed: 6, resume }))).toBe('fit-mismatch');
  }, 180_000);

  // the worker is the built file; where nothing is built yet, the threads are time slices of this one
  test('two workers give the draws of none', async () => {
    const there = await fitCatchment(problem, { ...quick, workers: 2, ...(existsSync(entry) ? { worker: entry.href } : {}) });
    expect(there.alternatives.map(({ draws }) => draws)).toEqual(fit.alternatives.map(({ draws }) => draws));
  }, 180_000);

  test('runDrawsInBackground gives the runs of runDraws, and ends at a signal', async () => {
    const options = { youngerThan: [30] };
    const shares = (runs: { run: { outflows: Record<string, { youngerShare: Map<number, Float64Array> }> } }[]): number[][] =>
      runs.map(({ run }) => [...run.outflows['discharge'].youngerShare.get(30)!.slice(-3)]);
    const there: number[] = [];
    const runs = await runDrawsInBackground(fit, problem, options, { count: 12, onProgress: ({ done }) => there.push(done) });
    expect(shares(runs)).toEqual(shares(runDraws(fit, problem, options, 12)));
    expect(there.at(-1)).toBe(1);
    const signal = AbortSignal.abort();
    await expect(runDrawsInBackground(fit, problem, options, { signal })).rejects.toMatchObject({ code: 'aborted' });
  });

  test('fitMembers refuses a fit of another problem', async () => {
    expect(await codeOf(() => fitMembers(fit, single))).toBe('fit-mismatch');
  });

  test('the seasonal cycle gives a second opinion at its own age, near the fitted share', () => {
    const [check] = fit.crossCheck;
    expect(check.tracer).toBe('d18O');
    expect(check.days).toBeGreaterThan(30);
    expect(check.days).toBeLessThan(110);
    expect(check.byFlow.agrees).toBe(Math.abs(check.byFlow.seasonal - check.byFlow.fitted[1]) <= limit(check.byFlow));
  });

  function limit({ seasonalError, fitted }: Fit['crossCheck'][number]['byFlow']): number {
    return 2 * Math.hypot(seasonalError, (fitted[2] - fitted[0]) / 3.29) + 0.05;
  }

  test('the scale lies in its 5 to 95 %', () => {
    const scale = fit.parameters.find(({ path }) => path.includes('scale'))!;
    expect(scale.after[0]).toBeLessThan(TRUTH.scale);
    expect(scale.after[2]).toBeGreaterThan(TRUTH.scale);
  });
});

describe('checkProblem refuses', () => {
  test.each([
    ['a field that it does not know', { sample: [] }, 'unknown-field'],
    ['fillings without rain samples', { rainSamples: [] }, 'fillings-without-samples'],
    ['no fillings at all', { fillings: [] }, 'no-fillings'],
    ['a field of a filling that it does not know', { fillings: [{ rule: 'bulkConstant', uncovered, sed: 1 }] }, 'unknown-field'],
    [
      'a form that does not exist',
      {
        catchment: {
          ...single.catchment,
          selection: { ...single.catchment.selection, discharge: { form: 'gama', scale: { prior: 'uniform', low: 1, high: 2 } } },
        },
      },
      'selection-form',
    ],
    ['a field of a sample that it does not know', { samples: [{ ...single.samples[0], err: 0.1 }] }, 'sample-invalid'],
    [
      'a sample of a tracer that another catchment lacks',
      { otherCatchments: { bare: { ...catchmentOf(0), tracers: {}, initialStorage: { prior: 'uniform', low: 900, high: 2000 } } } },
      'sample-invalid',
    ],
    [
      'rain samples in a unit of another kind',
      { rainSamples: single.rainSamples!.map((sample) => ({ ...sample, unit: 'mg/L' })) },
      'unit-mismatch',
    ],
  ])('%s', async (_what, change, code) => {
    expect(await codeOf(() => checkProblem({ ...problem, ...(change as Partial<FitProblem>) }))).toBe(code);
  });
});

function cut(from: Forcing, first: number, end: number): Forcing {
  const each = (series: Record<string, Float64Array>) =>
    Object.fromEntries(Object.entries(series).map(([name, values]) => [name, values.slice(first, end)]));
  return {
    start: new Date(Date.parse(from.start) + first * 86_400_000).toISOString(),
    stepDays: 1,
    inflow: from.inflow.slice(first, end),
    outflows: each(from.outflows),
    inflowConcentration: each(from.inflowConcentration),
  };
}
