import { voltsAtSoc } from '../curve/ocv';
import { CHEMISTRIES } from '../parameters/chemistries';
import type { PlanInput } from '../plan-types';
import { isGiven } from '../require';
import type { PlanModel } from './plan-model';

/** The input with the volts of a target that is given as a state of charge; otherwise as it is. */
export function withTargetVolts(input: PlanInput): PlanInput {
  const { soc } = input.target;
  if (!isGiven(soc) || !(soc >= 0 && soc <= 1)) return input;
  const curve = input.module.curve ?? CHEMISTRIES[input.module.chemistry].curve;
  return { ...input, target: { ...input.target, volts: voltsAtSoc(curve, soc) } };
}

/** Whether the target lies where the chemistry's voltage says little of its charge. */
export function isOnPlateau(model: PlanModel): boolean {
  const { plateau } = CHEMISTRIES[model.input.module.chemistry];
  return plateau !== null && model.targetSoc >= plateau.fromSoc && model.targetSoc <= plateau.toSoc;
}

/** The target is a state of charge on the plateau: to be counted from a known end. */
export const countsFromEnd = (model: PlanModel): boolean => isGiven(model.input.target.soc) && isOnPlateau(model);
