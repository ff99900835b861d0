import { describe, expect, it } from 'vitest';
import { earliestDueFirst, planBench, seededRandom, type BenchProblem, type Stretch } from '@/calc/index';
import { bestOfAllOrders, bestOfAllShares, type Judged } from './bench-brute';

/** In steps of five minutes, say: a day and a half, with a night in which nothing may be begun. */
const HORIZON = 130;

/** A small workshop of whole times: channels of different speed, running charges, nights, charges that not all can take. */
function drawn(seed: number, jobs: number, channels: number, pairs: boolean): BenchProblem {
  const random = seededRandom(seed);
  const whole = (from: number, to: number) => from + Math.floor(random() * (to - from + 1));
  const taken = Array.from({ length: channels }, (): Stretch[] => {
    const list: Stretch[] = [];
    if (random() < 0.5) list.push({ fromS: -5, toS: whole(1, 10) });
    if (random() < 0.4) list.push({ fromS: whole(14, 22), toS: whole(23, 34) });
    return list;
  });
  const speeds = taken.map(() => 0.6 + random());
  const night = whole(30, 60);
  const open: Stretch[] = random() < 0.6 ? [{ fromS: 0, toS: night }] : [{ fromS: 0, toS: HORIZON }];
  if (open[0]!.toS === night && random() < 0.7) open.push({ fromS: night + 20, toS: night + 45 });
  const ways = taken.map((_, channel) => [channel]);
  if (pairs) ways.push([0, channels - 1]);
  return {
    taken,
    jobs: Array.from({ length: jobs }, (_, job) => {
      const length = whole(4, 24);
      const fit = ways.filter(() => random() < 0.75);
      return {
        id: `${job}`,
        dueS: random() < 0.15 ? null : whole(5, 20 * Math.ceil(jobs / channels)),
        weight: whole(1, 5),
        alternatives: (fit.length > 0 ? fit : [ways[0]!]).map((held) => {
          const busyS = Math.max(1, Math.round((length * speeds[held[0]!]!) / held.length));
          const readyS = busyS + whole(0, 4);
          return { channels: held, busyS, readyS, guardS: readyS + whole(0, 6), mayStart: open };
        }),
      };
    }),
  };
}

const judged = (problem: BenchProblem): { plan: Judged; list: Judged; proved: boolean; bound: number } => {
  const plan = planBench(problem);
  const list = earliestDueFirst(problem);
  const of = ({ unplaced, weightedTardinessS, makespanS }: typeof plan): Judged => [
    unplaced.length,
    weightedTardinessS,
    makespanS,
  ];
  return { plan: of(plan), list: of(list), proved: plan.proved, bound: plan.boundS };
};

describe('small workshops: the plan is the best of all there are', () => {
  // 7 and 3 have no divisor in common: every size of 1 to 7 charges on 1 to 3 channels comes nine times or ten.
  const seeds = Array.from({ length: 200 }, (_, seed) => ({ seed, jobs: 1 + (seed % 7), channels: 1 + (seed % 3) }));

  it('200 of every size of 1 to 7 charges on 1 to 3 channels: least left out, least weighted tardiness, least makespan, proved', () => {
    expect(new Set(seeds.map(({ jobs, channels }) => `${jobs}/${channels}`)).size).toBe(21);
    for (const { seed, jobs, channels } of seeds) {
      const problem = drawn(seed, jobs, channels, false);
      const { plan, proved, bound } = judged(problem);
      expect({ seed, plan, proved }).toEqual({ seed, plan: bestOfAllShares(problem, HORIZON), proved: true });
      expect(bound).toBe(plan[1]);
    }
  });

  it('50 more of up to 5 charges, some of which may hold two channels together', () => {
    for (let seed = 1000; seed < 1050; seed += 1) {
      const problem = drawn(seed, 3 + (seed % 3 === 0 ? 2 : seed % 2), 2 + (seed % 2), true);
      const { plan, proved } = judged(problem);
      const starts = planBench(problem).placements.reduce((sum, { startS }) => sum + startS, 0);
      const best = bestOfAllOrders(problem, HORIZON);
      expect({ seed, plan: [...plan, starts], proved }).toEqual({ seed, plan: best, proved: true });
    }
  });

  it('the workshops are not all easy: list scheduling misses the best in a third of them, tardiness in a fifth', () => {
    const all = seeds.map(({ seed, jobs, channels }) => judged(drawn(seed, jobs, channels, false)));
    expect(all.filter(({ plan, list }) => list.some((value, at) => value !== plan[at])).length).toBeGreaterThan(66);
    expect(all.filter(({ plan, list }) => list[0] === plan[0] && list[1] > plan[1]).length).toBeGreaterThan(40);
    expect(all.filter(({ plan }) => plan[1] > 0).length).toBeGreaterThan(50);
    expect(all.filter(({ plan }) => plan[0] > 0).length).toBeGreaterThan(3);
  });
});
