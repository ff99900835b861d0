import { describe, expect, it } from 'vitest';
import {
  CHEMISTRIES,
  planCharge,
  socAtVolts,
  voltsAtSoc,
  type ChannelParameters,
  type PlanInput,
  type PlanOption,
  type Spreads,
} from '@/calc/index';
import { LMO_BLEND } from './reference/curves';
import { channel, lmoModule, lmoSpare, planInput, target } from './plan-fixtures';

const nothing: Spreads = {
  capacityRelative: 0,
  resistanceRelative: 0,
  currentRelative: 0.01,
  meterVolts: 0,
  readingVolts: 0,
  targetVolts: 0,
  chargerVolts: 0,
  curveVolts: 0,
  hysteresisVolts: 0,
  temperatureCelsius: 0,
  selfDischargeRelative: 0,
};
const option = (over: Partial<PlanInput>, finish: PlanOption['finish'] = 'over-and-settle'): PlanOption =>
  planCharge(planInput(over)).options.find((one) => one.way === 'terminals' && one.finish === finish)!;
const withChannel = (over: Partial<ChannelParameters>): Partial<PlanInput> => ({ channels: [channel('A1', over)] });
const bulkS = (one: PlanOption): number => one.steps[0]!.stopS - one.steps[0]!.startS;
const currentBand = (one: PlanOption): number => one.totalS.p90 - one.totalS.p10;

describe('a charger with a coarse display', () => {
  it('is set to the next lower 0.1 A that its display shows', () => {
    expect(option(withChannel({ maxAmps: 9.97, displayStepAmps: 0.1 })).steps[0]!.setAmps).toBe(9.9);
    expect(option(withChannel({ maxAmps: 9.97 })).steps[0]!.setAmps).toBe(9.97);
  });

  it('at 2 A is off by 1 % and a tenth of an ampere evenly: 1.76 times the band of the 1 % alone', () => {
    const band = (over: Partial<ChannelParameters>) =>
      currentBand(option({ ...withChannel({ maxAmps: 2, ...over }), spreads: nothing, samples: 512 }));
    const expected = Math.hypot(0.01, 0.1 / 2 / Math.sqrt(12)) / 0.01;
    expect(expected).toBeCloseTo(1.756, 2);
    expect(Math.abs(band({ displayStepAmps: 0.1 }) / band({}) / expected - 1)).toBeLessThan(0.02);
  });
});

describe('a charger in the heat', () => {
  const derating = { aboveCelsius: 30, ampsShare: 0.7 };

  it('gives 7 of its 10 A above 30 °C in the room, and all of them below', () => {
    const warm = option({ ...withChannel({ derating }), celsius: 33 });
    const cool = option({ ...withChannel({ derating }), celsius: 28 });
    expect(warm.steps[0]!.setAmps).toBe(7);
    expect(cool.steps[0]!.setAmps).toBe(10);
    expect(bulkS(warm) / bulkS(cool)).toBeCloseTo(1 / 0.7, 3);
  });

  it('that pauses a fifth of the time takes a quarter longer at the amps it is set to, for the same ampere-hours', () => {
    const pausing = option(withChannel({ duty: 0.8 }));
    const steady = option({});
    expect(pausing.steps[0]!.setAmps).toBe(steady.steps[0]!.setAmps);
    expect(pausing.ampHours).toBeCloseTo(steady.ampHours, 6);
    expect(bulkS(pausing) / bulkS(steady)).toBeCloseTo(1.25, 3);
  });
});

describe('a module in the cold or the heat', () => {
  // JEITA settings of charger chips: 20 % of the current from 0 to 10 °C, 40 % above 45 °C.
  const module = { ...lmoModule, coldCurrentShare: 0.2, warmCurrentShare: 0.4, maxChargeCelsius: 60 };
  const amps = (celsius: number, over = {}) =>
    option({ module: { ...module, ...over }, spare: { ...lmoSpare, celsius }, ...withChannel({ maxAmps: 30 }) })
      .steps[0]!.setAmps;

  it('takes a fifth of its 33 A from 0 to 10 °C and two fifths above 45 °C, all of what the charger has between', () => {
    [0, 9.9, 10, 25, 45, 46, 60].forEach((celsius, at) =>
      expect(amps(celsius)).toBeCloseTo([6.6, 6.6, 30, 30, 30, 13.2, 13.2][at]!, 9),
    );
  });

  it('whose type says nothing of it is charged as before', () => {
    expect(amps(5, { coldCurrentShare: null })).toBe(30);
  });
});

