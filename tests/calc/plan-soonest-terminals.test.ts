import { describe, expect, test } from 'vitest';
import { planCharge, soonestTerminals } from '@/calc/index';
import type { PlanInput } from '@/calc/plan-types';
import { channel, planInput } from './plan-fixtures';

/** The soonest of the whole plan's ways through the terminals that go over and settle. */
const soonestOfPlan = (input: PlanInput) =>
  planCharge(input)
    .options.filter(({ way, finish }) => way === 'terminals' && finish === 'over-and-settle')
    .sort((one, other) => one.currentEndS - other.currentEndS)[0]!;

const benches: [string, PlanInput['channels']][] = [
  ['one channel', [channel('a', { maxAmps: 10 })]],
  [
    'a strong one that is taken for two hours',
    [channel('a', { maxAmps: 10 }), channel('b', { maxAmps: 30, freeInS: 7200 })],
  ],
  [
    'a strong one that is free',
    [channel('a', { maxAmps: 10 }), channel('b', { maxAmps: 30 }), channel('c', { maxAmps: 20 })],
  ],
  ['a strong one without the watts', [channel('a', { maxAmps: 10 }), channel('b', { maxAmps: 30, maxWatts: 40 })]],
];

describe('the soonest way through the terminals', () => {
  test.each(benches)('on %s is that of the whole plan, to the last digit of its band', (_name, channels) => {
    const input = planInput({ channels, samples: 16 });
    const { option, alreadyWithin, reason } = soonestTerminals(input);
    const best = soonestOfPlan(input);
    expect([option!.channelIds, option!.totalS]).toEqual([best.channelIds, best.totalS]);
    expect(option!.apart).toEqual(best.cautions.find(({ code }) => code === 'ends-apart') ?? null);
    expect([alreadyWithin, reason]).toEqual([false, null]);
  });

  test('of two groups that end 8 mV apart, inside ±5 mV each, says so in the words of the whole plan', () => {
    const base = planInput({ channels: [channel('a', { maxAmps: 10 })], samples: 16 });
    const [volts] = base.spare.groupVolts;
    const input = { ...base, spare: { ...base.spare, groupVolts: [volts!, volts! + 0.016] } };
    const { option } = soonestTerminals(input);
    const best = soonestOfPlan(input);
    expect([option!.channelIds, option!.totalS]).toEqual([best.channelIds, best.totalS]);
    expect(option!.apart?.text).toMatch(/^Ends 8.mV apart, just inside ±5.mV\.$/);
    expect(option!.apart).toEqual(best.cautions.find(({ code }) => code === 'ends-apart'));
  });

  test('is none where the spare rests at the target, is swollen, or no channel is there, each with its word', () => {
    const input = planInput();
    const volts = input.spare.groupVolts.map(() => input.target.volts);
    expect(soonestTerminals({ ...input, spare: { ...input.spare, groupVolts: volts } })).toMatchObject({
      option: null,
      alreadyWithin: true,
    });
    const swollen = soonestTerminals({ ...input, spare: { ...input.spare, condition: 'swollen' } });
    expect([swollen.option, swollen.refusals[0]!.code]).toEqual([null, 'condition']);
    expect(soonestTerminals({ ...input, channels: [] }).reason).toBe(
      'No channel is in use here. Add a charger with its channels first.',
    );
  });
});
