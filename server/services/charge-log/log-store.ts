import { startThinning, STORED_THINNING, thinForStoring, widerThinning } from '@/calc/index';
import type { StoredPoint, ThinningRule } from '@/calc/index';
import { invalid } from '../../errors/domain-error';

/** Of one file at most so many readings are stored: a picture of two pixels a reading, and an answer of some 200 KB. */
export const MOST_STORED = 1_000;
/** The deadband is never widened beyond so many times the usual one; what is left then may be more. */
const MOST_TIMES = 16;
/** But not more than so many times. */
const MOST_OVER = 5;

/** A reading of a file, with its line. `s` is epoch seconds. */
export interface LogPoint extends StoredPoint {
  line: number;
  at: number;
  groupVolts: number[] | null;
}

export interface LogStore {
  push: (point: LogPoint) => void;
  /** What is stored, and the deadband that all the rest lies within. */
  finish: () => { points: LogPoint[]; within: ThinningRule };
}

/**
 * Thins a log as it is read, by the rule for stored readings. Where more than `most` are left, what is stored so far is thinned
 * again with a deadband twice as wide, and what follows too: 4 mV, then 8, 16 … 64. Each pass adds its own deadband to what a
 * left-out reading may be off, so that after k widenings all lie within 2^(k+1) − 1 times the first. The same readings give the
 * same stored ones. Refused (400) where that leaves more than five times `most`.
 */
export function makeLogStore(most: number = MOST_STORED): LogStore {
  let times = 1;
  let off = 1;
  let thinning = startThinning<LogPoint>();
  let points: LogPoint[] = [];
  let widenAt = 2 * most;
  const widen = (): void => {
    const last = thinning.finish();
    if (last !== null) points.push(last);
    while (points.length > most && times < MOST_TIMES) {
      times *= 2;
      off += times;
      points = thinForStoring(points, widerThinning(STORED_THINNING, times));
    }
    if (points.length > most * MOST_OVER)
      throw invalid({
        file: `The numbers jump so much from line to line that ${points.length} readings would be stored. Send the log in parts, or leave out the column that jumps.`,
      });
    widenAt = Math.max(widenAt, 2 * points.length);
    thinning = startThinning<LogPoint>(widerThinning(STORED_THINNING, times));
    // The last one stored is the first of what follows.
    const from = points.pop();
    if (from !== undefined) points.push(thinning.push(from)!);
  };
  return {
    push: (point) => {
      const sure = thinning.push(point);
      if (sure !== null) points.push(sure);
      if (points.length > widenAt) widen();
    },
    finish: () => {
      const last = thinning.finish();
      if (last !== null) points.push(last);
      if (points.length > most) widen();
      return { points, within: { ...widerThinning(STORED_THINNING, off), mostS: STORED_THINNING.mostS } };
    },
  };
}
