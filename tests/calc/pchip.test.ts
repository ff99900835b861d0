import { CalcInputError, isBeyondCurve, shiftCurve, slopeAtSoc, socAtVolts, voltsAtSoc } from '@/calc/index';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { LMO_BLEND, PCHIP_CHECKS } from './reference/curves';

describe('the open-circuit curve', () => {
  // Check values: SciPy's PchipInterpolator, from the independent numerical reference.
  it.each(PCHIP_CHECKS)('of $name agrees with PCHIP at nine points to 1 µV and its slope to 1e-6', (check) => {
    check.soc.forEach((soc, i) => {
      expect(Math.abs(voltsAtSoc(check.table, soc) - check.volts[i]!)).toBeLessThan(1e-6);
      expect(Math.abs(slopeAtSoc(check.table, soc) / check.slope[i]! - 1)).toBeLessThan(1e-6);
    });
  });

  it('goes through its own points and straight on beyond both ends', () => {
    LMO_BLEND.soc.forEach((soc, i) => expect(voltsAtSoc(LMO_BLEND, soc)).toBeCloseTo(LMO_BLEND.volts[i]!, 12));
    const below = slopeAtSoc(LMO_BLEND, -0.01);
    expect(slopeAtSoc(LMO_BLEND, -0.3)).toBe(below);
    expect(slopeAtSoc(LMO_BLEND, 0)).toBeCloseTo(below, 12);
    expect(voltsAtSoc(LMO_BLEND, -0.1)).toBeCloseTo(3.1 - 0.1 * below, 12);
    const above = slopeAtSoc(LMO_BLEND, 1.2);
    expect(voltsAtSoc(LMO_BLEND, 1.05)).toBeCloseTo(4.185 + 0.05 * above, 12);
    expect(isBeyondCurve(LMO_BLEND, 4.186)).toBe(true);
    expect(isBeyondCurve(LMO_BLEND, 3.1)).toBe(false);
  });

  const risingTable = fc
    .array(fc.tuple(fc.double({ min: 0.005, max: 1, noNaN: true }), fc.double({ min: 0.0005, max: 1, noNaN: true })), {
      minLength: 2,
      maxLength: 30,
    })
    .map((steps) => {
      const soc = [0];
      const volts = [2];
      for (const [right, up] of steps) {
        soc.push(soc.at(-1)! + right);
        volts.push(volts.at(-1)! + up);
      }
      return { soc, volts };
    });

  it('never falls, whatever rises in its table, and its inverse leads back to within 1e-9 V', () => {
    fc.assert(
      fc.property(risingTable, fc.double({ min: 0, max: 1, noNaN: true }), (table, part) => {
        const last = table.soc.at(-1)!;
        const soc = part * last;
        const volts = voltsAtSoc(table, soc);
        expect(slopeAtSoc(table, soc)).toBeGreaterThanOrEqual(-1e-9);
        expect(voltsAtSoc(table, Math.min(last, soc + 0.01 * last))).toBeGreaterThanOrEqual(volts - 1e-12);
        expect(Math.abs(voltsAtSoc(table, socAtVolts(table, volts)) - volts)).toBeLessThan(1e-9);
      }),
      { numRuns: 300, seed: 7 },
    );
  });

  it('its slope is that of its volts: differences of 1e-6 agree to 1e-4 V', () => {
    for (let soc = 0.013; soc < 1; soc += 0.0511) {
      const difference = (voltsAtSoc(LMO_BLEND, soc + 5e-7) - voltsAtSoc(LMO_BLEND, soc - 5e-7)) / 1e-6;
      expect(Math.abs(slopeAtSoc(LMO_BLEND, soc) - difference)).toBeLessThan(1e-4);
    }
  });

  it('a shift by 4 mV moves every voltage by 4 mV and no state of charge', () => {
    const shifted = shiftCurve(LMO_BLEND, 0.004);
    for (const soc of [-0.05, 0.2, 0.61, 1.1])
      expect(voltsAtSoc(shifted, soc) - voltsAtSoc(LMO_BLEND, soc)).toBeCloseTo(0.004, 12);
  });

  it.each([
    ['curve.soc', { soc: [0.5], volts: [3] }],
    ['curve.volts', { soc: [0, 1], volts: [3, 3.5, 4] }],
    ['curve.soc[2]', { soc: [0, 0.5, 0.5], volts: [3, 3.5, 4] }],
    ['curve.volts[1]', { soc: [0, 0.5, 1], volts: [3, 2.9, 4] }],
    ['curve.volts[1]', { soc: [0, 1], volts: [3, Number.NaN] }],
  ])('refuses a table at fault and names %s', (field, table) => {
    try {
      voltsAtSoc(table, 0.5);
      expect.unreachable('the table was taken');
    } catch (error) {
      expect(error).toBeInstanceOf(CalcInputError);
      expect((error as CalcInputError).field).toBe(field);
      expect((error as CalcInputError).allowed).not.toBe('');
    }
  });
});
