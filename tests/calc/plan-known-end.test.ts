import { describe, expect, it } from 'vitest';
import {
  CHEMISTRIES,
  planCharge,
  reckonCharge,
  voltsAtSoc,
  type ModuleParameters,
  type PlanOption,
  type PlanInput,
  type TargetState,
} from '@/calc/index';
import { plannedRuns, reckonInput } from './live-fixtures';
import { channel, lmoModule, lmoSpare, planInput, target } from './plan-fixtures';

const lfp: ModuleParameters = {
  ...lmoModule,
  chemistry: 'lfp',
  groupsInSeries: 4,
  ratedAh: 100,
  chargeLimitVolts: 3.6,
  dischargeLimitVolts: 2.5,
  floorVolts: 2,
  maxChargeAmps: 50,
  maxDischargeAmps: 50,
  resistanceOhm: 0.001,
};
const spare = { ...lmoSpare, groupVolts: [3.3, 3.3, 3.3, 3.3], capacityAh: 100 };
const bySoc = (soc: number): TargetState => ({ ...target, volts: 0, soc });
const both = channel('A1', { maxAmps: 20, canDischarge: true, dischargeAmps: 25 });
const input = (over: Partial<PlanInput> = {}): PlanInput =>
  planInput({ module: lfp, spare, target: bySoc(0.6), channels: [both], ...over });
const fromFull = (over: Partial<PlanInput> = {}): PlanOption =>
  planCharge(input(over)).options.find((one) => one.knownEnd === 'full')!;

