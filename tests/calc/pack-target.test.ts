import * as mathjs from 'mathjs';
import { describe, expect, it } from 'vitest';
import { CalcInputError, CHEMISTRIES, packTarget, socAtVolts, voltsAtSoc, type PackTargetInput } from '@/calc/index';
import { LMO_BLEND } from './reference/curves';
import { normals } from './pack-fixtures';

const even = (groups: number, volts = 3.9) => Array.from({ length: groups }, (_, at) => volts + ((at % 3) - 1) * 0.002);
const input = (over: Partial<PackTargetInput> = {}): PackTargetInput => ({
  volts: even(96),
  odd: [],
  curve: LMO_BLEND,
  meterSdVolts: 0.001,
  ageS: 3600,
  celsius: 22,
  restS: 7200,
  capacityAh: 66,
  ...over,
});

describe('the target of a pack', () => {
  it('is the median of the healthy groups, whatever the two odd ones read', () => {
    const volts = even(96);
    volts[10] = 0.2;
    volts[11] = 4.19;
    const found = packTarget(input({ volts, odd: [10, 11, 11] }));
    expect(found.volts).toBeCloseTo(mathjs.median(volts.filter((_, at) => at !== 10 && at !== 11)) as number, 12);
    expect(found.healthy).toBe(94);
    expect(found.trust).toBe('good');
    expect(found.reasons).toEqual([]);
  });

  it('its standard error is the scatter of 4000 medians of 96 groups with 4 mV each and a meter of 1 mV, to 5 %', () => {
    const normal = normals(3);
    const medians: number[] = [];
    let said = 0;
    for (let pack = 0; pack < 4000; pack += 1) {
      const offset = 0.001 * normal();
      const found = packTarget(input({ volts: Array.from({ length: 96 }, () => 3.9 + offset + 0.004 * normal()) }));
      medians.push(found.volts);
      said += found.standardErrorVolts / 4000;
    }
    expect(Math.abs(said / Number(mathjs.std(medians, 'uncorrected')) - 1)).toBeLessThan(0.05);
  });

  it('never falls below the meter, and not below the last digit over the root of the groups', () => {
    const found = packTarget(input({ volts: Array<number>(4).fill(3.9), meterSdVolts: 0.002 }));
    expect(found.standardErrorVolts).toBeCloseTo(Math.hypot(0.002, (1.2533 * 0.001) / 2), 9);
  });

  // Slopes of the independent reference at 47.5 % and 62.5 % charge: 0.358293 and 0.3354945 V.
  it.each([
    [0.475, 3.908826, 0.358293],
    [0.625, 3.964742, 0.3354945],
  ])('at %d charge its slope is the reference’s, and 1 mV of 66 Ah is 0.066 Ah over it', (soc, volts, slope) => {
    const found = packTarget(input({ volts: Array<number>(8).fill(volts) }));
    expect(Math.abs(found.soc - soc)).toBeLessThan(1e-5);
    expect(Math.abs(found.slopeVoltsPerSoc / slope - 1)).toBeLessThan(1e-4);
    expect(found.ampHoursPerMillivolt).toBeCloseTo(0.066 / slope, 4);
  });

  it('leaves out what a millivolt is worth where nobody gave the capacity', () => {
    expect(packTarget(input({ capacityAh: null }))).not.toHaveProperty('ampHoursPerMillivolt');
  });

  it('reads an NMC pack of 5 °C on its own curve: 20 K at −0.36 mV/K are 7.2 mV at 10 %', () => {
    const { curve, temperatureCoefficient } = CHEMISTRIES.nmc;
    const warm = voltsAtSoc(curve, 0.1);
    const found = packTarget(
      input({ volts: Array<number>(9).fill(warm + 0.0072), curve, temperatureCoefficient, celsius: 5 }),
    );
    expect(found.soc).toBeCloseTo(0.1, 6);
    expect(found.volts).toBeCloseTo(warm + 0.0072, 12);
    expect(found.reasons).toContain('cold-or-warm');
  });

  const lfp = CHEMISTRIES.lfp;
  it.each<[string, Partial<PackTargetInput>, 'fair' | 'poor', string]>([
    [
      'LFP at 40 %, 0.85 % a mV',
      { volts: Array<number>(16).fill(voltsAtSoc(lfp.curve, 0.4)), curve: lfp.curve },
      'fair',
      'flat-curve',
    ],
    [
      'LFP at 50 %, 1.8 % a mV',
      { volts: Array<number>(16).fill(voltsAtSoc(lfp.curve, 0.5)), curve: lfp.curve },
      'poor',
      'flat-curve',
    ],
    [
      'LFP at 20 % with its ±25 mV',
      {
        volts: Array<number>(16).fill(voltsAtSoc(lfp.curve, 0.2)),
        curve: lfp.curve,
        hysteresisVolts: lfp.hysteresisVolts,
      },
      'poor',
      'flat-curve',
    ],
    ['25 h old', { ageS: 90_000 }, 'fair', 'old-reading'],
    ['8 days old', { ageS: 8 * 86_400 }, 'poor', 'old-reading'],
    ['three healthy of four', { volts: even(4), odd: [0] }, 'fair', 'few-healthy'],
    ['one group', { volts: [3.9] }, 'poor', 'few-healthy'],
    ['half of 96 odd', { odd: Array.from({ length: 48 }, (_, at) => at) }, 'poor', 'few-healthy'],
    ['30 mV among the healthy', { volts: [...even(90), 3.88, 3.91] }, 'fair', 'wide-spread'],
    ['80 mV among the healthy', { volts: [...even(90), 3.86, 3.94] }, 'poor', 'wide-spread'],
    ['rested 50 min', { restS: 3000 }, 'fair', 'short-rest'],
    ['rested 10 min', { restS: 600 }, 'poor', 'short-rest'],
    ['rested 70 min at 12 °C', { restS: 4200, celsius: 14.9, curveCelsius: 20 }, 'fair', 'short-rest'],
    ['a rest that nobody noted', { restS: null }, 'fair', 'unknown-rest'],
    ['at 12 °C', { celsius: 12 }, 'fair', 'cold-or-warm'],
    ['at −5 °C', { celsius: -5 }, 'poor', 'cold-or-warm'],
  ])('trusts %s less', (_, over, trust, reason) => {
    expect(packTarget(input(over))).toMatchObject({ trust, reasons: [reason] });
  });

  it('names the weightiest first: an old reading of 9 days before a rest of 50 min', () => {
    expect(packTarget(input({ restS: 3000, ageS: 9 * 86_400 })).reasons).toEqual(['old-reading', 'short-rest']);
  });

  it.each<[string, Partial<PackTargetInput>]>([
    ['all groups odd', { volts: even(3), odd: [0, 1, 2] }],
    ['an odd group that is not there', { odd: [96] }],
    ['no groups', { volts: [] }],
    ['no number', { volts: [3.9, Number.NaN] }],
    ['a pack that is reversed', { volts: [-3.9, -3.9, -3.8] }],
    ['an age below 0', { ageS: -1 }],
    ['a meter of no doubt known', { meterSdVolts: Number.NaN }],
    ['a capacity of 0', { capacityAh: 0 }],
    ['a temperature that is none', { celsius: Number.NaN }],
  ])('refuses %s', (_, over) => expect(() => packTarget(input(over))).toThrow(CalcInputError));

  it('takes 400 groups, and a reversed one that is left out', () => {
    const volts = even(400);
    volts[399] = -0.6;
    const found = packTarget(input({ volts, odd: [399] }));
    expect(found.healthy).toBe(399);
    expect(found.soc).toBeCloseTo(socAtVolts(LMO_BLEND, 3.9), 9);
  });
});
