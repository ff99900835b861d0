import type { FillProblem, FillSolution, SolveLimits } from './bench-types';
import { checkFills } from './check-fills';
import { fillBound } from './fill-bound';
import { fillReader } from './fill-decode';
import { exactFills, onlyLengthsCount } from './fill-exact';
import { fillModel, worthPerSecond } from './fill-model';
import { SAME_WORTH, searchFills, type ScoredFills } from './fill-search';
import { searchBudget } from './search-budget';
import { seededRandom } from '../statistics/seeded-random';

const USUAL_NODES = 20_000;
/** A node of the exact search costs a small part of reading a whole order. */
const EXACT_NODES_EACH = 20;

/**
 * Puts other work into windows: the most Σ weight · likely minutes. Each fill lies in one window of a person who can do
 * it, takes its long estimate and every look-in within it, begins after its release, ends by its due time, and has its
 * place to itself; a piece that can be parted may lie in several parts, never two at once. Where only lengths count the
 * search is complete (`proved`); otherwise it is annealed, and proved only when it comes to the bound.
 *
 * @param limits without them the search ends after 20,000 plans, under a second for 12 people and 40 pieces
 * @throws CalcInputError for a problem that makes no sense
 */
export function planFills(problem: FillProblem, limits: SolveLimits = {}): FillSolution {
  checkFills(problem);
  const model = fillModel(problem);
  const bound = fillBound(model);
  const nodes = limits.maxNodes ?? USUAL_NODES;
  const budget = searchBudget(limits, USUAL_NODES);
  const dense = Int32Array.from(model.pieces.keys()).sort(
    (one, other) => model.pieces[other]!.perSecond - model.pieces[one]!.perSecond,
  );
  let best: ScoredFills = { order: dense, wish: new Int32Array(dense.length).fill(-1), worth: 0 };
  const reader = fillReader(model);
  best.worth = reader.read(best);
  let complete = false;
  if (onlyLengthsCount(model)) {
    const most = searchBudget({ ...limits, maxNodes: nodes * EXACT_NODES_EACH }, 0);
    const exact = exactFills(model, best.worth, most);
    complete = exact.complete;
    if (exact.found) best = { ...exact.found, worth: reader.read(exact.found) };
  }
  const walked = Math.min(nodes, USUAL_NODES);
  if (!complete) best = searchFills(model, best, budget, walked, seededRandom(1), bound);
  const worth = reader.read(best);
  const { parts } = reader;
  const proved = complete || worth >= bound * (1 - SAME_WORTH);
  return {
    placements: parts
      .map(({ piece, window, fromS, toS, workedS }) => ({
        workId: problem.work[model.pieces[piece]!.source]!.id,
        personId: problem.windows[window]!.personId,
        window,
        fromS,
        toS,
        workedS,
      }))
      .sort((one, other) => one.fromS - other.fromS),
    weightedMinutes: parts.reduce(
      (sum, { piece, workedS }) => sum + worthPerSecond(problem.work[model.pieces[piece]!.source]!) * workedS,
      0,
    ),
    bound: proved ? worth : bound,
    proved,
  };
}
