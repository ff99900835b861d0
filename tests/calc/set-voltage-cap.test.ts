import {
  CHEMISTRIES,
  chargeThroughTerminals,
  setVoltageCap,
  voltsAtSoc,
  type CellGroup,
  type ChemistryId,
} from '@/calc/index';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { stepOf } from './reference/modules';

const chemistries = Object.keys(CHEMISTRIES) as ChemistryId[];

/** Unequal groups of any chemistry: charge 15 to 60 %, 20 % apart at most, capacities and resistances to ±15 %. */
const unequalModule = fc.record({
  chemistry: fc.constantFrom(...chemistries),
  capacityAh: fc.double({ min: 5, max: 200, noNaN: true }),
  middle: fc.double({ min: 0.25, max: 0.6, noNaN: true }),
  groups: fc.array(
    fc.record({
      soc: fc.double({ min: -0.1, max: 0.1, noNaN: true }),
      capacity: fc.double({ min: 0.85, max: 1.15, noNaN: true }),
      resistance: fc.double({ min: 0.85, max: 1.15, noNaN: true }),
    }),
    { minLength: 1, maxLength: 8 },
  ),
  rate: fc.double({ min: 0.05, max: 0.5, noNaN: true }),
});

type Drawn = typeof unequalModule extends fc.Arbitrary<infer T> ? T : never;

function groupsOf({ chemistry, capacityAh, middle, groups }: Drawn): CellGroup[] {
  const { curve, resistanceOhmAh, polarisationTimeConstantS } = CHEMISTRIES[chemistry];
  return groups.map((group) => ({
    capacityAh: capacityAh * group.capacity,
    ohmicResistanceOhm: (0.4 * resistanceOhmAh * group.resistance) / capacityAh,
    polarisationResistanceOhm: (0.6 * resistanceOhmAh * group.resistance) / capacityAh,
    polarisationTimeConstantS,
    restVolts: voltsAtSoc(curve, middle + group.soc),
  }));
}

describe('the set-voltage cap', () => {
  it('a forgotten charger, run until nothing flows, leaves every group at or under its limit and one at it', () => {
    fc.assert(
      fc.property(unequalModule, (drawn) => {
        const { curve, chargeLimitVolts, coulombicEfficiency } = CHEMISTRIES[drawn.chemistry];
        const groups = groupsOf(drawn);
        const limitVolts = Math.min(chargeLimitVolts, voltsAtSoc(curve, 0.96));
        const cap = setVoltageCap({ groups, curve, limitVolts, direction: 'charge', coulombicEfficiency });
        const end = chargeThroughTerminals(
          stepOf(
            groups,
            curve,
            { maxAmps: drawn.rate * drawn.capacityAh, setVolts: cap.volts, leadResistanceOhm: 0.001 },
            { cutoffAmps: 1e-4 * drawn.capacityAh },
            { coulombicEfficiency },
          ),
        );
        const rest = end.groups.map((group) => voltsAtSoc(curve, group.soc));
        expect(end.outcome).toBe('cutoff');
        expect(Math.max(...rest)).toBeLessThanOrEqual(limitVolts + 1e-6);
        expect(limitVolts - Math.max(...rest)).toBeLessThan(0.001);
        expect(Math.max(...rest) - rest[cap.limitingGroup]!).toBeLessThan(1e-9);
      }),
      { numRuns: 150, seed: 3 },
    );
  });

  it('20 mV above it, a forgotten charger takes the first group over its limit: the cap is not merely cautious', () => {
    fc.assert(
      fc.property(unequalModule, (drawn) => {
        const { curve, coulombicEfficiency } = CHEMISTRIES[drawn.chemistry];
        const groups = groupsOf(drawn);
        const limitVolts = voltsAtSoc(curve, 0.9);
        const cap = setVoltageCap({ groups, curve, limitVolts, direction: 'charge', coulombicEfficiency });
        const end = chargeThroughTerminals(
          stepOf(
            groups,
            curve,
            { maxAmps: drawn.capacityAh / 3, setVolts: cap.volts + 0.02 },
            { cutoffAmps: 1e-4 * drawn.capacityAh },
            { coulombicEfficiency },
          ),
        );
        expect(voltsAtSoc(curve, end.groups[cap.limitingGroup]!.soc)).toBeGreaterThan(limitVolts);
      }),
      { numRuns: 60, seed: 4 },
    );
  });

  it('mirrored for a discharge: no group rests under its lower limit', () => {
    fc.assert(
      fc.property(unequalModule, (drawn) => {
        const { curve, dischargeLimitVolts } = CHEMISTRIES[drawn.chemistry];
        const groups = groupsOf(drawn);
        const limitVolts = Math.max(dischargeLimitVolts, voltsAtSoc(curve, 0.1));
        const cap = setVoltageCap({ groups, curve, limitVolts, direction: 'discharge' });
        const end = chargeThroughTerminals(
          stepOf(
            groups,
            curve,
            { maxAmps: drawn.rate * drawn.capacityAh, setVolts: cap.volts },
            { cutoffAmps: 1e-4 * drawn.capacityAh },
            { direction: 'discharge' },
          ),
        );
        const rest = end.groups.map((group) => voltsAtSoc(curve, group.soc));
        expect(Math.min(...rest)).toBeGreaterThanOrEqual(limitVolts - 1e-6);
      }),
      { numRuns: 80, seed: 5 },
    );
  });

  it('is lower than the limit less the differences of the start, where the curve is steeper further up', () => {
    // A group 20 mV ahead on the LMO-blend plateau is far more than 20 mV ahead near full.
    const { curve } = CHEMISTRIES['lmo-blend'];
    const group = (restVolts: number): CellGroup => ({
      capacityAh: 66,
      ohmicResistanceOhm: 0.0008,
      polarisationResistanceOhm: 0.0012,
      polarisationTimeConstantS: 300,
      restVolts,
    });
    const groups = [group(3.93), group(3.95)];
    const cap = setVoltageCap({ groups, curve, limitVolts: 4.18, direction: 'charge' });
    expect(cap.limitingGroup).toBe(1);
    expect(cap.groupVolts[1]).toBeCloseTo(4.18, 9);
    expect(cap.volts).toBeLessThan(4.18 + 4.16 - 0.02);
  });
});
