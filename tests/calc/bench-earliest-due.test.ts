import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { earliestDueFirst, type BenchProblem } from '@/calc/index';
import { benchJob, benchProblem, published } from './bench-fixtures';

/** The largest amount by which a charge is over its due time, below 0 where all are early, s. */
function largestLateness(problem: BenchProblem): number {
  const late = earliestDueFirst(problem).placements.map(({ jobId, alternative, startS }) => {
    const job = problem.jobs.find(({ id }) => id === jobId)!;
    return startS + job.alternatives[alternative]!.guardS - job.dueS!;
  });
  return Math.max(...late);
}

function* permutations<T>(list: readonly T[]): Generator<T[]> {
  if (list.length === 0) yield [];
  for (let at = 0; at < list.length; at += 1)
    for (const rest of permutations([...list.slice(0, at), ...list.slice(at + 1)])) yield [list[at]!, ...rest];
}

describe('earliest due first', () => {
  // J. R. Jackson, Research Report 43, UCLA (1955): on one machine it has the least largest lateness (from memory).
  const [, jackson] = published.one_machine;

  it(`one channel: the published least largest lateness, ${jackson.optimum}, in whatever order the charges come`, () => {
    for (const list of [jackson.jobs_time_due, jackson.jobs_time_due.toReversed()]) {
      const jobs = list.map(([time, dueS], at) => benchJob(`${at}`, time, 1, { dueS }));
      expect(largestLateness(benchProblem(1, jobs))).toBe(jackson.optimum);
    }
  });

  it('one channel: no order of up to 6 charges has a smaller largest lateness, over 200 drawn ones', () => {
    const lists = fc.array(fc.tuple(fc.integer({ min: 1, max: 50 }), fc.integer({ min: 0, max: 150 })), {
      minLength: 1,
      maxLength: 6,
    });
    fc.assert(
      fc.property(lists, (list) => {
        let least = Infinity;
        for (const order of permutations(list)) {
          let [end, worst] = [0, -Infinity];
          for (const [time, due] of order) {
            end += time;
            worst = Math.max(worst, end - due);
          }
          least = Math.min(least, worst);
        }
        const jobs = list.map(([time, dueS], at) => benchJob(`${at}`, time, 1, { dueS }));
        expect(largestLateness(benchProblem(1, jobs))).toBe(least);
      }),
      { numRuns: 200 },
    );
  });

  it('of two that are due together the heavier goes first: 100 s late at a weight of 1, where the other way round were 500', () => {
    const pair = [1, 5].map((weight) => benchJob(`of ${weight}`, 100, 1, { dueS: 100, weight }));
    for (const jobs of [pair, pair.toReversed()]) {
      const { placements, weightedTardinessS } = earliestDueFirst(benchProblem(1, jobs));
      expect(placements.map(({ jobId, startS }) => [jobId, startS])).toEqual([
        ['of 5', 0],
        ['of 1', 100],
      ]);
      expect(weightedTardinessS).toBe(100);
    }
  });

  it('what is due never goes last, and of two alike the first to come goes first', () => {
    const due = [null, 900, null, 900].map((dueS, at) => benchJob(`${at}`, 100, 1, { dueS }));
    expect(earliestDueFirst(benchProblem(1, due)).placements.map(({ jobId }) => jobId)).toEqual(['1', '3', '0', '2']);
  });

  it('each goes to the channel that has it ready first, into a gap that is long enough', () => {
    const slow = benchJob('slow', 300, 2, { dueS: 100 });
    slow.alternatives[1]!.readyS = 200;
    const short = benchJob('short', 40, 1, { dueS: 500 });
    const problem = { taken: [[{ fromS: 50, toS: 90 }], []], jobs: [short, slow] };
    expect(earliestDueFirst(problem).placements).toEqual([
      { jobId: 'short', alternative: 0, startS: 0 },
      { jobId: 'slow', alternative: 1, startS: 0 },
    ]);
  });
});
