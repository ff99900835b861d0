import Papa from 'papaparse';
import { describe, expect, it } from 'vitest';
import {
  checkOwnCurve,
  planCharge,
  publishedCurves,
  PUBLISHED_CURVES,
  voltsAtSoc,
  type ChemistryId,
  type OwnCurve,
} from '@/calc/index';
import { lmoModule, lmoSpare, planInput, target } from './plan-fixtures';

/** Of a 33 Ah LMO-blend cell (batterysim/equiv-circ-model): per cent and rest volts, as a person would type them. */
const MEASURED = `charge,volts
6.1,3.531
16.5,3.723
27.0,3.802
37.4,3.869
47.8,3.909
58.3,3.949
68.7,3.984
79.1,4.048
89.6,4.086
100.0,4.182
`;
const check = (text: string, chemistry: ChemistryId = 'lmo-blend'): OwnCurve =>
  checkOwnCurve(Papa.parse<string[]>(text, { delimiter: text.includes(';') ? ';' : ',' }).data, chemistry);
const curveOf = (checked: OwnCurve) => {
  if (!checked.ok) throw new Error(JSON.stringify(checked.problems));
  return checked.curve;
};
const sentences = (checked: OwnCurve): string[] =>
  checked.ok ? [] : checked.problems.map(({ row, text }) => `${row ?? 'all'}: ${text}`);
const changed = (from: string, to: string): string[] => sentences(check(MEASURED.replace(from, to)));

describe('a workshop’s own curve', () => {
  it('is read from per cent with a heading, and then rests where its rows say, to a microvolt', () => {
    const checked = check(MEASURED);
    const curve = curveOf(checked);
    expect(checked).toMatchObject({ ok: true, inPercent: true, fromSoc: 0.061, toSoc: 1 });
    expect(voltsAtSoc(curve, 0.478)).toBeCloseTo(3.909, 6);
    expect(voltsAtSoc(curve, 0.896)).toBeCloseTo(4.086, 6);
  });

  it('is the same from shares, from falling rows, with signs and units, and with decimal commas', () => {
    const curve = curveOf(check(MEASURED));
    const lines = MEASURED.trim().split('\n').slice(1);
    const rewritten = (change: (soc: string, volts: string) => string) =>
      lines.map((line) => change(...(line.split(',') as [string, string]))).join('\n');
    const others = [
      rewritten((soc, volts) => `${Number(soc) / 100},${volts}`),
      [...lines].reverse().join('\n'),
      rewritten((soc, volts) => `${soc} %,${volts} V`),
      rewritten((soc, volts) => `${soc.replace('.', ',')};${volts.replace('.', ',')}`),
    ];
    for (const text of others) {
      const other = curveOf(check(text));
      other.soc.forEach((soc, at) => expect(soc).toBeCloseTo(curve.soc[at]!, 12));
      expect(other.volts).toEqual(curve.volts);
    }
  });

  it('names the row and what to change, one for each', () => {
    expect(changed('37.4,3.869', '37.4,3.802')).toEqual([
      '5: 3.802\u00a0V does not rise above the 3.802\u00a0V of row 4. Take out the one that was read wrong.',
    ]);
    expect(changed('37.4,3.869', '27.0,3.869')).toContainEqual(
      '5: The same state of charge as in row 4. Keep one of them.',
    );
    expect(changed('37.4,3.869', '21,3.869')[0]).toMatch(/^5: The state of charge goes back against row 4/);
    expect(changed('37.4,3.869', '37.4,3869')).toContainEqual(
      '5: 3869 looks like millivolts. In volts it is 3.869. Give volts.',
    );
    expect(changed('37.4,3.869', '37.4,?')).toContainEqual("5: '?' is no voltage. Give a number, 3.652 for example.");
    expect(changed('37.4,3.869', 'half,3.869')[0]).toMatch(/^5: 'half' is no state of charge/);
    expect(changed('37.4,3.869', '37.4')[0]).toMatch(/^5: One column only/);
    expect(changed('100.0,4.182', '130,4.19')[0]).toMatch(/^11: A state of charge of 130\u00a0% cannot be/);
  });

  it('wants 8 points from 10 to 90 % without a gap over 20 %', () => {
    const lines = MEASURED.trim().split('\n');
    expect(sentences(check(lines.slice(0, 8).join('\n')))).toEqual(['all: 7 points are too few. Give 8 or more.']);
    expect(sentences(check(lines.slice(0, 9).join('\n')))).toEqual([
      'all: The curve ends at 79.1\u00a0%. Add points up to 90\u00a0% or higher.',
    ]);
    expect(sentences(check(lines.slice(3).join('\n')))[0]).toMatch(/begins at 27\u00a0%/);
    expect(sentences(check(lines.filter((_, at) => at !== 5).join('\n')))).toHaveLength(1);
    expect(sentences(check(''))).toEqual(['all: 0 points are too few. Give 8 or more.']);
  });

  it('does not take one chemistry for another: LMO volts as LFP, or the whole module', () => {
    expect(sentences(check(MEASURED, 'lfp')).length).toBeGreaterThan(5);
    const module = MEASURED.replace(/,(\d\.\d+)/g, (_, volts: string) => `,${(2 * Number(volts)).toFixed(3)}`);
    expect(sentences(check(module))[0]).toMatch(/Give the volts of one cell/);
  });

  it('stops after twenty sentences and says how many more there are', () => {
    const rows = Array.from({ length: 100 }, (_, at) => [at, 9]);
    const checked = checkOwnCurve(rows, 'nmc');
    expect(checked.ok).toBe(false);
    expect(sentences(checked)).toHaveLength(21);
    expect(sentences(checked)[20]).toMatch(/^all: And \d+ more/);
  });

  it('plans like the shipped one it was copied from, to 0.2 % of the ampere-hours', () => {
    const ampHours = (curve: typeof lmoModule.curve) =>
      planCharge(planInput({ module: { ...lmoModule, curve }, spare: lmoSpare, target })).options[0]!.ampHours;
    expect(Math.abs(ampHours(curveOf(check(MEASURED))) / ampHours(null) - 1)).toBeLessThan(0.002);
  });
});

