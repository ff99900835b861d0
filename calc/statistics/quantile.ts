import { CalcInputError } from '../errors';

/**
 * Quantile of a sample, type 7: straight between the ordered points at (n − 1)·p.
 *
 * Source: R. J. Hyndman, Y. Fan, The American Statistician 50 (1996) 361–365.
 *
 * @param values in any order; not changed
 * @param p 0…1
 * @throws CalcInputError for an empty sample or a p outside 0…1
 * @example quantile([15, 20, 35, 40, 50], 0.25) === 20
 */
export function quantile(values: ArrayLike<number>, p: number): number {
  return quantileOfSorted(Float64Array.from(values).sort(), p);
}

/** The same of values that are already in rising order. */
export function quantileOfSorted(sorted: ArrayLike<number>, p: number): number {
  if (sorted.length === 0) throw new CalcInputError('values', [], 'a list of one or more');
  if (!(p >= 0 && p <= 1)) throw new CalcInputError('p', p, 'between 0 and 1');
  const place = (sorted.length - 1) * p;
  const below = Math.floor(place);
  const low = sorted[below]!;
  const high = sorted[Math.min(below + 1, sorted.length - 1)]!;
  return low + (place - below) * (high - low);
}
