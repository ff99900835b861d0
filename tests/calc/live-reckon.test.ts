import { describe, expect, it } from 'vitest';
import {
  chemistryParameters,
  planCharge,
  reckonCharge,
  socAtVolts,
  voltsAtSoc,
  type PlanOption,
  type Reckoning,
} from '@/calc/index';
import type { LiveReading, ReckonInput } from '@/calc/live-types';
import { plannedRuns, reckonInput } from './live-fixtures';
import { channel, lmoSpare, planInput, sixChannels, workshop } from './plan-fixtures';

const input = planInput({ channels: [channel('A1')] });
const plan = planCharge(input);
const over = plan.options.find((one) => one.id === 'terminals/over-and-settle/id-A1')!;
const mark = plan.options.find((one) => one.id === 'terminals/on-the-mark/id-A1')!;
/** 66 Ah from 3.75 to 3.92 V: what the curve says, and at 10 A its seconds. */
const { curve } = chemistryParameters('lmo-blend');
const NEEDED_AH = 66 * (socAtVolts(curve, 3.92) - socAtVolts(curve, 3.75));
const NOMINAL_S = 360 * NEEDED_AH;

const at = (s: number, more: Partial<LiveReading> = {}): LiveReading => ({
  s,
  terminalVolts: null,
  amps: null,
  celsius: null,
  groupVolts: null,
  ...more,
});
const reckon = (option: PlanOption, more: Partial<ReckonInput>): Reckoning =>
  reckonCharge(reckonInput(input, option, more));
/** Instants of a nominal run are the likely ones stretched to the middle of the band; this is what that may move. */
const near = (actual: number, expected: number, within: number): void =>
  expect(Math.abs(actual - expected), `${actual} against ${expected}`).toBeLessThanOrEqual(within);

