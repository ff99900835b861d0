import { CalcInputError } from '../errors';
import type { OpenMinutes } from './waits-types';

/** When somebody is there: asked at instants that never go back. */
export interface OpenTime {
  isOpen: (at: number) => boolean;
  /** The next opening after an instant, min; Infinity: none. */
  nextAfter: (at: number) => number;
}

/** A reader of the open stretches; null: always open. */
export function openFrom(open: readonly OpenMinutes[] | null): OpenTime {
  if (!open) return { isOpen: () => true, nextAfter: () => Infinity };
  requireApart(open);
  let place = 0;
  const seek = (at: number) => {
    while (place < open.length && open[place]!.toMinutes <= at) place += 1;
  };
  return {
    isOpen: (at) => {
      seek(at);
      return place < open.length && open[place]!.fromMinutes <= at;
    },
    nextAfter: (at) => {
      seek(at);
      if (place < open.length && open[place]!.fromMinutes > at) return open[place]!.fromMinutes;
      return open[place + 1]?.fromMinutes ?? Infinity;
    },
  };
}

/**
 * Until when somebody looks in often enough from an instant on: the first absence longer than the look-in interval, min.
 * Asked at instants that never go back.
 */
export function guardedUntil(open: readonly OpenMinutes[] | null, lookInMinutes = Infinity): (at: number) => number {
  if (!open || lookInMinutes === Infinity) return () => Infinity;
  const ends: number[] = [];
  open.forEach((one, at) => {
    const next = open[at + 1];
    if (!next || next.fromMinutes - one.toMinutes > lookInMinutes) ends.push(one.toMinutes);
  });
  let place = 0;
  return (at) => {
    while (place < ends.length && ends[place]! <= at) place += 1;
    return ends[place] ?? -Infinity;
  };
}

/** Open minutes between two instants; with null every minute counts. */
export function openBetween(open: readonly OpenMinutes[] | null): (from: number, to: number) => number {
  if (!open) return (from, to) => Math.max(0, to - from);
  requireApart(open);
  const before = new Float64Array(open.length + 1);
  open.forEach((one, at) => (before[at + 1] = before[at]! + one.toMinutes - one.fromMinutes));
  const until = (at: number) => {
    let [low, high] = [0, open.length];
    while (low < high) {
      const middle = (low + high) >> 1;
      if (open[middle]!.toMinutes <= at) low = middle + 1;
      else high = middle;
    }
    return before[low]! + (low < open.length ? Math.max(0, at - open[low]!.fromMinutes) : 0);
  };
  return (from, to) => (to > from ? until(to) - until(from) : 0);
}

function requireApart(open: readonly OpenMinutes[]): void {
  open.forEach(({ fromMinutes, toMinutes }, at) => {
    if (!(toMinutes > fromMinutes) || (at > 0 && fromMinutes < open[at - 1]!.toMinutes))
      throw new CalcInputError('open', at, 'stretches in rising order that do not overlap');
  });
}
