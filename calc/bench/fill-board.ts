import type { Stretch } from './bench-types';
import type { FillModel, FillPiece } from './fill-model';
import { ROUNDING_S } from './window-clock';

/** Stretches in order, in arrays that are used again from plan to plan. */
interface Line {
  from: number[];
  to: number[];
  count: number;
}

/** The gaps that the last look found, and the work that goes into each, s. */
export interface Gaps {
  count: number;
  from: number[];
  to: number[];
  room: number[];
}

/** What lies where while a plan is laid, and the gaps in it. */
export interface FillBoard {
  /** Takes everything off again. */
  clear: () => void;
  /** The gaps of a window with room for `leastS` of a piece: person and place free, the piece not done elsewhere. */
  look: (window: number, piece: number, leastS: number) => Gaps;
  /** The longest gap of a window, as far as the person goes: work that goes into it, s. */
  longest: (window: number) => number;
  /** Lays so much of a piece into a window from an instant that `look` gave; gives its end. */
  lay: (window: number, piece: number, fromS: number, toS: number, workedS: number) => number;
}

const line = (stretches: readonly Stretch[] = []): Line => ({
  from: stretches.map(({ fromS }) => fromS),
  to: stretches.map(({ toS }) => toS),
  count: stretches.length,
});

/** An empty board for one model. */
export function fillBoard({ windows, places, pieces }: FillModel): FillBoard {
  const inWindow = windows.map(() => line());
  const atPlace = places.map((taken) => line(taken));
  const ofPiece = pieces.map(() => line());
  const gaps: Gaps = { count: 0, from: [], to: [], room: [] };
  const empty = windows.map(({ fromS, toS, clock }) => clock.between(clock.leave(fromS), toS));
  /** The longest gap of each window, as far as the person goes. */
  const longest = empty.slice();
  const none = line();

  /** Gaps of a window between the stretches of up to three lines: this is where the search spends its time. */
  const find = (at: number, fromS: number, toS: number, leastS: number, a: Line, b: Line, c: Line): void => {
    const window = windows[at]!;
    const end = Math.min(window.toS, toS);
    gaps.count = 0;
    let [i, j, k] = [0, 0, 0];
    for (let from = window.clock.leave(Math.max(window.fromS, fromS)); from < end;) {
      while (i < a.count && a.to[i]! <= from) i += 1;
      while (j < b.count && b.to[j]! <= from) j += 1;
      while (k < c.count && c.to[k]! <= from) k += 1;
      // The first thing in the way that is not over by then.
      let [hinderFrom, hinderTo] = [Infinity, Infinity];
      if (i < a.count) [hinderFrom, hinderTo] = [a.from[i]!, a.to[i]!];
      if (j < b.count && b.from[j]! < hinderFrom) [hinderFrom, hinderTo] = [b.from[j]!, b.to[j]!];
      if (k < c.count && c.from[k]! < hinderFrom) [hinderFrom, hinderTo] = [c.from[k]!, c.to[k]!];
      const to = Math.min(end, hinderFrom);
      if (to - from >= leastS) {
        const room = window.clock.between(from, to);
        if (room >= leastS) {
          gaps.from[gaps.count] = from;
          gaps.to[gaps.count] = to;
          gaps.room[gaps.count] = room;
          gaps.count += 1;
        }
      }
      if (hinderFrom >= end) break;
      from = window.clock.leave(Math.max(from, hinderTo));
    }
  };

  const placeLine = ({ place }: FillPiece): Line => (place >= 0 ? atPlace[place]! : none);
  const ownLine = (piece: number): Line => (pieces[piece]!.splittable ? ofPiece[piece]! : none);

  return {
    clear: () => {
      for (const one of inWindow) one.count = 0;
      for (const one of ofPiece) one.count = 0;
      places.forEach((taken, place) => {
        const one = atPlace[place]!;
        taken.forEach(({ fromS, toS }, k) => ([one.from[k], one.to[k]] = [fromS, toS]));
        one.count = taken.length;
      });
      for (let at = 0; at < empty.length; at += 1) longest[at] = empty[at]!;
    },
    look: (at, piece, leastS) => {
      const least = Math.max(leastS - ROUNDING_S, ROUNDING_S);
      gaps.count = 0;
      if (longest[at]! < least) return gaps;
      const one = pieces[piece]!;
      find(at, one.fromS, one.toS, least, inWindow[at]!, placeLine(one), ownLine(piece));
      return gaps;
    },
    longest: (at) => longest[at]!,
    lay: (at, piece, fromS, toS, workedS) => {
      const end = Math.min(toS, windows[at]!.clock.finish(fromS, workedS));
      const one = pieces[piece]!;
      insert(inWindow[at]!, fromS, end);
      if (one.place >= 0) insert(atPlace[one.place]!, fromS, end);
      if (one.splittable) insert(ofPiece[piece]!, fromS, end);
      find(at, -Infinity, Infinity, 0, inWindow[at]!, none, none);
      longest[at] = 0;
      for (let k = 0; k < gaps.count; k += 1) longest[at] = Math.max(longest[at]!, gaps.room[k]!);
      return end;
    },
  };
}

function insert(into: Line, fromS: number, toS: number): void {
  let at = into.count;
  for (; at > 0 && into.from[at - 1]! > fromS; at -= 1) {
    into.from[at] = into.from[at - 1]!;
    into.to[at] = into.to[at - 1]!;
  }
  into.from[at] = fromS;
  into.to[at] = toS;
  into.count += 1;
}
