import {
  CalcInputError,
  chargeGroupByGroup,
  chargeThroughTerminals,
  equaliseThroughResistor,
  type CellGroup,
  type StepInput,
} from '@/calc/index';
import { describe, expect, it } from 'vitest';
import { LMO_BLEND, NMC } from './reference/curves';
import { lmoGroup, NO_LIMIT, OPEN_STOP, stepOf } from './reference/modules';

const two = [lmoGroup(3.75), lmoGroup(3.75)];

/** No large number in disguise. */
function expectNothingCounted(result: ReturnType<typeof chargeThroughTerminals>): void {
  expect(result.outcome).toBe('unreachable');
  expect([result.stopAtS, result.settleS, result.totalS, result.ampHours, result.wattHours]).toEqual([0, 0, 0, 0, 0]);
  expect(result.reason).toMatch(/\.$/);
}

describe('what cannot be reached is said, with the reason and without a time', () => {
  it('set to the very target without a tolerance: only in infinite time', () => {
    const result = chargeThroughTerminals(
      stepOf(two, LMO_BLEND, { maxAmps: 10, setVolts: 7.84 }, { relaxedVolts: 7.84 }),
    );
    expectNothingCounted(result);
    expect(result.reason).toContain('infinite time');
    expect(result.relaxedVolts).toBeCloseTo(7.84, 6);
  });

  it('1 mV of tolerance makes the same target reachable', () => {
    const stop = { relaxedVolts: 7.84, toleranceVolts: 0.001 };
    expect(chargeThroughTerminals(stepOf(two, LMO_BLEND, { maxAmps: 10, setVolts: 7.84 }, stop)).outcome).toBe(
      'target',
    );
  });

  it('a group held under the target: the reason names the hold, the group, and what the sum tends to', () => {
    const groups = [lmoGroup(3.75), lmoGroup(3.8), lmoGroup(3.75)];
    const result = chargeThroughTerminals(
      stepOf(groups, LMO_BLEND, { maxAmps: 10, heldGroupVolts: 3.9 }, { relaxedVolts: 11.9 }),
    );
    expectNothingCounted(result);
    expect(result.limitingGroup).toBe(1);
    expect(result.groups[1]!.volts).toBeCloseTo(3.9, 9);
    expect(result.reason).toContain('a group held at 3.900 V');
    expect(result.reason).toContain('11.900 V');
  });

  it('a discharge whose load holds the voltage above the target', () => {
    const groups = [lmoGroup(4.05)];
    const result = chargeThroughTerminals(
      stepOf(groups, LMO_BLEND, { maxAmps: 10, setVolts: 3.9 }, { relaxedVolts: 3.85 }, { direction: 'discharge' }),
    );
    expectNothingCounted(result);
    expect(result.reason).toContain('above the target');
  });

  it('an end current that no voltage limit ever brings about', () => {
    const result = chargeThroughTerminals(stepOf(two, LMO_BLEND, { maxAmps: 10 }, { cutoffAmps: 1 }));
    expectNothingCounted(result);
    expect(result.reason).toContain('no set voltage');
  });

  it('an end current of 0 A', () => {
    expectNothingCounted(
      chargeThroughTerminals(stepOf(two, LMO_BLEND, { maxAmps: 10, setVolts: 8 }, { cutoffAmps: 0 })),
    );
  });

  it('a group limit under current that the set voltage keeps out of reach', () => {
    expectNothingCounted(
      chargeThroughTerminals(stepOf(two, LMO_BLEND, { maxAmps: 10, setVolts: 7.84 }, { groupVolts: 4 })),
    );
  });

  it('with a time cap the step ends at the cap and the reason stays', () => {
    const stop = { relaxedVolts: 7.9, maxSeconds: 40_000 };
    const result = chargeThroughTerminals(stepOf(two, LMO_BLEND, { maxAmps: 10, setVolts: 7.84 }, stop));
    expect(result.outcome).toBe('time-cap');
    expect(result.stopAtS).toBe(40_000);
    expect(result.reason).toContain('7.900 V');
    expect(result.relaxedVolts).toBeLessThan(7.84);
  });

  it('a set voltage under the rest voltage with a tolerated target is met at once or not at all', () => {
    const high = [lmoGroup(3.95)];
    expectNothingCounted(
      chargeThroughTerminals(stepOf(high, LMO_BLEND, { maxAmps: 10, setVolts: 3.9 }, { relaxedVolts: 3.98 })),
    );
    const past = chargeThroughTerminals(stepOf(high, LMO_BLEND, { maxAmps: 10, setVolts: 3.9 }, { relaxedVolts: 3.9 }));
    expect(past.outcome).toBe('target');
    expect(past.stopAtS).toBe(0);
    expect(past.reason).toContain('50.0 mV beyond');
  });

  it('two modules do not come level in finite time, nor does the first get past the level of both', () => {
    const first = { groups: [lmoGroup(3.95)], curve: LMO_BLEND };
    const second = { groups: [lmoGroup(3.85)], curve: LMO_BLEND };
    const level = equaliseThroughResistor({ first, second, resistorOhm: 0.5, stopDifferenceVolts: 0 });
    expect(level.outcome).toBe('unreachable');
    expect(level.firstRelaxedVolts).toBeCloseTo(level.secondRelaxedVolts, 9);
    const far = { first, second, resistorOhm: 0.5, stopDifferenceVolts: null };
    for (const stopFirstRelaxedVolts of [3.86, 3.97]) {
      const result = equaliseThroughResistor({ ...far, stopFirstRelaxedVolts });
      expect(result.outcome).toBe('unreachable');
      expect(result.stopAtS).toBe(0);
      expect(result.reason).toContain(`${stopFirstRelaxedVolts.toFixed(3)} V`);
    }
    const between = equaliseThroughResistor({ ...far, stopFirstRelaxedVolts: 3.92 });
    expect(between.outcome).toBe('target');
    expect(between.firstRelaxedVolts).toBeCloseTo(3.92, 6);
  });

  it('a group that no channel can bring to its target takes no time and keeps its own outcome', () => {
    const { source, ...shared } = stepOf(
      [lmoGroup(3.75), lmoGroup(3.8)],
      LMO_BLEND,
      { maxAmps: 10, setVolts: 3.79 },
      { relaxedVolts: 3.795 },
    );
    const result = chargeGroupByGroup({ ...shared, sources: [source] });
    expect(result.groups.map((group) => group.outcome)).toEqual(['unreachable', 'target']);
    expect(result.totalS).toBe(0);
  });
});

