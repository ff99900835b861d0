import type { BenchProblem } from './bench-types';
import { benchDecoder, type BenchOrder } from './bench-decode';
import { lateModel, type BenchModel } from './bench-model';
import { benchReach, type ScoredOrder } from './bench-order';
import { compareScores, SAME_S, type BenchScore } from './bench-score';
import { searchOrders } from './bench-search';
import { budgetPart, type SearchBudget } from './search-budget';

/** What a second after the evening costs, in seconds of lateness of a charge of mean weight: step by step more. */
const PRICES = [4, 6, 9, 14, 20];
/** How long after the evening charges may be begun, in the mean length of a charge: between these, another each round. */
const OVERTIME = [0.2, 0.8] as const;
/** Of a step's search, and of the last one, which keeps the evenings again. */
const STEP_NODES = 9_000;
const LAST_NODES = 6_000;

/**
 * The best order found through evenings that give way. A charge that just misses an evening is not begun before the
 * morning, so that no small step leads from one full day to another; here it may be begun a little late at a price,
 * which goes up until nothing is begun late any more. Rounds of this until the budget is spent: two on from where the one
 * before ended, then one from the best so far.
 */
export function searchThroughEvenings(
  problem: BenchProblem,
  model: BenchModel,
  from: BenchOrder,
  budget: SearchBudget,
  random: () => number,
  isBest: (score: BenchScore) => boolean,
): ScoredOrder {
  const reach = benchReach(model);
  let best = searchOrders(model, reach, from, budgetPart(budget, STEP_NODES), random, isBest);
  const meanWeight = mean(model.weight);
  const meanBusyS = mean(model.busy);
  let last = best;
  for (let round = 0; !budget.over() && !isBest(best.score); round += 1) {
    let current: BenchOrder = round % 3 === 2 ? best : last;
    const byS = meanBusyS * (OVERTIME[0] + random() * (OVERTIME[1] - OVERTIME[0]));
    const dearer = meanWeight * (0.6 + 0.8 * random());
    const untilLate = lateModel(model, problem, byS);
    for (const price of PRICES) {
      const late = { ...untilLate, overPrice: price * dearer };
      const found = searchOrders(late, reach, current, budgetPart(budget, STEP_NODES), random, () => false);
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
    last = searchOrders(model, reach, current, budgetPart(budget, LAST_NODES), random, isBest);
    if (compareScores(last.score, best.score) < 0) best = last;
  }
  return best;
}

const mean = (list: Float64Array): number => list.reduce((sum, one) => sum + one, 0) / list.length;
/** Also for two times that never come. */
const byTime = (one: number, other: number): number => (one === other ? 0 : one - other);
