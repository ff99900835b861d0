import { describe, expect, it } from 'vitest';
import { CalcInputError, compareSources, type CompareSourcesInput } from '@/calc/index';
import { normals } from './pack-fixtures';

const packVolts = Array.from({ length: 48 }, (_, at) => 3.9 + 0.001 * (at % 3));
packVolts[42] = 3.84;
packVolts[43] = 3.812;
const meter = (by: number, ...groups: number[]) => groups.map((group) => ({ group, volts: packVolts[group]! + by }));
const input = (over: Partial<CompareSourcesInput> = {}): CompareSourcesInput => ({
  packVolts,
  oddModule: [42, 43],
  meterGroups: meter(0, 42, 43, 0, 10, 20),
  toleranceVolts: 0.005,
  ...over,
});

describe('a second source', () => {
  it('agrees where the hand meter reads 12 mV more everywhere, healthy groups too', () => {
    const found = compareSources(input({ meterGroups: meter(0.012, 42, 43, 0, 10, 20) }));
    expect(found.verdict).toBe('agree');
    expect(found.offsetVolts).toBeCloseTo(0.012, 12);
    expect(found.groups.map(({ differenceVolts }) => Math.abs(differenceVolts) < 1e-12)).toEqual([true, true]);
  });

  it('disagrees where the meter finds the accused group 88 mV higher, as healthy as the rest, and names it', () => {
    const found = compareSources(input({ meterGroups: [...meter(0, 42, 0, 10, 20), { group: 43, volts: 3.9 }] }));
    expect(found).toMatchObject({ verdict: 'disagree', differing: [43], notRead: [] });
    expect(found.groups[1]!.differenceVolts).toBeCloseTo(0.088, 12);
  });

  it('with no healthy group read allows 10 mV more: 17 mV agree, 18 mV do not, and no offset is claimed', () => {
    expect(compareSources(input({ meterGroups: meter(0.017, 42, 43) }))).toMatchObject({
      verdict: 'agree',
      offsetVolts: null,
    });
    expect(compareSources(input({ meterGroups: meter(0.018, 42, 43) })).verdict).toBe('disagree');
  });

  it('one healthy group misread by 100 mV does not move the offset of five', () => {
    const meterGroups = [...meter(0.002, 42, 43, 0, 10, 20, 30), { group: 31, volts: packVolts[31]! + 0.1 }];
    expect(compareSources(input({ meterGroups }))).toMatchObject({ verdict: 'agree' });
    expect(compareSources(input({ meterGroups })).offsetVolts).toBeCloseTo(0.002, 12);
  });

  it('of 2000 honest pairs with 1 mV of noise and an offset of 20 mV it calls under 1 % a disagreement', () => {
    const normal = normals(8);
    let wrong = 0;
    for (let pair = 0; pair < 2000; pair += 1) {
      const noisy = packVolts.map((volts) => volts + 0.001 * normal());
      const meterGroups = [42, 43, 5, 15, 25].map((group) => ({
        group,
        volts: packVolts[group]! + 0.02 + 0.001 * normal(),
      }));
      if (compareSources(input({ packVolts: noisy, meterGroups })).verdict === 'disagree') wrong += 1;
    }
    expect(wrong / 2000).toBeLessThan(0.01);
  });

  it('says which suspected groups nobody read', () => {
    expect(compareSources(input({ meterGroups: meter(0, 43, 0) })).notRead).toEqual([42]);
  });

  it.each<[string, Partial<CompareSourcesInput>]>([
    ['no suspected group read', { meterGroups: meter(0, 0, 10) }],
    ['no module', { oddModule: [] }],
    ['a group read twice', { meterGroups: meter(0, 42, 42) }],
    ['a group that is not there', { meterGroups: [{ group: 48, volts: 3.9 }] }],
    ['a meter that shows nothing', { meterGroups: [{ group: 42, volts: Number.NaN }] }],
    ['millivolts', { meterGroups: [{ group: 42, volts: 3840 }] }],
    ['a tolerance below 0', { toleranceVolts: -0.001 }],
    ['an empty pack', { packVolts: [] }],
  ])('refuses %s', (_, over) => expect(() => compareSources(input(over))).toThrow(CalcInputError));
});
