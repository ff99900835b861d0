import * as mathjs from 'mathjs';
import { describe, expect, it } from 'vitest';
import {
  balanceForecast,
  CalcInputError,
  socAtVolts,
  voltsAtSoc,
  type BalanceForecastOptions,
  type PackReading,
} from '@/calc/index';
import { neverRisingChiSquared, weightedLine } from '@/calc/pack/weighted-line';
import { LMO_BLEND, NMC } from './reference/curves';
import { advanced, ampHoursBetween, commonLog, normals, spreadOver } from './pack-fixtures';

const options = (over: Partial<BalanceForecastOptions> = {}): BalanceForecastOptions => ({
  aimVolts: 0.01,
  capacityAh: 66,
  curve: LMO_BLEND,
  bleedAmps: { low: 0.1, likely: 0.15, high: 0.2 },
  hoursPerCharge: 10,
  maxCharges: 12,
  ...over,
});
const after = (volts: number[], balanceCount: number): PackReading => ({ volts, stage: 'after-balance', balanceCount });
const fit = (volts: number[]): PackReading => ({ volts, stage: 'after-fit' });

describe('the forecast of balance charges', () => {
  // Common practice, no source: 120, 40, 39, 28 mV; 1 to 4 further charges to 10 mV.
  it.each([3.76, 3.85, 3.88, 3.9, 3.93, 3.95, 4.0, 4.05, 4.09])(
    'from 28 to 10 mV of a pack at %d V is 1 to 4 charges, by the bleed current and by it with the log; 1 to 5 by the log alone',
    (meanVolts) => {
      // The log alone has drops of 1 and of 11 mV: it knows less, and its late end lies up to a charge later.
      for (const [bleedAmps, log, bySource, most] of [
        [options().bleedAmps, commonLog(meanVolts), 'both', 4],
        [options().bleedAmps, commonLog(meanVolts).slice(3), 'bleed', 4],
        [null, commonLog(meanVolts), 'log', 5],
      ] as const) {
        const found = balanceForecast(log, options({ bleedAmps }));
        expect(found).toMatchObject({ bySource, doesNotConverge: null, moreThanMost: false });
        const { p10, p50, p90 } = found.charges!;
        expect(p10, bySource).toBeGreaterThanOrEqual(1);
        expect(p50, bySource).toBeLessThanOrEqual(4);
        expect(p90, bySource).toBeLessThanOrEqual(most);
        expect([p10, p50, p90]).toEqual([p10, p50, p90].sort((a, b) => a - b));
      }
    },
  );

  it('what is left is what lies between the highest group and 10 mV over the lowest', () => {
    const log = commonLog(3.88);
    const low = Math.min(...log[3]!.volts);
    expect(balanceForecast(log, options()).remainingAh).toBeCloseTo(ampHoursBetween(low + 0.01, low + 0.028, 66), 9);
  });

  it('where 5.5 Ah are left and a charge takes 1.0 Ah off, known to 1 %, 6 are likely', () => {
    const low = voltsAtSoc(LMO_BLEND, 0.5);
    const top = voltsAtSoc(LMO_BLEND, socAtVolts(LMO_BLEND, low + 0.01) + 5.5 / 66);
    const found = balanceForecast(
      [fit([low, low, top])],
      options({ bleedAmps: { low: 0.099, likely: 0.1, high: 0.101 }, noiseVolts: 1e-5 }),
    );
    expect(found.remainingAh).toBeCloseTo(5.5, 6);
    expect(found.charges!.p50).toBe(6);
    expect(found.expectedVolts).toHaveLength(found.charges!.p90);
    // After the first of them 1 Ah less than now.
    const first = found.expectedVolts[0]!.p50;
    expect(Math.abs(low + first - voltsAtSoc(LMO_BLEND, socAtVolts(LMO_BLEND, top) - 1 / 66))).toBeLessThan(0.0005);
    for (let at = 1; at < found.expectedVolts.length; at += 1)
      expect(found.expectedVolts[at]!.p50).toBeLessThanOrEqual(found.expectedVolts[at - 1]!.p50);
  });

  // Second path: packs whose full groups really bleed, charge by charge, read with 1 mV of noise.
  it('holds 75 % or more of 300 simulated packs in its band, and under 15 % need more than its p90', () => {
    const normal = normals(21);
    let inside = 0;
    let over = 0;
    const packs = 300;
    for (let pack = 0; pack < packs; pack += 1) {
      const ampHours = Array.from({ length: 8 }, (_, at) => (at === 0 ? 0 : at === 7 ? 6 : 1 + 0.5 * at));
      const perCharge = 1.5 * Math.exp(0.25 * normal());
      const soc = 0.45 + 0.02 * normal();
      const true_ = () => ampHours.map((above) => voltsAtSoc(LMO_BLEND, soc + above / 66));
      const read = () => true_().map((volts) => volts + 0.001 * normal());
      const bleed = () => {
        const off = perCharge * Math.max(0, 1 + 0.25 * normal());
        ampHours.forEach((above, group) => (ampHours[group] = Math.max(0, above - off)));
      };
      const log = [fit(read())];
      bleed();
      log.push(after(read(), 1));
      const found = balanceForecast(log, options());
      const spread = () => Math.max(...true_()) - Math.min(...true_());
      let needed = 0;
      for (; spread() > 0.01; needed += 1) bleed();
      expect(found.charges).not.toBeNull();
      if (needed >= found.charges!.p10 && needed <= found.charges!.p90) inside += 1;
      if (needed > found.charges!.p90) over += 1;
    }
    expect(inside / packs).toBeGreaterThan(0.75);
    expect(over / packs).toBeLessThan(0.15);
  });

  it('is the same to the last digit for the same input, and needs no more charges for a larger aim', () => {
    const log = commonLog(3.9);
    expect(balanceForecast(log, options())).toEqual(balanceForecast(log, options()));
    const likely = [0.005, 0.01, 0.015, 0.02].map(
      (aimVolts) => balanceForecast(log, options({ aimVolts })).charges!.p50,
    );
    expect([...likely].sort((a, b) => b - a)).toEqual(likely);
  });

  it('is 0 where the aim is reached, of one group, and of equal ones', () => {
    for (const volts of [spreadOver(3.9, 0.009), [3.9], Array<number>(400).fill(3.9)])
      expect(balanceForecast([fit(volts)], options())).toMatchObject({
        charges: { p10: 0, p50: 0, p90: 0 },
        remainingAh: 0,
        doesNotConverge: null,
      });
  });

  it('says nothing from one reading without a bleed current', () => {
    expect(balanceForecast([fit(spreadOver(3.9, 0.04))], options({ bleedAmps: null }))).toMatchObject({
      charges: null,
      bySource: null,
      doesNotConverge: null,
    });
  });

  it('says more than 12 for 200 mV at 50 mA, in place of a large number', () => {
    const found = balanceForecast(
      [fit(spreadOver(3.9, 0.2))],
      options({ bleedAmps: { low: 0.04, likely: 0.05, high: 0.06 } }),
    );
    expect(found).toMatchObject({ charges: null, moreThanMost: true });
  });

  it('believes the log where the bleed current cannot be: 11 mV a charge against 20 A said', () => {
    const log = [0.05, 0.039, 0.028].map((spread, at) =>
      at === 0 ? fit(spreadOver(3.9, spread)) : after(spreadOver(3.9, spread), at),
    );
    const found = balanceForecast(log, options({ bleedAmps: { low: 19, likely: 20, high: 21 } }));
    expect(found.bySource).toBe('log');
    expect(found.charges!.p50).toBe(2);
  });

  it('counts a reading two charges later as two: 50 to 28 mV over two is 11 mV each', () => {
    const one = balanceForecast(
      [fit(spreadOver(3.9, 0.05)), after(spreadOver(3.9, 0.028), 2)],
      options({ bleedAmps: null }),
    );
    expect(one.ampHoursPerCharge!.likely).toBeCloseTo(
      (ampHoursBetween(3.875, 3.925, 66) - ampHoursBetween(3.886, 3.914, 66)) / 2,
      9,
    );
  });

  it.each<[string, PackReading[], Partial<BalanceForecastOptions>]>([
    ['an empty log', [], {}],
    ['no number', [fit([3.9, Number.NaN])], {}],
    ['another pack in between', [fit([3.9, 3.95]), after([3.9], 1)], {}],
    ['an aim of 0', [fit([3.9, 3.95])], { aimVolts: 0 }],
    ['an aim below 0', [fit([3.9, 3.95])], { aimVolts: -0.01 }],
    [
      'a bleed current whose low is above its high',
      [fit([3.9, 3.95])],
      { bleedAmps: { low: 0.2, likely: 0.15, high: 0.1 } },
    ],
    ['no hours', [fit([3.9, 3.95])], { hoursPerCharge: 0 }],
    ['half a charge', [fit([3.9, 3.95])], { maxCharges: 0.5 }],
  ])('refuses %s', (_, log, over) => expect(() => balanceForecast(log, options(over))).toThrow(CalcInputError));
});

