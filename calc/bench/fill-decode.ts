import type { Stretch } from './bench-types';
import type { FillModel, FillPiece } from './fill-model';
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

/** Lays pieces into windows. */
interface Board {
  /** Parts per window, stretches per place and per piece, ascending. */
  inWindow: Stretch[][];
  atPlace: Stretch[][];
  ofPiece: Stretch[][];
}

/** A gap of a window that a piece could begin in. */
interface Gap extends Stretch {
  window: number;
  roomS: number;
}

/**
 * The plan that an order stands for: each piece after the other goes into the first room of the window it wishes, or
 * else into the gap it leaves the least of; a piece that can be parted fills gap after gap.
 *
 * @returns the parts and their worth in weighted minutes
 */
export function readFills(model: FillModel, { order, wish }: FillOrder): { parts: FillPart[]; worth: number } {
  const board: Board = {
    inWindow: model.windows.map(() => []),
    atPlace: model.places.map((taken) => [...taken]),
    ofPiece: model.pieces.map(() => []),
  };
  const parts: FillPart[] = [];
  let worth = 0;
  for (const piece of order) {
    const one = model.pieces[piece]!;
    const laid = one.splittable
      ? layParts(model, board, piece, wish[piece]!)
      : layWhole(model, board, piece, wish[piece]!);
    for (const part of laid) worth += one.perSecond * part.workedS;
    parts.push(...laid);
  }
  return { parts, worth };
}

function layWhole(model: FillModel, board: Board, piece: number, wish: number): FillPart[] {
  const one = model.pieces[piece]!;
  if (wish >= 0) {
    const gap = gapsOf(model, board, one, piece, wish).find(({ roomS }) => roomS >= one.longS - ROUNDING_S);
    if (gap) return [lay(model, board, piece, gap, one.longS)];
  }
  let best: Gap | null = null;
  for (const window of one.windows)
    for (const gap of gapsOf(model, board, one, piece, window))
      if (gap.roomS >= one.longS - ROUNDING_S && (!best || gap.roomS < best.roomS)) best = gap;
  return best ? [lay(model, board, piece, best, one.longS)] : [];
}

/** Fills one gap after the other, the wished window's first, then the longest. */
function layParts(model: FillModel, board: Board, piece: number, wish: number): FillPart[] {
  const one = model.pieces[piece]!;
  const laid: FillPart[] = [];
  let left = one.longS;
  while (left > ROUNDING_S) {
    // A remainder under the least part would never be done, so the part before it leaves a least part over.
    const least = Math.min(one.leastS, one.longS);
    if (left < least - ROUNDING_S) break;
    let best: Gap | null = null;
    for (const window of one.windows)
      for (const gap of gapsOf(model, board, one, piece, window)) {
        if (gap.roomS < Math.max(least - ROUNDING_S, ROUNDING_S)) continue;
        if (!best || rank(gap, wish, left) > rank(best, wish, left)) best = gap;
      }
    if (!best) break;
    let worked = Math.min(left, best.roomS);
    const rest = left - worked;
    if (rest > ROUNDING_S && rest < least && left - least >= least) worked = left - least;
    laid.push(lay(model, board, piece, best, worked));
    left -= worked;
  }
  return laid;
}

/** Of two gaps the better for a part: in the wished window; takes all that is left, and is then the shorter; the longer. */
function rank({ window, roomS }: Gap, wish: number, left: number): number {
  const wished = window === wish ? 2e9 : 0;
  return wished + (roomS >= left ? 1e9 - roomS : roomS);
}

function lay(model: FillModel, board: Board, piece: number, gap: Gap, workedS: number): FillPart {
  const { clock } = model.windows[gap.window]!;
  const toS = Math.min(gap.toS, clock.finish(gap.fromS, workedS));
  const part = { piece, window: gap.window, fromS: gap.fromS, toS, workedS };
  const { place } = model.pieces[piece]!;
  insert(board.inWindow[gap.window]!, part);
  insert(board.ofPiece[piece]!, part);
  if (place >= 0) insert(board.atPlace[place]!, part);
  return part;
}

function insert(list: Stretch[], one: Stretch): void {
  let at = list.length;
  while (at > 0 && list[at - 1]!.fromS > one.fromS) at -= 1;
  list.splice(at, 0, one);
}

/** The gaps of a window in which person and place are free and the piece is not done elsewhere, with the work that goes in. */
function gapsOf(model: FillModel, board: Board, one: FillPiece, piece: number, at: number): Gap[] {
  const window = model.windows[at]!;
  const gaps: Gap[] = [];
  const lists = [board.inWindow[at]!, board.ofPiece[piece]!];
  if (one.place >= 0) lists.push(board.atPlace[one.place]!);
  const next = lists.map(() => 0);
  const end = Math.min(window.toS, one.toS);
  let from = window.clock.leave(Math.max(window.fromS, one.fromS));
  while (from < end) {
    // The first thing in the way that is not over by then.
    let hinder: Stretch | null = null;
    for (let k = 0; k < lists.length; k += 1) {
      const list = lists[k]!;
      while (next[k]! < list.length && list[next[k]!]!.toS <= from) next[k]! += 1;
      const first = list[next[k]!];
      if (first && (!hinder || first.fromS < hinder.fromS)) hinder = first;
    }
    const toS = Math.min(end, hinder?.fromS ?? Infinity);
    if (toS > from) gaps.push({ window: at, fromS: from, toS, roomS: window.clock.between(from, toS) });
    if (!hinder) break;
    from = window.clock.leave(Math.max(from, hinder.toS));
  }
  return gaps;
}
