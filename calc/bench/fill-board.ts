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
  const anyPiece = { fromS: -Infinity, toS: Infinity };

  const find = (at: number, { fromS, toS }: Stretch, leastS: number, lines: readonly Line[]): void => {
    const window = windows[at]!;
    const end = Math.min(window.toS, toS);
    gaps.count = 0;
    for (let from = window.clock.leave(Math.max(window.fromS, fromS)); from < end;) {
      // The first thing in the way that is not over by then.
      let [hinderFrom, hinderTo] = [Infinity, Infinity];
      for (const { from: begins, to: ends, count } of lines)
        for (let k = 0; k < count; k += 1) {
          if (ends[k]! <= from) continue;
          if (begins[k]! < hinderFrom) [hinderFrom, hinderTo] = [begins[k]!, ends[k]!];
          break;
        }
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

  const linesOf = (at: number, piece: number, { place, splittable }: FillPiece): Line[] => {
    const lines = [inWindow[at]!];
    if (place >= 0) lines.push(atPlace[place]!);
    if (splittable) lines.push(ofPiece[piece]!);
    return lines;
  };

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
      if (longest[at]! >= least) find(at, pieces[piece]!, least, linesOf(at, piece, pieces[piece]!));
      return gaps;
    },
    lay: (at, piece, fromS, toS, workedS) => {
      const end = Math.min(toS, windows[at]!.clock.finish(fromS, workedS));
      for (const one of linesOf(at, piece, pieces[piece]!)) insert(one, fromS, end);
      find(at, anyPiece, 0, [inWindow[at]!]);
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
