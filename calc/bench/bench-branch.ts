import { firstStart, type BenchModel } from './bench-model';
import { compareScores, SAME_S, type BenchScore } from './bench-score';
import type { ScoredOrder } from './bench-order';
import type { SearchBudget } from './search-budget';

/** So many jobs at most are searched through: their sets are counted in the bits of a number. */
export const MOST_BRANCHED = 12;

/** A part of a plan, and what it leaves to the rest. */
interface Part {
  /** Bit per job that has its place. */
  placed: number;
  /** Per channel: nothing begins on it any more before this. */
  free: Float64Array;
  score: BenchScore;
}

export interface Branched {
  best: ScoredOrder;
  /** Everything was searched through: it is the best there is. */
  complete: boolean;
}

/**
 * Branch and bound over all plans in which nothing could begin earlier: jobs are laid in order of their starts, each by
 * each of its alternatives. A part is left when its jobs and the least that each job still costs are not better than the
 * best plan so far, or when another part with the same jobs leaves every channel free as early at no more cost.
 *
 * @param from a plan to be bettered
 */
export function branchAndBound(model: BenchModel, from: ScoredOrder, budget: SearchBudget): Branched {
  const jobs = model.source.length;
  const all = 2 ** jobs - 1;
  let best = from;
  const seen = new Map<number, Part[]>();
  const order: number[] = [];
  const alternative = from.alternative.slice();

  const keep = (score: BenchScore, placed: number) => {
    if (compareScores(score, best.score) >= 0) return;
    const rest = Array.from({ length: jobs }, (_, job) => job).filter((job) => !(placed & (1 << job)));
    best = { order: Int32Array.from([...order, ...rest]), alternative: alternative.slice(), score: { ...score } };
  };

  const visit = (part: Part, last: number): boolean => {
    if (!budget.spend()) return false;
    if (part.placed === all) {
      keep({ ...part.score, unplaced: 0 }, part.placed);
      return true;
    }
    const { children, bound } = look(model, part, last);
    if (children.length === 0) {
      keep(bound, part.placed);
      return true;
    }
    if (compareScores(bound, best.score) >= 0 || isOutdone(seen, part)) return true;
    for (const { job, way, start } of children) {
      const next = after(model, part, job, way, start);
      if (compareScores(next.score, best.score) >= 0) continue;
      order.push(job);
      const was = alternative[job]!;
      alternative[job] = way;
      const done = visit(next, start);
      alternative[job] = was;
      order.pop();
      if (!done) return false;
    }
    return true;
  };

  const start: Part = {
    placed: 0,
    free: new Float64Array(model.channels),
    score: { unplaced: 0, lateS: 0, makespanS: 0, startsS: 0 },
  };
  const complete = visit(start, 0);
  return { best, complete };
}

interface Child {
  job: number;
  way: number;
  start: number;
}

/** What may come next, the most promising first, and the least that any plan with this part can come to. */
function look(model: BenchModel, part: Part, last: number): { children: Child[]; bound: BenchScore } {
  const { firstAlternative, firstHeld, held, guard, ready, due, weight } = model;
  const children: (Child & { cost: number; end: number })[] = [];
  const bound = { ...part.score };
  for (let job = 0; job < model.source.length; job += 1) {
    if (part.placed & (1 << job)) continue;
    let [late, end, begin] = [Infinity, Infinity, Infinity];
    for (let way = firstAlternative[job]!; way < firstAlternative[job + 1]!; way += 1) {
      let from = last;
      for (let h = firstHeld[way]!; h < firstHeld[way + 1]!; h += 1) from = Math.max(from, part.free[held[h]!]!);
      const start = firstStart(model, way, from);
      if (start === Infinity) continue;
      const cost = weight[job]! * Math.max(0, start + guard[way]! - due[job]!);
      children.push({ job, way, start, cost, end: start + ready[way]! });
      late = Math.min(late, cost);
      end = Math.min(end, start + ready[way]!);
      begin = Math.min(begin, start);
    }
    if (end === Infinity) {
      bound.unplaced += 1;
      continue;
    }
    bound.lateS += late;
    bound.makespanS = Math.max(bound.makespanS, end);
    bound.startsS += begin;
  }
  children.sort((one, other) => one.start - other.start || due[one.job]! - due[other.job]! || one.end - other.end);
  return { children, bound };
}

function after(model: BenchModel, part: Part, job: number, way: number, start: number): Part {
  const { firstHeld, held, busy, guard, ready, due, weight } = model;
  // Nothing begins before this job any more, on any channel.
  const free = part.free.map((one) => Math.max(one, start));
  for (let h = firstHeld[way]!; h < firstHeld[way + 1]!; h += 1) free[held[h]!] = start + busy[way]!;
  const { unplaced, lateS, makespanS, startsS } = part.score;
  const score = {
    unplaced,
    lateS: lateS + weight[job]! * Math.max(0, start + guard[way]! - due[job]!),
    makespanS: Math.max(makespanS, start + ready[way]!),
    startsS: startsS + start,
  };
  return { placed: part.placed | (1 << job), free, score };
}

/** Whether a part seen before leaves as much for no more; otherwise the part is remembered. */
function isOutdone(seen: Map<number, Part[]>, part: Part): boolean {
  const parts = seen.get(part.placed);
  if (!parts) {
    seen.set(part.placed, [part]);
    return false;
  }
  if (parts.some((one) => leavesAsMuch(one, part))) return true;
  parts.push(part);
  return false;
}

const leavesAsMuch = (one: Part, other: Part): boolean =>
  one.score.lateS <= other.score.lateS + SAME_S &&
  one.score.makespanS <= other.score.makespanS &&
  one.score.startsS <= other.score.startsS &&
  one.free.every((from, channel) => from <= other.free[channel]!);
