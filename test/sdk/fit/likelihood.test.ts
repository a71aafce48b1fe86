import { describe, expect, it } from 'vitest';
import {
  type ErrorModel,
  checkErrorModel,
  drawMeasured,
  errorScale,
  logLikelihood,
  pointwiseLogLikelihood,
} from '../../../packages/sdk/src/fit/likelihood.js';
import { logNormalCdf } from '../../../packages/sdk/src/fit/normalTail.js';
import { Random } from '../../../packages/sdk/src/numeric/random.js';
import checks from '../../checks/fitValues.json';

const normal: ErrorModel = { error: 'normal', constant: 0.3 };

describe('logNormalCdf(x), 40-digit values', () => {
  it.each(checks.logNormalCdf)('x = $x', ({ x, value }) => {
    expect(Math.abs(logNormalCdf(x) / value - 1)).toBeLessThan(2e-13);
  });

  it('keeps to the ends', () => {
    expect(logNormalCdf(-Infinity)).toBe(-Infinity);
    expect(logNormalCdf(50)).toBe(-0);
    expect(logNormalCdf(NaN)).toBeNaN();
  });
});

describe('logLikelihood(model, measured, simulated)', () => {
  it('normal: −½z² − log σ − ½ log 2π', () => {
    expect(logLikelihood(normal, -9.2, -9.5)).toBeCloseTo(-0.5 - Math.log(0.3) - 0.5 * Math.log(2 * Math.PI), 13);
  });

  it.each(checks.student)('studentT: $degrees degrees at $z (general library)', ({ degrees, z, logDensity, logCdf }) => {
    const model: ErrorModel = { error: 'studentT', degrees, constant: 2 };
    expect(logLikelihood(model, 10 + 2 * z, 10)).toBeCloseTo(logDensity - Math.log(2), 11);
    expect(logLikelihood(model, 10 + 2 * z, 10, 0, 'below')).toBeCloseTo(logCdf, 10);
    expect(logLikelihood(model, 10 - 2 * z, 10, 0, 'above')).toBeCloseTo(logCdf, 10);
  });

  it('studentT tends to normal for many degrees', () => {
    const many: ErrorModel = { error: 'studentT', degrees: 1e7, constant: 0.3 };
    expect(logLikelihood(many, -9, -9.5)).toBeCloseTo(logLikelihood(normal, -9, -9.5), 5);
  });

  it('censored: both sides of a limit make one', () => {
    for (const model of [normal, { error: 'studentT', degrees: 4, constant: 0.3 } as const]) {
      const below = Math.exp(logLikelihood(model, 0.05, 0.2, 0.1, 'below'));
      const above = Math.exp(logLikelihood(model, 0.05, 0.2, 0.1, 'above'));
      expect(below + above).toBeCloseTo(1, 14);
    }
  });

  it('a detection limit far below the simulation counts against it, finitely', () => {
    expect(logLikelihood(normal, 0.05, 20, 0, 'below')).toBeGreaterThan(-2300);
    expect(logLikelihood(normal, 0.05, 20, 0, 'below')).toBeLessThan(-2200);
  });

  it('errors add in quadrature', () => {
    expect(errorScale({ error: 'normal', constant: 4, proportional: 0.5 }, 24, 3)).toBe(13);
    expect(errorScale(normal, -9)).toBe(0.3);
  });

  it('is −Infinity for a run that gave no concentration, and without any error', () => {
    expect(logLikelihood(normal, 1, NaN)).toBe(-Infinity);
    expect(logLikelihood({ error: 'normal', constant: 0 }, 1, 1)).toBe(-Infinity);
  });

  it('densities add up to one', () => {
    for (const model of [normal, { error: 'studentT', degrees: 3, constant: 0.3, proportional: 0.1 } as const]) {
      let sum = 0;
      for (let y = -300; y <= 300; y += 0.01) sum += 0.01 * Math.exp(logLikelihood(model, y, 2));
      expect(sum).toBeCloseTo(1, 5);
    }
  });
});

describe('pointwiseLogLikelihood(model, samples, simulated)', () => {
  it('is the same, sample by sample', () => {
    const samples = [
      { value: 1, stated: 0.1 },
      { value: 0.05, stated: 0, censored: 'below' as const },
    ];
    expect(Array.from(pointwiseLogLikelihood(normal, samples, [1.2, 0.1]))).toEqual([
      logLikelihood(normal, 1, 1.2, 0.1),
      logLikelihood(normal, 0.05, 0.1, 0, 'below'),
    ]);
  });
});

describe('drawMeasured(model, simulated, stated, random)', () => {
  it.each([
    ['normal', { error: 'normal', constant: 0.4 } as ErrorModel],
    ['studentT', { error: 'studentT', degrees: 3.5, constant: 0.4 } as ErrorModel],
  ])('%s: the shares below limits are those of the likelihood', (_, model) => {
    const random = Random.fromSeed(5);
    const draws = Array.from({ length: 20_000 }, () => drawMeasured(model, 2, 0.3, random));
    for (const limit of [1, 1.8, 2.5]) {
      const share = draws.filter((y) => y <= limit).length / draws.length;
      const expected = Math.exp(logLikelihood(model, limit, 2, 0.3, 'below'));
      // four standard errors
      expect(Math.abs(share - expected)).toBeLessThan(4 * Math.sqrt((expected * (1 - expected)) / draws.length));
    }
  });
});

describe('checkErrorModel(value)', () => {
  it.each([
    [{ error: 'normal', constant: 0.3, proportional: 0.05 }, []],
    [{ error: 'studentT', degrees: 4, constant: 0 }, []],
    [7, ['type']],
    [{ error: 'toString' }, ['unknown-error-model']],
    [{ error: 'normal', constant: 0.3, degrees: 4 }, ['unknown-field']],
    [{ error: 'normal', constant: -1, proportional: NaN }, ['negative', 'not-finite']],
    [{ error: 'studentT', constant: 1 }, ['not-finite']],
    [{ error: 'studentT', degrees: 0.5, constant: 1 }, ['degrees']],
  ])('%j: %j', (value, codes) => {
    expect(checkErrorModel(value, 'errors.deuterium').map((issue) => issue.code)).toEqual(codes);
  });
});
