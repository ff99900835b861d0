import { findRoot } from './find-root';

/** A function of time as the sum of a part that never falls and a part that never rises (null: none). */
export interface SplitFunction {
  rising: (s: number) => number;
  falling: ((s: number) => number) | null;
}

/**
 * First moment in [0, `untilS`] at which the function reaches `level` from below, s; null where it does not.
 *
 * Without a falling part one look at the end decides. With one, an interval is passed over only where the most that
 * the two parts could make together stays below the level, so that no crossing and re-crossing is missed.
 */
export function firstReach(f: SplitFunction, level: number, untilS: number): number | null {
  const tolerance = 1e-9 + 1e-13 * untilS;
  const { rising, falling } = f;
  if (!falling) {
    const start = rising(0) - level;
    if (start >= 0) return 0;
    const end = rising(untilS) - level;
    return end < 0 ? null : findRoot((s) => rising(s) - level, 0, start, untilS, end, tolerance);
  }
  const search = (from: number, to: number, depth: number): number | null => {
    const start = rising(from) + falling(from) - level;
    if (start >= 0) return from;
    if (rising(to) + falling(from) < level) return null;
    if (to - from <= tolerance || depth > 60) return null;
    const middle = (from + to) / 2;
    return search(from, middle, depth + 1) ?? search(middle, to, depth + 1);
  };
  const early = search(0, untilS, 0);
  if (early !== null) return early;
  return rising(untilS) + falling(untilS) >= level ? untilS : null;
}
