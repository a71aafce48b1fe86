import { describe, expect, test } from 'vitest';
import { leastSquares } from '../../../packages/sdk/src/numeric/leastSquares.js';
import { Random } from '../../../packages/sdk/src/numeric/random.js';
import { robustLeastSquares } from '../../../packages/sdk/src/numeric/robustLeastSquares.js';
import values from '../../checks/numericValues.json' with { type: 'json' };
import { expectAbsolute, expectRelative } from './near.js';

const line = (n: number): number[] => Array.from({ length: n }, (_, i) => [1, i / n]).flat();

describe('leastSquares(design, observations, weights)', () => {
  test('leastSquares gives the coefficients and covariance of numpy', () => {
    const { design, observations, weights, coefficients, covariance, residualSd } = values.regression;
    const fit = leastSquares(design, observations, weights)!;
    coefficients.forEach((c, j) => expectRelative(fit.coefficients[j], c, 1e-12, `coefficient ${j}`));
    covariance.forEach((entry, j) => expectRelative(fit.covariance[j], entry, 1e-11, `covariance ${j}`));
    expectRelative(fit.residualSd, residualSd, 1e-12, 'residualSd');
  });

  test('leastSquares reproduces an exact line; weights of 0 leave rows out; input is unchanged', () => {
    const design = line(6);
    const observations = Array.from({ length: 6 }, (_, i) => 2 - (3 * i) / 6);
    observations[4] = 99;
    const before = [...observations];
    const fit = leastSquares(design, observations, [1, 2, 1, 5, 0, 1])!;
    expectAbsolute(fit.coefficients[0], 2, 1e-14, 'offset');
    expectAbsolute(fit.coefficients[1], -3, 1e-14, 'slope');
    expectAbsolute(fit.residuals[4], 99, 1e-12, 'the row left out keeps its residual');
    expect(observations).toEqual(before);
  });

  test('leastSquares: ten times the weights changes nothing, ten times the observations scales all', () => {
    const { design, observations, weights } = values.regression;
    const fit = leastSquares(design, observations, weights)!;
    const heavier = leastSquares(
      design,
      observations,
      weights.map((w) => 10 * w),
    )!;
    const larger = leastSquares(
      design,
      observations.map((y) => 10 * y),
      weights,
    )!;
    fit.coefficients.forEach((c, j) => {
      expectRelative(heavier.coefficients[j], c, 1e-12, 'weights');
      expectRelative(larger.coefficients[j], 10 * c, 1e-12, 'observations');
    });
    fit.covariance.forEach((entry, j) => {
      expectRelative(heavier.covariance[j], entry, 1e-11, 'weights');
      expectRelative(larger.covariance[j], 100 * entry, 1e-11, 'observations');
    });
  });

  test('leastSquares is undefined where the rows do not determine the coefficients', () => {
    expect(leastSquares([1, 2, 2, 4, 3, 6], [1, 2, 3])).toBeUndefined();
    expect(leastSquares([1, 0, 0, 0], [1, 2])).toBeUndefined();
    expect(leastSquares([1, 2], [1])).toBeUndefined();
    expect(leastSquares(line(3), [1, 2, 3], [1, 0, 0])).toBeUndefined();
    expect(leastSquares(line(3), [1, NaN, 3])).toBeUndefined();
    expect(leastSquares(line(3), [1, 2, 3], [1, -1, 1])).toBeUndefined();
    expect(leastSquares([], [])).toBeUndefined();
  });

  test('leastSquares with as many rows as coefficients fits, and says that the spread is unknown', () => {
    const fit = leastSquares([1, 0, 1, 1], [3, 5])!;
    expectAbsolute(fit.coefficients[1], 2, 1e-14, 'slope');
    expect([fit.residualSd, fit.covariance[0]]).toEqual([NaN, NaN]);
  });
});

describe('robustLeastSquares(design, observations, shape)', () => {
  test('robustLeastSquares with Huber weights has the least Huber loss, as found by scipy', () => {
    const { design, observations, coefficients, spread, tolerance } = values.huber;
    const fit = robustLeastSquares(design, observations, 'huber')!;
    expect(fit.settled).toBe(true);
    coefficients.forEach((c, j) => expectAbsolute(fit.coefficients[j], c, tolerance, `coefficient ${j}`));
    expectAbsolute(fit.residualSd, spread, tolerance, 'spread');
  });

  test('robustLeastSquares with Tukey weights is not moved by how far an outlier lies', () => {
    const { design, observations } = values.huber;
    const near = robustLeastSquares(design, observations, 'tukey')!;
    const far = robustLeastSquares(
      design,
      observations.map((y, i) => (i === 30 ? y + 1e4 : y)),
      'tukey',
    )!;
    expect([near.weights[3], near.weights[17], near.weights[30], far.weights[30]]).toEqual([0, 0, 0, 0]);
    near.coefficients.forEach((c, j) => expectAbsolute(far.coefficients[j], c, 1e-7, `coefficient ${j}`));
  });

  test.each(['huber', 'tukey'] as const)('robustLeastSquares(…, %s): its standard errors match the scatter of its answers', (shape) => {
    const random = Random.fromSeed(77);
    const design = line(50);
    let slopes = 0;
    let slopeSquares = 0;
    let variances = 0;
    const rounds = 400;
    for (let round = 0; round < rounds; round++) {
      const observations = Array.from({ length: 50 }, (_, i) => 1 + (2 * i) / 50 + random.normal());
      const fit = robustLeastSquares(design, observations, shape)!;
      slopes += fit.coefficients[1] / rounds;
      slopeSquares += fit.coefficients[1] ** 2 / rounds;
      variances += fit.covariance[3] / rounds;
    }
    // The standard deviation of 400 answers is itself known to 1/√800 = 3.5 %, and the formula holds for many rows.
    expectRelative(Math.sqrt(variances), Math.sqrt(slopeSquares - slopes ** 2), 0.12, 'standard error');
    // Efficiency 95 %: the variance of plain least squares, 1/Σ(x − x̄)² with x = i/50, is 12/(50·(1 − 1/50²)).
    expectRelative(slopeSquares - slopes ** 2, 12 / (50 * (1 - 1 / 2500)) / 0.95, 0.25, 'variance');
  });

  test('robustLeastSquares fits an exact line exactly', () => {
    const fit = robustLeastSquares(
      line(9),
      Array.from({ length: 9 }, (_, i) => 1 + i / 9),
    )!;
    expectAbsolute(fit.coefficients[1], 1, 1e-13, 'slope');
  });

  test('robustLeastSquares is undefined where leastSquares is, and without a row to spare', () => {
    expect(robustLeastSquares([1, 2, 2, 4, 3, 6], [1, 2, 3])).toBeUndefined();
    expect(robustLeastSquares([1, 0, 1, 1], [3, 5])).toBeUndefined();
  });
});
