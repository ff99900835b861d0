import { describe, expect, it } from 'vitest';
import { chemistryParameters, planCharge, reckonCharge, socAtVolts, voltsAtSoc } from '@/calc/index';
import { reckonInput } from './live-fixtures';
import { channel, planInput } from './plan-fixtures';

const input = planInput({ channels: [channel('A1')] });
const { options } = planCharge(input);
const over = options.find((one) => one.id === 'terminals/over-and-settle/id-A1')!;
const mark = options.find((one) => one.id === 'terminals/on-the-mark/id-A1')!;
const { curve } = chemistryParameters('lmo-blend');
/** 66 Ah from 3.75 to 3.92 V at 10 A: ampere-hours by the curve, and their seconds. */
const NEEDED_AH = 66 * (socAtVolts(curve, 3.92) - socAtVolts(curve, 3.75));
const NOMINAL_S = 360 * NEEDED_AH;

describe('a charger that was switched off later than reckoned', () => {
  it('over and settle has charged on: 12 min late at 10 A are 2.0 Ah more, and the rest counts from then', () => {
    const offAt = NOMINAL_S + 720;
    const now = reckonCharge(reckonInput(input, over, { nowS: offAt + 600, currentOffAtS: offAt }));
    expect(now.stage).toBe('resting');
    expect(now.currentEndS).toBeCloseTo(offAt, 6);
    expect(now.deliveredAh).toBeCloseTo(NEEDED_AH + 2, 2);
    expect(now.restEndS - now.currentEndS).toBeGreaterThanOrEqual(3600);
    // 2 Ah of 66 past the target's own state of charge.
    const settled = voltsAtSoc(curve, socAtVolts(curve, 3.92) + 2 / 66);
    const rested = reckonCharge(reckonInput(input, over, { nowS: offAt + 7200, currentOffAtS: offAt }));
    for (const group of rested.groups) expect(Math.abs(group.restVolts - settled)).toBeLessThan(5e-4);
  });

  it('on the mark has only trickled: an hour late is less than 1 Ah, and no group is past the target', () => {
    const end = mark.currentEndS - mark.currentStartS;
    const offAt = end + 3600;
    const now = reckonCharge(reckonInput(input, mark, { nowS: offAt + 600, currentOffAtS: offAt }));
    expect(now.currentEndS).toBeCloseTo(offAt, 6);
    expect(now.deliveredAh - mark.ampHours).toBeGreaterThan(0);
    expect(now.deliveredAh - mark.ampHours).toBeLessThan(1);
    for (const group of now.groups) expect(group.restVolts).toBeLessThan(3.92 + 1e-4);
  });

  it('a zero that was read before stands against it: nothing flowed from then on', () => {
    const offAt = NOMINAL_S + 720;
    const readings = [{ s: NOMINAL_S + 60, terminalVolts: null, amps: 0, celsius: null, groupVolts: null }];
    const now = reckonCharge(reckonInput(input, over, { nowS: offAt + 600, currentOffAtS: offAt, readings }));
    expect(now.deliveredAh).toBeCloseTo(NEEDED_AH, 2);
  });
});
