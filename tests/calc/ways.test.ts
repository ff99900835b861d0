import {
  chargeGroupByGroup,
  chargeParalleled,
  chargeThroughTerminals,
  equaliseThroughResistor,
  joiningInrush,
  type Source,
} from '@/calc/index';
import { describe, expect, it } from 'vitest';
import { LMO_BLEND } from './reference/curves';
import { lmoGroup, NO_LIMIT, stepOf } from './reference/modules';

const pair = (millivolts: number) => [
  { restVolts: 3.8, ohmicResistanceOhm: 0.00035 },
  { restVolts: 3.8 + millivolts / 1000, ohmicResistanceOhm: 0.00035 },
];

describe('the inrush on joining groups', () => {
  // Ohm's law for a pair: 10 mV across 0.7 mΩ is 14 A, 120 mV is 170 A (to two figures).
  it.each([
    { millivolts: 10, amps: 14.29 },
    { millivolts: 120, amps: 171.4 },
  ])('of a pair $millivolts mV apart is $amps A', ({ millivolts, amps }) => {
    const result = joiningInrush(pair(millivolts));
    expect(result.inrushAmps).toBeCloseTo(amps, 1);
    expect(result.worstPairAmps).toBeCloseTo(amps, 1);
  });

  // One outlier among n groups sees 2(n − 1)/n times the current of its pair.
  it.each([2, 3, 4, 8, 12])('one outlier among %d equal groups sees 2(n − 1)/n times its pair', (n) => {
    const groups = Array.from({ length: n }, (_, i) => ({
      restVolts: i === 0 ? 3.85 : 3.8,
      ohmicResistanceOhm: 0.0005,
    }));
    const { inrushAmps, worstPairAmps } = joiningInrush(groups);
    expect(worstPairAmps).toBeCloseTo(50, 9);
    expect(inrushAmps / worstPairAmps).toBeCloseTo((2 * (n - 1)) / n, 9);
  });

  it('with unequal resistances the currents at the joint add up to nothing', () => {
    const groups = [
      { restVolts: 3.82, ohmicResistanceOhm: 0.0004 },
      { restVolts: 3.75, ohmicResistanceOhm: 0.0009 },
      { restVolts: 3.79, ohmicResistanceOhm: 0.0006 },
    ];
    const { busVolts } = joiningInrush(groups);
    const sum = groups.reduce((total, group) => total + (group.restVolts - busVolts) / group.ohmicResistanceOhm, 0);
    expect(sum).toBeCloseTo(0, 9);
  });
});

