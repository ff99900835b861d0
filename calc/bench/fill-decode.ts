import type { Stretch } from './bench-types';
import { fillBoard } from './fill-board';
import type { FillModel } from './fill-model';
import { ROUNDING_S } from './window-clock';

/** A fill plan as the search turns it over: pieces in an order, each with the window to try first. */
export interface FillOrder {
  order: Int32Array;
  /** Per piece a window's index; −1: whichever it leaves the least of. */
  wish: Int32Array;
}

/** A part of a piece that has its place. */
export interface FillPart extends Stretch {
  piece: number;
  window: number;
  workedS: number;
}

/** Reads orders of one model, with its own scratch. */
export interface FillReader {
  /**
   * The worth of the plan that an order stands for, in weighted minutes: each piece after the other goes into the first
   * room of the window it wishes, or else into the gap it leaves the least of, which it then wishes; a piece that can be
   * parted fills gap after gap.
   */
  read: (plan: FillOrder) => number;
  /** The parts of the order read last. */
  parts: FillPart[];
}

/** A reader for one model. */
export function fillReader(model: FillModel): FillReader {
  const board = fillBoard(model);
  const parts: FillPart[] = [];
  const best = { window: -1, fromS: 0, toS: 0, roomS: 0 };
  const take = (window: number, k: number, { from, to, room }: ReturnType<typeof board.look>) => {
    best.window = window;
    best.fromS = from[k]!;
    best.toS = to[k]!;
    best.roomS = room[k]!;
  };
  const lay = (piece: number, workedS: number): number => {
    const { window, fromS } = best;
    parts.push({ piece, window, fromS, toS: board.lay(window, piece, fromS, best.toS, workedS), workedS });
    return workedS;
  };

  const layWhole = (piece: number, wish: Int32Array): number => {
    const { longS, windows } = model.pieces[piece]!;
    const wished = wish[piece]!;
    if (wished >= 0) {
      const gaps = board.look(wished, piece, longS);
      if (gaps.count > 0) {
        take(wished, 0, gaps);
        return lay(piece, longS);
      }
    }
    best.window = -1;
    for (const window of windows) {
      if (window === wished) continue;
      const gaps = board.look(window, piece, longS);
      for (let k = 0; k < gaps.count; k += 1) if (best.window < 0 || gaps.room[k]! < best.roomS) take(window, k, gaps);
    }
    if (best.window < 0) return 0;
    wish[piece] = best.window;
    return lay(piece, longS);
  };

  /** Fills one gap after the other: the wished window's first, then one that takes all that is left, then the longest. */
  const layParts = (piece: number, wish: Int32Array): number => {
    const { longS, leastS, windows } = model.pieces[piece]!;
    let left = longS;
    while (left > ROUNDING_S && left >= leastS - ROUNDING_S) {
      best.window = -1;
      let rank = -1;
      for (const window of windows) {
        const gaps = board.look(window, piece, leastS);
        for (let k = 0; k < gaps.count; k += 1) {
          const room = gaps.room[k]!;
          const mine = (window === wish[piece] ? 2e9 : 0) + (room >= left ? 1e9 - room : room);
          if (mine <= rank) continue;
          rank = mine;
          take(window, k, gaps);
        }
      }
      if (best.window < 0) break;
      let worked = Math.min(left, best.roomS);
      // A remainder under the least part would never be done, so this part leaves a least part over.
      const rest = left - worked;
      if (rest > ROUNDING_S && rest < leastS && left - leastS >= leastS) worked = left - leastS;
      left -= lay(piece, worked);
    }
    return longS - left;
  };

  return {
    parts,
    read: ({ order, wish }) => {
      board.clear();
      parts.length = 0;
      let worth = 0;
      for (const piece of order) {
        const { splittable, perSecond } = model.pieces[piece]!;
        worth += perSecond * (splittable ? layParts(piece, wish) : layWhole(piece, wish));
      }
      return worth;
    },
  };
}
