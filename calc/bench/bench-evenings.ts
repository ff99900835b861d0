import type { BenchProblem } from './bench-types';
import { benchDecoder, type BenchOrder } from './bench-decode';
import { benchModel, type BenchModel } from './bench-model';
import type { ScoredOrder } from './bench-order';
import { compareScores, SAME_S, type BenchScore } from './bench-score';
import { searchOrders } from './bench-search';
import { budgetPart, type SearchBudget } from './search-budget';

/** What a second after the evening costs, in seconds of lateness of a charge of mean weight: step by step more. */
const PRICES = [4, 6, 9, 14, 20];
/** How long after the evening charges may be begun, in the mean length of a charge. */
const OVERTIME = 0.4;
/** Of a step's search, and of the last one, which keeps the evenings again. */
const STEP_NODES = 9_000;
const LAST_NODES = 6_000;

/**
 * The best order found through evenings that give way. A charge that just misses an evening is not begun before the
 * morning, so that no small step leads from one full day to another; here it may be begun a little late at a price,
 * which goes up until nothing is begun late any more. Rounds of this, each from the best so far, until the budget is spent.
 */
export function searchThroughEvenings(
  problem: BenchProblem,
  model: BenchModel,
  from: BenchOrder,
  budget: SearchBudget,
  random: () => number,
  isBest: (score: BenchScore) => boolean,
): ScoredOrder {
  let best = searchOrders(model, from, budgetPart(budget, STEP_NODES), random, isBest);
  const meanWeight = mean(model.weight);
  const byS = OVERTIME * mean(model.busy);
  while (!budget.over() && !isBest(best.score)) {
    let current: BenchOrder = best;
    for (const price of PRICES) {
      const late = benchModel(problem, { byS, price: price * meanWeight });
      const found = searchOrders(late, current, budgetPart(budget, STEP_NODES), random, () => false);
      const decoder = benchDecoder(late);
      decoder.read(found, null);
      const { starts } = decoder;
      current = {
        order: found.order.slice().sort((one, other) => byTime(starts[one]!, starts[other]!)),
        alternative: found.alternative,
      };
      const kept = benchDecoder(model);
      kept.read(current, null);
      if (kept.score.lateS <= found.score.lateS + SAME_S || budget.over()) break;
    }
    const ended = searchOrders(model, current, budgetPart(budget, LAST_NODES), random, isBest);
    if (compareScores(ended.score, best.score) < 0) best = ended;
  }
  return best;
}

const mean = (list: Float64Array): number => list.reduce((sum, one) => sum + one, 0) / list.length;
/** Also for two times that never come. */
const byTime = (one: number, other: number): number => (one === other ? 0 : one - other);
