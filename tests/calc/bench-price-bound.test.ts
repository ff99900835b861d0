import { describe, expect, it } from 'vitest';
import { priceBound } from '@/calc/bench/bench-bound';
import { benchModel } from '@/calc/bench/bench-model';
import { benchPrices } from '@/calc/bench/bench-prices';
import { searchBudget } from '@/calc/bench/search-budget';
import type { BenchProblem, Stretch } from '@/calc/index';
import { benchJob, benchProblem, published } from './bench-fixtures';

const bound = (problem: BenchProblem, knownS: number, horizonS: number): number => {
  const model = benchModel(problem);
  return priceBound(model, benchPrices(model, problem.taken, horizonS), knownS, searchBudget({}, 1_500_000));
};

/** So many alike charges of 100 s, all due at once, and so many channels. */
const alike = (jobs: number, channels: number): BenchProblem =>
  benchProblem(
    channels,
    Array.from({ length: jobs }, (_, at) => benchJob(`${at}`, 100, channels, { dueS: 0 })),
  );

// The bound is told of plans worse than the best, so that nothing but its own prices keeps it under the best.
describe('the bound by prices of the channels’ time', () => {
  it.each([
    { channels: 1, least: 0.98 },
    { channels: 2, least: 0.99 },
    { channels: 4, least: 0.995 },
  ])(
    '24 alike charges on $channels channels, in rounds of that many: at most the sum of their ends, at least $least of it',
    ({ channels, least }) => {
      const rounds = 24 / channels;
      const sum = channels * 100 * ((rounds * (rounds + 1)) / 2);
      const found = bound(alike(24, channels), 1.5 * sum, 110 * rounds);
      expect(found).toBeLessThanOrEqual(sum + 1e-6);
      expect(found).toBeGreaterThanOrEqual(least * sum);
    },
  );

  it('a channel that a running charge has for 600 s: 12 charges of 100 s end 600 s later each, and so does the bound', () => {
    const running: Stretch[][] = [[{ fromS: -50, toS: 600 }]];
    const sum = 12 * 600 + 100 * ((12 * 13) / 2);
    const found = bound({ ...alike(12, 1), taken: running }, 1.5 * sum, 1.1 * 1800);
    expect(found).toBeLessThanOrEqual(sum + 1e-6);
    expect(found).toBeGreaterThanOrEqual(0.98 * sum);
  });

  it.each([1.01, 1.5, 3])(
    `OR-Library's wt40, instance 1, beside a plan of %d times its published optimum of 913: at most 913`,
    (times913) => {
      const { times, weights, due, optimum } = published.one_machine[3];
      const jobs = times.map((time, at) => benchJob(`${at}`, time, 1, { dueS: due[at]!, weight: weights[at]! }));
      const length = times.reduce((sum, time) => sum + time, 0);
      expect(bound(benchProblem(1, jobs), times913 * optimum, 1.1 * length)).toBeLessThanOrEqual(optimum + 1e-6);
    },
  );
});
