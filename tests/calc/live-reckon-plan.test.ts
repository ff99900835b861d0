import { describe, expect, it } from 'vitest';
import { planCharge, reckonCharge } from '@/calc/index';
import type { ChannelParameters, PlanInput, PlanOption, TimeFactor } from '@/calc/plan-types';
import { plannedRuns, reckonInput } from './live-fixtures';
import { channel, planInput, sixChannels, lmoModule, lmoSpare, target } from './plan-fixtures';

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
const learned: TimeFactor = { mean: 1.12, sd: 0.06, charges: 14 };
/** What a plan knows of a charger. */
const chargers: [string, Partial<ChannelParameters>][] = [
  ['pauses a fifth of the time', { duty: 0.8 }],
  ['guessed leads', { senses: 'own-terminals', leadResistanceOhm: 0, leadsMeasured: false }],
  ['leads guessed at 15 mohm', { senses: 'own-terminals', leadResistanceOhm: 0.015, leadsMeasured: false }],
  ['learned 12 % longer', { timeFactor: learned }],
  ['display of 0.1 A, less when warm', { displayStepAmps: 0.1, derating: { aboveCelsius: 20, ampsShare: 0.73 } }],
  [
    'all at once',
    { duty: 0.7, senses: 'own-terminals', leadsMeasured: false, leadResistanceOhm: 0, timeFactor: learned },
  ],
];
const cases: [string, PlanInput][] = [
  ['even', even],
  ['uneven', uneven],
  ['four groups', four],
  ...chargers.map(([name, over]): [string, PlanInput] => [
    name,
    planInput({
      channels: sixChannels.slice(0, 2).map((one) => ({ ...one, ...over })),
      spare: { ...lmoSpare, groupVolts: [3.7, 3.72] },
    }),
  ]),
  ...[{}, { duty: 0.8 }].map((over): [string, PlanInput] => [
    `counted from a known end ${JSON.stringify(over)}`,
    planInput({
      module: { ...lmoModule, chemistry: 'lfp', ratedAh: 100, chargeLimitVolts: 3.6, dischargeLimitVolts: 2.5 },
      spare: { ...lmoSpare, groupVolts: [3.3, 3.3], capacityAh: 100 },
      target: { ...target, volts: 0, soc: 0.6 },
      channels: [channel('A1', { maxAmps: 20, canDischarge: true, dischargeAmps: 25, ...over })],
    }),
  ]),
  ['60 W at 7.5 V', planInput({ channels: [channel('A1', { maxWatts: 60 })] })],
  [
    'pre-charge of a low group',
    planInput({
      module: { ...lmoModule, chemistry: 'nmc', prechargeBelowVolts: 3, dischargeLimitVolts: 2.8 },
      spare: { ...lmoSpare, groupVolts: [2.85, 2.95] },
      target: { ...target, volts: 3.7 },
    }),
  ],
];

/** The planned times with each step as long as closed charges have made it. */
function asLearned(option: PlanOption): PlanOption {
  const factor = option.timeFactor?.mean ?? 1;
  let added = 0;
  let [roundS, longest] = [-Infinity, 0];
  const steps = option.steps.map((step) => {
    if (step.startS - roundS > 1) {
      added += longest * (factor - 1);
      [roundS, longest] = [step.startS, 0];
    }
    const seconds = step.stopS - step.startS;
    longest = Math.max(longest, seconds);
    return { ...step, startS: step.startS + added, stopS: step.startS + added + seconds * factor };
  });
  return { ...option, steps, currentEndS: Math.max(...steps.map((step) => step.stopS)) };
}

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
      const course = asLearned(option);
      for (const step of course.steps) {
        for (const share of [0.1, 0.6, 0.95]) {
          const nowS = step.startS + share * (step.stopS - step.startS) - from;
          const then = reckonCharge(reckonInput(input, option, { nowS, runs: plannedRuns(course, nowS) }));
          expect(Math.abs(then.readyS.p50 - likely)).toBeLessThan(0.3 * width + 0.01 * likely);
          expect(then.readyS.p90 - then.readyS.p10).toBeLessThan(1.2 * width + 1);
          expect(['charging', 'tapering']).toContain(then.stage);
          expect(then.stepIndex).toBe(course.steps.findIndex((one) => Math.abs(one.startS - step.startS) <= 1));
        }
      }
      const nowS = course.currentEndS - from + 1;
      const done = reckonCharge(reckonInput(input, option, { nowS, runs: plannedRuns(course, nowS) }));
      expect(done.stage).toBe('resting');
      done.groups.forEach((group, at) => {
        expect(Math.abs(group.restVolts - option.endGroupVolts[at]!)).toBeLessThan(5e-4);
      });
      expect(done.deliveredAh).toBeCloseTo(option.ampHours, 1);
    },
  );
});
