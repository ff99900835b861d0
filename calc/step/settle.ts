import { findRoot } from './find-root';

/**
 * Seconds of rest until Σ|v1|·e^(−t/τ) is within `withinVolts`.
 *
 * @param over over-voltage of each RC branch at the end of current, V
 * @param tau their time constants, s
 */
export function settleSeconds(over: number[], tau: number[], withinVolts: number): number {
  const sum = (s: number) => over.reduce((total, volts, i) => total + Math.abs(volts) * Math.exp(-s / tau[i]!), 0);
  const start = sum(0);
  if (start <= withinVolts) return 0;
  const slowest = Math.max(...tau.filter((_, i) => over[i] !== 0));
  const longest = slowest * Math.log(start / withinVolts);
  if (tau.every((value, i) => value === slowest || over[i] === 0)) return longest;
  const miss = (s: number) => Math.log(sum(s) / withinVolts);
  return findRoot(miss, 0, miss(0), longest, Math.min(miss(longest), 0), 1e-9 * longest);
}
