import type { BenchProblem, BenchSolution, SolveLimits } from './bench-types';
import { eachAlone, priceBound } from './bench-bound';
import { branchAndBound, MOST_BRANCHED } from './bench-branch';
import { benchDecoder, type BenchOrder } from './bench-decode';
import { earliestDueOrder } from './bench-earliest-due';
import { searchThroughEvenings } from './bench-evenings';
import { benchModel, type BenchModel } from './bench-model';
import { benchReach, type ScoredOrder } from './bench-order';
import { benchPrices } from './bench-prices';
import { SAME_S, type BenchScore } from './bench-score';
import { searchOrders } from './bench-search';
import { checkBench } from './check-bench';
import { budgetPart, searchBudget, type SearchBudget } from './search-budget';
import { seededRandom } from '../statistics/seeded-random';

const USUAL_NODES = 1_500_000;
/** Of the nodes, so many go into a first descent, whose plan lets the exact search leave most of its branches. */
const FIRST_NODES = 4_000;

/**
 * Gives every job one of its alternatives and a start: no channel with two jobs, the taken stretches kept, each start
 * within a stretch it may start in. Least unplaced jobs, then least Σ weight · max(0, start + guardS − dueS), then
 * least makespan, then least sum of starts. Few jobs are searched through completely (`proved`), many by a local search
 * from the earliest-due-first plan, which the answer is never worse than.
 *
 * @param limits without them the search ends after 1,500,000 nodes, a little more than a second
 * @throws CalcInputError for a problem that makes no sense
 */
export function planBench(problem: BenchProblem, limits: SolveLimits = {}): BenchSolution {
  checkBench(problem);
  const model = benchModel(problem);
  const budget = searchBudget(limits, USUAL_NODES);
  const least = eachAlone(model);
  const first = earliestDueOrder(model);
  const near = searchMany(problem, model, first, budgetPart(budget, FIRST_NODES), least);
  let from = near;
  if (model.source.length <= MOST_BRANCHED) {
    const { best, complete } = branchAndBound(model, near, budget);
    if (complete) return solution(problem, model, best, best.score.lateS, true);
    from = best;
  }
  const boundS = lateBound(problem, model, from.score, budget, least);
  const { order, alternative, score } = searchMany(problem, model, from, budget, least);
  const proved = score.unplaced === 0 && score.lateS <= boundS + SAME_S && score.makespanS <= least.makespanS + SAME_S;
  return solution(problem, model, { order, alternative }, boundS, proved);
}

type Least = ReturnType<typeof eachAlone>;

/** Nothing can be better: all have a place, and neither lateness nor makespan is more than that of each job alone. */
const isLeast = ({ unplaced, lateS, makespanS }: BenchScore, least: Least): boolean =>
  unplaced === 0 && lateS <= least.lateS + SAME_S && makespanS <= least.makespanS + SAME_S;

/** The local search that fits the problem: evenings matter where starts end some time and lateness counts. */
function searchMany(
  problem: BenchProblem,
  model: BenchModel,
  from: BenchOrder,
  budget: SearchBudget,
  least: Least,
): ScoredOrder {
  const random = seededRandom(1);
  const isBest = (score: BenchScore) => isLeast(score, least);
  const evenings =
    model.source.length > 1 && model.windowTo.some((end) => end < Infinity) && model.weight.some((one) => one > 0);
  return evenings
    ? searchThroughEvenings(problem, model, from, budget, random, isBest)
    : searchOrders(model, benchReach(model), from, budget, random, isBest);
}

/** A weighted tardiness that no plan goes under that leaves no job out, s. */
function lateBound(
  { taken }: BenchProblem,
  model: BenchModel,
  { unplaced, lateS, makespanS }: BenchScore,
  budget: SearchBudget,
  least: Least,
): number {
  if (unplaced > 0 || lateS <= least.lateS + SAME_S) return least.lateS;
  const prices = benchPrices(model, taken, makespanS * 1.1);
  return Math.max(least.lateS, priceBound(model, prices, lateS, budget));
}

/**
 * The plan of list scheduling: jobs by due time, each by the alternative that has it ready first.
 *
 * @throws CalcInputError for a problem that makes no sense
 */
export function earliestDueFirst(problem: BenchProblem): BenchSolution {
  checkBench(problem);
  const model = benchModel(problem);
  const least = eachAlone(model);
  return solution(problem, model, earliestDueOrder(model), least.lateS, false);
}

function solution(
  { jobs }: BenchProblem,
  model: BenchModel,
  plan: BenchOrder,
  boundS: number,
  proved: boolean,
): BenchSolution {
  const decoder = benchDecoder(model);
  decoder.read(plan, null);
  const { lateS, makespanS, unplaced } = decoder.score;
  const idOf = (job: number) => jobs[model.source[job]!]!.id;
  const placed = [...plan.order].filter((job) => decoder.starts[job]! < Infinity);
  return {
    placements: placed.map((job) => ({
      jobId: idOf(job),
      alternative: model.alternativeSource[plan.alternative[job]!]!,
      startS: decoder.starts[job]!,
    })),
    unplaced: [...model.unplaced, ...[...plan.order].filter((job) => decoder.starts[job] === Infinity).map(idOf)],
    weightedTardinessS: lateS,
    makespanS,
    // Where jobs had to be left out, another choice of them may be less late than all alone.
    boundS: unplaced > 0 && !proved ? 0 : Math.min(boundS, lateS),
    proved,
  };
}
