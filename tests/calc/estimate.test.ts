import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { CHEMISTRIES } from '@/calc/parameters/chemistries';
import { quickEstimate, type QuickNumbers } from '@/calc/plan/estimate';

const numbers = (change: Partial<QuickNumbers> = {}): QuickNumbers => ({
  chemistry: 'nmc',
  groups: 2,
  ratedAh: 66,
  healthPercent: 92,
  spareVolts: 3.62,
  targetVolts: 3.925,
  amps: 20,
  maxVolts: null,
  maxWatts: null,
  resistanceMilliohm: null,
  celsius: 21,
  ...change,
});

/** State of charge by straight lines through the chemistry's published points: not the core's own interpolation. */
function linearSoc(chemistry: QuickNumbers['chemistry'], volts: number): number {
  const { soc, volts: table } = CHEMISTRIES[chemistry].curve;
  const above = table.findIndex((point) => point >= volts);
  const below = above - 1;
  return soc[below]! + ((volts - table[below]!) / (table[above]! - table[below]!)) * (soc[above]! - soc[below]!);
}

const secondsOf = (segments: { kind: string; fromS: number; toS: number }[], ...kinds: string[]): number =>
  segments.filter(({ kind }) => kinds.includes(kind)).reduce((sum, { fromS, toS }) => sum + toS - fromS, 0);

describe('the quick estimate', () => {
  it.each(['nmc', 'lmo-blend'] as const)(
    'of %s moves the ampere-hours between the two voltages within 3 %%',
    (chemistry) => {
      const estimate = quickEstimate(numbers({ chemistry }));
      const expected = 66 * 0.92 * (linearSoc(chemistry, 3.925) - linearSoc(chemistry, 3.62));
      expect(estimate.overAndSettle!.ampHours / expected).toBeGreaterThan(0.97);
      expect(estimate.overAndSettle!.ampHours / expected).toBeLessThan(1.03);
    },
  );

  it('takes 3600 s · Ah / A of current at 20 A over and settle, within 1 %', () => {
    const way = quickEstimate(numbers()).overAndSettle!;
    expect(secondsOf(way.segments, 'cc', 'taper') / ((3600 * way.ampHours) / 20)).toBeCloseTo(1, 2);
  });

  it.each([3.64, 3.72, 3.8])(
    'brings a four-cell module of 66 Ah groups from %s V to 4.00 V at 10 A in 2.9 to 4.1 h or less, as is common practice',
    (spareVolts) => {
      const asked = { chemistry: 'lmo-blend', ratedAh: 66, healthPercent: 100, targetVolts: 4, amps: 10 } as const;
      const estimate = quickEstimate(numbers({ ...asked, spareVolts }));
      const over = secondsOf(estimate.overAndSettle!.segments, 'cc', 'taper') / 3600;
      const mark = secondsOf(estimate.onTheMark!.segments, 'cc', 'taper') / 3600;
      expect(over).toBeGreaterThan(2.9);
      expect(over).toBeLessThan(4.1);
      expect(mark).toBeGreaterThan(over);
      expect(mark).toBeLessThan(5);
    },
  );

  it('rests an hour and ends with the check, and its band encloses the likely time', () => {
    for (const way of [quickEstimate(numbers()).overAndSettle!, quickEstimate(numbers()).onTheMark!]) {
      expect(secondsOf(way.segments, 'rest')).toBeCloseTo(3600, 6);
      expect(way.segments.at(-1)?.kind).toBe('check');
      expect(way.totalS.p10).toBeLessThan(way.totalS.p50);
      expect(way.totalS.p50).toBeLessThan(way.totalS.p90);
    }
  });

  it('is never slower with more amps, a fuller spare or less capacity', () => {
    const volts = fc.integer({ min: 3500, max: 3900 }).map((millivolts) => millivolts / 1000);
    fc.assert(
      fc.property(
        volts,
        fc.integer({ min: 4, max: 40 }),
        fc.integer({ min: 60, max: 100 }),
        (spareVolts, amps, health) => {
          const time = (change: Partial<QuickNumbers>): number =>
            quickEstimate(numbers({ spareVolts, amps, healthPercent: health, targetVolts: 4, ...change }))
              .overAndSettle!.totalS.p50;
          const asked = time({});
          expect(time({ amps: amps * 1.25 })).toBeLessThanOrEqual(asked + 1);
          expect(time({ spareVolts: spareVolts + 0.02 })).toBeLessThanOrEqual(asked + 1);
          expect(time({ healthPercent: health - 10 })).toBeLessThanOrEqual(asked + 1);
        },
      ),
      { seed: 3, numRuns: 25 },
    );
  });

  it('discharges a spare that rests above the target', () => {
    const estimate = quickEstimate(numbers({ spareVolts: 4.05, targetVolts: 3.87 }));
    expect(estimate.direction).toBe('discharge');
    expect(estimate.overAndSettle!.endGroupVolts[0]).toBeCloseTo(3.87, 2);
  });

  it('widens by itself where the curve is flat: LFP on its plateau by more than NMC', () => {
    const share = (way: { totalS: { p10: number; p50: number; p90: number } }): number =>
      (way.totalS.p90 - way.totalS.p10) / way.totalS.p50;
    const lfp = quickEstimate(numbers({ chemistry: 'lfp', spareVolts: 3.25, targetVolts: 3.31 }));
    expect(share(lfp.overAndSettle!)).toBeGreaterThan(2 * share(quickEstimate(numbers()).overAndSettle!));
    expect(lfp.cautions.map(({ code }) => code)).toContain('hysteresis');
  });

  it('refuses a spare at 2.41 V of NMC, a target of 4.50 V and a module at −5 °C', () => {
    const codes = (change: Partial<QuickNumbers>): string[] => {
      const estimate = quickEstimate(numbers(change));
      expect(estimate.overAndSettle).toBeNull();
      expect(estimate.onTheMark).toBeNull();
      return estimate.refusals.map(({ code }) => code);
    };
    expect(codes({ spareVolts: 2.41 })).toEqual(['deep-discharged']);
    expect(codes({ targetVolts: 4.5 })).toEqual(['target-over-limit']);
    expect(codes({ celsius: -5 })).toEqual(['temperature']);
  });

  it('says that nothing is to be charged 2 mV from the target', () => {
    const estimate = quickEstimate(numbers({ spareVolts: 3.923 }));
    expect(estimate.overAndSettle).toBeNull();
    expect(estimate.ruledOut).toEqual([
      'The spare rests within 5\u00a0mV of the target already. Nothing is to be charged.',
    ]);
  });

  it('says why a charger of 7 V cannot bring two groups to 3.925 V', () => {
    const estimate = quickEstimate(numbers({ maxVolts: 7 }));
    expect(estimate.overAndSettle).toBeNull();
    expect(estimate.ruledOut.length).toBeGreaterThan(0);
  });

  it('takes longer with 60 W than without a limit of power, by the ratio of the currents', () => {
    const free = quickEstimate(numbers()).overAndSettle!;
    const limited = quickEstimate(numbers({ maxWatts: 60 })).overAndSettle!;
    const ratio = secondsOf(limited.segments, 'cc', 'taper') / secondsOf(free.segments, 'cc', 'taper');
    // 20 A through two groups at 3.7 to 4.0 V is about 155 W.
    expect(ratio).toBeGreaterThan(2.4);
    expect(ratio).toBeLessThan(2.75);
  });

  it('gives the same digits for the same numbers', () => {
    expect(quickEstimate(numbers())).toEqual(quickEstimate(numbers()));
  });
});
