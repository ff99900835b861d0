import { socOf } from './soc-of';
import { CalcInputError } from '../errors';
import { CHEMISTRIES } from '../parameters/chemistries';
import type { CheckVerdict, ModuleParameters, TargetState } from '../plan-types';

/** A hundredth of a millivolt: decimals of a reading that lies on the tolerance's edge. */
const EDGE_VOLTS = 1e-5;

/**
 * Judges the rest voltages read in the check: each group against the target and its tolerance, with the charge it still
 * needs by the curve (at the terminals: what does not stay is added while charging).
 *
 * @param groupVolts rest voltage of each group, V
 * @param capacityAh of one group, or of each
 * @throws CalcInputError where a voltage is missing or no number, or the counts differ
 */
export function judgeCheck(
  groupVolts: number[],
  target: Pick<TargetState, 'volts' | 'toleranceVolts'>,
  module: Pick<ModuleParameters, 'chemistry' | 'curve' | 'groupsInSeries'>,
  capacityAh: number | number[],
): CheckVerdict {
  if (groupVolts.length !== module.groupsInSeries)
    throw new CalcInputError('groupVolts', groupVolts, `a list of ${module.groupsInSeries}, one for each group`);
  const wrong = groupVolts.findIndex((volts) => !Number.isFinite(volts));
  if (wrong >= 0) throw new CalcInputError(`groupVolts[${wrong}]`, groupVolts[wrong], 'a number');
  if (!(target.toleranceVolts > 0))
    throw new CalcInputError('target.toleranceVolts', target.toleranceVolts, 'a number above 0');
  const chemistry = CHEMISTRIES[module.chemistry];
  const curve = module.curve ?? chemistry.curve;
  const targetSoc = socOf(curve, target.volts);
  const groups = groupVolts.map((volts, group) => {
    const capacity = Array.isArray(capacityAh) ? capacityAh[group]! : capacityAh;
    const deviationVolts = volts - target.volts;
    const stays = (targetSoc - socOf(curve, volts)) * capacity;
    return {
      group,
      volts,
      deviationVolts,
      within: Math.abs(deviationVolts) <= target.toleranceVolts + EDGE_VOLTS,
      ampHoursToGo: stays > 0 ? stays / chemistry.coulombicEfficiency : stays,
    };
  });
  const worst = groups.reduce((most, one) =>
    Math.abs(one.deviationVolts) > Math.abs(most.deviationVolts) ? one : most,
  );
  return {
    within: groups.every((one) => one.within),
    groups,
    spreadVolts: Math.max(...groupVolts) - Math.min(...groupVolts),
    worstGroup: worst.group,
  };
}
