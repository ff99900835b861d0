import { describe, expect, it } from 'vitest';
import { earliestDueFirst, planBench, planFills } from '@/calc/index';
import { benchInstance, fillInstance } from './reference/bench-instances';
import kept from './reference/bench-instances.json';

/** Bounds are kept to a ten-thousandth of an hour, rounded down. */
const ROUNDING_HOURS = 1e-4;

describe('beside bounds that a mixed integer program proved offline', () => {
  it('there are 20 workshops, some of which can be all in time and most of which cannot, and 6 days', () => {
    expect(kept.bench.length).toBe(20);
    expect(kept.bench.filter(({ boundHours }) => boundHours === 0).length).toBeGreaterThanOrEqual(2);
    expect(kept.bench.filter(({ boundHours }) => boundHours > 1).length).toBeGreaterThanOrEqual(10);
    expect(kept.fills.length).toBe(6);
  });

  it.each(kept.bench)(
    'workshop $seed, 30 charges on 8 channels: at most 5 % over the bound of $boundHours h, never worse than earliest due first',
    ({ seed, boundHours }) => {
      const problem = benchInstance(seed);
      const [plan, list] = [planBench(problem), earliestDueFirst(problem)];
      const hours = plan.weightedTardinessS / 3600;
      expect(plan.unplaced).toEqual([]);
      expect(hours).toBeGreaterThanOrEqual(boundHours - 1e-9);
      expect(hours).toBeLessThanOrEqual(boundHours === 0 ? 0 : boundHours * 1.05 + ROUNDING_HOURS);
      expect(plan.weightedTardinessS).toBeLessThanOrEqual(list.weightedTardinessS);
      // Its own bound is under any plan there is, and so under this one.
      expect(plan.boundS).toBeLessThanOrEqual(plan.weightedTardinessS + 1e-6);
    },
  );

  it.each(kept.fills)(
    'day $seed, 12 people and 40 pieces: within 2 % of the bound of $boundMinutes weighted minutes',
    ({ seed, boundMinutes }) => {
      const { weightedMinutes, bound } = planFills(fillInstance(seed));
      expect(weightedMinutes).toBeLessThanOrEqual(boundMinutes + 1e-6);
      expect(weightedMinutes).toBeGreaterThanOrEqual(0.98 * boundMinutes);
      expect(bound).toBeGreaterThanOrEqual(weightedMinutes - 1e-6);
    },
  );
});