describe('a running charge and its readings', () => {
  it('at half the current all along has half the charge in, and its current ends at the ampere-hours over 5 A', () => {
    const readings = [600, 1800, 3600].map((s) => at(s, { amps: 5 }));
    const now = reckon(over, { nowS: 3600, readings });
    expect(now.deliveredAh).toBeCloseTo(5, 9);
    near(now.currentEndS, 720 * NEEDED_AH, 0.015 * 720 * NEEDED_AH);
    expect(now.amps).toBeCloseTo(5, 6);
    const { samples: _, ...rest } = reckonInput(input, over, { nowS: 3600, readings });
    // One sample alone: the nominal run to a second.
    expect(Math.abs(reckonCharge({ ...rest, samples: 1 }).currentEndS - 720 * NEEDED_AH)).toBeLessThan(1);
  });

  it('counts the trapezium between two readings, holds the first one back to the clip-on and the last one on to now', () => {
    const readings = [at(1200, { amps: 10 }), at(2400, { amps: 6 })];
    const now = reckon(over, { nowS: 3000, readings });
    // 10 A for 20 min, 8 A in the mean for 20 min, 6 A for 10 min.
    expect(now.deliveredAh).toBeCloseTo(10 / 3 + 8 / 3 + 1, 9);
    const { groups } = now;
    near(groups[0]!.soc, socAtVolts(curve, 3.75) + (10 / 3 + 8 / 3 + 1) / 66, 1e-9);
  });

  it('corrects everything after a corrected reading: the same readings typed anew give the same digits', () => {
    const wrong = reckon(over, { nowS: 3000, readings: [at(1200, { amps: 1 }), at(2400, { amps: 10 })] });
    const right = reckon(over, { nowS: 3000, readings: [at(1200, { amps: 10 }), at(2400, { amps: 10 })] });
    expect(wrong.deliveredAh).toBeLessThan(right.deliveredAh);
    const again = reckon(over, { nowS: 3000, readings: [at(1200, { amps: 10 }), at(2400, { amps: 10 })] });
    expect(JSON.stringify(again)).toBe(JSON.stringify(right));
  });

  it('held for half an hour is ready half an hour later, to a second in constant current, and relaxes meanwhile', () => {
    const runs = [
      { fromS: 0, toS: 2000 },
      { fromS: 3800, toS: null },
    ];
    const free = reckon(over, { nowS: 4500 - 1800 });
    const held = reckon(over, { nowS: 4500, runs });
    near(held.currentEndS - free.currentEndS, 1800, 1);
    near(held.readyS.p10 - free.readyS.p10, 1800, 1);
    expect(held.deliveredAh).toBeCloseTo(free.deliveredAh, 6);
    const atResume = reckon(over, { nowS: 3800, runs: [{ fromS: 0, toS: 2000 }] });
    // 1800 s are six time constants.
    expect(atResume.groups[0]!.polarisationVolts).toBeLessThan(
      0.01 * reckon(over, { nowS: 2000 }).groups[0]!.polarisationVolts,
    );
    expect(held.segments.map((one) => one.kind)).toEqual(['cc', 'cc', 'rest', 'check']);
  });

  it('that is held moves on with the clock: ten minutes later ready ten minutes later', () => {
    const runs = [{ fromS: 0, toS: 2000 }];
    const one = reckon(over, { nowS: 2600, runs });
    const later = reckon(over, { nowS: 3200, runs });
    near(later.readyS.p50 - one.readyS.p50, 600, 1);
    expect(one.amps).toBe(0);
    expect(one.stage).toBe('charging');
  });

  it('with no current while some is due counts half the way to that reading and then nothing, and moves with the clock', () => {
    const readings = [at(1000, { amps: 10 }), at(1600, { amps: 0 })];
    const now = reckon(over, { nowS: 2200, readings });
    expect(now.deliveredAh).toBeCloseTo(10 / 3.6 + 5 / 6, 9);
    expect(now.amps).toBe(0);
    const later = reckon(over, { nowS: 2800, readings });
    near(later.readyS.p50 - now.readyS.p50, 600, 1);
    near(now.currentEndS - 2200, 360 * (NEEDED_AH - now.deliveredAh), 0.02 * NOMINAL_S);
    const again = reckon(over, { nowS: 2800, readings: [...readings, at(2500, { amps: 10 })] });
    expect(again.amps).toBeCloseTo(10, 6);
    expect(again.deliveredAh).toBeCloseTo(now.deliveredAh + (5 * 900) / 3600 + (10 * 300) / 3600, 9);
  });

  it('goes from charging to resting to check due by the numbers alone', () => {
    const stage = (option: PlanOption, nowS: number) => reckon(option, { nowS }).stage;
    const end = over.currentEndS - over.currentStartS;
    expect(stage(over, end - 1)).toBe('charging');
    expect(stage(over, end + 1)).toBe('resting');
    expect(stage(over, end + 3599)).toBe('resting');
    expect(stage(over, end + 3601)).toBe('check-due');
    const markEnd = mark.currentEndS - mark.currentStartS;
    const taper = mark.steps[0]!.voltageLimitAtS! - mark.currentStartS;
    expect(stage(mark, taper - 5)).toBe('charging');
    expect(stage(mark, taper + 5)).toBe('tapering');
    expect(stage(mark, markEnd + 5)).toBe('resting');
  });

  it('is over when a person says so, with what is in by then, whatever the plan', () => {
    const now = reckon(over, { nowS: 4000, currentOffAtS: 3600 });
    expect(now.stage).toBe('resting');
    expect(now.deliveredAh).toBeCloseTo(10, 6);
    expect(now.plannedAh).toBeCloseTo(NEEDED_AH, 3);
    expect(now.currentEndS).toBe(3600);
    expect(now.restEndS).toBe(7200);
    expect(now.readyS.p10).toBe(now.readyS.p90);
    expect(now.readyS.p50).toBe(7200 + workshop.checkS);
  });

  it('believes a current that is read after its reckoned end: it charges on, and more than planned goes in', () => {
    const readings = [at(1000, { amps: 10 }), at(NOMINAL_S + 900, { amps: 10 })];
    const now = reckon(over, { nowS: NOMINAL_S + 1200, readings });
    expect(now.stage).toBe('charging');
    expect(now.amps).toBeGreaterThan(9);
    expect(now.deliveredAh).toBeCloseTo(NEEDED_AH + 1200 / 360, 2);
    expect(now.currentEndS).toBe(NOMINAL_S + 1200);
    const off = reckon(over, { nowS: NOMINAL_S + 1500, readings: [...readings, at(NOMINAL_S + 1300, { amps: 0 })] });
    expect(off.stage).toBe('resting');
  });

  it('takes a zero after the reckoned end for the end, and not for a fault', () => {
    const now = reckon(over, {
      nowS: NOMINAL_S + 700,
      readings: [at(3000, { amps: 10 }), at(NOMINAL_S + 600, { amps: 0 })],
    });
    expect(now.stage).toBe('resting');
    expect(now.deliveredAh).toBeCloseTo(NEEDED_AH, 4);
    near(now.currentEndS, NOMINAL_S, 1);
  });

  it('in a taper begins with the amps that were read, and then its band is narrower than without', () => {
    const from = mark.steps[0]!.voltageLimitAtS! - mark.currentStartS;
    const nowS = from + 1500;
    const without = reckon(mark, { nowS });
    const read = reckon(mark, { nowS, readings: [at(nowS - 60, { amps: -without.amps * -0.9 })] });
    near(read.amps, without.amps * 0.9, 0.08 * without.amps);
    expect(read.stage).toBe('tapering');
    expect(read.readyS.p90 - read.readyS.p10).toBeLessThan(0.8 * (without.readyS.p90 - without.readyS.p10));
    // Fewer amps at the same charge: a charger a little low, which ends sooner at its end current.
    expect(read.currentEndS).toBeLessThan(without.currentEndS + 60);
  });

  it('narrows with volts as the charge goes in, at 10, 50 and 90 % of it, and by ampere-hours alone hardly', () => {
    const width = (share: number, withVolts: boolean): number => {
      const times = Array.from({ length: 9 }, (_, k) => ((k + 1) / 9) * share * NOMINAL_S);
      const readings = times.map((s) => {
        // 10 A for so long, and over the long resistance of 2 mohm, 1/2.7 of it at once and the rest with 300 s, 20 mV a group.
        const rest = voltsAtSoc(curve, socAtVolts(curve, 3.75) + s / 360 / 66);
        const overVolts = 0.02 * (1 - (1 - 1 / 2.7) * Math.exp(-s / 300));
        return at(s, { amps: 10, terminalVolts: withVolts ? 2 * (rest + overVolts) : null });
      });
      const { readyS } = reckon(over, { nowS: share * NOMINAL_S, readings });
      return readyS.p90 - readyS.p10;
    };
    const [early, half, late] = [0.1, 0.5, 0.9].map((share) => width(share, true));
    expect(half!).toBeLessThan(0.95 * early!);
    expect(late!).toBeLessThan(0.9 * early!);
    // The capacity is as unknown as before: what has gone in does not say how much still has to.
    expect(width(0.5, false)).toBeGreaterThan(0.85 * width(0.1, false));
  });

  it('sets what the plan expects beside the last reading: volts between the clips, amps, degrees at that instant', () => {
    const reading = at(3600, { amps: 9.2, terminalVolts: 7.7, celsius: 24 });
    const { expected } = reckon(over, { nowS: 4000, readings: [reading] });
    expect(expected!.s).toBe(3600);
    expect(expected!.amps).toBeCloseTo(10, 6);
    expect(expected!.celsius).toBe(25);
    // Rest voltage after 10 Ah and 20 mV a group over the long resistance: the trace of the plan has it too.
    const planned = over.trace.findLast((point) => point.s <= 3600 + over.currentStartS)!;
    near(expected!.terminalVolts / 2, planned.clipVolts, 0.003);
    expect(reckon(over, { nowS: 4000 }).expected).toBeNull();
  });

  it('takes group voltages of the rest for what they are once it has nearly settled, and ends the rest when two agree', () => {
    const end = NOMINAL_S;
    const early = [at(end + 120, { groupVolts: [3.93, 3.925] })];
    const early1 = reckon(over, { nowS: end + 150, readings: early });
    near(early1.groups[0]!.restVolts, 3.92, 1e-4);
    const late = [at(end + 1500, { groupVolts: [3.923, 3.918] })];
    const one = reckon(over, { nowS: end + 1600, readings: late });
    near(one.groups[0]!.restVolts, 3.923, 2e-4);
    near(one.groups[1]!.restVolts, 3.918, 2e-4);
    near(one.restEndS, end + 3600, 1);
    const settled = [...late, at(end + 2200, { groupVolts: [3.9226, 3.9178] })];
    const two = reckon(over, { nowS: end + 2300, readings: settled });
    expect(two.restEndS).toBe(end + 2200);
    expect(two.stage).toBe('check-due');
    const moving = [...late, at(end + 2200, { groupVolts: [3.9206, 3.9158] })];
    expect(reckon(over, { nowS: end + 2300, readings: moving }).stage).toBe('resting');
  });

  it('names the group that lags, by its start and by what was read at the groups under current', () => {
    const uneven = planInput({ channels: [channel('A1')], spare: { ...lmoSpare, groupVolts: [3.75, 3.744] } });
    const option = planCharge(uneven).options.find((one) => one.id === 'terminals/over-and-settle/id-A1')!;
    const byStart = reckonCharge(reckonInput(uneven, option, { nowS: 1000 }));
    expect(byStart.laggingGroup).toBe(1);
    expect(byStart.lagVolts).toBeGreaterThan(0.001);
    expect(reckon(over, { nowS: 1000 }).laggingGroup).toBeNull();
    const read = reckon(over, { nowS: 2000, readings: [at(1900, { amps: 10, groupVolts: [3.834, 3.84] })] });
    expect(read.laggingGroup).toBe(0);
    near(read.lagVolts, 0.006, 1e-4);
  });

  it('says how odd a reading is: the plan’s own volts are likely, 150 mV more are not', () => {
    const nowS = 3000;
    const planned = reckon(over, { nowS }).terminalVolts;
    const chance = (terminalVolts: number) =>
      reckon(over, { nowS, readings: [at(nowS, { amps: 10, terminalVolts })] }).readingChance!;
    expect(chance(planned)).toBeGreaterThan(0.5);
    expect(chance(planned + 0.15)).toBeLessThan(0.001);
    expect(chance(planned - 0.15)).toBeLessThan(0.001);
    expect(reckon(over, { nowS, readings: [at(nowS, { amps: 10 })] }).readingChance).toBeNull();
  });
});

