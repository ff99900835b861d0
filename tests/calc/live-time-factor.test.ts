import { describe, expect, it } from 'vitest';
import { planCharge, reckonCharge } from '@/calc/index';
import type { LiveReading } from '@/calc/live-types';
import type { PlanOption, TimeFactor } from '@/calc/plan-types';
import { reckonInput } from './live-fixtures';
import { channel, planInput } from './plan-fixtures';

const charge = (timeFactor: TimeFactor | null, finish: PlanOption['finish'] = 'over-and-settle') => {
  const input = planInput({ channels: [channel('A1', { timeFactor })], samples: 256 });
  const option = planCharge(input).options.find((one) => one.way === 'terminals' && one.finish === finish)!;
  return { input, option };
};
const plain = charge(null);
const longer = charge({ mean: 1.2, sd: 0.06, charges: 14 });
const amps = (untilS: number): LiveReading[] =>
  Array.from({ length: Math.floor(untilS / 600) }, (_, at) => ({
    s: (at + 1) * 600,
    amps: 10,
    terminalVolts: null,
    celsius: null,
    groupVolts: null,
  }));
const at = ({ input, option }: typeof plain, nowS: number, readings: LiveReading[]) =>
  reckonCharge(reckonInput(input, option, { nowS, readings }));

describe('a running charge whose like have taken 20 % longer', () => {
  it('without readings is 20 % longer from its first current to its last, wherever it stands', () => {
    const end = at(plain, 0, []).currentEndS;
    for (const share of [0, 0.3, 0.6, 0.95])
      expect(at(longer, 1.2 * share * end, []).currentEndS / end).toBeCloseTo(1.2, 2);
  });

  it('without readings has at its end the ampere-hours of the plan, and not a fifth more', () => {
    const { currentEndS } = at(longer, 0, []);
    expect(at(longer, currentEndS, []).deliveredAh).toBeCloseTo(longer.option.ampHours, 1);
  });

  it('with readings has the ampere-hours that were read, and 20 % more of what is still to come alone', () => {
    for (const nowS of [1800, 3600, 5400]) {
      const [one, other] = [plain, longer].map((of) => at(of, nowS, amps(nowS)));
      expect(other!.deliveredAh).toBeCloseTo(one!.deliveredAh, 9);
      expect(Math.abs((other!.currentEndS - nowS) / (one!.currentEndS - nowS) / 1.2 - 1)).toBeLessThan(0.01);
    }
  });

  it('has the band of the plan at its clip-on, to a second, and a narrower one of what is left', () => {
    for (const finish of ['over-and-settle', 'on-the-mark'] as const) {
      const one = charge({ mean: 1.2, sd: 0.12, charges: 30 }, finish);
      const { readyS } = at(one, 0, []);
      const { totalS, currentStartS } = one.option;
      expect(Math.abs(readyS.p10 - totalS.p10 + currentStartS)).toBeLessThan(1);
      expect(Math.abs(readyS.p90 - totalS.p90 + currentStartS)).toBeLessThan(1);
      const nowS = 0.8 * (one.option.currentEndS - currentStartS);
      const later = at(one, nowS, amps(nowS)).readyS;
      expect(later.p90 - later.p10).toBeLessThan(readyS.p90 - readyS.p10);
    }
  });
});
