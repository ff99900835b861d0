import { chargeThroughTerminals } from './charge-through-terminals';
import { socAtVolts, voltsAtSoc } from './curve/ocv';
import { joiningInrush } from './joining-inrush';
import { validateStep } from './step/validate-step';
import type { CellGroup, OcvTable, ParalleledResult, StepInput, StepOptions } from './types';

/**
 * All groups joined in parallel, then charged as one group: ΣQ at group voltage.
 *
 * The joined group starts where the groups' charge, summed, puts it; the inrush that gets it there is given beside.
 * Target and limits are per group, and `groups` has the one joined group.
 *
 * @throws CalcInputError for input that cannot be
 */
export function chargeParalleled(input: StepInput, options?: StepOptions): ParalleledResult {
  validateStep(input);
  const { inrushAmps, worstPairAmps } = joiningInrush(input.groups);
  const joined = joinGroups(input.groups, input.curve);
  const result = chargeThroughTerminals({ ...input, groups: [joined] }, options);
  return { ...result, joinedVolts: joined.restVolts, inrushAmps, worstPairAmps };
}

/** The one group that groups in parallel make up once they have settled among themselves. */
export function joinGroups(groups: CellGroup[], curve: OcvTable): CellGroup {
  const capacityAh = groups.reduce((sum, group) => sum + group.capacityAh, 0);
  const charge = groups.reduce((sum, group) => sum + group.capacityAh * socAtVolts(curve, group.restVolts), 0);
  const ohmicResistanceOhm = inParallel(groups.map((group) => group.ohmicResistanceOhm));
  const polarisationResistanceOhm = inParallel(groups.map((group) => group.polarisationResistanceOhm));
  // R1 branches in parallel: capacitances τ/R1 add up, and their charge is shared by them.
  const farads = groups.map((group) =>
    group.polarisationResistanceOhm > 0 ? group.polarisationTimeConstantS / group.polarisationResistanceOhm : 0,
  );
  const total = farads.reduce((sum, value) => sum + value, 0);
  const over = groups.reduce((sum, group, i) => sum + farads[i]! * (group.polarisationVolts ?? 0), 0);
  return {
    capacityAh,
    ohmicResistanceOhm,
    polarisationResistanceOhm,
    polarisationTimeConstantS:
      polarisationResistanceOhm > 0 ? total * polarisationResistanceOhm : groups[0]!.polarisationTimeConstantS,
    restVolts: groups.length === 1 ? groups[0]!.restVolts : voltsAtSoc(curve, charge / capacityAh),
    polarisationVolts: total > 0 ? over / total : 0,
  };
}

function inParallel(ohm: number[]): number {
  if (ohm.some((value) => value === 0)) return 0;
  return 1 / ohm.reduce((sum, value) => sum + 1 / value, 0);
}
