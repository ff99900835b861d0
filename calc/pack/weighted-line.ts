/** A straight line through points with standard deviations, by weighted least squares. */
export interface WeightedLine {
  slope: number;
  /** Standard deviation of the slope, from those of the points. */
  slopeSd: number;
  /** Squared misses over squared standard deviations, summed. */
  chiSquared: number;
}

/** @param sd of each y, above 0; the x must not all be the same */
export function weightedLine(x: readonly number[], y: readonly number[], sd: readonly number[]): WeightedLine {
  const weights = sd.map((value) => 1 / (value * value));
  const total = sum(weights);
  const mean = (values: readonly number[]): number => sum(values.map((value, at) => weights[at]! * value)) / total;
  const middleX = mean(x);
  const middleY = mean(y);
  const xx = sum(x.map((value, at) => weights[at]! * (value - middleX) ** 2));
  const slope = sum(x.map((value, at) => weights[at]! * (value - middleX) * (y[at]! - middleY))) / xx;
  return {
    slope,
    slopeSd: Math.sqrt(1 / xx),
    chiSquared: sum(y.map((value, at) => weights[at]! * (value - middleY - slope * (x[at]! - middleX)) ** 2)),
  };
}

/**
 * Squared misses over squared standard deviations of the course that comes nearest without ever rising, by pooling adjacent
 * violators: what noise alone would have to explain if nothing grew.
 */
export function neverRisingChiSquared(y: readonly number[], sd: readonly number[]): number {
  const pools: { weight: number; mean: number; square: number }[] = [];
  y.forEach((value, at) => {
    const weight = 1 / (sd[at]! * sd[at]!);
    let pool = { weight, mean: value, square: 0 };
    for (let last = pools.at(-1); last && last.mean < pool.mean; last = pools.at(-1)) {
      pools.pop();
      const both = last.weight + pool.weight;
      pool = {
        weight: both,
        mean: (last.weight * last.mean + pool.weight * pool.mean) / both,
        square: last.square + pool.square + ((last.weight * pool.weight) / both) * (last.mean - pool.mean) ** 2,
      };
    }
    pools.push(pool);
  });
  return sum(pools.map(({ square }) => square));
}

const sum = (values: readonly number[]): number => values.reduce((total, value) => total + value, 0);
