import { fillReader, type FillOrder } from './fill-decode';
import type { FillModel } from './fill-model';
import type { SearchBudget } from './search-budget';

/** Differences in worth that are none, as a share. */
export const SAME_WORTH = 1e-9;

/** An order with its worth in weighted minutes. */
export interface ScoredFills extends FillOrder {
  worth: number;
}

/**
 * The best order that an annealed walk finds: it moves pieces, swaps two, changes the window one wishes, and takes a
 * worse order with a chance that goes down as the walk does, over several walks, each from the best so far.
 */
export function searchFills(
  model: FillModel,
  from: FillOrder,
  budget: SearchBudget,
  nodes: number,
  random: () => number,
  bound: number,
): ScoredFills {
  const copyOf = ({ order, wish, worth }: ScoredFills) => ({ order: order.slice(), wish: wish.slice(), worth });
  const reader = fillReader(model);
  let current: ScoredFills = { ...from, worth: reader.read(from) };
  let best = copyOf(current);
  const pieces = model.pieces.length;
  if (pieces === 0) return best;
  const walk = Math.max(1, Math.floor(nodes / WALKS));
  const hot = (HOT * best.worth) / pieces;
  for (let node = 0; best.worth < bound * (1 - SAME_WORTH) && budget.spend(); node += 1) {
    const along = (node % walk) / walk;
    if (along === 0) current = copyOf(best);
    const heat = hot * (1 - along) ** 2;
    const next = { order: current.order.slice(), wish: current.wish.slice() };
    step(model, next, random);
    // A worse plan is taken with the chance e^(difference / heat): drawn first, so that reading ends where it is missed.
    const least = current.worth + heat * Math.log(1 - random());
    const worth = reader.read(next, least - ROUNDING);
    if (worth < least) continue;
    current = { ...next, worth };
    if (worth > best.worth * (1 + SAME_WORTH)) best = copyOf(current);
  }
  return best;
}

/** Sums in another order differ by less, weighted minutes. */
const ROUNDING = 1e-6;
const WALKS = 2;
/** Heat at the start of a walk, in the mean worth of a piece. */
const HOT = 0.1;

/** One change by chance, in place. */
function step(model: FillModel, { order, wish }: FillOrder, random: () => number): void {
  const draw = (below: number) => Math.floor(random() * below);
  const at = draw(order.length);
  const piece = order[at]!;
  const kind = random();
  if (kind < 0.4) {
    const { windows } = model.pieces[piece]!;
    const pick = draw(windows.length + 1);
    wish[piece] = windows[pick] ?? -1;
    return;
  }
  const to = draw(order.length);
  if (kind < 0.7) {
    order[at] = order[to]!;
    order[to] = piece;
    return;
  }
  if (to < at) order.copyWithin(to + 1, to, at);
  else order.copyWithin(at, at + 1, to + 1);
  order[to] = piece;
}
