import { describe, expect, it } from 'vitest';
import { branchAndBound } from '@/calc/bench/bench-branch';
import { benchDecoder } from '@/calc/bench/bench-decode';
import { benchModel } from '@/calc/bench/bench-model';
import { searchBudget } from '@/calc/bench/search-budget';
import { seededRandom, type BenchProblem } from '@/calc/index';
import { bestOfAllOrders } from './bench-brute';

const HORIZON = 400;

/** Charges of whole times on two or three channels of different speed, with a pause in which none may begin. */
function drawn(seed: number): BenchProblem {
  const random = seededRandom(seed);
  const whole = (from: number, to: number) => from + Math.floor(random() * (to - from + 1));
  const channels = 2 + (seed % 2);
  const noon = whole(8, 20);
  const open = [
    { fromS: 0, toS: noon },
    { fromS: noon + whole(3, 9), toS: HORIZON },
  ];
  return {
    taken: Array.from({ length: channels }, (_, at) => (at === 1 ? [{ fromS: 0, toS: whole(1, 6) }] : [])),
    jobs: Array.from({ length: 4 + (seed % 3 === 0 ? 1 : 0) }, (_, job) => {
      const length = whole(2, 9);
      return {
        id: `${job}`,
        dueS: random() < 0.2 ? null : whole(2, 22),
        weight: whole(0, 3),
        alternatives: Array.from({ length: channels }, (_way, channel) => {
          const busyS = length + channel * whole(0, 3);
          const readyS = busyS + whole(0, 8);
          return { channels: [channel], busyS, readyS, guardS: readyS + whole(0, 4), mayStart: open };
        }).filter((_way, channel) => channel === job % channels || random() < 0.7),
      };
    }),
  };
}

/** The search through all branches, begun from the charges as they came, each by its last way. */
function branched(problem: BenchProblem) {
  const model = benchModel(problem);
  const order = Int32Array.from(model.source.keys()).reverse();
  const alternative = Int32Array.from(model.source, (_, job) => model.firstAlternative[job + 1]! - 1);
  const decoder = benchDecoder(model);
  decoder.read({ order, alternative }, null);
  const from = { order, alternative, score: { ...decoder.score } };
  const { best, complete } = branchAndBound(model, from, searchBudget({}, 1_000_000));
  decoder.read(best, null);
  return { from, best, complete, read: { ...decoder.score } };
}

describe('the search through all branches, with no good plan to begin from', () => {
  it('finds the best of 4 or 5 charges that trying all orders finds, and what it says of it is what it comes to, over 300', () => {
    let bettered = 0;
    for (let seed = 1; seed <= 300; seed += 1) {
      const problem = drawn(seed);
      const { from, best, complete, read } = branched(problem);
      expect({ seed, complete }).toEqual({ seed, complete: true });
      const { unplaced, lateS, makespanS, startsS } = best.score;
      const ofAll = bestOfAllOrders(problem, HORIZON);
      expect({ seed, best: [unplaced, lateS, makespanS, startsS] }).toEqual({ seed, best: ofAll });
      expect(read).toEqual(best.score);
      if (from.score.lateS > lateS || from.score.makespanS > makespanS) bettered += 1;
    }
    expect(bettered).toBeGreaterThan(250);
  });
});
