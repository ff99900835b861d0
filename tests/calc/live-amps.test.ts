import { describe, expect, it } from 'vitest';
import { planCharge, reckonCharge, type ChannelParameters } from '@/calc/index';
import type { LiveReading } from '@/calc/live-types';
import { reckonInput } from './live-fixtures';
import { channel, lmoSpare, planInput, target } from './plan-fixtures';
import { Chance } from './reference/worlds';

/** What a display or a logger makes of the charger's current; the volts are the nominal module's at it. */
function watched(
  maxAmps: number,
  everyS: number,
  untilS: number,
  shown: (at: number) => number,
  over: Partial<ChannelParameters> = {},
) {
  const input = planInput({ channels: [channel('A1', { maxAmps, ...over })] });
  const option = planCharge(input).options.find((one) => one.id === 'terminals/over-and-settle/id-A1')!;
  const readings = Array.from({ length: Math.floor(untilS / everyS) }, (_, at): LiveReading => {
    const s = (at + 1) * everyS;
    return { s, amps: shown(at), terminalVolts: null, celsius: null, groupVolts: null };
  });
  const at = (nowS: number) =>
    reckonCharge(reckonInput(input, option, { nowS, readings: readings.filter(({ s }) => s <= nowS) }));
  return { at, readings, currentS: option.currentEndS - option.currentStartS };
}

describe('a discharge', () => {
  it.each([-1, 1])('read as planned with the sign %d raises nothing and ends where it was to end, to 3 %%', (sign) => {
    const input = planInput({
      channels: [channel('A1', { canDischarge: true, dischargeAmps: 10 })],
      spare: { ...lmoSpare, groupVolts: [3.95, 3.95] },
      target: { ...target, volts: 3.85 },
    });
    const option = planCharge(input).options.find((one) => one.direction === 'discharge' && one.way === 'terminals')!;
    const endS = option.currentEndS - option.currentStartS;
    for (const nowS of [600, 1800]) {
      const seen = reckonCharge(
        reckonInput(input, option, {
          nowS,
          readings: [600, 1200, 1800]
            .filter((s) => s <= nowS)
            .map((s) => ({ s, amps: sign * 10, terminalVolts: null, celsius: null, groupVolts: null })),
        }),
      );
      expect(seen.odd).toBeNull();
      expect(seen.amps).toBeCloseTo(-10, 6);
      expect(Math.abs(seen.currentEndS / endS - 1)).toBeLessThan(0.03);
    }
  });
});

describe('a current with ripple', () => {
  it('of 3 % to and fro at 10 s raises nothing at any hour, has the ampere-hours of its mean to 1 % and the end to 4 %', () => {
    const chance = new Chance(5);
    const { at, currentS } = watched(10, 10, 5400, () => 10 * (1 + 0.03 * Math.sin(2 * Math.PI * chance.uniform())));
    for (const nowS of [600, 1800, 3600, 5400]) {
      const seen = at(nowS);
      expect(seen.odd).toBeNull();
      expect(Math.abs(seen.deliveredAh / ((10 * nowS) / 3600) - 1)).toBeLessThan(0.01);
      // Seven kinds of draws are resampled by the current alone: the middle of 256 samples scatters by some 3 % of what is left.
      expect(Math.abs(seen.currentEndS / currentS - 1)).toBeLessThan(0.04);
    }
  });
});

describe('a display of 0.1 A steps', () => {
  it.each([10, 900])(
    'that flickers between 1.9 and 2.0 A, read every %d s, raises nothing and keeps its end to 3 %',
    (everyS) => {
      const chance = new Chance(6);
      const { at, currentS } = watched(2, everyS, 18_000, () => (chance.uniform() < 0.5 ? 1.9 : 2), {
        displayStepAmps: 0.1,
      });
      for (const nowS of [1800, 9000, 18_000]) {
        const seen = at(nowS);
        expect(seen.odd).toBeNull();
        expect(Math.abs(seen.currentEndS / (currentS / 0.975) - 1)).toBeLessThan(0.03);
      }
    },
  );
});

describe('a charger that gives 70 % when it is warm', () => {
  const derating = { aboveCelsius: 30, ampsShare: 0.7 };
  // 10 A for 40 min and 7 A from then on.
  const shown = (at: number): number => (at < 4 ? 10 : 7);

  it('and does so after 40 min raises nothing, and ends with what is left at 7 A, to 2 %', () => {
    const { at, currentS } = watched(10, 600, 5400, shown, { derating });
    const nowS = 5400;
    const seen = at(nowS);
    expect(seen.odd).toBeNull();
    // Half way from the last 10 A to the first 7 A by the trapezium, as all readings are taken.
    const ampSeconds = 10 * 2400 + 8.5 * 600 + 7 * 2400;
    expect(seen.deliveredAh).toBeCloseTo(ampSeconds / 3600, 6);
    expect(Math.abs(seen.currentEndS / (nowS + (10 * currentS - ampSeconds) / 7) - 1)).toBeLessThan(0.02);
  });

  it('is a stuck current where nobody has said that it does so', () => {
    expect(watched(10, 600, 5400, shown).at(5400).odd?.kind).toBe('stuck-current');
  });
});