describe('a charge in several steps', () => {
  const uneven = planInput({ channels: sixChannels, spare: { ...lmoSpare, groupVolts: [3.7, 3.75] } });
  const option = planCharge(uneven).options.find((one) => one.id === 'terminals/over-and-settle/id-B1')!;
  const [bulk, trim] = option.steps.map((step) => ({
    startS: step.startS - option.currentStartS,
    stopS: step.stopS - option.currentStartS,
    ampHours: step.ampHours,
  }));
  const reckonOf = (more: Partial<ReckonInput>): Reckoning => reckonCharge(reckonInput(uneven, option, more));

  it('waits for the hand that swaps the clips: no current, and the next step begins its hands-on time from now', () => {
    const waits = reckonOf({ nowS: bulk!.stopS + 1200 });
    expect(waits.stage).toBe('charging');
    expect(waits.amps).toBe(0);
    expect(waits.stepIndex).toBe(0);
    near(waits.stepEndS, bulk!.stopS, 1);
    const later = reckonOf({ nowS: bulk!.stopS + 1800 });
    near(later.readyS.p50 - waits.readyS.p50, 600, 1);
    const next = waits.segments.find((one) => one.fromS > bulk!.stopS + 1200 + 1)!;
    near(next.fromS, bulk!.stopS + 1200 + (trim!.startS - bulk!.stopS), 1);
    expect(waits.deliveredAh).toBeCloseTo(bulk!.ampHours, 3);
  });

  it('runs the trim from its own stretch, on its own group, and is done when that is', () => {
    const nowS = trim!.startS + 0.5 * (trim!.stopS - trim!.startS);
    const now = reckonOf({ nowS, runs: plannedRuns(option, nowS) });
    expect(now.stepIndex).toBe(1);
    expect(now.stage).toBe('charging');
    expect(now.groups[1]!.restVolts).toBeCloseTo(3.92, 4);
    expect(now.groups[0]!.restVolts).toBeLessThan(3.92);
    near(now.deliveredAh, bulk!.ampHours + trim!.ampHours / 2, 0.02);
    near(now.terminalVolts, now.groups[0]!.clipVolts, 1e-6);
    const done = reckonOf({ nowS: trim!.stopS + 10, runs: plannedRuns(option, trim!.stopS + 10) });
    expect(done.stage).toBe('resting');
    done.groups.forEach((group) => near(group.restVolts, 3.92, 1e-4));
  });

  it('that was swapped ten minutes late is ready ten minutes late', () => {
    const runs = (late: number) => [
      { fromS: 0, toS: trim!.startS + late, stepIndex: 0 },
      { fromS: trim!.startS + late, toS: null, stepIndex: 1 },
    ];
    const one = reckonOf({ nowS: trim!.startS + 5, runs: runs(0) });
    const late = reckonOf({ nowS: trim!.startS + 605, runs: runs(600) });
    near(late.readyS.p50 - one.readyS.p50, 600, 5);
  });
});
