import type { PlanModel } from './plan-model';

/** Below this, near empty and near full a cell needs half as long again to come within 2 mV (measured relaxations). */
const COLD_CELSIUS = 15;
const NEAR_EMPTY_SOC = 0.1;
const NEAR_FULL_SOC = 0.9;
const LONGER = 1.5;

/** Least rest before the check, s: the workshop's (60 min by default), half as long again where cells relax slowly. */
export function minimumRestS(model: Pick<PlanModel, 'input' | 'celsius'>, endSoc: readonly number[]): number {
  const slow = model.celsius < COLD_CELSIUS || endSoc.some((soc) => soc < NEAR_EMPTY_SOC || soc > NEAR_FULL_SOC);
  return model.input.workshop.minRestS * (slow ? LONGER : 1);
}
