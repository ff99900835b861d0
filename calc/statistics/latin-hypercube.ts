import { CalcInputError } from '../errors';
import { inverseNormal } from './inverse-normal';
import { seededRandom } from './seeded-random';

/**
 * `count` points in the unit cube of `dimensions` such that each of `count` equal slices of every axis holds exactly
 * one, at the slice's middle. So each axis alone is spread as evenly as can be, whatever the seed. Source: M. D. McKay,
 * R. J. Beckman, W. J. Conover, Technometrics 21 (1979) 239–245.
 *
 * @param seed the same seed gives the same points to the last digit
 * @returns one row a point, every value inside (0, 1)
 * @throws CalcInputError for a count or number of dimensions that is no whole number above 0
 */
export function latinHypercube(count: number, dimensions: number, seed: number): number[][] {
  if (!Number.isInteger(count) || count < 1) throw new CalcInputError('count', count, 'a whole number above 0');
  if (!Number.isInteger(dimensions) || dimensions < 1)
    throw new CalcInputError('dimensions', dimensions, 'a whole number above 0');
  const random = seededRandom(seed);
  const points: number[][] = Array.from({ length: count }, () => new Array<number>(dimensions).fill(0));
  for (let d = 0; d < dimensions; d++) {
    const slices = shuffled(count, random);
    for (let i = 0; i < count; i++) points[i]![d] = (slices[i]! + 0.5) / count;
  }
  return points;
}

/** The same points as standard normal deviates. */
export function latinHypercubeNormal(count: number, dimensions: number, seed: number): number[][] {
  return latinHypercube(count, dimensions, seed).map((point) => point.map(inverseNormal));
}

/** 0 … count − 1 in seeded random order (Fisher–Yates). */
export function shuffled(count: number, random: () => number): number[] {
  const order = Array.from({ length: count }, (_, i) => i);
  for (let i = count - 1; i > 0; i--) {
    const j = Math.floor(random() * (i + 1));
    [order[i], order[j]] = [order[j]!, order[i]!];
  }
  return order;
}
