import { describe, expect, it } from 'vitest';
import { CalcInputError, classifyChange, voltsAtSoc, type PackReading } from '@/calc/index';
import { LMO_BLEND } from './reference/curves';
import { ampHoursBetween, commonLog, normals, spreadOver } from './pack-fixtures';

const options = { curve: LMO_BLEND, capacityAh: 66 };
const balance = (volts: number[], balanceCount?: number): PackReading => ({
  volts,
  stage: 'after-balance',
  balanceCount,
});

describe('what happened between two readings', () => {
  // Common practice, no source: 120 mV at the arrival, 40 after the fit, 39 and 28 after two balance charges.
  it.each([3.76, 3.8, 3.85, 3.88, 3.9, 3.93, 3.95, 3.97, 4.0, 4.05, 4.09, 4.12])(
    'a pack at %d V: 120 to 40 mV is the exchange, 40 to 39 no change, 39 to 28 balancing of 0.8 to 2.2 Ah',
    (meanVolts) => {
      const [arrival, fit, first, second] = commonLog(meanVolts) as [
        PackReading,
        PackReading,
        PackReading,
        PackReading,
      ];
      expect(classifyChange(arrival, fit, options)).toMatchObject({ kind: 'exchange', ampHours: null });
      expect(classifyChange(fit, first, options).kind).toBe('no-change');
      const { kind, ampHours } = classifyChange(first, second, options);
      expect(kind).toBe('balanced');
      expect(ampHours!.likely).toBeGreaterThan(0.8);
      expect(ampHours!.likely).toBeLessThan(2.2);
      // By hand: what lies between the ends of either reading.
      const span = (volts: number[]) => ampHoursBetween(Math.min(...volts), Math.max(...volts), 66);
      expect(ampHours!.likely).toBeCloseTo(span(first.volts) - span(second.volts), 9);
      expect(ampHours!.low).toBeLessThan(ampHours!.likely);
      expect(ampHours!.high).toBeGreaterThan(ampHours!.likely);
    },
  );

  it('at 40 % of charge the whole band of 39 to 28 mV lies in 0.8 to 2.2 Ah', () => {
    const [, , first, second] = commonLog(3.88) as [PackReading, PackReading, PackReading, PackReading];
    const { ampHours } = classifyChange(first, second, options);
    expect(ampHours!.low).toBeGreaterThan(0.8);
    expect(ampHours!.high).toBeLessThan(2.2);
  });

  it('of 2000 noisy pairs with 1.6 Ah taken off 80 % lie in the band, to 4 %', () => {
    // The ends stand well apart from the rest, so that noise does not choose the highest and lowest group.
    const normal = normals(5);
    const soc = 0.5;
    const ends = (spreadAh: number) =>
      [-spreadAh / 2, 0, 0, 0, 0, spreadAh / 2].map(
        (ampHours) => voltsAtSoc(LMO_BLEND, soc + ampHours / 66) + 0.001 * normal(),
      );
    let inside = 0;
    for (let pair = 0; pair < 2000; pair += 1) {
      const { ampHours } = classifyChange(balance(ends(6.6), 1), balance(ends(5), 2), options);
      if (ampHours!.low <= 1.6 && 1.6 <= ampHours!.high) inside += 1;
    }
    // The band also holds 10 % of the slope, which is exact here: somewhat more than 80 % lie inside.
    expect(inside / 2000).toBeGreaterThan(0.78);
    expect(inside / 2000).toBeLessThan(0.9);
  });

  it('the same 3 Ah read at 40 and at 95 %, 20 and 40 mV, are no change; 20 mV twice at these charges are one', () => {
    const at = (soc: number, spreadAh: number) =>
      [-spreadAh / 2, 0, spreadAh / 2].map((ampHours) => voltsAtSoc(LMO_BLEND, soc + ampHours / 66));
    const low = balance(at(0.4, 3), 1);
    const high = balance(at(0.95, 3), 2);
    const found = classifyChange(low, high, options);
    expect(found.kind).toBe('no-change');
    expect(found.afterVolts).toBeGreaterThan(1.7 * found.beforeVolts);
    expect([found.beforeSoc, found.afterSoc].map((soc) => Math.round(100 * soc))).toEqual([40, 95]);
    const alike = classifyChange(
      balance(spreadOver(voltsAtSoc(LMO_BLEND, 0.4), 0.02), 1),
      balance(spreadOver(voltsAtSoc(LMO_BLEND, 0.95), 0.02), 2),
      options,
    );
    expect(alike.kind).toBe('balanced');
  });

  it('28 to 39 mV is worse, at the fit too; a fit that changed nothing is no exchange', () => {
    expect(classifyChange(balance(spreadOver(3.9, 0.028)), balance(spreadOver(3.9, 0.039)), options).kind).toBe(
      'worse',
    );
    const arrival: PackReading = { volts: spreadOver(3.9, 0.04), stage: 'arrival' };
    expect(classifyChange(arrival, { volts: spreadOver(3.9, 0.08), stage: 'after-fit' }, options).kind).toBe('worse');
    expect(classifyChange(arrival, { volts: spreadOver(3.9, 0.039), stage: 'after-fit' }, options).kind).toBe(
      'no-change',
    );
  });

  it('a meter of 5 mV makes no change of the 11 mV that one of 1 mV sees', () => {
    const pair = [balance(spreadOver(3.9, 0.039)), balance(spreadOver(3.9, 0.028))] as const;
    expect(classifyChange(...pair, { ...options, noiseVolts: 0.005 }).kind).toBe('no-change');
  });

  it('equal readings of 400 groups, and of one, are no change of 0 Ah', () => {
    for (const groups of [1, 400]) {
      const volts = Array<number>(groups).fill(3.9);
      const { kind, ampHours } = classifyChange(balance(volts), balance(volts), options);
      expect(kind).toBe('no-change');
      expect(ampHours!.likely).toBe(0);
    }
  });

  it.each<[string, PackReading, PackReading]>([
    ['packs of different size', balance([3.9, 3.9]), balance([3.9])],
    ['an empty reading', balance([]), balance([])],
    ['no number', balance([3.9, Number.NaN]), balance([3.9, 3.9])],
    ['an arrival after the fit', { volts: [3.9], stage: 'after-fit' }, { volts: [3.9], stage: 'arrival' }],
    ['balance charge 1 after 2', balance([3.9], 2), balance([3.9], 1)],
    ['balance charge 0', balance([3.9], 0), balance([3.9], 1)],
  ])('refuses %s', (_, before, after) => expect(() => classifyChange(before, after, options)).toThrow(CalcInputError));
});