describe('what cannot be is refused by the name of its field', () => {
  const good = stepOf(two, LMO_BLEND, { maxAmps: 10, setVolts: 8 }, { cutoffAmps: 1 });
  const cell = (more: Partial<CellGroup>): Partial<StepInput> => ({
    groups: [lmoGroup(3.75), { ...lmoGroup(3.75), ...more }],
  });
  const cases: [string, Partial<StepInput>][] = [
    ['stop', { stop: OPEN_STOP }],
    ['groups', { groups: [] }],
    ['groups[1].capacityAh', cell({ capacityAh: 0 })],
    ['groups[1].restVolts', cell({ restVolts: Number.NaN })],
    ['groups[1].ohmicResistanceOhm', cell({ ohmicResistanceOhm: -0.001 })],
    ['groups[1].polarisationResistanceOhm', cell({ polarisationResistanceOhm: Infinity })],
    ['groups[1].polarisationTimeConstantS', cell({ polarisationTimeConstantS: 0 })],
    ['coulombicEfficiency', { coulombicEfficiency: 1.01 }],
    ['coulombicEfficiency', { coulombicEfficiency: 0 }],
    ['linkResistanceOhm', { linkResistanceOhm: -1 }],
    ['direction', { direction: 'up' as 'charge' }],
    ['source.maxAmps', { source: NO_LIMIT }],
    ['source.maxAmps', { source: { ...NO_LIMIT, maxAmps: 0 } }],
    ['source.leadResistanceOhm', { source: { ...good.source, leadResistanceOhm: Number.NaN } }],
    ['source.loadOhm', { source: { ...NO_LIMIT, loadOhm: 1 } }],
    ['stop.toleranceVolts', { stop: { ...good.stop, toleranceVolts: -0.001 } }],
    ['stop.maxSeconds', { stop: { ...OPEN_STOP, maxSeconds: Number.NaN } }],
    ['settledVolts', { settledVolts: 0 }],
    ['curve.volts[1]', { curve: { soc: [0, 1], volts: [3, 3] } }],
  ];

  it.each(cases)('%s', (field, more) => {
    let thrown: unknown = null;
    try {
      chargeThroughTerminals({ ...good, ...more });
    } catch (error) {
      thrown = error;
    }
    expect(thrown).toBeInstanceOf(CalcInputError);
    expect((thrown as CalcInputError).field).toBe(field);
    expect((thrown as CalcInputError).message).toContain('must be');
  });

  it('a resistor and no stop for two modules, and no channels for group by group', () => {
    const side = { groups: [lmoGroup(3.9)], curve: NMC };
    const stop = { first: side, second: side, stopDifferenceVolts: null };
    expect(() => equaliseThroughResistor({ ...stop, resistorOhm: 1 })).toThrow(CalcInputError);
    expect(() => equaliseThroughResistor({ ...stop, stopDifferenceVolts: 0.01, resistorOhm: 0 })).toThrow(
      /resistorOhm/,
    );
    expect(() => chargeGroupByGroup({ ...good, sources: [] })).toThrow(/sources/);
  });
});
