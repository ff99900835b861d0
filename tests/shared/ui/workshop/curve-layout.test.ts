import { describe, expect, it } from 'vitest';
import { chemistryParameters, voltsAtSoc } from '@/calc';
import { chemistryIds } from '@/shared/contract/equipment';
import { flattest, layoutCurve, worthByTenth, worthShare } from '@/shared/ui/workshop/curve-layout';

/** Second path: walks the curve in small steps and counts those that rest within 2.5 mV of the middle. */
function countedShare(chemistry: (typeof chemistryIds)[number], soc: number): number {
  const { curve } = chemistryParameters(chemistry);
  const middle = voltsAtSoc(curve, soc);
  const steps = 200_000;
  let inside = 0;
  for (let i = 0; i < steps; i++) if (Math.abs(voltsAtSoc(curve, (i + 0.5) / steps) - middle) <= 0.0025) inside++;
  return inside / steps;
}

describe('what 5 mV is worth', () => {
  it.each(chemistryIds)('agrees for %s with counting along the curve, to 0.01 % of the capacity', (chemistry) => {
    for (const soc of [0.15, 0.35, 0.65, 0.85])
      expect(worthShare(chemistryParameters(chemistry), soc)).toBeCloseTo(countedShare(chemistry, soc), 4);
  });

  it('is never more than the whole capacity, nor less than nothing, at the ends too', () => {
    for (const chemistry of chemistryIds)
      for (const soc of [0, 0.5, 1]) {
        const share = worthShare(chemistryParameters(chemistry), soc);
        expect(share).toBeGreaterThan(0);
        expect(share).toBeLessThanOrEqual(1);
      }
  });

  it('is worth most on the plateau of LFP: at least 5 times what it is worth there for NMC', () => {
    const most = (chemistry: 'lfp' | 'nmc') =>
      Math.max(...worthByTenth(chemistryParameters(chemistry)).map(({ share }) => share));
    expect(most('lfp')).toBeGreaterThan(5 * most('nmc'));
  });

  it('takes neighbours that are nearly as flat into the flattest part, and no others', () => {
    const worths = [0.01, 0.02, 0.09, 0.1, 0.05, 0.099, 0.01, 0.01, 0.01, 0.01].map((share, i) => ({
      fromSoc: i / 10,
      toSoc: (i + 1) / 10,
      volts: 3.6,
      share,
    }));
    expect(flattest(worths)).toEqual({ fromSoc: 0.2, toSoc: 0.4 });
  });
});

describe('the picture of the curve', () => {
  const input = {
    chemistry: 'nmc',
    ratedAh: 66,
    chargeLimitVolts: 4.2,
    dischargeLimitVolts: 3,
    floorVolts: 2.5,
    shelfVolts: 3.6,
  } as const;

  it('draws the limits in their order, inside the panel', () => {
    const { limits, voltsHeight } = layoutCurve(input, 640, 300, 92);
    const y = Object.fromEntries(limits.map((limit) => [limit.key, limit.y]));
    expect(y.charge).toBeGreaterThan(0);
    expect(y.discharge!).toBeGreaterThan(y.charge!);
    expect(y.floor!).toBeGreaterThan(y.discharge!);
    expect(y.floor).toBeLessThan(voltsHeight);
  });

  it('leads the shelf voltage to the charge at which a group rests there', () => {
    const { shelf, toX } = layoutCurve(input, 640, 300, 92);
    expect(voltsAtSoc(chemistryParameters('nmc').curve, shelf!.soc)).toBeCloseTo(3.6, 9);
    expect(shelf!.x).toBeCloseTo(toX(shelf!.soc), 6);
  });

  it('leaves out what is not typed, or typed as nonsense', () => {
    const drawn = layoutCurve({ ...input, chargeLimitVolts: 42, floorVolts: null, shelfVolts: 9 }, 640, 300, 92);
    expect(drawn.limits.map(({ key }) => key)).toEqual(['discharge']);
    expect(drawn.shelf).toBeNull();
  });

  it('prints a bar in Ah of one group: twice the capacity, twice the bar', () => {
    const [one, two] = [66, 132].map((ratedAh) => layoutCurve({ ...input, ratedAh }, 640, 300, 92).bars[7]!);
    expect(Number(two!.text)).toBeCloseTo(2 * Number(one!.text), 1);
  });
});
