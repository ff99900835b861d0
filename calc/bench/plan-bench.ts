import type { BenchProblem, BenchSolution, SolveLimits } from './bench-types';
import { eachAlone } from './bench-bound';
import { branchAndBound, MOST_BRANCHED } from './bench-branch';
import { benchDecoder, type BenchOrder } from './bench-decode';
import { earliestDueOrder } from './bench-earliest-due';
import { benchModel, type BenchModel } from './bench-model';
import { SAME_S } from './bench-score';
import { searchOrders } from './bench-search';
import { checkBench } from './check-bench';
import { searchBudget } from './search-budget';
import { seededRandom } from '../statistics/seeded-random';

const USUAL_NODES = 600_000;
/** Of the nodes, so many go into a first descent, whose plan lets the exact search leave most of its branches. */
const FIRST_NODES = 4_000;

/**
 * Gives every job one of its alternatives and a start: no channel with two jobs, the taken stretches kept, each start
 * within a stretch it may start in. Least unplaced jobs, then least Σ weight · max(0, start + guardS − dueS), then
 * least makespan, then least sum of starts. Few jobs are searched through completely (`proved`), many by a local search
 * from the earliest-due-first plan, which the answer is never worse than.
 *
 * @param limits without them the search ends after 600,000 nodes, about a second
 * @throws CalcInputError for a problem that makes no sense
 */
export function planBench(problem: BenchProblem, limits: SolveLimits = {}): BenchSolution {
  checkBench(problem);
  const model = benchModel(problem);
  const budget = searchBudget(limits, USUAL_NODES);
  const random = seededRandom(1);
  const least = eachAlone(model);
  const isBest = (score: { unplaced: number; lateS: number; makespanS: number }) =>
    score.unplaced === 0 && score.lateS <= least.lateS + SAME_S && score.makespanS <= least.makespanS + SAME_S;
  const first = earliestDueOrder(model);
  if (model.source.length > MOST_BRANCHED) {
    const found = searchOrders(model, first, budget, random, isBest);
    return solution(problem, model, found, least.lateS, isBest(found.score));
  }
  const quick = searchBudget({ ...limits, maxNodes: Math.min(FIRST_NODES, limits.maxNodes ?? FIRST_NODES) }, 0);
  const near = searchOrders(model, first, quick, random, isBest);
  const { best, complete } = branchAndBound(model, near, budget);
  const found = complete ? best : searchOrders(model, best, budget, random, isBest);
  return solution(problem, model, found, complete ? found.score.lateS : least.lateS, complete || isBest(found.score));
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
