import { describe, expect, it } from 'vitest';
import { planCharge, reckonCharge } from '@/calc/index';
import { reckonInput } from './live-fixtures';
import { channel, lmoModule, lmoSpare, planInput, sixChannels, target } from './plan-fixtures';

describe('edges of a plan', () => {
  it('takes a workshop’s curve that is level at its ends: the samples beyond them count as full or empty, nothing throws', () => {
    // Three points that bend so far that the end slope comes out as zero.
    const curve = { soc: [0, 0.5, 0.55, 1], volts: [3.6, 3.601, 4.19, 4.2] };
    const plan = planCharge(
      planInput({
        module: { ...lmoModule, curve, chargeLimitVolts: 4.2 },
        spare: { ...lmoSpare, groupVolts: [3.6, 3.6] },
        target: { ...target, volts: 4.195 },
        channels: [channel('A1')],
      }),
    );
    expect(plan.options.length + plan.ruledOut.length).toBeGreaterThan(0);
    for (const option of plan.options) expect(Number.isFinite(option.totalS.p90)).toBe(true);
  });

  it('without a channel or a neighbour offers nothing and says what to add', () => {
    const plan = planCharge(planInput({ channels: [] }));
    expect(plan.options).toEqual([]);
    expect(plan.ruledOut.map((one) => one.reason)).toEqual([
      'No channel is in use here. Add a charger with its channels first.',
    ]);
  });

  it('plans a module of 24 groups with capacities measured apart, each group ending within the tolerance', () => {
    const groupVolts = Array.from({ length: 24 }, (_, at) => 3.7 + 0.0002 * at);
    const plan = planCharge(
      planInput({
        module: { ...lmoModule, groupsInSeries: 24 },
        spare: { ...lmoSpare, groupVolts, capacityAh: groupVolts.map((_, at) => 60 + 0.2 * at) },
        channels: sixChannels.map((one) => ({ ...one, maxVolts: one.singleGroup ? 5 : 120 })),
      }),
    );
    const terminals = plan.options.find((one) => one.way === 'terminals' && one.withinTolerance)!;
    expect(terminals).toBeDefined();
    expect(terminals.endGroupVolts).toHaveLength(24);
  });

  it('a gap of 60 mV inside the module leaves no silent misfit: an option outside the tolerance has its caution and no mark', () => {
    for (const volts of [
      [3.7, 3.76],
      [3.94, 3.88],
      [3.9, 3.96],
    ]) {
      const plan = planCharge(planInput({ spare: { ...lmoSpare, groupVolts: volts }, channels: sixChannels }));
      for (const option of plan.options) {
        const off = Math.max(...option.endGroupVolts.map((one) => Math.abs(one - 3.92)));
        expect(option.withinTolerance).toBe(off <= 0.005 + 1e-5);
        if (option.withinTolerance) continue;
        expect(option.cautions.some((one) => one.code === 'ends-apart')).toBe(true);
        expect(option.soonest || option.soonestBusbarsStay).toBe(false);
      }
    }
  });

  it('reckons a charge that was planned with spreads of its own, and one before its clip-on', () => {
    const input = planInput({ channels: [channel('A1')], spreads: { capacityRelative: 0.2 } });
    const [option] = planCharge(input).options;
    const before = reckonCharge(reckonInput(input, option!, { runs: [], nowS: 0 }));
    expect(before.stage).toBe('charging');
    expect(before.amps).toBe(0);
    expect(before.readyS.p90 - before.readyS.p10).toBeCloseTo(option!.totalS.p90 - option!.totalS.p10, 0);
  });
});
