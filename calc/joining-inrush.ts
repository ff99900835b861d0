import { requirePositive } from './require';
import type { CellGroup } from './types';

export interface JoiningInrush {
  /** The largest current into or out of one group when all are joined at once, A. */
  inrushAmps: number;
  /** The largest current between any two of them joined alone, A. */
  worstPairAmps: number;
  /** Voltage on the joined terminals at the first moment, V. */
  busVolts: number;
}

/**
 * Currents at the moment groups are joined in parallel, before any charge has moved: max |U_i − Ū|/R0_i with Ū the mean
 * weighted by 1/R0, and for pairs |U_a − U_b|/(R0_a + R0_b). Kirchhoff's laws over the ohmic resistances alone; jumpers
 * only make it less.
 *
 * @throws CalcInputError where a group has no ohmic resistance
 */
export function joiningInrush(
  groups: Pick<CellGroup, 'restVolts' | 'ohmicResistanceOhm' | 'polarisationVolts'>[],
): JoiningInrush {
  groups.forEach((group, i) => requirePositive(`groups[${i}].ohmicResistanceOhm`, group.ohmicResistanceOhm));
  const volts = groups.map((group) => group.restVolts + (group.polarisationVolts ?? 0));
  const ohm = groups.map((group) => group.ohmicResistanceOhm);
  const conductance = ohm.reduce((sum, value) => sum + 1 / value, 0);
  const busVolts = volts.reduce((sum, value, i) => sum + value / ohm[i]!, 0) / conductance;
  let inrushAmps = 0;
  let worstPairAmps = 0;
  for (let a = 0; a < groups.length; a++) {
    inrushAmps = Math.max(inrushAmps, Math.abs(volts[a]! - busVolts) / ohm[a]!);
    for (let b = a + 1; b < groups.length; b++)
      worstPairAmps = Math.max(worstPairAmps, Math.abs(volts[a]! - volts[b]!) / (ohm[a]! + ohm[b]!));
  }
  return { inrushAmps, worstPairAmps, busVolts };
}