describe('a spread that does not converge', () => {
  const log = (spreads: number[], meanVolts = 3.9) =>
    spreads.map((spread, at) =>
      at === 0 ? fit(spreadOver(meanVolts, spread)) : after(spreadOver(meanVolts, spread), at),
    );

  it.each([
    [[0.04, 0.04, 0.04]],
    [[0.04, 0.0395, 0.039]],
    [[0.06, 0.05, 0.04, 0.04, 0.039]],
    [[0.03, 0.03, 0.031, 0.03, 0.03, 0.029]],
  ])('%j V over the charges is no change', (spreads) => {
    expect(balanceForecast(log(spreads), options())).toMatchObject({ charges: null, doesNotConverge: 'no-change' });
  });

  it.each([[[0.02, 0.026, 0.033]], [[0.03, 0.03, 0.036, 0.04]]])('%j V over the charges grows', (spreads) => {
    expect(balanceForecast(log(spreads), options())).toMatchObject({ charges: null, doesNotConverge: 'grows' });
  });

  it.each([[[0.04, 0.034, 0.028]], [[0.04, 0.039, 0.028]], [[0.05, 0.056, 0.04, 0.03]]])(
    '%j V over the charges converges',
    (spreads) => {
      const found = balanceForecast(log(spreads), options());
      expect(found.doesNotConverge).toBeNull();
      expect(found.charges).not.toBeNull();
    },
  );

  it('two readings alone are not called so, whatever they are', () => {
    expect(balanceForecast(log([0.04, 0.04]), options()).doesNotConverge).toBeNull();
    expect(balanceForecast(log([0.04, 0.06]), options()).doesNotConverge).toBeNull();
  });

  // A group of 54 Ah among those of 60, alike at 30 %: it runs ahead by a ninth of what is charged.
  it.each([[[0.4, 0.6, 0.8]], [[0.5, 0.85, 0.6]], [[0.45, 0.45, 0.75, 0.45, 0.75]]])(
    'one group of 54 Ah among 60 Ah, read at %j of the charge, is a capacity spread',
    (socs) => {
      for (const curve of [LMO_BLEND, NMC]) {
        const volts = (soc: number) => advanced([60, 60, 60, 54, 60, 60], 0.3, 60 * (soc - 0.3), curve);
        const readings = socs.map((soc, at) => (at === 0 ? fit(volts(soc)) : after(volts(soc), at)));
        expect(balanceForecast(readings, options({ capacityAh: 60, curve, aimVolts: 0.002 }))).toMatchObject({
          charges: null,
          doesNotConverge: 'capacity-spread',
        });
      }
    },
  );

  it('a spread that bleeds by 2 Ah a charge, read at 40, 75 and 55 %, is not taken for one', () => {
    const volts = (soc: number, above: number) =>
      [0, 0.3, 0.6, 1].map((share) => voltsAtSoc(LMO_BLEND, soc + (share * above) / 66));
    const found = balanceForecast([fit(volts(0.4, 8)), after(volts(0.75, 6), 1), after(volts(0.55, 4), 2)], options());
    expect(found.doesNotConverge).toBeNull();
    expect(found.ampHoursPerCharge!.likely).toBeGreaterThan(1.4);
    expect(found.ampHoursPerCharge!.likely).toBeLessThan(2.2);
  });

  it('of 250 packs that truly close by 6 mV a charge, read with 1 mV of noise, under 3 % are called so', () => {
    const normal = normals(17);
    let called = 0;
    for (let pack = 0; pack < 250; pack += 1) {
      const noisy = log([0.045, 0.039, 0.033, 0.027]).map((reading) => ({
        ...reading,
        volts: reading.volts.map((volts) => volts + 0.001 * normal()),
      }));
      if (balanceForecast(noisy, options()).doesNotConverge !== null) called += 1;
    }
    expect(called / 250).toBeLessThan(0.03);
  });
});

