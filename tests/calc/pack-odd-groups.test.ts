import fc from 'fast-check';
import * as mathjs from 'mathjs';
import { describe, expect, it } from 'vitest';
import { CalcInputError, oddGroups } from '@/calc/index';
import { normals } from './pack-fixtures';

const volts = fc.double({ min: 2.5, max: 4.3, noNaN: true });

describe('odd groups', () => {
  // Second path: median and MAD by mathjs, 1.4826 by hand.
  it('median, MAD and scores of 300 random packs are those of mathjs to 1e-12', () => {
    fc.assert(
      fc.property(fc.array(volts, { minLength: 1, maxLength: 120 }), (pack) => {
        const found = oddGroups(pack);
        const median = mathjs.median(pack) as number;
        const mad = mathjs.mad(pack) as number;
        const sigma = Math.max(0.003, 1.4826 * mad);
        expect(Math.abs(found.medianVolts - median)).toBeLessThan(1e-12);
        expect(Math.abs(found.madVolts - mad)).toBeLessThan(1e-12);
        found.scores.forEach((score, at) => expect(Math.abs(score - (pack[at]! - median) / sigma)).toBeLessThan(1e-9));
        expect(found.spreadVolts).toBe(Math.max(...pack) - Math.min(...pack));
      }),
      { numRuns: 300 },
    );
  });

  // R documents mad(1:9) = 2.965204 (from memory): 1.4826 · 2.
  it('sigma of 1 to 9 tenths is 0.2965204 times 1', () => {
    expect(oddGroups([1, 2, 3, 4, 5, 6, 7, 8, 9].map((x) => x / 10)).sigmaVolts).toBeCloseTo(0.29652, 6);
  });

  it('finds the two groups of one module 88 and 60 mV low among 96, and no other', () => {
    const normal = normals(4);
    const pack = Array.from({ length: 96 }, () => 3.9 + 0.002 * normal());
    pack[43] = 3.812;
    pack[42] = 3.84;
    const found = oddGroups(pack);
    expect(found.odd).toEqual([42, 43]);
    expect(found.lowest).toEqual({ group: 43, volts: 3.812 });
    expect(found.medianVolts).toBeCloseTo(3.9, 2);
  });

  it('accuses nobody in a tight pack of 1 mV for a group 10 mV away, but for one 11 mV away', () => {
    const tight = Array.from({ length: 20 }, (_, at) => 3.9 + (at % 2) * 0.001);
    expect(oddGroups([...tight, 3.8905]).odd).toEqual([]);
    expect(oddGroups([...tight, 3.8885]).odd).toEqual([20]);
    expect(oddGroups([...tight, 3.8905], { floorVolts: 0.001 }).odd).toEqual([20]);
  });

  it('of 2000 healthy packs of 96 groups with 5 mV of scatter it accuses 3 groups in 2000 or fewer', () => {
    // Beyond 3.5 standard deviations lie 0.047 % of a normal sample; the MAD of 96 groups scatters by some 8 % on top.
    const normal = normals(11);
    let accused = 0;
    for (let pack = 0; pack < 2000; pack += 1)
      accused += oddGroups(Array.from({ length: 96 }, () => 3.9 + 0.005 * normal())).odd.length;
    expect(accused / (2000 * 96)).toBeLessThan(0.0015);
    expect(accused / (2000 * 96)).toBeGreaterThan(0.0003);
  });

  it('does not depend on the order, and follows a shift of all groups', () => {
    fc.assert(
      fc.property(fc.array(volts, { minLength: 3, maxLength: 60 }), (pack) => {
        const oddVolts = (list: readonly number[]) => {
          const { odd } = oddGroups(list);
          return odd.map((group) => list[group]!).sort();
        };
        expect(oddVolts([...pack].reverse())).toEqual(oddVolts(pack));
        const shifted = oddGroups(pack.map((value) => value + 0.25));
        const found = oddGroups(pack);
        expect(shifted.sigmaVolts).toBeCloseTo(found.sigmaVolts, 9);
        shifted.scores.forEach((score, at) => expect(Math.abs(score - found.scores[at]!)).toBeLessThan(1e-9));
      }),
    );
  });

  it('nothing is odd of one or two groups, of equal ones, nor of 400 that scatter alike', () => {
    expect(oddGroups([3.9]).odd).toEqual([]);
    expect(oddGroups([3.9, 2.1], { limit: 0.1 }).odd).toEqual([]);
    expect(oddGroups(Array<number>(96).fill(3.9))).toMatchObject({
      odd: [],
      spreadVolts: 0,
      madVolts: 0,
      sigmaVolts: 0.003,
    });
    expect(oddGroups(Array.from({ length: 400 }, (_, at) => 3.9 + at / 1e5)).odd).toEqual([]);
  });

  it('reads a dead group at 0 V and a reversed one at −0.4 V as odd', () => {
    expect(oddGroups([3.9, 3.9, 0, 3.91, -0.4, 3.9]).odd).toEqual([2, 4]);
  });

  it('with one half of the groups 100 mV above the other accuses neither', () => {
    expect(oddGroups([3.8, 3.8, 3.8, 3.9, 3.9, 3.9]).odd).toEqual([]);
  });

  it.each([
    ['no groups', []],
    ['401 groups', Array<number>(401).fill(3.9)],
    ['no number', [3.9, Number.NaN]],
    ['infinite volts', [3.9, Infinity]],
    ['millivolts', [3900, 3901]],
  ])('refuses %s', (_, pack) => expect(() => oddGroups(pack)).toThrow(CalcInputError));

  it('refuses a floor of 0 and a limit below it, and names the group that cannot be', () => {
    expect(() => oddGroups([3.9], { floorVolts: 0 })).toThrow(CalcInputError);
    expect(() => oddGroups([3.9], { limit: -1 })).toThrow(CalcInputError);
    expect(() => oddGroups([3.9, 3652])).toThrow(/volts\[1\] is 3652.*3\.652, not 3652/);
  });
});
