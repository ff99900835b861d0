import { describe, expect, it } from 'vitest';
import {
  planCharge,
  type ChannelParameters,
  type NumberSource,
  type PlanInput,
  type PlanOption,
  type ResistanceKind,
} from '@/calc/index';
import { channel, lmoModule, lmoSpare, planInput, target } from './plan-fixtures';

const option = (over: Partial<PlanInput>, finish: PlanOption['finish'] = 'over-and-settle'): PlanOption =>
  planCharge(planInput({ samples: 256, ...over })).options.find(
    (one) => one.way === 'terminals' && one.finish === finish,
  )!;
const width = ({ totalS }: PlanOption): number => totalS.p90 - totalS.p10;

describe('the band by where a number comes from', () => {
  it('is 3, 6 and 12 % of capacity wide for a measured, a labelled and a guessed one, where that is all the doubt', () => {
    // What is left is 0.2 %: widths of a normal distribution from 10 to 90 %, of the seconds of current.
    const rest = { resistanceRelative: 0, currentRelative: 0.002, meterVolts: 0, readingVolts: 0, targetVolts: 0 };
    const spreads = { ...rest, chargerVolts: 0, curveVolts: 0, temperatureCelsius: 0 };
    const sources: [NumberSource, number][] = [
      ['measured', 0.03],
      ['label', 0.06],
      ['guessed', 0.12],
    ];
    for (const [capacitySource, sd] of sources) {
      const one = option({ spare: { ...lmoSpare, capacitySource }, spreads });
      const currentS = one.currentEndS - one.currentStartS;
      const expected = 2 * Math.sinh(1.2816 * sd);
      expect(Math.abs(width(one) / currentS / expected - 1)).toBeLessThan(0.05);
      expect(one.dominant).toBe('capacity');
    }
  });

  it('on the mark widens from a typed long resistance over pulses to the 1 kHz one and to none typed', () => {
    const known = { ...lmoModule, resistanceOhm: 0.002 };
    const kinds: ResistanceKind[] = ['long', 'pulse-10s', 'pulse-0.5s', 'ac-1khz'];
    const shares = kinds.map((resistanceKind) => {
      const one = option({ module: { ...known, resistanceKind }, spreads: { chargerVolts: 0 } }, 'on-the-mark');
      return width(one) / (one.currentEndS - one.currentStartS);
    });
    for (let at = 1; at < shares.length; at += 1) expect(shares[at]).toBeGreaterThan(shares[at - 1]!);
  });
});

describe('what makes most of a band on the mark', () => {
  const bands = (one: Partial<ChannelParameters>, other: Partial<ChannelParameters>) =>
    [one, other].map((over) =>
      option({ channels: [channel('A1', over)], target: { ...target, toleranceVolts: 0.006 } }, 'on-the-mark'),
    );

  it('is the leads that nobody has measured, and measuring them narrows it by what is said, to 20 %', () => {
    const leads = { senses: 'own-terminals' as const, leadResistanceOhm: 0.015 };
    const [guessed, measured] = bands({ ...leads, leadsMeasured: false }, { ...leads, leadsMeasured: true });
    expect(guessed!.dominant).toBe('leads');
    expect(guessed!.narrowsByS).toBeGreaterThan(600);
    // Worked out a second way: the same plan with them measured.
    const gained = width(guessed!) - width(measured!);
    expect(Math.abs(guessed!.narrowsByS / gained - 1)).toBeLessThan(0.2);
    expect(measured!.dominant).not.toBe('leads');
  });

  it('is the voltmeter of a charger that may be 12 mV off, and a checked one is not named', () => {
    const [off, checked] = bands({ offsetSdVolts: 0.012 }, { offsetSdVolts: 0.0005 });
    expect(off!.dominant).toBe('charger');
    expect(Math.abs(off!.narrowsByS / (width(off!) - width(checked!)) - 1)).toBeLessThan(0.2);
    expect(checked!.dominant).not.toBe('charger');
  });
});
