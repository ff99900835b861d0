import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  bleedHours,
  CalcInputError,
  CHEMISTRIES,
  readingAmpHours,
  slopeAtSoc,
  spareAgreement,
  voltsAtSoc,
} from '@/calc/index';
import { LFP, LMO_BLEND, NMC } from './reference/curves';
import { advanced, spreadOver } from './pack-fixtures';

describe('a reading in ampere-hours', () => {
  it('gives back what was put into each group: −3, 0, 0.5 and 2 Ah of 66 about the middle', () => {
    const put = [-3, 0, 0, 0.5, 2];
    const volts = put.map((ampHours) => voltsAtSoc(LMO_BLEND, 0.55 + ampHours / 66));
    const found = readingAmpHours({ volts, curve: LMO_BLEND, capacityAh: 66 });
    found.ampHours.forEach((ampHours, group) => expect(ampHours).toBeCloseTo(put[group]!, 9));
    expect(found.spreadAh).toBeCloseTo(5, 9);
    expect(found.medianSoc).toBeCloseTo(0.55, 9);
    expect(found.meanSoc).toBeCloseTo(0.55 - 0.5 / 66 / 5, 9);
  });

  it('the same 20 mV are some 3.5 Ah at 60 % and 1.4 Ah at 95 %', () => {
    const spread = (soc: number) =>
      readingAmpHours({ volts: spreadOver(voltsAtSoc(LMO_BLEND, soc), 0.02, 5), curve: LMO_BLEND, capacityAh: 66 })
        .spreadAh;
    // Twice the 10 mV of the reference's slopes: 1.785 Ah at 60 %, 0.734 Ah at 95 %.
    expect(Math.abs(spread(0.6) / 3.57 - 1)).toBeLessThan(0.05);
    expect(Math.abs(spread(0.95) / 1.468 - 1)).toBeLessThan(0.05);
  });

  it('takes a capacity for each group: 10 mV of a 33 Ah group are half of a 66 Ah one’s', () => {
    const volts = [3.9, 3.9, 3.9, 3.91, 3.91];
    const { ampHours } = readingAmpHours({ volts, curve: LMO_BLEND, capacityAh: [66, 66, 66, 66, 33] });
    expect(ampHours[3]! / ampHours[4]!).toBeCloseTo(2, 9);
  });

  it('is 0 throughout for equal volts, for one group and for 400', () => {
    for (const groups of [1, 2, 400])
      expect(
        readingAmpHours({ volts: Array<number>(groups).fill(3.9), curve: LMO_BLEND, capacityAh: 66 }).ampHours.every(
          (ampHours) => ampHours === 0,
        ),
      ).toBe(true);
  });

  it('holds a dead group within 5 % beyond empty: it never misses more than the group can hold and a twentieth', () => {
    const found = readingAmpHours({
      volts: [3.9, 3.9, 3.9, 0, -0.5],
      curve: CHEMISTRIES['lmo-blend'].curve,
      capacityAh: 66,
    });
    expect(found.beyondCurve).toEqual([3, 4]);
    for (const group of [3, 4]) {
      expect(found.ampHours[group]!).toBeGreaterThan(-66 * 1.05);
      expect(found.ampHours[group]!).toBeLessThan(-66 * 0.2);
    }
  });

  it('refuses volts that are none, no groups, and capacities that do not fit', () => {
    const base = { volts: [3.9, 3.91], curve: LMO_BLEND };
    expect(() => readingAmpHours({ ...base, volts: [Number.NaN], capacityAh: 66 })).toThrow(CalcInputError);
    expect(() => readingAmpHours({ ...base, volts: [], capacityAh: 66 })).toThrow(CalcInputError);
    expect(() => readingAmpHours({ ...base, capacityAh: [66] })).toThrow(CalcInputError);
    expect(() => readingAmpHours({ ...base, capacityAh: [66, -1] })).toThrow(CalcInputError);
  });
});

