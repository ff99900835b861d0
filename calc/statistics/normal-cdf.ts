/**
 * Share of the standard normal distribution below `z`.
 *
 * Series of G. Marsaglia, J. Stat. Software 11 (2004) no. 4: about 1e-15 absolute within ±7, beyond which it is 0 or 1.
 *
 * @example Math.abs(normalCdf(1.959963984540054) - 0.975) < 1e-12
 */
export function normalCdf(z: number): number {
  if (z < -7) return 0;
  if (z > 7) return 1;
  let sum = z;
  let term = z;
  let before = 0;
  for (let odd = 3; sum !== before; odd += 2) {
    before = sum;
    term *= (z * z) / odd;
    sum += term;
  }
  return 0.5 + (sum * Math.exp(-0.5 * z * z)) / Math.sqrt(2 * Math.PI);
}

/** Share of it farther from the middle than `z`, to either side: 0…1. */
export function twoSidedTail(z: number): number {
  return Math.min(1, Math.max(0, 2 * normalCdf(-Math.abs(z))));
}
