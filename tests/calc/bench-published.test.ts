import { describe, expect, it } from 'vitest';
import { earliestDueFirst, planBench, planFills } from '@/calc/index';
import { benchJob, benchProblem, fillProblem, fillWork, published } from './bench-fixtures';

const [smith, , , tardiness] = published.one_machine;

describe('published instances through the solvers of the bench plan', () => {
  it.each(published.knapsack)(
    'knapsack $name: one window filled for $optimum',
    ({ capacity, weights, values, optimum }) => {
      // A minute by the likely estimate each, worth the item's value, as long as the item's weight.
      const work = weights.map((longS, at) => fillWork(`${at}`, { longS, likelyS: 60, weight: values[at]! }));
      const plan = planFills(fillProblem(capacity, work));
      expect(plan.weightedMinutes).toBeCloseTo(optimum, 6);
      expect(plan.proved).toBe(true);
      const taken = plan.placements.map(({ workId }) => Number(workId));
      expect(taken.reduce((sum, at) => sum + weights[at]!, 0)).toBeLessThanOrEqual(capacity);
      expect(taken.reduce((sum, at) => sum + values[at]!, 0)).toBe(optimum);
    },
  );

  it.each(published.parallel_machines_makespan)(
    '$machines alike channels are over at $optimum, where the longest first would take $longest_first_gives',
    ({ machines, times, optimum }) => {
      const plan = planBench(
        benchProblem(
          machines,
          times.map((time, at) => benchJob(`${at}`, time, machines)),
        ),
      );
      expect(plan.makespanS).toBe(optimum);
      expect(plan.proved).toBe(true);
    },
  );

  it(`one channel, all due at 0: the weighted sum of ends is ${smith.optimum}, which Smith's rule gives`, () => {
    const jobs = smith.jobs_time_weight.map(([time, weight], at) => benchJob(`${at}`, time, 1, { dueS: 0, weight }));
    const plan = planBench(benchProblem(1, jobs));
    expect(plan.weightedTardinessS).toBeCloseTo(smith.optimum, 9);
    expect(plan.proved).toBe(true);
    // Largest lateness and number of late jobs, the file's other two rules, are no objective of the bench plan.
  });

  it(`one channel, 40 jobs of OR-Library's wt40, instance 1: weighted tardiness ${tardiness.optimum}, the published optimum`, () => {
    const { times, weights, due, optimum } = tardiness;
    const jobs = times.map((time, at) => benchJob(`${at}`, time, 1, { dueS: due[at]!, weight: weights[at]! }));
    const problem = benchProblem(1, jobs);
    const plan = planBench(problem);
    expect(plan.weightedTardinessS).toBe(optimum);
    expect(plan.boundS).toBeLessThanOrEqual(optimum);
    expect(earliestDueFirst(problem).weightedTardinessS).toBeGreaterThanOrEqual(optimum);
  });
});