describe('hours of bleeding', () => {
  // Electronics World, Nov. 2025, p. 28: 5 % of 4 Ah at 200 mA takes about 1 h, at 100 mA 2 h; 15 Ah at 300 mA over 50 h
  // (15 / 0.3 is 50 to the hour).
  it.each([
    [4, 0.2, 1],
    [4, 0.1, 2],
    [300, 0.3, 50],
  ])('take a twentieth off %d Ah at %d A in %d h, on any curve', (capacityAh, bleedAmps, hours) => {
    for (const curve of [LMO_BLEND, NMC, LFP])
      for (const soc of [0.95, 0.6, 0.35])
        expect(
          bleedHours({
            fromVolts: voltsAtSoc(curve, soc),
            toVolts: voltsAtSoc(curve, soc - 0.05),
            capacityAh,
            curve,
            bleedAmps,
          }),
        ).toBeCloseTo(hours, 9);
  });

  // sources.md §9, by the slope of the LMO table of the worked examples: 10 mV of 66 Ah; 11, 20 and 7 h at 100 mA.
  it.each([
    [0.3, 1.07, 11],
    [0.65, 1.96, 20],
    [0.95, 0.73, 7],
  ])('for 10 mV of 66 Ah at %d of its charge, within a hundredth: %d Ah, %d h at 100 mA', (soc, ampHours, hours) => {
    const middle = voltsAtSoc(LMO_BLEND, soc);
    const found = bleedHours({
      fromVolts: middle + 0.005,
      toVolts: middle - 0.005,
      capacityAh: 66,
      curve: LMO_BLEND,
      bleedAmps: 0.1,
    });
    expect(Math.abs((0.1 * found) / ampHours - 1)).toBeLessThan(0.01);
    expect(Math.round(found)).toBe(hours);
  });

  it('double with half the current and add up over parts', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 3.5, max: 4.1, noNaN: true }),
        fc.double({ min: 0.001, max: 0.04, noNaN: true }),
        fc.double({ min: 0.01, max: 1, noNaN: true }),
        (toVolts, more, bleedAmps) => {
          const of = (fromVolts: number, to: number, amps: number) =>
            bleedHours({ fromVolts, toVolts: to, capacityAh: 52, curve: NMC, bleedAmps: amps });
          const whole = of(toVolts + 2 * more, toVolts, bleedAmps);
          const parts = of(toVolts + 2 * more, toVolts + more, bleedAmps) + of(toVolts + more, toVolts, bleedAmps);
          expect(Math.abs(parts / whole - 1)).toBeLessThan(1e-9);
          expect(of(toVolts + 2 * more, toVolts, bleedAmps / 2) / whole).toBeCloseTo(2, 9);
        },
      ),
    );
  });

  it('are 0 where there is nothing to do; upwards, no current and no capacity are refused', () => {
    const base = { fromVolts: 3.9, toVolts: 3.9, capacityAh: 66, curve: LMO_BLEND, bleedAmps: 0.1 };
    expect(bleedHours(base)).toBe(0);
    expect(() => bleedHours({ ...base, toVolts: 3.91 })).toThrow(/bleeding takes charge off/);
    expect(() => bleedHours({ ...base, bleedAmps: 0 })).toThrow(CalcInputError);
    expect(() => bleedHours({ ...base, bleedAmps: -0.1 })).toThrow(CalcInputError);
    expect(() => bleedHours({ ...base, capacityAh: Number.NaN })).toThrow(CalcInputError);
    expect(() => bleedHours({ ...base, fromVolts: 3900 })).toThrow(CalcInputError);
  });
});

