import { expect } from 'vitest';

/** Fails unless |received − expected| ≤ tolerance·|expected|, and says by how much. */
export function expectRelative(received: number, expected: number, tolerance: number, what: string): void {
  const error = expected === 0 ? Math.abs(received) : Math.abs(received - expected) / Math.abs(expected);
  expect(error, `${what}: received ${received}, expected ${expected}`).toBeLessThanOrEqual(tolerance);
}

/** Fails unless |received − expected| ≤ tolerance. */
export function expectAbsolute(received: number, expected: number, tolerance: number, what: string): void {
  expect(Math.abs(received - expected), `${what}: received ${received}, expected ${expected}`).toBeLessThanOrEqual(tolerance);
}

/** Arguments for the tests, spread evenly and the same in every run: the fractional parts of n·√prime. */
export function spread(n: number, prime: number): number {
  return (n * Math.sqrt(prime)) % 1;
}