describe('a group below its pre-charge volts', () => {
  const { curve } = CHEMISTRIES.nmc;
  const module = { ...lmoModule, chemistry: 'nmc' as const, prechargeBelowVolts: 3, dischargeLimitVolts: 2.8 };
  const low = { ...lmoSpare, groupVolts: [2.85, 2.95] };
  const over = { module, spare: low, target: { ...target, volts: 3.7 } };

  it('is brought up to it at C/10 as a step of its own, and then charged with all amps', () => {
    const [pre, bulk] = option(over).steps;
    expect(pre!.precharge).toBe(true);
    expect(pre!.setAmps).toBeCloseTo(6.6, 9);
    expect(pre!.restVoltsAfter[0]).toBeCloseTo(3, 4);
    expect(pre!.ampHours).toBeCloseTo(66 * (socAtVolts(curve, 3) - socAtVolts(curve, 2.85)), 3);
    expect(pre!.stopS - pre!.startS).toBeCloseTo((3600 * pre!.ampHours) / 6.6, 0);
    expect(bulk!.precharge).toBeUndefined();
    expect(bulk!.setAmps).toBe(10);
    expect(bulk!.startS).toBeGreaterThan(pre!.stopS);
  });

  it('takes the same ampere-hours in all, and ends where a charge without the step ends', () => {
    const plain = option({ ...over, module: { ...module, prechargeBelowVolts: null } });
    const stepped = option(over);
    expect(stepped.ampHours).toBeCloseTo(plain.ampHours, 3);
    stepped.endGroupVolts.forEach((volts, group) => expect(volts).toBeCloseTo(plain.endGroupVolts[group]!, 5));
    expect(stepped.totalS.p50).toBeGreaterThan(plain.totalS.p50);
  });

  it('by itself is charged at no more than C/10, and a group above it at all amps', () => {
    const plan = planCharge(planInput({ ...over, spare: { ...low, groupVolts: [2.85, 3.4] } }));
    const alone = plan.options.find((one) => one.way === 'group-by-group')!;
    const amps = new Map(alone.steps.map((step) => [step.groupIndexes[0], step.setAmps]));
    expect(amps.get(0)).toBeCloseTo(6.6, 9);
    expect(amps.get(1)).toBe(10);
  });

  it('is no step where all groups are above', () => {
    const steps = option({ ...over, spare: { ...low, groupVolts: [3.2, 3.2] } }).steps;
    expect(steps.some((step) => step.precharge)).toBe(false);
    expect(voltsAtSoc(curve, socAtVolts(curve, 3.2))).toBeCloseTo(3.2, 9);
  });
});

describe('leads of a supply that senses its own terminals', () => {
  const leads = (ohm: number, over: Partial<ChannelParameters> = {}): Partial<PlanInput> => ({
    module: { ...lmoModule, curve: LMO_BLEND },
    target: { ...target, toleranceVolts: 0.006 },
    ...withChannel({ senses: 'own-terminals', leadResistanceOhm: ohm, ...over }),
  });

  // Worked figures of an independent model, order of magnitude: 66 Ah 2s at 10 A, set to the target, to 2 mV a cell.
  it.each([
    [0, 3.2],
    [0.005, 4.4],
    [0.01, 5.9],
    [0.02, 9.3],
  ])('of %d Ω make a charge on the mark %d h long, to 25 %', (ohm, hours) => {
    expect(Math.abs(bulkS(option(leads(ohm), 'on-the-mark')) / 3600 / hours - 1)).toBeLessThan(0.25);
  });

  it('that nobody measured are 10 mΩ with a band over twice as wide on the mark, and a caution to measure them', () => {
    const known = option(leads(0.01), 'on-the-mark');
    const guessed = option(leads(0, { leadsMeasured: false }), 'on-the-mark');
    expect(bulkS(guessed)).toBeCloseTo(bulkS(known), 6);
    expect(currentBand(guessed)).toBeGreaterThan(2 * currentBand(known));
    expect(guessed.cautions.find((one) => one.code === 'thin-leads')!.text).toContain('Measure them');
  });

  it('matter little over and settle, measured or not: the band grows by less than a quarter', () => {
    const known = option(leads(0.01));
    const guessed = option(leads(0.01, { leadsMeasured: false }));
    expect(currentBand(guessed) / currentBand(known)).toBeLessThan(1.25);
  });

  it('measured, or not told of, are as before to the last digit', () => {
    const before = option(leads(0.01), 'on-the-mark');
    expect(option(leads(0.01, { leadsMeasured: true }), 'on-the-mark')).toEqual(before);
  });
});
