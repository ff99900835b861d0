import { benchDecoder, type BenchOrder } from './bench-decode';
import { benchDescent } from './bench-descent';
import { copyOfOrder, moveTo, type BenchReach, type ScoredOrder } from './bench-order';
import type { BenchModel } from './bench-model';
import { compareScores, type BenchScore } from './bench-score';
import type { SearchBudget } from './search-budget';

/**
 * The best order that moves and swaps reach from the one given: a descent until no single move of a job (to any
 * alternative and place) and no swap of two is better, then some chance moves and the next descent, until the budget is
 * spent or `isBest` says that nothing can be better.
 */
export function searchOrders(
  model: BenchModel,
  reach: BenchReach,
  from: BenchOrder,
  budget: SearchBudget,
  random: () => number,
  isBest: (score: BenchScore) => boolean,
): ScoredOrder {
  const decoder = benchDecoder(model);
  decoder.read(from, null);
  let current: ScoredOrder = copyOfOrder({ ...from, score: decoder.score });
  let best = copyOfOrder(current);
  const descend = benchDescent(model, reach, budget, random);
  let fruitless = 0;
  for (;;) {
    descend(current);
    if (compareScores(current.score, best.score) < 0) {
      best = copyOfOrder(current);
      fruitless = 0;
    } else fruitless += 1;
    if (budget.over() || isBest(best.score) || best.order.length < 2) return best;
    // A walk that has found nothing for long begins again at the best.
    const worse = compareScores(current.score, best.score) > 0;
    if (worse && (fruitless % 12 === 0 || random() < 0.25)) current = copyOfOrder(best);
    kick(model, current, random, 2 + Math.floor(random() * 4));
    decoder.read(current, null);
    current.score = { ...decoder.score };
  }
}

/** Moves some jobs to places and alternatives by chance. */
function kick(model: BenchModel, { order, alternative }: BenchOrder, random: () => number, moves: number): void {
  const draw = (below: number) => Math.floor(random() * below);
  for (let move = 0; move < moves; move += 1) {
    const at = draw(order.length);
    const job = order[at]!;
    const first = model.firstAlternative[job]!;
    alternative[job] = first + draw(model.firstAlternative[job + 1]! - first);
    const to = draw(order.length);
    moveTo(order, at, to);
  }
}