describe('a target in state of charge on the plateau', () => {
  it('goes to full first and then takes the 40 Ah of 100 out by count, at 25 A in 96 min', () => {
    const option = fromFull();
    expect(option.id).toBe('terminals/over-and-settle/id-A1/from-full');
    const [toFull, count] = option.steps;
    expect(toFull!.direction).toBe('charge');
    // Full of LFP by its limit: 3.60 V a group, and the current down to C/20.
    expect(toFull!.setVolts! / 4).toBeGreaterThan(3.585);
    expect(toFull!.setVolts! / 4).toBeLessThanOrEqual(3.6);
    expect(toFull!.endAmps).toBeCloseTo(5, 1);
    expect(count!.direction).toBe('discharge');
    expect(Math.abs(count!.ampHours - 40)).toBeLessThan(0.5);
    expect(Math.abs(count!.stopS - count!.startS - (3600 * count!.ampHours) / 25)).toBeLessThan(1);
    option.endGroupVolts.forEach((volts) => expect(volts).toBeCloseTo(voltsAtSoc(CHEMISTRIES.lfp.curve, 0.6), 4));
  });

  it('with a group below its pre-charge volts goes to full at C/10, 10 A of 20', () => {
    const module = { ...lfp, prechargeBelowVolts: 3 };
    const from = (volts: number) => fromFull({ module, spare: { ...spare, groupVolts: [3.3, 3.3, volts, 3.3] } });
    expect(from(2.9).steps[0]!.setAmps).toBeCloseTo(10, 9);
    expect(from(3.1).steps[0]!.setAmps).toBe(20);
  });

  it('goes to empty first, soonest for a low one, and counts some 31 Ah in', () => {
    const low = { ...spare, groupVolts: [3.1, 3.1, 3.1, 3.1] };
    const [option] = planCharge(input({ target: bySoc(0.32), spare: low })).options;
    expect(option!.knownEnd).toBe('empty');
    const [toEmpty, count] = option!.steps;
    expect(toEmpty!.direction).toBe('discharge');
    expect(count!.direction).toBe('charge');
    const from = 0.32 - count!.ampHours / 100;
    // 2.5 V and a little rests within the first per cent of the measured curve.
    expect(from).toBeGreaterThanOrEqual(-0.01);
    expect(from).toBeLessThan(0.02);
  });

  it('ends where the doubt of the capacity lets it: 3 % of it and 1 % of current on 40 Ah are ±1.6 % of charge from 10 to 90 %', () => {
    const option = fromFull({ samples: 256 });
    const { p10, p50, p90 } = option.endSoc!;
    expect(p50).toBeCloseTo(0.6, 2);
    expect(Math.abs((p90 - p10) / (2 * 1.2816 * Math.hypot(0.03, 0.01) * 0.4) - 1)).toBeLessThan(0.08);
  });

  it('is over five times nearer than a voltage target of the same place: its end against what the voltage allows', () => {
    const counted = fromFull({ samples: 256 }).endSoc!;
    const volts = { ...target, volts: voltsAtSoc(CHEMISTRIES.lfp.curve, 0.6) };
    const [refusal] = planCharge(input({ samples: 256, target: volts, acceptWideBand: false })).refusals;
    const { soc } = refusal!.plateau!;
    expect(soc.p90 - soc.p10).toBeGreaterThan(5 * (counted.p90 - counted.p10));
  });

  it('group by group fills and counts each, and says that through the terminals the first one ends it', () => {
    const plan = planCharge(
      input({ channels: [channel('C1', { ...both, channelId: 'c1', name: 'C1', singleGroup: true, maxVolts: 5 })] }),
    );
    const option = plan.options.find((one) => one.knownEnd === 'full')!;
    expect(option.way).toBe('group-by-group');
    expect(option.steps.map((step) => step.direction)).toEqual(Array(4).fill(['charge', 'discharge']).flat());
    const terminals = fromFull();
    expect(terminals.cautions.map((one) => one.code)).toContain('ends-apart');
  });

  it('is not possible without a channel that discharges, and the reason says so; voltages only where accepted', () => {
    const plan = planCharge(input({ channels: [channel('A1')] }));
    expect(plan.options).toEqual([]);
    expect(plan.ruledOut.map((one) => one.reason).join(' ')).toMatch(/cannot discharge/);
    const wide = planCharge(input({ channels: [channel('A1')], acceptWideBand: true, target: bySoc(0.8) }));
    expect(wide.options.some((one) => one.knownEnd === undefined)).toBe(true);
  });

  it('to full itself is one step, and on a steep curve a state of charge is simply its voltage', () => {
    const nmc = { ...lmoModule, chemistry: 'nmc' as const };
    const volts = voltsAtSoc(CHEMISTRIES.nmc.curve, 0.6);
    const by = (over: Partial<TargetState>) =>
      planCharge(
        planInput({ module: nmc, spare: { ...lmoSpare, groupVolts: [3.6, 3.6] }, target: { ...target, ...over } }),
      ).options[0]!;
    expect(by({ volts: 0, soc: 0.6 }).knownEnd).toBeUndefined();
    expect(by({ volts: 0, soc: 0.6 }).ampHours).toBeCloseTo(by({ volts }).ampHours, 6);
  });

  it('is reckoned while it runs: after the swap 10 Ah out of full leave 90 % of charge', () => {
    const plan = input();
    const option = fromFull();
    const first = option.steps[1]!.startS - option.currentStartS;
    const now = reckonCharge(
      reckonInput(plan, option, { nowS: first + (3600 * 10) / 25, runs: plannedRuns(option, first + 1440) }),
    );
    expect(now.stepIndex).toBe(1);
    expect(now.groups[0]!.soc).toBeGreaterThan(0.885);
    expect(now.groups[0]!.soc).toBeLessThan(0.905);
  });

  it('per cent in place of a share are told apart, and what is neither is refused', () => {
    expect(planCharge(input({ target: bySoc(60) })).refusals[0]!.text).toContain('As a share it is 0.6');
    expect(planCharge(input({ target: bySoc(-0.1) })).refusals[0]!.text).toContain('cannot be');
  });
});

describe('a bare voltage target on the plateau', () => {
  const volts = { ...target, volts: 3.34 };

  it('is refused with its band where nobody accepts that, and offered where somebody does', () => {
    const refused = planCharge(input({ target: volts, acceptWideBand: false }));
    expect(refused.options).toEqual([]);
    const [refusal] = refused.refusals;
    expect(refusal!.plateau!.totalS.p90).toBeGreaterThan(refusal!.plateau!.totalS.p10);
    expect(refusal!.text).toContain('accept this band');
    const accepted = planCharge(input({ target: volts, acceptWideBand: true }));
    expect(accepted.options[0]!.totalS).toEqual(refusal!.plateau!.totalS);
    expect(JSON.stringify(planCharge(input({ target: volts })).options)).toBe(JSON.stringify(accepted.options));
  });

  it('above the plateau, or on a steep curve, is not: nobody is asked', () => {
    expect(planCharge(planInput({ acceptWideBand: false })).refusals).toEqual([]);
    const high = planCharge(input({ target: { ...target, volts: 3.45 }, acceptWideBand: false }));
    expect(high.refusals).toEqual([]);
    expect(high.options.length).toBeGreaterThan(0);
  });
});
