import { describe, expect, it } from 'vitest';
import { planCharge, reckonCharge } from '@/calc/index';
import type { LiveReading } from '@/calc/live-types';
import { reckonInput } from './live-fixtures';
import { channel, planInput } from './plan-fixtures';
import { Chance } from './reference/worlds';

/** What a display or a logger makes of the charger's current; the volts are the nominal module's at it. */
function watched(maxAmps: number, everyS: number, untilS: number, shown: (at: number) => number, stepAmps?: number) {
  const over = { maxAmps, ...(stepAmps === undefined ? {} : { displayStepAmps: stepAmps }) };
  const input = planInput({ channels: [channel('A1', over)] });
  const option = planCharge(input).options.find((one) => one.id === 'terminals/over-and-settle/id-A1')!;
  const readings = Array.from({ length: Math.floor(untilS / everyS) }, (_, at): LiveReading => {
    const s = (at + 1) * everyS;
    return { s, amps: shown(at), terminalVolts: null, celsius: null, groupVolts: null };
  });
  const at = (nowS: number) =>
    reckonCharge(reckonInput(input, option, { nowS, readings: readings.filter(({ s }) => s <= nowS) }));
  return { at, readings, currentS: option.currentEndS - option.currentStartS };
}

describe('a current with ripple', () => {
  it('of 3 % to and fro at 10 s raises nothing at any hour, and has the ampere-hours and the end of its mean to 1 %', () => {
    const chance = new Chance(5);
    const { at, currentS } = watched(10, 10, 5400, () => 10 * (1 + 0.03 * Math.sin(2 * Math.PI * chance.uniform())));
    for (const nowS of [600, 1800, 3600, 5400]) {
      const seen = at(nowS);
      expect(seen.odd).toBeNull();
      expect(Math.abs(seen.deliveredAh / ((10 * nowS) / 3600) - 1)).toBeLessThan(0.01);
      expect(Math.abs(seen.currentEndS / currentS - 1)).toBeLessThan(0.03);
    }
  });
});

describe('a display of 0.1 A steps', () => {
  it.each([10, 900])(
    'that flickers between 1.9 and 2.0 A, read every %d s, raises nothing and keeps its end to 3 %',
    (everyS) => {
      const chance = new Chance(6);
      const { at, currentS } = watched(2, everyS, 18_000, () => (chance.uniform() < 0.5 ? 1.9 : 2), 0.1);
      for (const nowS of [1800, 9000, 18_000]) {
        const seen = at(nowS);
        expect(seen.odd).toBeNull();
        expect(Math.abs(seen.currentEndS / (currentS / 0.975) - 1)).toBeLessThan(0.03);
      }
    },
  );
});
