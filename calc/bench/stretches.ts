import type { Stretch } from './bench-types';

/** The same time as stretches that are ascending and apart: what overlaps or touches becomes one, empty ones go. */
export function merge(list: readonly Stretch[]): Stretch[] {
  const merged: Stretch[] = [];
  for (const { fromS, toS } of [...list].sort((one, other) => one.fromS - other.fromS)) {
    if (!(toS > fromS)) continue;
    const last = merged.at(-1);
    if (last && fromS <= last.toS) last.toS = Math.max(last.toS, toS);
    else merged.push({ fromS, toS });
  }
  return merged;
}

/** The time that is in `a` and not in `b`, ascending and apart. */
export function subtract(a: readonly Stretch[], b: readonly Stretch[]): Stretch[] {
  const without = merge(b);
  const left: Stretch[] = [];
  for (const { fromS, toS } of merge(a)) {
    let fromNow = fromS;
    for (const hole of without) {
      if (hole.toS <= fromNow) continue;
      if (hole.fromS >= toS) break;
      if (hole.fromS > fromNow) left.push({ fromS: fromNow, toS: hole.fromS });
      fromNow = hole.toS;
    }
    if (fromNow < toS) left.push({ fromS: fromNow, toS });
  }
  return left;
}

/** The time that is in both, ascending and apart. */
export function intersect(a: readonly Stretch[], b: readonly Stretch[]): Stretch[] {
  const [one, other] = [merge(a), merge(b)];
  const both: Stretch[] = [];
  for (let i = 0, j = 0; i < one.length && j < other.length;) {
    const [left, right] = [one[i]!, other[j]!];
    const fromS = Math.max(left.fromS, right.fromS);
    const toS = Math.min(left.toS, right.toS);
    if (fromS < toS) both.push({ fromS, toS });
    if (left.toS < right.toS) i += 1;
    else j += 1;
  }
  return both;
}
