import { describe, expect, it } from 'vitest';
import { CalcInputError, chemistryParameters, planCharge, runMinutes, socAtVolts } from '@/calc/index';
import { channel, lmoModule, lmoSpare, planInput, target } from './plan-fixtures';

/** U = 3 + s. */
const line = { soc: [0, 1], volts: [3, 4] };

describe('minutes of current between two states of charge', () => {
  const string = { curve: line, capacityAh: 50, groupOhm: 0.002 };

  it('at constant current are Q·Δs/I: 50 Ah · 0.4 at 20 A are 60 min, up and down', () => {
    const minutes = runMinutes({
      ...string,
      charge: { amps: 20, capVolts: 4.2 },
      discharge: { amps: 20, floorVolts: 2.8 },
    });
    expect(minutes(0.3, 0.7)).toBeCloseTo(60, 9);
    expect(minutes(0.7, 0.3)).toBeCloseTo(60, 9);
    expect(minutes(0.5, 0.5)).toBe(0);
  });

  it('at the cap of a straight curve are QR·ln((V − U₀)/(V − U₁)), to 0.1 %', () => {
    // From 3.8 V on 1000 A would flow, so the cap of 4 V decides all the way: 50 · 0.002 h · ln(0.2/0.05) = 8.3178 min.
    const minutes = runMinutes({ ...string, charge: { amps: 1000, capVolts: 4 }, discharge: null });
    expect(minutes(0.8, 0.95)! / (60 * 0.1 * Math.log(4))).toBeCloseTo(1, 3);
  });

  it('are none where the channel cannot: down without a load, or up to the cap itself', () => {
    const minutes = runMinutes({ ...string, charge: { amps: 20, capVolts: 3.9 }, discharge: null });
    expect(minutes(0.7, 0.3)).toBeNull();
    expect(minutes(0.3, 0.9)).toBeNull();
    expect(minutes(0.3, 0.8)).toBeCloseTo(75, 6);
    expect(() => runMinutes({ ...string, charge: { amps: 0, capVolts: 4 }, discharge: null })).toThrow(CalcInputError);
  });

  it.each([
    [10, 3.75, 3.92],
    [30, 3.75, 3.92],
    [30, 3.6, 4.1],
  ])('at %d A from %d to %d V are within 3 %% of the planner, which steps through the charge', (amps, from, to) => {
    const input = planInput({
      channels: [channel('A1', { maxAmps: amps })],
      spare: { ...lmoSpare, groupVolts: [from, from] },
      target: { ...target, volts: to },
    });
    const option = planCharge(input).options.find(
      ({ way, finish }) => way === 'terminals' && finish === 'over-and-settle',
    )!;
    const { curve } = chemistryParameters('lmo-blend');
    const minutes = runMinutes({
      ...{ curve, capacityAh: 66, groupOhm: lmoModule.resistanceOhm!, discharge: null },
      charge: { amps, capVolts: lmoModule.chargeLimitVolts },
    })(socAtVolts(curve, from), socAtVolts(curve, to))!;
    const planned = (option.currentEndS - option.currentStartS) / 60;
    expect(planned).toBeGreaterThan(30);
    expect(minutes / planned).toBeGreaterThan(0.97);
    expect(minutes / planned).toBeLessThan(1.03);
  });
});
