/** Stretches of instants, epoch ms. */
export interface Stretch {
  from: number;
  to: number;
}

export const overlaps = (one: Stretch, other: Stretch): boolean => one.from < other.to && other.from < one.to;

/** Sorted, and those that touch or overlap as one. */
export function united(stretches: readonly Stretch[]): Stretch[] {
  const found: Stretch[] = [];
  for (const one of [...stretches].sort((a, b) => a.from - b.from)) {
    if (one.to <= one.from) continue;
    const last = found.at(-1);
    if (last && one.from <= last.to) last.to = Math.max(last.to, one.to);
    else found.push({ ...one });
  }
  return found;
}

/** What is in both. */
export function common(some: readonly Stretch[], others: readonly Stretch[]): Stretch[] {
  const found: Stretch[] = [];
  for (const one of united(some))
    for (const other of united(others)) {
      const both = { from: Math.max(one.from, other.from), to: Math.min(one.to, other.to) };
      if (both.to > both.from) found.push(both);
    }
  return found;
}

/** The first without the others. */
export function without(some: readonly Stretch[], others: readonly Stretch[]): Stretch[] {
  let left = united(some);
  for (const other of united(others))
    left = left.flatMap((one) =>
      overlaps(one, other)
        ? [
            { from: one.from, to: other.from },
            { from: other.to, to: one.to },
          ].filter(({ from, to }) => to > from)
        : [one],
    );
  return left;
}

export const lengthOf = (stretches: readonly Stretch[]): number =>
  united(stretches).reduce((sum, { from, to }) => sum + to - from, 0);

/**
 * The first instant from `notBefore` on at which something of this length may begin and is undisturbed to its end;
 * null: there is none.
 * @param mayBegin instants at which it may begin, both ends among them
 */
export function earliestBegin(
  mayBegin: readonly Stretch[],
  taken: readonly Stretch[],
  lengthMs: number,
  notBefore = -Infinity,
): number | null {
  const inTheWay = united(taken);
  for (const { from, to } of [...mayBegin].sort((a, b) => a.from - b.from)) {
    let at = Math.max(from, notBefore);
    for (const one of inTheWay) if (one.from < at + lengthMs && at < one.to) at = one.to;
    if (at <= to) return at;
  }
  return null;
}
