import { voltsAtSoc } from '../curve/ocv';
import type { PlanModel } from '../plan/plan-model';

/** The module at one moment of a running charge. */
export interface ModuleState {
  s: number;
  /** Of each group. */
  soc: number[];
  /** Over-voltage of each group's RC branch, V. */
  over: number[];
}

/** At the clip-on: settled. */
export const stateAtStart = (model: PlanModel): ModuleState => ({
  s: 0,
  soc: [...model.startSoc],
  over: model.startSoc.map(() => 0),
});

/** Without current until `toS`: dv1/dt = −v1/τ. */
export function rested(model: PlanModel, state: ModuleState, toS: number, only?: readonly number[]): ModuleState {
  const seconds = toS - state.s;
  if (!(seconds > 0)) return state;
  const over = state.over.map((volts, group) =>
    only === undefined || only.includes(group)
      ? volts * Math.exp(-seconds / model.groups[group]!.polarisationTimeConstantS)
      : volts,
  );
  return { s: toS, soc: state.soc, over };
}

/** Rest voltage of each group, V. */
export const restVolts = (model: PlanModel, soc: readonly number[]): number[] =>
  soc.map((at) => voltsAtSoc(model.curve, at));
