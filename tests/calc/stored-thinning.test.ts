import { existsSync, readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { CalcInputError, STORED_THINNING, startThinning, thinForStoring, widerThinning } from '@/calc/index';
import type { StoredPoint, ThinningRule } from '@/calc/index';

const rule: ThinningRule = { terminalVolts: 0.01, amps: 0.1, celsius: 0.5, groupVolts: 0.002, mostS: 120 };

const point = (s: number, values: Partial<StoredPoint> = {}): StoredPoint => ({
  s,
  terminalVolts: null,
  amps: null,
  celsius: null,
  groupVolts: null,
  ...values,
});

const some = (from: number, to: number) => fc.option(fc.double({ min: from, max: to, noNaN: true }), { nil: null });
/** Steps of 0 to 40 s, and quantities that come and go. */
const logs = fc
  .array(
    fc.record({
      step: fc.integer({ min: 0, max: 40 }),
      terminalVolts: some(11.9, 11.95),
      amps: some(9.8, 10.1),
      celsius: some(20, 21),
      groupVolts: fc.option(fc.tuple(fc.double({ min: 3.7, max: 3.71, noNaN: true })), { nil: null }),
    }),
    { maxLength: 120 },
  )
  .map((rows) => {
    let s = 0;
    return rows.map(({ step, ...values }) => point((s += step), values));
  });

/** Distance from the straight line between two readings, worked out by the two-point form. */
const off = (a: StoredPoint, b: StoredPoint, p: StoredPoint, of: (one: StoredPoint) => number | null | undefined) => {
  const [ya, yb, y] = [of(a), of(b), of(p)];
  if (ya == null || yb == null || y == null) return { same: ya == null && yb == null && y == null, by: 0 };
  return { same: true, by: Math.abs(((b.s - p.s) * ya + (p.s - a.s) * yb) / (b.s - a.s) - y) };
};

/** A measured charge of an LFP cell; the folder with its source is not part of the project. */
const measured = '/work/shared/data/lfp_2p3Ah_0p77A_25C.csv';
const ampSeconds = (log: StoredPoint[]): number =>
  log.slice(1).reduce((sum, one, at) => sum + ((one.amps! + log[at]!.amps!) / 2) * (one.s - log[at]!.s), 0);

const quantities: [keyof Omit<ThinningRule, 'mostS'>, (one: StoredPoint) => number | null | undefined][] = [
  ['terminalVolts', (one) => one.terminalVolts],
  ['amps', (one) => one.amps],
  ['celsius', (one) => one.celsius],
  ['groupVolts', (one) => one.groupVolts?.[0]],
];

describe('what is stored of a log', () => {
  it('leaves out only readings within the deadband of the line between their stored neighbours, in 1,000 logs', () => {
    fc.assert(
      fc.property(logs, (log) => {
        const kept = thinForStoring(log, rule);
        expect(kept[0]).toBe(log[0]);
        expect(kept.at(-1)).toBe(log.at(-1));
        const at = kept.map((one) => log.indexOf(one));
        expect(at).toEqual([...at].sort((one, other) => one - other));
        log.forEach((one, index) => {
          const next = at.findIndex((keptIndex) => keptIndex >= index);
          if (at[next] === index) return;
          const [a, b] = [log[at[next - 1]!]!, log[at[next]!]!];
          expect(b.s - a.s).toBeLessThanOrEqual(rule.mostS);
          for (const [name, of] of quantities) {
            const { same, by } = off(a, b, one, of);
            expect(same).toBe(true);
            expect(by).toBeLessThanOrEqual(rule[name] + 1e-9);
          }
        });
      }),
      { numRuns: 1000 },
    );
  });

  it('never leaves out the one odd reading, 11 mV off a straight course, wherever it stands among 300', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 299 }), fc.constantFrom(-1, 1), (odd, sign) => {
        const log = Array.from({ length: 300 }, (_, at) =>
          point(at, { terminalVolts: 11 + at * 1e-4 + (at === odd ? sign * 0.0111 : 0) }),
        );
        expect(thinForStoring(log, rule)).toContain(log[odd]);
      }),
    );
  });

  it('keeps of a straight course one reading every 120 s, and of one that stands still as many', () => {
    const straight = Array.from({ length: 1201 }, (_, s) => point(s, { amps: 10 - s * 1e-3, terminalVolts: 11 }));
    expect(thinForStoring(straight, rule).map(({ s }) => s)).toEqual([...Array(11).keys()].map((at) => at * 120));
  });

  it('keeps both readings of one instant, both sides of a quantity that comes or goes, and both sides of a gap', () => {
    const twice = [0, 1, 1, 2].map((s) => point(s, { amps: 10 }));
    expect(thinForStoring(twice, rule)).toEqual(twice);
    const log = [0, 1, 2, 3, 4, 5].map((s) => point(s, { amps: 10, celsius: s === 3 ? 21 : null }));
    expect(thinForStoring(log, rule).map(({ s }) => s)).toEqual([0, 2, 3, 4, 5]);
    const gap = [0, 1, 2, 500, 501, 502].map((s) => point(s, { amps: 10 }));
    expect(thinForStoring(gap, rule).map(({ s }) => s)).toEqual([0, 2, 500, 502]);
  });

  it('gives the same one by one, holds nothing back at the end, and begins anew', () => {
    const thinning = startThinning<StoredPoint>(rule);
    const log = [0, 1, 2].map((s) => point(s, { amps: 10 }));
    expect(log.map((one) => thinning.push(one))).toEqual([log[0], null, null]);
    expect(thinning.finish()).toBe(log[2]);
    expect(thinning.finish()).toBeNull();
    expect(thinning.push(point(-5, { amps: 1 }))).toEqual(point(-5, { amps: 1 }));
  });

  it('refuses what runs backwards, what is no number, and a rule without sense', () => {
    expect(() => thinForStoring([point(1, { amps: 1 }), point(0, { amps: 1 })], rule)).toThrow(CalcInputError);
    expect(() => thinForStoring([point(1, { amps: NaN })], rule)).toThrow(CalcInputError);
    expect(() => thinForStoring([point(Infinity)], rule)).toThrow(CalcInputError);
    expect(() => startThinning({ ...rule, amps: -1 })).toThrow(CalcInputError);
    expect(() => startThinning({ ...rule, mostS: 0 })).toThrow(CalcInputError);
    expect(() => widerThinning(rule, 0)).toThrow(CalcInputError);
  });

  it.skipIf(!existsSync(measured))(
    'carries the charge of a measured log to 0.1 % with under half of its readings',
    () => {
      const log = readFileSync(measured, 'utf8')
        .trim()
        .split('\n')
        .slice(1)
        .map((line) => line.split(',').map(Number))
        .map(([s, volts, amps]) => point(s!, { terminalVolts: volts!, amps: amps! }));
      const kept = thinForStoring(log, STORED_THINNING);
      expect(kept.length).toBeLessThan(log.length / 2);
      expect(Math.abs(ampSeconds(kept) / ampSeconds(log) - 1)).toBeLessThan(0.001);
    },
  );
});
