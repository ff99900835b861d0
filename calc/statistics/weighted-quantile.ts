import { CalcInputError } from '../errors';

/**
 * Quantile of a weighted sample that is type 7 where all weights are equal.
 *
 * The ordered points weigh the stretch they take of the cumulated weights; the quantile is their mean over the uniform
 * stretch [h/n, (h + 1)/n] with h = (n − 1)·p, and n is the effective sample size (Σw)²/Σw². A point of no weight counts for
 * nothing. Construction of A. Akinshin, Weighted quantile estimators (2023), from memory.
 *
 * @param values in any order; not changed
 * @param weights not below 0, not all 0
 * @param p 0…1
 * @throws CalcInputError for lists that do not fit together or a p outside 0…1
 */
export function weightedQuantile(values: ArrayLike<number>, weights: ArrayLike<number>, p: number): number {
  return weightedQuantiles(values, weights, [p])[0]!;
}

/** Several of them, sorted once. */
export function weightedQuantiles(
  values: ArrayLike<number>,
  weights: ArrayLike<number>,
  shares: readonly number[],
): number[] {
  const count = values.length;
  if (count === 0 || weights.length !== count)
    throw new CalcInputError('weights', weights.length, `as many as values, ${count}, and one or more`);
  let sum = 0;
  let squares = 0;
  for (let at = 0; at < count; at += 1) {
    const weight = weights[at]!;
    if (!(weight >= 0)) throw new CalcInputError('weights', weight, '0 or more');
    sum += weight;
    squares += weight * weight;
  }
  if (!(sum > 0)) throw new CalcInputError('weights', sum, 'not all 0');
  const effective = (sum * sum) / squares;
  const order = Array.from({ length: count }, (_, at) => at).sort((a, b) => values[a]! - values[b]! || a - b);
  return shares.map((p) => {
    if (!(p >= 0 && p <= 1)) throw new CalcInputError('p', p, 'between 0 and 1');
    const from = ((effective - 1) * p) / effective;
    const to = from + 1 / effective;
    let cumulated = 0;
    let covered = 0;
    let mean = 0;
    let last = values[order[0]!]!;
    for (const at of order) {
      const start = cumulated;
      cumulated += weights[at]! / sum;
      const overlap = Math.min(cumulated, to) - Math.max(start, from);
      if (overlap > 0) {
        mean += overlap * values[at]!;
        covered += overlap;
        last = values[at]!;
      }
      if (cumulated >= to) break;
    }
    return covered > 0 ? mean / covered : last;
  });
}
