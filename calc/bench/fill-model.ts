import type { FillProblem, FillWork, Stretch } from './bench-types';
import { subtract } from './stretches';
import { ROUNDING_S, windowClock, type WindowClock } from './window-clock';

/** A piece of work as the search turns it over. */
export interface FillPiece {
  /** Index in the problem. */
  source: number;
  longS: number;
  /** Worth of a second by the long estimate. */
  perSecond: number;
  /** Not to be parted: `longS`. */
  leastS: number;
  splittable: boolean;
  /** Index of the place it needs; −1: none. */
  place: number;
  fromS: number;
  toS: number;
  /** Windows it fits into, or a least part of it does. */
  windows: number[];
}

export interface FillModel {
  windows: (Stretch & { clock: WindowClock })[];
  /** Per place its taken stretches. */
  places: Stretch[][];
  /** Only pieces that are worth something and fit somewhere. */
  pieces: FillPiece[];
}

/** Brings a checked problem down to what the search needs. */
export function fillModel({ windows, work, placesTaken, lookInS }: FillProblem): FillModel {
  const placeIds = [...new Set(work.flatMap(({ placeId }) => (placeId === null ? [] : [placeId])))];
  const places = placeIds.map((id) => (Object.hasOwn(placesTaken, id) ? placesTaken[id]! : []));
  const clocks = windows.map((one) => ({ fromS: one.fromS, toS: one.toS, clock: windowClock(one, lookInS) }));
  const pieces = work.map((one, source): FillPiece => {
    const piece = {
      source,
      longS: one.longS,
      perSecond: worthPerSecond(one),
      leastS: one.splittable ? Math.min(one.leastPartS, one.longS) : one.longS,
      splittable: one.splittable,
      place: one.placeId === null ? -1 : placeIds.indexOf(one.placeId),
      // Nothing is done in the past.
      fromS: Math.max(0, one.releaseS),
      toS: one.dueS ?? Infinity,
    };
    const fits = (at: number) =>
      one.personIds.includes(windows[at]!.personId) && fitsInto(piece, clocks[at]!, places[piece.place] ?? []);
    return { ...piece, windows: [...clocks.keys()].filter(fits) };
  });
  return { windows: clocks, places, pieces: pieces.filter((one) => one.perSecond > 0 && one.windows.length > 0) };
}

/** Whether a whole piece, or its least part, has room in an empty window. */
function fitsInto(
  { fromS, toS, leastS }: Pick<FillPiece, 'fromS' | 'toS' | 'leastS'>,
  window: FillModel['windows'][number],
  taken: readonly Stretch[],
): boolean {
  const own = { fromS: Math.max(fromS, window.fromS), toS: Math.min(toS, window.toS) };
  return subtract([own], taken).some(
    (gap) => window.clock.between(window.clock.leave(gap.fromS), gap.toS) >= leastS - ROUNDING_S,
  );
}

/** What a placed second of a piece is worth in weighted minutes. */
export const worthPerSecond = ({ weight, likelyS, longS }: FillWork): number => (weight * likelyS) / 60 / longS;
