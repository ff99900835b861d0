import type { BenchModel } from './bench-model';
import type { BenchReach, ScoredOrder } from './bench-order';
import { compareScores, type BenchScore } from './bench-score';
import { benchTrial } from './bench-trial';
import type { SearchBudget } from './search-budget';

/** Lowers an order in place until neither a move of one job nor a swap of two makes it better, or the budget is spent. */
export function benchDescent(
  model: BenchModel,
  { shares, twin }: BenchReach,
  budget: SearchBudget,
  random: () => number,
): (plan: ScoredOrder) => void {
  const jobs = model.source.length;
  const trial = benchTrial(model);
  const others = new Int32Array(Math.max(0, jobs - 1));

  /** The best place and alternative for one job, all others kept as they are. */
  const move = (plan: ScoredOrder, job: number): boolean => {
    const { order, alternative } = plan;
    for (let at = 0, to = 0; at < jobs; at += 1)
      if (order[at] !== job) {
        others[to] = order[at]!;
        to += 1;
      }
    trial.base(others, alternative);
    let better: BenchScore | null = null;
    let best = { at: 0, way: 0 };
    for (let way = model.firstAlternative[job]!; way < model.firstAlternative[job + 1]!; way += 1)
      // The job is put before each job that it shares a channel with, and at the end.
      for (let at = 0; at < jobs; at += 1) {
        if (at < jobs - 1 && !shares(way, alternative[others[at]!]!)) continue;
        const limit = better ?? plan.score;
        if (!budget.spend()) return false;
        if (!trial.insert({ at, job, way }, limit) || compareScores(trial.score, limit) >= 0) continue;
        better = { ...trial.score };
        best = { at, way };
      }
    if (!better) return false;
    order.set(others.subarray(0, best.at));
    order[best.at] = job;
    order.set(others.subarray(best.at), best.at + 1);
    alternative[job] = best.way;
    plan.score = better;
    return true;
  };

  /** Swaps the job with any other that can take its channels, and it the other's. */
  const swap = (plan: ScoredOrder, job: number): boolean => {
    const { order, alternative } = plan;
    const place = order.indexOf(job);
    trial.base(order, alternative);
    for (let to = 0; to < jobs; to += 1) {
      const other = order[to]!;
      const [way, otherWay] = [twin(job, alternative[other]!), twin(other, alternative[job]!)];
      if (other === job || way < 0 || otherWay < 0) continue;
      if (!budget.spend()) return false;
      const [mine, theirs] = [
        { at: to, job, way },
        { at: place, job: other, way: otherWay },
      ];
      const read = to < place ? trial.replace(mine, theirs, plan.score) : trial.replace(theirs, mine, plan.score);
      if (!read || compareScores(trial.score, plan.score) >= 0) continue;
      order[place] = other;
      order[to] = job;
      alternative[job] = way;
      alternative[other] = otherWay;
      plan.score = { ...trial.score };
      return true;
    }
    return false;
  };

  return (plan) => {
    const turn = Int32Array.from({ length: jobs }, (_, at) => at);
    for (let still = 0, at = 0; still < jobs && !budget.over(); at = (at + 1) % jobs) {
      if (at === 0) shuffle(turn, random);
      const job = turn[at]!;
      still = move(plan, job) || swap(plan, job) ? 0 : still + 1;
    }
  };
}

function shuffle(list: Int32Array, random: () => number): void {
  for (let at = list.length - 1; at > 0; at -= 1) {
    const to = Math.floor(random() * (at + 1));
    [list[at], list[to]] = [list[to]!, list[at]!];
  }
}