describe('a spare of other capacity', () => {
  it.each([
    [60, 48],
    [48, 60],
    [66, 52],
  ])('of %d Ah among %d Ah, matched at 0.6, is off as a step through all groups leaves it', (spareAh, neighboursAh) => {
    const found = spareAgreement({ spareAh, neighboursAh, matchSoc: 0.6, curve: LMO_BLEND });
    // Second path: move the pair by the same ampere-hours until the first of them is full, or at 10 %.
    const least = Math.min(spareAh, neighboursAh);
    const full = advanced([spareAh, neighboursAh], 0.6, 0.4 * least);
    const low = advanced([spareAh, neighboursAh], 0.6, -0.5 * least);
    expect(found.atFullVolts).toBeCloseTo(full[0]! - full[1]!, 12);
    expect(found.atLowVolts).toBeCloseTo(low[0]! - low[1]!, 12);
    // The smaller one is above at full and below at low charge.
    expect(Math.sign(found.atFullVolts)).toBe(Math.sign(neighboursAh - spareAh));
    expect(Math.sign(found.atLowVolts)).toBe(Math.sign(spareAh - neighboursAh));
  });

  it.each([LMO_BLEND, NMC, LFP])('is best matched where a search over 2000 matches finds none better', (curve) => {
    for (const [spareAh, neighboursAh] of [
      [60, 48],
      [48, 60],
    ] as const) {
      const { bestMatchSoc, best } = spareAgreement({ spareAh, neighboursAh, matchSoc: 0.5, curve });
      const worst = (matchSoc: number) => {
        const at = spareAgreement({ spareAh, neighboursAh, matchSoc, curve });
        return Math.max(Math.abs(at.atFullVolts), Math.abs(at.atLowVolts));
      };
      let least = Infinity;
      for (let step = 0; step <= 2000; step += 1) least = Math.min(least, worst(0.1 + (0.9 * step) / 2000));
      expect(worst(bestMatchSoc)).toBeLessThanOrEqual(least + 1e-9);
      expect(Math.abs(best.atFullVolts)).toBeCloseTo(Math.abs(best.atLowVolts), 6);
    }
  });

  it('of the same capacity agrees everywhere, and your match stands', () => {
    expect(spareAgreement({ spareAh: 66, neighboursAh: 66, matchSoc: 0.42, curve: LMO_BLEND })).toEqual({
      atFullVolts: 0,
      atLowVolts: 0,
      bestMatchSoc: 0.42,
      best: { atFullVolts: 0, atLowVolts: 0 },
    });
  });

  it('matched at full agrees at full, matched at the low charge or below agrees there', () => {
    const at = (matchSoc: number) => spareAgreement({ spareAh: 48, neighboursAh: 60, matchSoc, curve: LMO_BLEND });
    expect(at(1).atFullVolts).toBe(0);
    expect(at(0.1).atLowVolts).toBe(0);
    expect(at(0.05).atLowVolts).toBe(0);
    expect(at(0.05).atFullVolts).toBeGreaterThan(at(0.5).atFullVolts);
  });

  it('for a few per cent of difference it is ΔQ/Q of the charge moved times the slope', () => {
    const { atFullVolts } = spareAgreement({ spareAh: 65.9, neighboursAh: 66, matchSoc: 0.6, curve: LMO_BLEND });
    const expected = 0.4 * (0.1 / 66) * slopeAtSoc(LMO_BLEND, 1);
    expect(Math.abs(atFullVolts / expected - 1)).toBeLessThan(0.02);
  });

  it('refuses capacities of 0 and a match beyond full', () => {
    const base = { spareAh: 48, neighboursAh: 60, matchSoc: 0.5, curve: LMO_BLEND };
    expect(() => spareAgreement({ ...base, spareAh: 0 })).toThrow(CalcInputError);
    expect(() => spareAgreement({ ...base, neighboursAh: -60 })).toThrow(CalcInputError);
    expect(() => spareAgreement({ ...base, matchSoc: 60 })).toThrow(CalcInputError);
    expect(() => spareAgreement({ ...base, lowSoc: Number.NaN })).toThrow(CalcInputError);
  });
});