describe('the published curves', () => {
  it('are there for all five chemistries, two of NMC and three of LFP, the one used unasked first', () => {
    const counts = (['nmc', 'lmo-blend', 'lfp', 'lto', 'nimh'] as const).map((id) => publishedCurves(id).length);
    expect(counts).toEqual([2, 1, 3, 1, 1]);
    expect(publishedCurves('nmc')[0]!.id).toBe('nmc-mohtat-2020');
    expect(publishedCurves('lfp')[0]!.id).toBe('lfp-measured');
    expect(new Set(PUBLISHED_CURVES.map((one) => one.id)).size).toBe(8);
  });

  it.each(PUBLISHED_CURVES.map((one) => ({ id: one.id, one })))(
    '$id passes the check of a workshop’s own',
    ({ one }) => {
      const rows = one.curve.soc.map((soc, at) => [Math.min(1, soc), one.curve.volts[at]!]);
      expect(sentences(checkOwnCurve(rows, one.chemistry))).toEqual([]);
    },
  );

  // The two NMC sources at 50 %: 3.708 and 3.716 V (PyBaMM Chen2020.py and Mohtat2020.py).
  it('the two of NMC rest within 10 mV of each other at half charge and 130 mV or more apart at 20 %', () => {
    const [mohtat, chen] = publishedCurves('nmc').map((one) => one.curve);
    expect(Math.abs(voltsAtSoc(mohtat!, 0.5) - voltsAtSoc(chen!, 0.5))).toBeLessThan(0.01);
    expect(Math.abs(voltsAtSoc(mohtat!, 0.2) - voltsAtSoc(chen!, 0.2))).toBeGreaterThan(0.13);
  });
});
