import { CHEMISTRIES, chargeThroughTerminals, voltsAtSoc, type CellGroup, type StepInput } from '@/calc/index';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { LMO_BLEND, NMC } from './reference/curves';
import { lmoGroup, stepOf } from './reference/modules';

/** The input of the rest of a step that was run for `seconds`. */
function resume(
  input: StepInput,
  seconds: number,
): { before: ReturnType<typeof chargeThroughTerminals>; input: StepInput } {
  const before = chargeThroughTerminals({ ...input, stop: { ...input.stop, maxSeconds: seconds } });
  const groups = input.groups.map((group, i): CellGroup => ({
    ...group,
    restVolts: voltsAtSoc(input.curve, before.groups[i]!.soc),
    polarisationVolts: before.groups[i]!.polarisationVolts,
  }));
  return { before, input: { ...input, groups } };
}

const unequal = [lmoGroup(3.75), lmoGroup(3.77, { capacityAh: 62, polarisationTimeConstantS: 180 }), lmoGroup(3.74)];

describe('a step taken up again', () => {
  it.each([
    ['over and settle', stepOf(unequal, LMO_BLEND, { maxAmps: 12, setVolts: 12.4 }, { relaxedVolts: 11.76 })],
    [
      'on the mark',
      stepOf(
        unequal,
        LMO_BLEND,
        { maxAmps: 12, setVolts: 11.76, leadResistanceOhm: 0.01 },
        { relaxedVolts: 11.76, toleranceVolts: 0.006 },
      ),
    ],
    ['with a held group', stepOf(unequal, LMO_BLEND, { maxAmps: 20, heldGroupVolts: 3.94 }, { cutoffAmps: 2 })],
    [
      'down',
      stepOf(
        unequal.map((g) => ({ ...g, restVolts: g.restVolts + 0.2 })),
        LMO_BLEND,
        { maxAmps: 15, setVolts: 11.4 },
        { relaxedVolts: 11.4, toleranceVolts: 0.006 },
        { direction: 'discharge' },
      ),
    ],
  ])('%s: at any moment, both parts make up the uninterrupted step to a ten-thousandth or 0.2 s', (_, input) => {
    const whole = chargeThroughTerminals(input);
    fc.assert(
      fc.property(fc.double({ min: 0.01, max: 0.99, noNaN: true }), (part) => {
        const { before, input: rest } = resume(input, part * whole.stopAtS);
        const after = chargeThroughTerminals(rest);
        expect(before.outcome).toBe('time-cap');
        expect(after.outcome).toBe(whole.outcome);
        expect(Math.abs(before.stopAtS + after.stopAtS - whole.stopAtS)).toBeLessThan(
          Math.max(0.2, 1e-4 * whole.stopAtS),
        );
        expect(Math.abs((before.ampHours + after.ampHours) / whole.ampHours - 1)).toBeLessThan(1e-4);
        expect(Math.abs((before.wattHours + after.wattHours) / whole.wattHours - 1)).toBeLessThan(1e-4);
        expect(Math.abs(after.settleS - whole.settleS)).toBeLessThan(0.5);
        after.groups.forEach((group, i) => {
          expect(Math.abs(group.volts - whole.groups[i]!.volts)).toBeLessThan(5e-5);
          expect(Math.abs(group.soc - whole.groups[i]!.soc)).toBeLessThan(2e-5);
        });
      }),
      { numRuns: 25, seed: 9 },
    );
  });

  it('forgets its over-voltage in a rest between, and then takes its own time again', () => {
    const input = stepOf(
      [lmoGroup(3.75)],
      LMO_BLEND,
      { maxAmps: 10, setVolts: 3.92 },
      { relaxedVolts: 3.92, toleranceVolts: 0.002 },
    );
    const { input: rest } = resume(input, 6500);
    const rested = { ...rest, groups: rest.groups.map((group) => ({ ...group, polarisationVolts: 0 })) };
    // A rested group lets more through at first, so that the same charge comes in sooner.
    expect(chargeThroughTerminals(rested).stopAtS).toBeLessThan(chargeThroughTerminals(rest).stopAtS);
  });
});

describe('what more resistance, current and tolerance do', () => {
  const base = (more: { ohm?: number; amps?: number; tolerance?: number; target?: number }) =>
    chargeThroughTerminals(
      stepOf(
        [{ ...lmoGroup(3.6), ohmicResistanceOhm: more.ohm ?? 0.0008 }],
        CHEMISTRIES['lmo-blend'].curve,
        { maxAmps: more.amps ?? 10, setVolts: more.target ?? 3.92 },
        { relaxedVolts: more.target ?? 3.92, toleranceVolts: more.tolerance ?? 0.002 },
      ),
    ).stopAtS;

  it('a step on the mark never gets shorter with more resistance, nor longer with more current or more tolerance', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.0002, max: 0.004, noNaN: true }),
        fc.double({ min: 3, max: 40, noNaN: true }),
        fc.double({ min: 0.0005, max: 0.01, noNaN: true }),
        (ohm, amps, tolerance) => {
          const time = base({ ohm, amps, tolerance });
          expect(base({ ohm: ohm * 1.2, amps, tolerance })).toBeGreaterThanOrEqual(time - 0.2);
          expect(base({ ohm, amps: amps * 1.2, tolerance })).toBeLessThanOrEqual(time + 0.2);
          expect(base({ ohm, amps, tolerance: tolerance * 1.2 })).toBeLessThanOrEqual(time + 0.2);
        },
      ),
      { numRuns: 100, seed: 2 },
    );
  });

  it('the same module twice as large, with half the resistance, takes twice as long at the same current and the same at twice', () => {
    const small = stepOf([lmoGroup(3.75), lmoGroup(3.76)], NMC, { maxAmps: 10, setVolts: 7.9 }, { cutoffAmps: 1 });
    const large = {
      ...small,
      groups: small.groups.map((group) => ({
        ...group,
        capacityAh: 132,
        ohmicResistanceOhm: 0.0004,
        polarisationResistanceOhm: 0.0006,
      })),
    };
    const doubled = { ...large, source: { ...large.source, maxAmps: 20 }, stop: { ...large.stop, cutoffAmps: 2 } };
    const time = chargeThroughTerminals(small).stopAtS;
    expect(Math.abs(chargeThroughTerminals(doubled).stopAtS / time - 1)).toBeLessThan(1e-4);
  });
});
