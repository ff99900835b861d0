import { benchDecoder, type BenchOrder } from './bench-decode';
import { copyOfOrder, moveTo, shareChannels, twins, type ScoredOrder } from './bench-order';
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
  from: BenchOrder,
  budget: SearchBudget,
  random: () => number,
  isBest: (score: BenchScore) => boolean,
): ScoredOrder {
  const decoder = benchDecoder(model);
  decoder.read(from, null);
  let current: ScoredOrder = copyOfOrder({ ...from, score: decoder.score });
  let best = copyOfOrder(current);
  const tryOrder = (order: Int32Array, alternative: Int32Array, than: BenchScore): boolean =>
    budget.spend() && decoder.read({ order, alternative }, than) && compareScores(decoder.score, than) < 0;
  const descend = descent(model, (order, alternative, than) =>
    tryOrder(order, alternative, than) ? { ...decoder.score } : null,
  );
  let fruitless = 0;
  for (;;) {
    descend(current, random);
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

type Attempt = (order: Int32Array, alternative: Int32Array, than: BenchScore) => BenchScore | null;

/** Lowers an order in place until neither a move nor a swap makes it better. */
function descent(model: BenchModel, attempt: Attempt): (plan: ScoredOrder, random: () => number) => void {
  const jobs = model.source.length;
  const shares = shareChannels(model);
  const twin = twins(model);
  const tried = new Int32Array(jobs);
  const found = new Int32Array(jobs);

  /** The best place and alternative for one job, all others kept as they are. */
  const move = (plan: ScoredOrder, job: number): boolean => {
    const { order, alternative } = plan;
    const was = alternative[job]!;
    let better: BenchScore | null = null;
    let way = was;
    for (let next = model.firstAlternative[job]!; next < model.firstAlternative[job + 1]!; next += 1) {
      alternative[job] = next;
      // The job is put before each job that it shares a channel with, and at the end.
      const others = order.filter((one) => one !== job);
      for (let to = 0; to < jobs; to += 1) {
        if (to < jobs - 1 && !shares(next, alternative[others[to]!]!)) continue;
        tried.set(others.subarray(0, to));
        tried[to] = job;
        tried.set(others.subarray(to), to + 1);
        const score = attempt(tried, alternative, better ?? plan.score);
        if (!score) continue;
        better = score;
        way = next;
        found.set(tried);
      }
    }
    alternative[job] = better ? way : was;
    if (!better) return false;
    order.set(found);
    plan.score = better;
    return true;
  };

  /** Swaps the job with any other that can take its channels, and it the other's. */
  const swap = (plan: ScoredOrder, job: number): boolean => {
    const { order, alternative } = plan;
    const at = order.indexOf(job);
    for (let to = 0; to < jobs; to += 1) {
      const other = order[to]!;
      const [mine, theirs] = [alternative[job]!, alternative[other]!];
      const [next, otherNext] = [twin(job, theirs), twin(other, mine)];
      if (other === job || next < 0 || otherNext < 0) continue;
      order[at] = other;
      order[to] = job;
      alternative[job] = next;
      alternative[other] = otherNext;
      const score = attempt(order, alternative, plan.score);
      if (score) {
        plan.score = score;
        return true;
      }
      order[at] = job;
      order[to] = other;
      alternative[job] = mine;
      alternative[other] = theirs;
    }
    return false;
  };

  return (plan, random) => {
    const turn = Int32Array.from({ length: jobs }, (_, at) => at);
    for (let still = 0, at = 0; still < jobs; at = (at + 1) % jobs) {
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