describe('ways of connecting the same equal groups', () => {
  const four = Array.from({ length: 4 }, () => lmoGroup(3.75));

  it('paralleled takes four times as long as the terminals at the same current, and as much energy a group', () => {
    const series = chargeThroughTerminals(stepOf(four, LMO_BLEND, { maxAmps: 10 }, { relaxedVolts: 4 * 3.92 }));
    const joined = chargeParalleled(stepOf(four, LMO_BLEND, { maxAmps: 10 }, { relaxedVolts: 3.92 }));
    expect(joined.stopAtS / series.stopAtS).toBeCloseTo(4, 9);
    expect(joined.ampHours / series.ampHours).toBeCloseTo(4, 9);
    expect(joined.joinedVolts).toBe(3.75);
    expect(joined.groups).toHaveLength(1);
    expect([joined.inrushAmps, joined.worstPairAmps]).toEqual([0, 0]);
  });

  it('joined groups behave as the one group of n times the capacity and an n-th of the resistance', () => {
    const input = stepOf(four, LMO_BLEND, { maxAmps: 40, setVolts: 3.92 }, { cutoffAmps: 4 });
    const one = { ...lmoGroup(3.75), capacityAh: 264, ohmicResistanceOhm: 0.0002, polarisationResistanceOhm: 0.0003 };
    const alone = chargeThroughTerminals({ ...input, groups: [one] });
    const joined = chargeParalleled(input);
    expect(joined.stopAtS).toBeCloseTo(alone.stopAtS, 6);
    expect(joined.wattHours).toBeCloseTo(alone.wattHours, 6);
  });

  it('unequal groups paralleled keep the charge that they had together', () => {
    const groups = [lmoGroup(3.8), lmoGroup(3.7, { capacityAh: 50 })];
    const joined = chargeParalleled(stepOf(groups, LMO_BLEND, { maxAmps: 10 }, { relaxedVolts: 3.9 }));
    const apart = chargeGroupByGroup({
      ...stepOf(groups, LMO_BLEND, {}, { relaxedVolts: 3.9 }),
      sources: [{ ...NO_LIMIT, maxAmps: 10 }],
    });
    expect(joined.ampHours).toBeCloseTo(apart.ampHours, 9);
  });

  it('two modules through a resistor move the charge that a discharge of the one and a charge of the other do', () => {
    const first = { groups: [lmoGroup(3.95), lmoGroup(3.96)], curve: LMO_BLEND };
    const second = { groups: [lmoGroup(3.85, { capacityAh: 50 }), lmoGroup(3.84)], curve: LMO_BLEND };
    const result = equaliseThroughResistor({ first, second, resistorOhm: 0.3, stopDifferenceVolts: 0.02 });
    const down = chargeThroughTerminals(
      stepOf(
        first.groups,
        LMO_BLEND,
        { maxAmps: 1 },
        { relaxedVolts: result.firstRelaxedVolts },
        { direction: 'discharge' },
      ),
    );
    const up = chargeThroughTerminals(
      stepOf(second.groups, LMO_BLEND, { maxAmps: 1 }, { relaxedVolts: result.secondRelaxedVolts }),
    );
    expect(result.firstRelaxedVolts - result.secondRelaxedVolts).toBeCloseTo(0.02, 6);
    expect(down.ampHours).toBeCloseTo(result.ampHours, 6);
    expect(up.ampHours).toBeCloseTo(result.ampHours, 6);
  });
});

describe('group by group', () => {
  const groups = [3.7, 3.75, 3.8, 3.72, 3.78].map((volts) => lmoGroup(volts));
  const channel = (maxAmps: number): Source => ({ ...NO_LIMIT, maxAmps, setVolts: 4.1 });
  const run = (sources: Source[]) =>
    chargeGroupByGroup({ ...stepOf(groups, LMO_BLEND, {}, { relaxedVolts: 3.92 }), sources });

  it('on one channel takes the sum, on five alike the longest', () => {
    const one = run([channel(10)]);
    const each = one.groups.map((group) => group.stopAtS);
    expect(one.totalS).toBeCloseTo(
      each.reduce((sum, s) => sum + s, 0),
      6,
    );
    expect(run(Array.from({ length: 5 }, () => channel(10))).totalS).toBeCloseTo(Math.max(...each), 6);
  });

  it('on two unequal channels lies between the best any split could do and 4/3 of the best there is', () => {
    const sources = [channel(10), channel(5)];
    const durations = sources.map((source) => run([source]).groups.map((group) => group.stopAtS));
    let best = Infinity;
    for (let split = 0; split < 2 ** groups.length; split++) {
      const busy = [0, 0];
      groups.forEach((_, i) => (busy[(split >> i) & 1]! += durations[(split >> i) & 1]![i]!));
      best = Math.min(best, Math.max(...busy));
    }
    const { totalS } = run(sources);
    expect(totalS).toBeGreaterThanOrEqual(best - 1e-6);
    expect(totalS).toBeLessThanOrEqual((4 / 3) * best);
  });

  // Longest first: 5 5 4 4 3 3 3 on three machines ends after 11 (and 9 is the best), as in any scheduling text.
  it('gives the longest group away first: 5 5 4 4 3 3 3 on three channels end after 11', () => {
    const line = { soc: [0, 1], volts: [3, 4] };
    const lengths = [3, 5, 4, 3, 5, 3, 4];
    const input = stepOf(
      lengths.map((length) => ({ ...lmoGroup(3.9 - length / 10), capacityAh: 10 })),
      line,
      {},
      { relaxedVolts: 3.9 },
    );
    const result = chargeGroupByGroup({ ...input, sources: [1, 1, 1].map((maxAmps) => ({ ...NO_LIMIT, maxAmps })) });
    expect(result.totalS / 3600).toBeCloseTo(11, 9);
  });
});
