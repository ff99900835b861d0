import type { Stretch } from './bench-types';
import { fillBoard, type Gaps } from './fill-board';
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
   * parted fills gap after gap. −Infinity as soon as it is clear that the plan is worth less than `leastWorth`.
   */
  read: (plan: FillOrder, leastWorth?: number) => number;
  /** The parts of the order read last. */
  parts: FillPart[];
}

/** A reader for one model. */
export function fillReader(model: FillModel): FillReader {
  const board = fillBoard(model);
  const parts: FillPart[] = [];
  const all = model.pieces.reduce((sum, { perSecond, longS }) => sum + perSecond * longS, 0);
  const best = { window: -1, fromS: 0, toS: 0, roomS: 0 };
  const take = (window: number, k: number, { from, to, room }: Gaps) => {
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

  /** The better gap for a part: one that takes all that is left, and is then the shorter; otherwise the longer. */
  const takeForPart = (window: number, gaps: Gaps, left: number) => {
    for (let k = 0; k < gaps.count; k += 1) {
      const room = gaps.room[k]!;
      if (best.roomS >= left ? room >= left && room < best.roomS : room > best.roomS) take(window, k, gaps);
    }
  };

  /** Fills one gap after the other: the wished window's first, then one that takes all that is left, then the longest. */
  const layParts = (piece: number, wish: Int32Array): number => {
    const { longS, leastS, windows } = model.pieces[piece]!;
    const wished = wish[piece]!;
    let left = longS;
    while (left > ROUNDING_S && left >= leastS - ROUNDING_S) {
      best.window = -1;
      best.roomS = 0;
      if (wished >= 0) takeForPart(wished, board.look(wished, piece, leastS), left);
      if (best.window < 0)
        for (const window of windows)
          // A window whose longest gap is no better than what is found need not be looked at.
          if (best.roomS < left ? board.longest(window) > best.roomS : best.roomS > left)
            takeForPart(window, board.look(window, piece, leastS), left);
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
    read: ({ order, wish }, leastWorth = -Infinity) => {
      board.clear();
      parts.length = 0;
      let worth = 0;
      let most = all;
      for (const piece of order) {
        const { splittable, perSecond, longS } = model.pieces[piece]!;
        const workedS = splittable ? layParts(piece, wish) : layWhole(piece, wish);
        worth += perSecond * workedS;
        most -= perSecond * (longS - workedS);
        if (most < leastWorth) return -Infinity;
      }
      return worth;
    },
  };
}
