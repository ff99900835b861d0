import type { FillModel } from './fill-model';
import type { FillOrder } from './fill-decode';
import { SAME_WORTH } from './fill-search';
import type { SearchBudget } from './search-budget';
import { ROUNDING_S } from './window-clock';

/**
 * Whether only lengths count: whole pieces, no places, none bound by its release or due within a window it fits into.
 * Then any pieces go together in a window whose lengths do, in any order.
 */
export const onlyLengthsCount = ({ pieces, windows }: FillModel): boolean =>
  pieces.every(
    ({ splittable, place, fromS, toS, windows: into }) =>
      !splittable && place < 0 && into.every((at) => fromS <= windows[at]!.fromS && toS >= windows[at]!.toS),
  );

/**
 * The most worth of a problem in which only lengths count, by branch and bound over who gets which piece: a branch is
 * left when what is left of all windows, filled with the densest pieces that are left and the last one cut, does not
 * come to more than the best so far (the bound of G. Dantzig, Oper. Res. 5 (1957) 266, over the windows together).
 *
 * @param least worth of a plan that is known; only a better one is given
 */
export function exactFills(
  { pieces, windows }: FillModel,
  least: number,
  budget: SearchBudget,
): { found: FillOrder | null; complete: boolean } {
  const order = Int32Array.from(pieces.keys()).sort((one, other) => pieces[other]!.perSecond - pieces[one]!.perSecond);
  const room = windows.map(({ fromS, toS, clock }) => clock.between(clock.leave(Math.max(0, fromS)), toS));
  const chosen = new Int32Array(pieces.length).fill(-1);
  let best = least;
  let found: FillOrder | null = null;

  const bound = (at: number, worth: number): number => {
    let left = room.reduce((sum, one) => sum + one, 0);
    let most = worth;
    for (let k = at; k < order.length && left > 0; k += 1) {
      const { longS, perSecond } = pieces[order[k]!]!;
      most += perSecond * Math.min(longS, left);
      left -= longS;
    }
    return most;
  };

  const visit = (at: number, worth: number): boolean => {
    if (!budget.spend()) return false;
    if (worth > best * (1 + SAME_WORTH)) {
      best = worth;
      const isIn = (piece: number) => chosen[piece]! >= 0;
      found = {
        order: Int32Array.from([...order].sort((one, other) => Number(isIn(other)) - Number(isIn(one)))),
        wish: chosen.slice(),
      };
    }
    if (at === order.length || bound(at, worth) <= best * (1 + SAME_WORTH)) return true;
    const piece = order[at]!;
    const { longS, perSecond, windows: into } = pieces[piece]!;
    for (const window of into) {
      if (room[window]! < longS - ROUNDING_S) continue;
      room[window]! -= longS;
      chosen[piece] = window;
      const done = visit(at + 1, worth + perSecond * longS);
      room[window]! += longS;
      chosen[piece] = -1;
      if (!done) return false;
    }
    return visit(at + 1, worth);
  };
  return { complete: visit(0, 0), found };
}
