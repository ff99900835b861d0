import { describe, expect, it } from 'vitest';
import { CHEMISTRIES, judgeCheck, socAtVolts, voltsAtSoc, type ChemistryId } from '@/calc/index';
import { driftOf } from '@/shared/ui/charge/drift';

/** Rest voltage after so many days at a share of loss a month, by the curve itself. */
function after(chemistry: ChemistryId, volts: number, days: number, lossPerMonth: number): number {
  const { curve } = CHEMISTRIES[chemistry];
  return voltsAtSoc(curve, socAtVolts(curve, volts) - (lossPerMonth * days) / (365.25 / 12));
}
const verdict = (chemistry: ChemistryId, volts: number[], target: number) =>
  judgeCheck(
    volts,
    { volts: target, toleranceVolts: 0.005 },
    { chemistry, curve: null, groupsInSeries: volts.length },
    60,
  );

describe('the drift of a proven module', () => {
  it.each([
    ['nmc', 3.947, null],
    ['nmc', 3.7, 0.05],
    ['lmo-blend', 3.9, null],
  ] as const)('of %s at %f V falls by 1 mV in the days it tells, within 3 %%', (chemistry, target, loss) => {
    const drift = driftOf(chemistry, loss, target, 0.005, verdict(chemistry, [target, target], target));
    const share = loss ?? CHEMISTRIES[chemistry].selfDischargePerMonth;
    const fallen = target - after(chemistry, target, drift.daysPerMillivolt, share);
    expect(fallen * 1000).toBeGreaterThan(0.97);
    expect(fallen * 1000).toBeLessThan(1.03);
  });

  it('asks for a new check when the lowest group may be 5 mV under at a loss of 1.65 times the likely', () => {
    const target = 3.947;
    const groups = [3.949, 3.946];
    const drift = driftOf('nmc', null, target, 0.005, verdict('nmc', groups, target));
    const lowest = after('nmc', 3.946, drift.daysInTolerance, CHEMISTRIES.nmc.selfDischargePerMonth * Math.exp(0.5));
    expect((lowest - (target - 0.005)) * 1000).toBeCloseTo(0, 1);
  });

  it('of a group that is at the edge already leaves no day', () => {
    expect(driftOf('nmc', null, 3.947, 0.005, verdict('nmc', [3.942, 3.947], 3.947)).daysInTolerance).toBeCloseTo(0, 6);
  });
});
