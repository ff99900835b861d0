import { breakpoints, pricedCost, sumPrices, type BenchPrices } from './bench-prices';
import { firstStart, type BenchModel } from './bench-model';
import { SAME_S } from './bench-score';
import type { SearchBudget } from './search-budget';

const ROUNDS = 240;
/** Rounds without a better bound, after which steps are half as long. */
const PATIENCE = 10;
/** A round takes as long as so many nodes of a search. */
const ROUND_NODES = 250;

/** Least of each job alone, on empty channels: a weighted tardiness and a makespan that no plan of all jobs goes under, s. */
export function eachAlone(model: BenchModel): { lateS: number; makespanS: number } {
  let [lateS, makespanS] = [0, 0];
  for (let job = 0; job < model.source.length; job += 1) {
    let [late, end] = [Infinity, Infinity];
    for (let way = model.firstAlternative[job]!; way < model.firstAlternative[job + 1]!; way += 1) {
      const start = firstStart(model, way, 0);
      late = Math.min(late, Math.max(0, start + model.guard[way]! - model.due[job]!));
      end = Math.min(end, start + model.ready[way]!);
    }
    lateS += model.weight[job]! * late;
    makespanS = Math.max(makespanS, end);
  }
  return { lateS, makespanS };
}

/**
 * A weighted tardiness that no plan of all jobs goes under, s, by Lagrangian relaxation: channels may have several jobs
 * at once, but ask a price for their time, which goes up where they have too many and down where they have too few. For
 * any prices the least cost of each job for itself, less the price of the time that there is, is such a bound.
 *
 * Source of the method: M. L. Fisher, Manage. Sci. 27 (1981) 1–18; for machines in time: M. E. Dyer, L. A. Wolsey,
 * Discrete Appl. Math. 26 (1990) 255–270 (from memory).
 *
 * @param knownS weighted tardiness of a plan that is known, which sets the length of the steps
 */
export function priceBound(model: BenchModel, prices: BenchPrices, knownS: number, budget: SearchBudget): number {
  const lists = breakpoints(model, prices);
  const { price, capacityS } = prices;
  const use = new Float64Array(price.length);
  let [best, step, stale] = [0, 1, 0];
  for (let round = 0; round < ROUNDS && budget.spend(ROUND_NODES) && best < knownS - SAME_S; round += 1) {
    sumPrices(prices);
    const { value, chosen } = choose(model, prices, lists);
    if (value > best + SAME_S) [best, stale] = [value, 0];
    else if ((stale += 1) >= PATIENCE) [step, stale] = [step / 2, 0];
    count(model, prices, chosen, use);
    let norm = 0;
    for (let at = 0; at < use.length; at += 1) {
      use[at]! -= capacityS[at]!;
      if (use[at]! > 0 || price[at]! > 0) norm += use[at]! ** 2;
    }
    if (norm === 0) break;
    const by = (step * Math.max(SAME_S, knownS - value)) / norm;
    for (let at = 0; at < use.length; at += 1) price[at] = Math.max(0, price[at]! + by * use[at]!);
  }
  return best;
}

interface Chosen {
  /** Per job. */
  alternative: Int32Array;
  starts: Float64Array;
}

/** Each job's cheapest alternative and start, and what all of it comes to as a bound. */
function choose(
  model: BenchModel,
  prices: BenchPrices,
  lists: readonly Float64Array[],
): { value: number; chosen: Chosen } {
  const jobs = model.source.length;
  const alternative = new Int32Array(jobs);
  const starts = new Float64Array(jobs);
  let value = 0;
  for (let job = 0; job < jobs; job += 1) {
    let least = Infinity;
    for (let way = model.firstAlternative[job]!; way < model.firstAlternative[job + 1]!; way += 1)
      for (const start of lists[way]!) {
        const cost = pricedCost(model, prices, job, way, start);
        if (cost >= least) continue;
        least = cost;
        alternative[job] = way;
        starts[job] = start;
      }
    value += least;
  }
  prices.price.forEach((one, at) => (value -= one * prices.capacityS[at]!));
  return { value, chosen: { alternative, starts } };
}

/** Seconds that the chosen starts have of each cell. */
function count(
  model: BenchModel,
  { cellS, cells, kind }: BenchPrices,
  { alternative, starts }: Chosen,
  use: Float64Array,
): void {
  use.fill(0);
  alternative.forEach((way, job) => {
    const [fromS, toS] = [starts[job]!, starts[job]! + model.busy[way]!];
    for (let h = model.firstHeld[way]!; h < model.firstHeld[way + 1]!; h += 1)
      for (let cell = Math.floor(fromS / cellS); cell < cells && cell * cellS < toS; cell += 1)
        use[kind[model.held[h]!]! * cells + cell]! += Math.min(toS, (cell + 1) * cellS) - Math.max(fromS, cell * cellS);
  });
}
