/** Stretches of instants, epoch ms. */
import { intersect, merge, subtract } from '@/calc/index';
import type { Stretch as CoreStretch } from '@/calc/bench/bench-types';

export interface Stretch {
  from: number;
  to: number;
}

export const overlaps = (one: Stretch, other: Stretch): boolean => one.from < other.to && other.from < one.to;

// The reckoning with stretches is the core's; its seconds may as well be the milliseconds of the server.
const toCore = ({ from, to }: Stretch): CoreStretch => ({ fromS: from, toS: to });
const fromCore = ({ fromS, toS }: CoreStretch): Stretch => ({ from: fromS, to: toS });

/** Sorted, and those that touch or overlap as one. */
export const united = (stretches: readonly Stretch[]): Stretch[] => merge(stretches.map(toCore)).map(fromCore);

/** What is in both. */
export const common = (some: readonly Stretch[], others: readonly Stretch[]): Stretch[] =>
  intersect(some.map(toCore), others.map(toCore)).map(fromCore);

/** The first without the others. */
export const without = (some: readonly Stretch[], others: readonly Stretch[]): Stretch[] =>
  subtract(some.map(toCore), others.map(toCore)).map(fromCore);

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
