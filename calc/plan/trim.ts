import type { ChannelParameters, Finish } from '../plan-types';
import { isStep, type DraftStep } from './draft';
import type { PlanModel } from './plan-model';
import { groupTasks, singleGroupStep, takesOneGroup, type GroupTask, type ModuleState } from './single-group';

export interface Trim {
  steps: DraftStep[];
  /** 0-based groups that no channel here can bring in. */
  left: number[];
}

/**
 * What a current through all groups has left in the others, finished group by group: on the channel that would have a
 * direction's groups done soonest, charging and discharging on their own.
 *
 * @param busyUntilS when the step before ends, s from now
 */
export function trimSteps(model: PlanModel, finish: Finish, state: ModuleState, busyUntilS: number): Trim {
  const tasks = groupTasks(model, state.soc, model.toleranceVolts + 1e-5);
  const trim: Trim = { steps: [], left: [] };
  for (const direction of ['charge', 'discharge'] as const) {
    const wanted = tasks.filter((task) => task.direction === direction);
    if (wanted.length === 0) continue;
    const steps = bestChannelSteps(model, finish, state, wanted, busyUntilS);
    if (steps === null) trim.left.push(...wanted.map((task) => task.group));
    else trim.steps.push(...steps);
  }
  return trim;
}

function bestChannelSteps(
  model: PlanModel,
  finish: Finish,
  state: ModuleState,
  tasks: GroupTask[],
  busyUntilS: number,
): DraftStep[] | null {
  const ampHours = tasks.reduce((sum, task) => sum + task.ampHours, 0);
  const ranked = model.input.channels
    .filter((channel) => takesOneGroup(channel) && (tasks[0]!.direction === 'charge' || channel.canDischarge))
    .map((channel) => ({
      channel,
      endsS: Math.max(busyUntilS, channel.freeInS) + (3600 * ampHours) / roughAmps(model, channel, tasks[0]!),
    }))
    .sort((a, b) => a.endsS - b.endsS);
  for (const { channel } of ranked) {
    const steps = stepsOn(model, finish, state, tasks, channel);
    if (steps !== null) return steps;
  }
  return null;
}

/** All of the tasks on one channel with the finish, or over and settle where the mark cannot be held; null: not possible. */
function stepsOn(
  model: PlanModel,
  finish: Finish,
  state: ModuleState,
  tasks: GroupTask[],
  channel: ChannelParameters,
): DraftStep[] | null {
  for (const way of finish === 'on-the-mark' ? (['on-the-mark', 'over-and-settle'] as const) : [finish]) {
    const soc = [...state.soc];
    const steps: DraftStep[] = [];
    for (const task of tasks) {
      const step = singleGroupStep(model, 'trim', channel, way, task, { ...state, soc });
      if (!isStep(step)) break;
      soc[task.group] = step.socAfter[task.group]!;
      steps.push(step);
    }
    if (steps.length === tasks.length) return steps;
  }
  return null;
}

function roughAmps(model: PlanModel, channel: ChannelParameters, task: GroupTask): number {
  const { module } = model.input;
  if (task.direction === 'charge') return Math.min(channel.maxAmps, module.maxChargeAmps);
  if (channel.loadOhm !== null) return Math.min(model.targetVolts / channel.loadOhm, module.maxDischargeAmps);
  return Math.min(channel.dischargeAmps ?? channel.maxAmps, module.maxDischargeAmps);
}
