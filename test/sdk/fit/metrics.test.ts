import { describe, expect, it } from 'vitest';
import {
  bias,
  klingGupta2009,
  klingGupta2012,
  logNashSutcliffe,
  meanAbsoluteError,
  nashSutcliffe,
  rootMeanSquareError,
  scoreSeries,
} from '../../../packages/sdk/src/fit/metrics.js';
import checks from '../../checks/metrics.json';

/** Source: definitions evaluated in a general numerical library, metrics.json; tolerance as stated there. */
describe('scoreSeries(observed, simulated)', () => {
  const { obs, sim, tol_rel } = checks;

  it.each([
    ['RMSE', rootMeanSquareError],
    ['MAE', meanAbsoluteError],
    ['bias', bias],
    ['NSE', nashSutcliffe],
    ['logNSE', logNashSutcliffe],
    ['KGE_2009', klingGupta2009],
    ['KGE_2012', klingGupta2012],
  ] as const)('%s', (name, score) => {
    expect(Math.abs(score(obs, sim) / checks[name] - 1)).toBeLessThan(tol_rel);
  });

  it('gives all of them at once', () => {
    expect(scoreSeries(obs, sim)).toMatchObject({ count: 10, nse: nashSutcliffe(obs, sim), kge2012: klingGupta2012(obs, sim) });
  });

  it('NSE by its decomposition 2αr − α² − β_n²', () => {
    expect(nashSutcliffe(obs, sim)).toBeCloseTo(checks.NSE_decomposition, 12);
  });

  it('the observed mean as a forecast: NSE 0, KGE 1 − √2', () => {
    const mean = obs.map(() => obs.reduce((a, b) => a + b, 0) / obs.length);
    expect(nashSutcliffe(obs, mean)).toBeCloseTo(checks.mean_benchmark.NSE, 12);
    expect(klingGupta2009(obs, mean)).toBeCloseTo(checks.mean_benchmark.KGE, 12);
  });

  it('a perfect simulation scores 1, and 0 error', () => {
    const scores = scoreSeries(obs, obs);
    expect(scores).toMatchObject({ rmse: 0, mae: 0, bias: 0, nse: 1, logNse: 1 });
    expect(scores.kge2009).toBeCloseTo(1, 14);
  });

  it('scores do not change with the unit, errors change with it', () => {
    const [o, s] = [obs.map((x) => x * 1e9), sim.map((x) => x * 1e9)];
    expect(klingGupta2012(o, s)).toBeCloseTo(klingGupta2012(obs, sim), 12);
    expect(rootMeanSquareError(o, s) / 1e9).toBeCloseTo(rootMeanSquareError(obs, sim), 12);
  });

  it('is NaN where nothing can be said', () => {
    expect(nashSutcliffe([0.3, 0.3, 0.3], [1, 2, 3])).toBeNaN();
    expect(klingGupta2009([0.3, 0.3, 0.3], [1, 2, 3])).toBeNaN();
    expect(klingGupta2009([-1, 1], [1, 2])).toBeNaN();
    expect(logNashSutcliffe([-9, -8], [-9, -8])).toBeNaN();
    expect(rootMeanSquareError([], [])).toBeNaN();
    expect(meanAbsoluteError([1, NaN], [1, 2])).toBeNaN();
  });

  it('throws on different lengths', () => {
    expect(() => nashSutcliffe([1, 2], [1])).toThrow(expect.objectContaining({ code: 'shape' }) as Error);
  });
});
