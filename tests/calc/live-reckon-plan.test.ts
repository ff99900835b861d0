import { describe, expect, it } from 'vitest';
import { planCharge, reckonCharge } from '@/calc/index';
import type { PlanInput, PlanOption } from '@/calc/plan-types';
import { plannedRuns, reckonInput } from './live-fixtures';
import { planInput, sixChannels, lmoModule, lmoSpare } from './plan-fixtures';

const even = planInput({ channels: sixChannels });
const uneven = planInput({
  channels: sixChannels,
  spare: { ...lmoSpare, groupVolts: [3.7, 3.75] },
});
const four = planInput({
  channels: sixChannels,
  module: { ...lmoModule, groupsInSeries: 4 },
  spare: { ...lmoSpare, groupVolts: [3.7, 3.702, 3.698, 3.78] },
  resistors: [{ resistorId: 'r1', name: 'R1', ohm: 0.05, maxWatts: 100 }],
});
const cases: [string, PlanInput][] = [
  ['even', even],
  ['uneven', uneven],
  ['four groups', four],
];

const everyOption = cases.flatMap(([name, input]) =>
  planCharge(input).options.map((option): [string, PlanInput, PlanOption] => [`${name} ${option.id}`, input, option]),
);

describe('a running charge without readings', () => {
  it.each(everyOption)(
    'is the plan to a second at the clip-on, stays within its band, and ends where it was to end: %s',
    (_, input, option) => {
      const from = option.currentStartS;
      const likely = option.totalS.p50 - from;
      const first = reckonCharge(reckonInput(input, option, { nowS: 0 }));
      expect(Math.abs(first.readyS.p50 - likely)).toBeLessThan(1);
      expect(Math.abs(first.readyS.p10 - (option.totalS.p10 - from))).toBeLessThan(1);
      expect(Math.abs(first.readyS.p90 - (option.totalS.p90 - from))).toBeLessThan(1);
      expect(first.segments.map((one) => one.kind)).toEqual(
        option.segments.filter((one) => one.fromS >= from - 1e-6).map((one) => one.kind),
      );
      const width = option.totalS.p90 - option.totalS.p10;
      for (const step of option.steps) {
        for (const share of [0.1, 0.6, 0.95]) {
          const nowS = step.startS + share * (step.stopS - step.startS) - from;
          const then = reckonCharge(reckonInput(input, option, { nowS, runs: plannedRuns(option, nowS) }));
          expect(Math.abs(then.readyS.p50 - likely)).toBeLessThan(0.3 * width + 0.01 * likely);
          expect(then.readyS.p90 - then.readyS.p10).toBeLessThan(1.1 * width + 1);
          expect(['charging', 'tapering']).toContain(then.stage);
          expect(then.stepIndex).toBe(option.steps.findIndex((one) => Math.abs(one.startS - step.startS) <= 1));
        }
      }
      const nowS = option.currentEndS - from + 1;
      const done = reckonCharge(reckonInput(input, option, { nowS, runs: plannedRuns(option, nowS) }));
      expect(done.stage).toBe('resting');
      done.groups.forEach((group, at) => {
        expect(Math.abs(group.restVolts - option.endGroupVolts[at]!)).toBeLessThan(5e-4);
      });
      expect(done.deliveredAh).toBeCloseTo(option.ampHours, 1);
    },
  );
});
