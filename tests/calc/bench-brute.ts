import type { BenchAlternative, BenchProblem, Stretch } from '@/calc/index';

/** Jobs left out, weighted tardiness, makespan: what a plan is judged by. */
export type Judged = [unplaced: number, late: number, makespan: number];
/** And last by the sum of its starts. */
export type JudgedToTheEnd = [...Judged, starts: number];

const better = (one: readonly number[], other: readonly number[]): boolean => {
  for (const [at, value] of one.entries()) if (value !== other[at]) return value < other[at]!;
  return false;
};

/** The first whole instant from `from` on at which it may start and meets nothing taken, found by trying one after the other. */
function firstWhole(one: BenchAlternative, taken: Stretch[][], from: number, horizon: number): number {
  for (let start = Math.max(0, from); start <= horizon; start += 1) {
    const may = one.mayStart.some(({ fromS, toS }) => fromS <= start && start <= toS);
    const meets = one.channels.some((channel) =>
      taken[channel]!.some(({ fromS, toS }) => fromS < start + one.busyS && start < toS),
    );
    if (may && !meets) return start;
  }
  return Infinity;
}

/** Every order of a list. */
function* permutations<T>(list: readonly T[]): Generator<T[]> {
  if (list.length === 0) yield [];
  for (let at = 0; at < list.length; at += 1)
    for (const rest of permutations([...list.slice(0, at), ...list.slice(at + 1)])) yield [list[at]!, ...rest];
}

/**
 * The best of all plans of whole times, by trying every order of all jobs with every alternative of each, and leaving
 * out. For up to five jobs.
 */
export function bestOfAllOrders({ taken, jobs }: BenchProblem, horizon: number): JudgedToTheEnd {
  let best: JudgedToTheEnd = [Infinity, Infinity, Infinity, Infinity];
  for (const order of permutations([...jobs.keys()])) {
    const lay = (at: number, free: readonly number[], judged: JudgedToTheEnd): void => {
      if (at === order.length) {
        if (better(judged, best)) best = judged;
        return;
      }
      const { alternatives, dueS, weight } = jobs[order[at]!]!;
      const [unplaced, late, makespan, starts] = judged;
      lay(at + 1, free, [unplaced + 1, late, makespan, starts]);
      for (const one of alternatives) {
        const start = firstWhole(one, taken, Math.max(...one.channels.map((channel) => free[channel]!)), horizon);
        if (start === Infinity) continue;
        const over = dueS === null ? 0 : weight * Math.max(0, start + one.guardS - dueS);
        const next = free.map((from, channel) => (one.channels.includes(channel) ? start + one.busyS : from));
        lay(at + 1, next, [unplaced, late + over, Math.max(makespan, start + one.readyS), starts + start]);
      }
    };
    lay(
      0,
      taken.map(() => 0),
      [0, 0, 0, 0],
    );
  }
  return best;
}

/**
 * The same where every alternative holds one channel and no job has two on one: every order of every set of jobs on
 * each channel, then every way to share the jobs out. For up to seven jobs on three channels.
 */
export function bestOfAllShares({ taken, jobs }: BenchProblem, horizon: number): Judged {
  const sets = 2 ** jobs.length;
  // Per channel and set of jobs, what its orders come to; only those that no other is as good as in both.
  const fronts = taken.map((_, channel) => {
    const found: [number, number][][] = Array.from({ length: sets }, () => []);
    const starts = jobs.map(({ alternatives }) => {
      const one = alternatives.find(({ channels }) => channels[0] === channel);
      return one ? Array.from({ length: horizon + 1 }, (_, from) => firstWhole(one, taken, from, horizon)) : null;
    });
    const lay = (set: number, free: number, late: number, makespan: number): void => {
      found[set]!.push([late, makespan]);
      jobs.forEach(({ alternatives, dueS, weight }, job) => {
        const start = set & (1 << job) ? undefined : starts[job]?.[free];
        if (start === undefined || start === Infinity) return;
        const one = alternatives.find(({ channels }) => channels[0] === channel)!;
        const over = dueS === null ? 0 : weight * Math.max(0, start + one.guardS - dueS);
        lay(set | (1 << job), start + one.busyS, late + over, Math.max(makespan, start + one.readyS));
      });
    };
    lay(0, 0, 0, 0);
    return found.map((list) => {
      const front: [number, number][] = [];
      for (const one of list.sort(([a, b], [c, d]) => a - c || b - d))
        if (front.length === 0 || one[1] < front.at(-1)![1]) front.push(one);
      return front;
    });
  });
  let best: Judged = [Infinity, Infinity, Infinity];
  const share = (channel: number, left: number, judged: Judged): void => {
    const [, late, makespan] = judged;
    if (channel === taken.length) {
      const unplaced = jobs.filter((_, job) => left & (1 << job)).length;
      if (better([unplaced, late, makespan], best)) best = [unplaced, late, makespan];
      return;
    }
    for (let set = left; ; set = (set - 1) & left) {
      for (const [more, end] of fronts[channel]![set]!)
        share(channel + 1, left & ~set, [0, late + more, Math.max(makespan, end)]);
      if (set === 0) break;
    }
  };
  share(0, sets - 1, [0, 0, 0]);
  return best;
}
