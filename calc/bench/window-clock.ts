import type { FillWindow, Stretch } from './bench-types';

/** Sums of the same parts in another order differ by less, s. */
export const ROUNDING_S = 1e-6;

/**
 * The time of a window that is one's own: without the look-ins in it. Each takes `lookInS` from its instant on, or from
 * the end of the one before; nothing begins or ends in one, so that a fill holds it whole or not at all.
 */
export interface WindowClock {
  /** The first instant from `atS` on that is in no look-in, s. */
  leave: (atS: number) => number;
  /** When `workedS` of work is done that begins at `fromS` (in no look-in), s. */
  finish: (fromS: number, workedS: number) => number;
  /** Work that can be done from `fromS` (in no look-in) to `toS`, s. */
  between: (fromS: number, toS: number) => number;
}

/** The clock of one window. */
export function windowClock({ fromS, toS, lookInsS }: FillWindow, lookInS: number): WindowClock {
  const visits: Stretch[] = [];
  for (const at of lookInsS.filter((one) => one >= fromS && one < toS && lookInS > 0).sort((a, b) => a - b)) {
    const last = visits.at(-1);
    if (last && at <= last.toS) last.toS += lookInS;
    else visits.push({ fromS: at, toS: at + lookInS });
  }
  return {
    leave: (at) => {
      for (const visit of visits) if (visit.fromS <= at && at < visit.toS) return visit.toS;
      return at;
    },
    finish: (from, worked) => {
      let end = from + worked;
      for (const visit of visits)
        if (visit.fromS >= from && visit.fromS < end - ROUNDING_S) end += visit.toS - visit.fromS;
      return end;
    },
    between: (from, to) => {
      let worked = to - from;
      for (const visit of visits)
        if (visit.fromS >= from && visit.fromS < to) worked -= Math.min(to, visit.toS) - visit.fromS;
      return Math.max(0, worked);
    },
  };
}
