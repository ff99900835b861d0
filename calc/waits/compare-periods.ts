import { CalcInputError } from '../errors';
import { quantile, quantileOfSorted } from '../statistics/quantile';
import { inverseNormal } from '../statistics/inverse-normal';
import { normalCdf } from '../statistics/normal-cdf';
import { seededRandom } from '../statistics/seeded-random';

/** Nothing under so many charges is averaged without saying so. */
export const FEWEST_AVERAGED = 5;

export interface PlannedActual {
  plannedMinutes: number;
  lowMinutes: number;
  highMinutes: number;
  actualMinutes: number;
}

/**
 * Planned against actual: mean of actual − planned, median of its size (min), and the share inside the planned band.
 *
 * @returns `tooFew` where fewer than 5 stand behind it; figures null where there is none
 */
export function plannedAgainstActual(rows: readonly PlannedActual[]): {
  count: number;
  tooFew: boolean;
  biasMinutes: number | null;
  medianAbsoluteErrorMinutes: number | null;
  shareInBand: number | null;
} {
  const count = rows.length;
  const tooFew = count < FEWEST_AVERAGED;
  if (count === 0) return { count, tooFew, biasMinutes: null, medianAbsoluteErrorMinutes: null, shareInBand: null };
  const errors = rows.map((one) => one.actualMinutes - one.plannedMinutes);
  const inside = rows.filter((one) => one.actualMinutes >= one.lowMinutes && one.actualMinutes <= one.highMinutes);
  return {
    count,
    tooFew,
    biasMinutes: errors.reduce((sum, one) => sum + one, 0) / count,
    medianAbsoluteErrorMinutes: quantile(errors.map(Math.abs), 0.5),
    shareInBand: inside.length / count,
  };
}

/**
 * Two-sided Mann–Whitney test whether values of two periods come from the same: normal approximation with the correction
 * for ties and for continuity.
 *
 * @returns U of the first and p; p is 1 where all values are equal
 * @throws CalcInputError for an empty period
 */
export function mannWhitney(first: readonly number[], second: readonly number[]): { u: number; p: number } {
  requireBoth(first, second);
  const all = [...first.map((value) => ({ value, one: 1 })), ...second.map((value) => ({ value, one: 0 }))];
  all.sort((a, b) => a.value - b.value);
  let ranks = 0;
  let ties = 0;
  for (let from = 0; from < all.length;) {
    let to = from;
    while (to < all.length && all[to]!.value === all[from]!.value) to += 1;
    for (let at = from; at < to; at += 1) ranks += all[at]!.one * ((from + 1 + to) / 2);
    ties += (to - from) ** 3 - (to - from);
    from = to;
  }
  const [m, n, both] = [first.length, second.length, all.length];
  const u = ranks - (m * (m + 1)) / 2;
  const variance = ((m * n) / 12) * (both + 1 - ties / (both * (both - 1)));
  if (!(variance > 0)) return { u, p: 1 };
  const z = Math.max(0, Math.abs(u - (m * n) / 2) - 0.5) / Math.sqrt(variance);
  return { u, p: 2 * (1 - normalCdf(z)) };
}

/** Above so many values a resampled median is drawn by its own distribution. */
const MOST_RESAMPLED = 1000;

/**
 * Difference of the medians, second − first, with its 95 % bootstrap interval of 1,000 draws (percentile interval).
 *
 * The median of n values drawn with replacement stands where the median of n uniform numbers stands, which is
 * Beta((n+1)/2, (n+1)/2) distributed: of more than 1,000 values a draw takes it from the normal distribution of the same
 * mean ½ and variance 1/(4(n+2)), in place of n values.
 */
export function medianDifference(
  first: readonly number[],
  second: readonly number[],
  seed: number,
): { value: number; low: number; high: number } {
  requireBoth(first, second);
  const random = seededRandom(seed);
  const drawer = (of: readonly number[]) => {
    if (of.length <= MOST_RESAMPLED)
      return () =>
        quantile(
          of.map(() => of[Math.floor(random() * of.length)]!),
          0.5,
        );
    const sorted = Float64Array.from(of).sort();
    const sd = 1 / Math.sqrt(4 * (of.length + 2));
    return () => quantileOfSorted(sorted, Math.min(1, Math.max(0, 0.5 + sd * inverseNormal(inside(random())))));
  };
  const [again, before] = [drawer(second), drawer(first)];
  const draws = Float64Array.from({ length: 1000 }, () => again() - before()).sort();
  return {
    value: quantile(second, 0.5) - quantile(first, 0.5),
    low: quantileOfSorted(draws, 0.025),
    high: quantileOfSorted(draws, 0.975),
  };
}

/** A number of [0, 1) off the end at which the inverse of the normal distribution is infinite. */
const inside = (share: number): number => Math.max(1e-12, share);

function requireBoth(first: readonly number[], second: readonly number[]): void {
  if (first.length === 0) throw new CalcInputError('first', [], 'a list of one or more');
  if (second.length === 0) throw new CalcInputError('second', [], 'a list of one or more');
}
