import { describe, expect, it } from 'vitest';
import { RillageError } from '../../../packages/sdk/src/errors.js';
import { collectPriors, substitute } from '../../../packages/sdk/src/fit/priorPaths.js';

const problem = {
  initialStorage: { prior: 'logUniform', low: 200, high: 5000 },
  selection: {
    discharge: {
      form: 'gamma',
      shape: 0.6,
      scale: { driver: 'storageAnomaly', at: [-50, 80], value: [{ prior: 'logUniform', low: 20, high: 2000 }, 150] },
    },
    'flow to the aquifer': { form: 'mixture', parts: [{ weight: { prior: 'beta', a: 2, b: 2 }, selection: { form: 'uniform' } }] },
  },
};

describe('collectPriors(data)', () => {
  it('finds every prior with its path, in the order of the keys', () => {
    expect(collectPriors(problem).map(({ path, prior }) => [path, prior.prior])).toEqual([
      ['initialStorage', 'logUniform'],
      ['selection.discharge.scale.value[0]', 'logUniform'],
      ['selection["flow to the aquifer"].parts[0].weight', 'beta'],
    ]);
  });

  it('finds none in plain numbers', () => {
    expect(collectPriors({ a: 1, b: [2, null, 'x', true] })).toEqual([]);
  });

  it('reports every problem in one batch', () => {
    const cycle: Record<string, unknown> = {};
    cycle.self = cycle;
    try {
      collectPriors({ a: { prior: 'uniform', low: 2, high: 1 }, b: NaN, c: cycle, d: new Map(), e: { prior: 'nope' } });
      expect.unreachable();
    } catch (error) {
      expect(error).toBeInstanceOf(RillageError);
      expect((error as RillageError).issues.map(({ code, path }) => [code, path])).toEqual([
        ['empty-range', 'a'],
        ['not-finite', 'b'],
        ['not-plain', 'c.self'],
        ['not-plain', 'd'],
        ['unknown-prior', 'e.prior'],
      ]);
    }
  });

  it('allows the same part in two places', () => {
    const shared = { prior: 'normal', mean: 0, sd: 1 };
    expect(collectPriors({ a: shared, b: shared })).toHaveLength(2);
  });
});

describe('substitute(data, priors, values)', () => {
  it('puts numbers where the priors stood and leaves the input as it was', () => {
    const before = structuredClone(problem);
    const result = substitute<typeof problem>(problem, collectPriors(problem), [800, 60, 0.4]);
    expect(result.initialStorage).toBe(800);
    expect(result.selection.discharge.scale.value).toEqual([60, 150]);
    expect(result.selection['flow to the aquifer'].parts[0].weight).toBe(0.4);
    expect(result.selection.discharge.form).toBe('gamma');
    expect(problem).toEqual(before);
  });

  it('a prior alone becomes its number', () => {
    const prior = { prior: 'normal', mean: 0, sd: 1 };
    expect(substitute(prior, collectPriors(prior), [3])).toBe(3);
  });

  it('throws on a wrong count', () => {
    expect(() => substitute(problem, collectPriors(problem), [1])).toThrow(expect.objectContaining({ code: 'shape' }) as Error);
  });
});
