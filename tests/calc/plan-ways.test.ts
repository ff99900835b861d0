import { describe, expect, it } from 'vitest';
import {
  chemistryParameters,
  joiningInrush,
  planCharge,
  socAtVolts,
  type ChargePlan,
  type PlanInput,
} from '@/calc/index';
import { channel, lmoModule, lmoSpare, planInput, sixChannels, target, workshop } from './plan-fixtures';

const plain = (text: string): string => text.replaceAll('\u00a0', ' ');
const withVolts = (groupVolts: number[], over: Partial<PlanInput> = {}): PlanInput =>
  planInput({
    module: { ...lmoModule, groupsInSeries: groupVolts.length },
    spare: { ...lmoSpare, groupVolts },
    ...over,
  });
const byId = (plan: ChargePlan, id: string) => plan.options.find((one) => one.id === id);
const reasonOf = (plan: ChargePlan, way: string, finish: string, name: string): string | undefined => {
  const found = plan.ruledOut.find((one) => one.way === way && one.finish === finish && one.channelName === name);
  return found && plain(found.reason);
};

describe('the ways of a plan', () => {
  it('offers every way, finish and channel that can do it, soonest first, and says of each other why not', () => {
    const plan = planCharge(planInput({ channels: sixChannels }));
    const times = plan.options.map((one) => one.totalS.p50);
    expect(times).toEqual([...times].sort((a, b) => a - b));
    // Terminals on three channels; group by group and paralleled on five that go that low; two finishes each; and two single-group channels at once.
    const ids = new Set(plan.options.map((one) => one.id));
    expect(ids.size).toBe(plan.options.length);
    for (const finish of ['over-and-settle', 'on-the-mark']) {
      for (const name of ['A1', 'A2', 'B1']) expect(ids).toContain(`terminals/${finish}/id-${name}`);
      for (const name of ['A1', 'A2', 'B1', 'C1', 'C2']) {
        expect(ids).toContain(`group-by-group/${finish}/id-${name}`);
        expect(ids).toContain(`paralleled/${finish}/id-${name}`);
      }
    }
    expect(reasonOf(plan, 'terminals', 'over-and-settle', 'C1')).toBe('C1 takes one group only.');
    expect(reasonOf(plan, 'terminals', 'on-the-mark', 'F1')).toBe('F1 has no voltage to set.');
    expect(reasonOf(plan, 'paralleled', 'on-the-mark', 'F1')).toBe('F1 cannot be set as low as one group.');
    expect(plan.ruledOut.every((one) => one.reason.endsWith('.'))).toBe(true);
  });

  it('marks the soonest, and the soonest that leaves the busbars alone', () => {
    const plan = planCharge(planInput({ channels: sixChannels }));
    const soonest = plan.options.filter((one) => one.soonest);
    const stays = plan.options.filter((one) => one.soonestBusbarsStay);
    expect(soonest).toEqual([plan.options[0]]);
    expect(stays).toEqual([plan.options.find((one) => !one.busbarsOff)]);
  });

  it('moves s times the ampere-hours group by group and paralleled, and takes n times 10 A in n paralleled groups', () => {
    const plan = planCharge(planInput({ channels: sixChannels, samples: 1 }));
    const terminals = byId(plan, 'terminals/over-and-settle/id-B1')!;
    const alone = byId(plan, 'group-by-group/over-and-settle/id-B1')!;
    const joined = byId(plan, 'paralleled/over-and-settle/id-B1')!;
    expect(alone.ampHours).toBeCloseTo(2 * terminals.ampHours, 3);
    expect(joined.ampHours).toBeCloseTo(2 * terminals.ampHours, 3);
    // 60 A into two groups of at most 33 A each.
    expect(byId(plan, 'paralleled/over-and-settle/id-C1')!.amps).toBe(60);
    expect(byId(plan, 'group-by-group/over-and-settle/id-C1')!.amps).toBe(33);
  });

  it('ends the current through the terminals where the middle of unequal groups is at the target, if all are inside then', () => {
    const plan = planCharge(withVolts([3.75, 3.756], { samples: 1 }));
    const option = byId(plan, 'terminals/over-and-settle/id-A1')!;
    expect(option.withinTolerance).toBe(true);
    expect(option.steps).toHaveLength(1);
    const [low, high] = option.endGroupVolts as [number, number];
    expect((low + high) / 2).toBeCloseTo(3.92, 5);
    expect(option.endSpreadVolts).toBeCloseTo(high - low, 12);
  });

  it('goes as far as the first group and trims the other where they do not: bulk, then the low group alone', () => {
    const plan = planCharge(withVolts([3.7, 3.75], { samples: 1 }));
    const option = byId(plan, 'terminals/over-and-settle/id-A1')!;
    expect(option.steps.map((step) => [step.kind, step.groupIndexes])).toEqual([
      ['bulk', [0, 1]],
      ['trim', [0]],
    ]);
    expect(option.steps[0]!.restVoltsAfter[1]).toBeCloseTo(3.92, 6);
    option.endGroupVolts.forEach((volts) => expect(volts).toBeCloseTo(3.92, 5));
    // Both groups get what the curve says, the low one in two helpings.
    const { curve } = chemistryParameters('lmo-blend');
    const needed = (from: number): number => 66 * (socAtVolts(curve, 3.92) - socAtVolts(curve, from));
    expect(option.steps[0]!.ampHours).toBeCloseTo(needed(3.75), 3);
    expect(option.steps[0]!.ampHours + option.steps[1]!.ampHours).toBeCloseTo(needed(3.7), 3);
    // The hand that swaps the clips: off and on.
    expect(option.steps[1]!.startS - option.steps[0]!.stopS).toBeCloseTo(600, 6);
    expect(option.segments.map((one) => one.kind)).toEqual(['hands', 'cc', 'hands', 'cc', 'rest', 'check']);
  });

  it('ends apart, says so and marks nothing where no channel can trim', () => {
    const blind = channel('F1', { adjustableVolts: false, maxVolts: 7.86, singleGroup: false });
    const plan = planCharge(withVolts([3.7, 3.75], { channels: [blind] }));
    const [option] = plan.options;
    expect(option!.withinTolerance).toBe(false);
    expect(option!.soonest || option!.soonestBusbarsStay).toBe(false);
    expect(option!.endGroupVolts[1]).toBeCloseTo(3.92, 5);
    expect(plain(option!.cautions.find((one) => one.code === 'ends-apart')!.text)).toBe(
      'G1 ends outside the tolerance. No channel here that clips to one group can finish it alone.',
    );
  });

  it('brings mixed groups in from both sides where a channel can discharge one alone, and rules out a current that makes it worse', () => {
    const mixed = withVolts([3.95, 3.7], { channels: sixChannels });
    const plan = planCharge(mixed);
    expect(plan.direction).toBe('charge');
    expect(reasonOf(plan, 'terminals', 'over-and-settle', 'B1')).toBe(
      'G1 is 30 mV over the target already. A charge through all groups takes it farther away.',
    );
    const option = byId(plan, 'group-by-group/over-and-settle/id-C2')!;
    expect(option.steps.map((step) => [step.groupIndexes[0], step.direction]).sort()).toEqual([
      [0, 'discharge'],
      [1, 'charge'],
    ]);
    option.endGroupVolts.forEach((volts) => expect(volts).toBeCloseTo(3.92, 5));
    // C1 cannot discharge: it ends apart and is not marked.
    const half = byId(plan, 'group-by-group/over-and-settle/id-C1')!;
    expect(half.withinTolerance).toBe(false);
    expect(half.soonest).toBe(false);
    expect(plan.groupAmpHours[0]).toBeLessThan(0);
    expect(plan.groupAmpHours[1]).toBeGreaterThan(0);
  });

  it('levels first where joining would push more than 1 C into a group, each step’s current and heat within its resistor', () => {
    const resistors = [
      { resistorId: 'r1', name: 'R1', ohm: 0.002, maxWatts: 5 },
      { resistorId: 'r2', name: 'R2', ohm: 0.01, maxWatts: 50 },
    ];
    const volts = [3.7, 3.702, 3.9, 3.701];
    const groups = volts.map((restVolts) => ({ restVolts, ohmicResistanceOhm: 0.002 / 2.7 }));
    expect(joiningInrush(groups).inrushAmps).toBeGreaterThan(66);
    const plan = planCharge(
      withVolts(volts, { resistors, channels: [channel('C1', { singleGroup: true, maxAmps: 60 })] }),
    );
    const option = plan.options.find((one) => one.way === 'paralleled')!;
    const [level, bulk] = option.steps;
    expect([level!.kind, level!.resistorId, level!.groupIndexes, level!.direction]).toEqual([
      'pre-level',
      'r2',
      [2],
      'discharge',
    ]);
    expect(bulk!.kind).toBe('bulk');
    // What the levelling leaves may be joined.
    const after = level!.restVoltsAfter.map((restVolts) => ({ restVolts, ohmicResistanceOhm: 0.002 / 2.7 }));
    expect(joiningInrush(after).inrushAmps).toBeLessThanOrEqual(66);
    // Charge is only passed on: the groups together have what they had.
    const { curve } = chemistryParameters('lmo-blend');
    const sum = (all: readonly number[]): number => all.reduce((total, one) => total + socAtVolts(curve, one), 0);
    expect(sum(level!.restVoltsAfter)).toBeCloseTo(sum(volts), 6);
    expect(option.cautions.map((one) => one.code)).toContain('inrush');
    const without = planCharge(withVolts(volts, { channels: [channel('C1', { singleGroup: true })] }));
    expect(reasonOf(without, 'paralleled', 'over-and-settle', 'C1')).toMatch(
      /^Joining would push \d+ A through a group, 66 A is the limit\. No resistor is on the list to level G\d first\.$/,
    );
  });

  it('goes through a resistor to a neighbour on the far side of the target, by the worked case’s time constant', () => {
    const neighbour = { label: 'S-9', groupVolts: [3.95, 3.95], capacityAh: 660 };
    const plan = planCharge(
      withVolts([3.9, 3.9], {
        neighbour,
        resistors: [{ resistorId: 'r1', name: 'R1', ohm: 0.05, maxWatts: 20 }],
        channels: [],
        samples: 1,
      }),
    );
    const option = byId(plan, 'resistor/over-and-settle/r1')!;
    expect(option.endGroupVolts[0]).toBeCloseTo(3.92, 5);
    expect(option.channelIds).toEqual([]);
    // Against a plain sum in steps of a second with one resistance for each side.
    const { curve } = chemistryParameters('lmo-blend');
    const stepped = steppedThroughResistor(curve, 0.05 + 2 * 0.002 + (2 * (0.002 * 66)) / 660);
    expect(Math.abs((option.steps[0]!.stopS - option.steps[0]!.startS) / stepped - 1)).toBeLessThan(0.02);
    const near = planCharge(
      withVolts([3.9, 3.9], {
        neighbour: { ...neighbour, groupVolts: [3.91, 3.91] },
        resistors: [{ resistorId: 'r1', name: 'R1', ohm: 0.05, maxWatts: 20 }],
        channels: [],
      }),
    );
    expect(reasonOf(near, 'resistor', 'over-and-settle', 'R1')).toMatch(
      /^S-9 rests at 3\.910 V a group\. Joined through a resistor both would settle at 3\.9\d\d V, not at the target\.$/,
    );
  });

  it('discharges to a lower target, electronically and into a resistor, and warns of the one that does not stop', () => {
    const channels = [
      channel('D1', { canDischarge: true, dischargeAmps: 12 }),
      channel('L1', { canDischarge: true, adjustableVolts: false, loadOhm: 1, maxWatts: 100 }),
      channel('N1'),
    ];
    const plan = planCharge(withVolts([4.05, 4.05], { channels, samples: 1 }));
    expect(plan.direction).toBe('discharge');
    const load = byId(plan, 'terminals/over-and-settle/id-D1')!;
    expect(load.steps[0]!.endAmps).toBeCloseTo(-12, 6);
    expect(load.setVolts).toBeLessThan(7.84);
    const resistor = byId(plan, 'terminals/over-and-settle/id-L1')!;
    expect(resistor.setVolts).toBeNull();
    expect(resistor.cautions.map((one) => one.code)).toContain('no-adjustable-volts');
    // 8.1 V over 1 Ω and 1.5 mΩ.
    expect(resistor.amps).toBeCloseTo(8.1 / (1 + (2 * 0.002) / 2.7), 2);
    expect(reasonOf(plan, 'terminals', 'over-and-settle', 'N1')).toBe('N1 cannot discharge.');
    expect(reasonOf(plan, 'terminals', 'on-the-mark', 'L1')).toBe('L1 has no voltage to set for a discharge.');
  });

  it('says unreachable, not a large number: a charger that ends at 7.50 V, one that holds no less than 3 A', () => {
    const plan = planCharge(
      planInput({ channels: [channel('A1', { maxVolts: 7.5 }), channel('A2', { minAmps: 8, singleGroup: false })] }),
    );
    expect(reasonOf(plan, 'terminals', 'over-and-settle', 'A1')).toBe(
      'A1 reaches 7.50 V, the target is 7.84 V between the clips: unreachable.',
    );
    expect(reasonOf(plan, 'terminals', 'on-the-mark', 'A2')).toMatch(
      /^A2 holds no less than 8 A and would end \d+ mV short\.$/,
    );
  });

  it('takes a target just under the limit by the taper at the limit itself, and rules out amps that would lift a group past it', () => {
    const high = { ...target, volts: 4.17 };
    const tapers = planCharge(planInput({ target: high, channels: [channel('B1', { maxAmps: 30 })] }));
    const option = byId(tapers, 'terminals/over-and-settle/id-B1')!;
    expect(option.setVolts).toBeCloseTo(8.4, 6);
    expect(option.segments.map((one) => one.kind)).toContain('taper');
    const load = channel('D1', { canDischarge: true, dischargeAmps: 60, adjustableVolts: false });
    const low = planCharge(
      planInput({
        target: { ...target, volts: 2.75 },
        spare: { ...lmoSpare, groupVolts: [3.3, 3.3] },
        channels: [load],
      }),
    );
    // 60 A over 2 mΩ are 120 mV: 2.63 V under current.
    expect(reasonOf(low, 'terminals', 'over-and-settle', 'D1')).toBe(
      'At 60 A G1 would be at its 2.70 V before the target. Take fewer amps.',
    );
  });

  it('leaves out what takes days where something is quicker, and keeps it where nothing is', () => {
    const slow = channel('Z1', { maxAmps: 0.3 });
    const both = planCharge(planInput({ channels: [channel('A1'), slow] }));
    expect(both.options.some((one) => one.channelIds.includes('id-Z1'))).toBe(false);
    expect(reasonOf(both, 'terminals', 'over-and-settle', 'Z1')).toBe('Would take about 3 days and is left out.');
    expect(planCharge(planInput({ channels: [slow] })).options.length).toBeGreaterThan(0);
  });

  it('offers nothing where all groups are inside the tolerance already', () => {
    const plan = planCharge(withVolts([3.917, 3.923]));
    expect(plan.alreadyWithin).toBe(true);
    expect(plan.options).toEqual([]);
    expect(plan.refusals).toEqual([]);
  });

  it('waits for a busy channel, and counts back from ready-by with the late end of the band', () => {
    const plan = planCharge(planInput({ channels: sixChannels, readyByS: 5 * 3600, clipOnAtS: 600 }));
    const busy = byId(plan, 'terminals/over-and-settle/id-A2')!;
    expect(busy.queueS).toBe(1800);
    expect(busy.segments[0]).toEqual({ kind: 'queue', fromS: 0, toS: 1800 });
    for (const option of plan.options) {
      expect(option.latestStartS).toBeCloseTo(5 * 3600 - (option.totalS.p90 - option.queueS), 6);
      expect(option.tooLate).toBe(600 + option.totalS.p90 > 5 * 3600);
    }
    expect(plan.options.some((one) => one.tooLate)).toBe(true);
    expect(plan.options.some((one) => !one.tooLate)).toBe(true);
  });

  it('rests an hour, and an hour and a half below 15 °C or outside 10 to 90 % charge', () => {
    const restOf = (over: Partial<PlanInput>): number => planCharge(planInput(over)).options[0]!.restS;
    expect(restOf({})).toBe(3600);
    expect(restOf({ spare: { ...lmoSpare, celsius: 12 } })).toBe(5400);
    expect(restOf({ target: { ...target, volts: 4.12 } })).toBe(5400);
    expect(restOf({ workshop: { ...workshop, minRestS: 7200 } })).toBe(7200);
  });

  it('has at most 120 points in its picture, in order of time, with the amps of its steps and the rest volts rising to the target', () => {
    for (const option of planCharge(planInput({ channels: sixChannels })).options) {
      expect(option.trace.length).toBeLessThanOrEqual(120);
      expect(option.trace.length).toBeGreaterThan(10);
      const times = option.trace.map((point) => point.s);
      expect(times).toEqual([...times].sort((a, b) => a - b));
      const rest = option.trace.map((point) => point.restVolts);
      rest.slice(1).forEach((volts, at) => expect(volts).toBeGreaterThanOrEqual(rest[at]! - 2e-4));
      expect(rest.at(-1)).toBeCloseTo(3.92, 2);
      // The charge under the curve of amps is the plan's.
      const steps = option.steps.reduce((sum, step) => sum + step.ampHours, 0);
      const under = option.trace.slice(1).reduce((sum, point, at) => {
        const before = option.trace[at]!;
        return sum + ((point.amps + before.amps) / 2) * ((point.s - before.s) / 3600);
      }, 0);
      if (option.steps.length === 1) expect(Math.abs(under / steps - 1), option.id).toBeLessThan(0.03);
    }
  });
});

function steppedThroughResistor(curve: { soc: number[]; volts: number[] }, ohm: number): number {
  const volts = (soc: number): number => {
    const at = Math.max(
      1,
      curve.soc.findIndex((one) => one >= soc),
    );
    const [s0, s1, v0, v1] = [curve.soc[at - 1]!, curve.soc[at]!, curve.volts[at - 1]!, curve.volts[at]!];
    return v0 + ((v1 - v0) * (soc - s0)) / (s1 - s0);
  };
  let spare = socAtVolts(curve, 3.9);
  let neighbour = socAtVolts(curve, 3.95);
  const end = socAtVolts(curve, 3.92);
  let seconds = 0;
  while (spare < end && seconds < 1e6) {
    const amps = (2 * (volts(neighbour) - volts(spare))) / ohm;
    spare += amps / (3600 * 66);
    neighbour -= amps / (3600 * 660);
    seconds += 1;
  }
  return seconds;
}