describe('the lines through a log', () => {
  // Second path: the normal equations solved by mathjs.
  it('slope, its doubt and the misses are those of the normal equations, to 1e-9', () => {
    const x = [0.2, 0.35, 0.5, 0.9];
    const y = [3, 3.4, 2.9, 5.1];
    const sd = [0.2, 0.1, 0.4, 0.3];
    const rows = x.map((value, at) => [1 / sd[at]!, value / sd[at]!]);
    const right = y.map((value, at) => value / sd[at]!);
    const normal = mathjs.multiply(mathjs.transpose(rows), rows);
    const inverse = mathjs.inv(normal);
    const solved = mathjs.multiply(inverse, mathjs.multiply(mathjs.transpose(rows), right));
    const misses = mathjs.subtract(mathjs.multiply(rows, solved), right) as unknown as number[];
    const line = weightedLine(x, y, sd);
    expect(line.slope).toBeCloseTo(solved[1]!, 9);
    expect(line.slopeSd).toBeCloseTo(Math.sqrt(inverse[1]![1]!), 9);
    expect(line.chiSquared).toBeCloseTo(mathjs.sum(misses.map((miss) => miss * miss)), 9);
  });

  it('a course that never rises is explained by itself; 1, 2, 3 at an sd of 1 only as 2, 2, 2: 2 in all', () => {
    expect(neverRisingChiSquared([5, 4, 4, 1], [1, 1, 1, 1])).toBe(0);
    expect(neverRisingChiSquared([1, 2, 3], [1, 1, 1])).toBeCloseTo(2, 12);
    // Only the pair that rises is pooled: weights 1 and 4 about 1.8.
    expect(neverRisingChiSquared([3, 1, 2], [1, 1, 0.5])).toBeCloseTo(0.64 + 4 * 0.04, 12);
  });
});
