/**
 * Share of a standard normal below z. M. Abramowitz, I. A. Stegun, Handbook of Mathematical Functions (1964), 7.1.26,
 * error below 1.5e-7.
 */
export function normalBelow(z: number): number {
  const x = Math.abs(z) / Math.SQRT2;
  const t = 1 / (1 + 0.3275911 * x);
  const series = t * (0.254829592 + t * (-0.284496736 + t * (1.421413741 + t * (-1.453152027 + t * 1.061405429))));
  const tail = (series * Math.exp(-x * x)) / 2;
  return z > 0 ? 1 - tail : tail;
}

/** One normal of a mixture. */
export interface Part {
  weight: number;
  mean: number;
  sd: number;
}

/** Share of a mixture below a value; weights sum to 1. */
export function mixtureBelow(parts: readonly Part[], value: number): number {
  let sum = 0;
  for (const { weight, mean, sd } of parts)
    sum += weight * (sd > 0 ? normalBelow((value - mean) / sd) : value >= mean ? 1 : 0);
  return sum;
}

/** The value below which a share `p` of a mixture lies, by bisection. */
export function mixtureQuantile(parts: readonly Part[], p: number): number {
  let low = Math.min(...parts.map(({ mean, sd }) => mean - 8 * sd));
  let high = Math.max(...parts.map(({ mean, sd }) => mean + 8 * sd));
  for (let pass = 0; pass < 60; pass += 1) {
    const middle = (low + high) / 2;
    if (mixtureBelow(parts, middle) < p) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}
