import { voltsAtSoc } from '../curve/ocv';
import type { ChannelParameters, Finish, StepKind } from '../plan-types';
import type { Direction } from '../types';
import type { DraftStep, NotPossible } from './draft';
import type { PlanModel } from './plan-model';
import type { Sample } from './samples';
import { groupsAt, sampleString, seriesStep } from './series-step';

/** State of the module between two steps. */
export interface ModuleState {
  soc: number[];
  /** Over-voltage left, V. */
  polarisation: number[];
  /** Charge that has gone into each group in a sample, Ah; out of it: negative. */
  movedIn: (sample: Sample, group: number) => number;
}

/** One group that is brought to the target by itself. */
export interface GroupTask {
  group: number;
  direction: Direction;
  /** Charge it takes at its terminals, Ah. */
  ampHours: number;
}

/** A channel that can be clipped to one group: made for it, or with a voltage that can be set that low. */
export const takesOneGroup = (channel: ChannelParameters): boolean => channel.singleGroup || channel.adjustableVolts;

/** Groups that rest farther than `withinVolts` from the target, with the way each has to go. */
export function groupTasks(model: PlanModel, soc: readonly number[], withinVolts: number): GroupTask[] {
  return soc.flatMap((at, group) => {
    const off = voltsAtSoc(model.curve, at) - model.targetVolts;
    if (Math.abs(off) <= withinVolts) return [];
    const needed = (model.targetSoc - at) * model.groups[group]!.capacityAh;
    return [
      {
        group,
        direction: needed > 0 ? ('charge' as const) : ('discharge' as const),
        ampHours: needed > 0 ? needed / model.efficiency : -needed,
      },
    ];
  });
}

/** Charges (or discharges) one group by itself to the target. */
export function singleGroupStep(
  model: PlanModel,
  kind: StepKind,
  channel: ChannelParameters,
  finish: Finish,
  task: GroupTask,
  state: ModuleState,
): DraftStep | NotPossible {
  const groupIndexes = [task.group];
  return seriesStep({
    model,
    kind,
    way: 'group-by-group',
    channel,
    finish,
    direction: task.direction,
    groupIndexes,
    groups: groupsAt(model, groupIndexes, state.soc, state.polarisation),
    linkOhm: 0,
    limitTimes: 1,
    aimVolts: model.targetVolts,
    first: false,
    markVolts: model.markVolts,
    socBefore: state.soc,
    stringIn: sampleString(model, groupIndexes, task.direction, state.movedIn),
  });
}
