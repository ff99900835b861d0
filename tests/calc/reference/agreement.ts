import { expect } from 'vitest';

/** Within 0.2 % or 2 s, whichever is more. */
export function expectSeconds(actual: number, expected: number, what = 'time'): void {
  expect(Math.abs(actual - expected), `${what}: ${actual} s against ${expected} s`).toBeLessThanOrEqual(
    Math.max(2, 0.002 * expected),
  );
}

/** Within 0.1 %. */
export function expectShare(actual: number, expected: number, what: string): void {
  expect(Math.abs(actual - expected), `${what}: ${actual} against ${expected}`).toBeLessThanOrEqual(
    0.001 * Math.abs(expected),
  );
}

/** Within 0.5 mV. */
export function expectVolts(actual: number, expected: number, what = 'voltage'): void {
  expect(Math.abs(actual - expected), `${what}: ${actual} V against ${expected} V`).toBeLessThanOrEqual(0.0005);
}
