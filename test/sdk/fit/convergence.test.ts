import { describe, expect, it } from 'vitest';
import { bulkSize, diagnoseChains, rHat, rankNormalisedRHat, splitChains, tailSize } from '../../../packages/sdk/src/fit/convergence.js';
import { effectiveSize } from '../../../packages/sdk/src/fit/effectiveSize.js';
import checks from '../../checks/chainDiagnostics.json';

/** Source: values of a general statistics library, written down in chainDiagnostics.json with its name. */
describe.each(checks.sets)('diagnoseChains($name)', ({ chains, expected, tol_rel }) => {
  const close = (value: number, reference: number): void => {
    expect(Math.abs(value / reference - 1)).toBeLessThan(tol_rel);
  };

  it('R-hat: rank-normalised, basic on halves, basic on whole chains', () => {
    close(rankNormalisedRHat(chains), expected.rhat_rank_split_fold);
    close(rHat(splitChains(chains)), expected.rhat_basic_split);
    close(rHat(chains), expected.rhat_basic_nosplit);
  });

  it('effective sizes: bulk, tail, basic', () => {
    close(bulkSize(chains), expected.ess_bulk);
    close(tailSize(chains), expected.ess_tail);
    close(effectiveSize(splitChains(chains)), expected.ess_basic_split);
    close(effectiveSize(chains), expected.ess_basic_nosplit);
  });

  it('Monte-Carlo errors of mean and standard deviation', () => {
    const diagnosis = diagnoseChains(chains);
    close(diagnosis.meanError, expected.mcse_mean);
    close(diagnosis.sdError, expected.mcse_sd);
    close(diagnosis.rHat, expected.rhat_rank_split_fold);
  });

  it('rank-normalised figures do not change under an increasing map', () => {
    const mapped = chains.map((chain) => chain.map((x) => Math.exp(2 * x) - 5));
    expect(bulkSize(mapped)).toBeCloseTo(bulkSize(chains), 9);
    expect(tailSize(mapped)).toBeCloseTo(tailSize(chains), 9);
  });
});

describe('rankNormalisedRHat', () => {
  it('is NaN for constant draws and for a draw that is not finite', () => {
    expect(rankNormalisedRHat([new Array<number>(20).fill(2), new Array<number>(20).fill(2)])).toBeNaN();
    const chain = Array.from({ length: 20 }, (_, i) => Math.sin(i));
    expect(rankNormalisedRHat([chain, [...chain.slice(1), NaN]])).toBeNaN();
    expect(effectiveSize([chain, [...chain.slice(1), Infinity]])).toBeNaN();
  });

  it('sees chains that agree in place and differ in spread', () => {
    const chain = Array.from({ length: 200 }, (_, i) => Math.sin(i * 7.3));
    const wide = chain.map((x, i) => x * (i % 2 ? 9 : -9));
    expect(rHat(splitChains([chain, wide]))).toBeLessThan(1.05);
    expect(rankNormalisedRHat([chain, wide])).toBeGreaterThan(1.3);
  });

  it('leaves its input as it was', () => {
    const chains = checks.sets[0].chains.map((chain) => Object.freeze([...chain]));
    expect(() => diagnoseChains(chains)).not.toThrow();
  });
});
