import type { ChannelParameters, Finish } from '../plan-types';
import { isStep, type Draft, type DraftStep, type NotPossible } from './draft';
import type { PlanModel } from './plan-model';
import { groupTasks, singleGroupStep, takesOneGroup, type GroupTask, type ModuleState } from './single-group';
import { groupsText } from './words';

/** Groups this near to the target, as a share of the tolerance, are left as they are. */
const LEAVE_SHARE = 1 / 3;

/**
 * Each group by itself, on one channel or on several at once: longest first, each to the channel that is then done soonest.
 *
 * A group whose direction no channel has is left as it is: the draft then ends apart, or is not possible where that is all
 * of them.
 */
export function groupByGroupWay(model: PlanModel, channels: ChannelParameters[], finish: Finish): Draft | NotPossible {
  const names = channels.map((channel) => channel.name).join(' and ');
  if (model.groups.length === 1) return { reason: 'This module has one group: its terminals are the group.' };
  const blind = channels.find((channel) => !takesOneGroup(channel));
  if (blind) return { reason: `${blind.name} cannot be set as low as one group.` };
  const tasks = groupTasks(model, model.startSoc, model.toleranceVolts * LEAVE_SHARE);
  const state: ModuleState = {
    soc: model.startSoc,
    polarisation: model.startSoc.map(() => 0),
    movedIn: () => 0,
  };
  const done = assign(model, channels, finish, tasks, state);
  if (done.steps.length === 0) return { reason: done.reason ?? `${names} has nothing to move.` };
  const left = done.left;
  const outside = groupTasks(model, model.startSoc, model.toleranceVolts + 1e-5).filter((task) =>
    left.includes(task.group),
  );
  const firstStep = done.steps[0]!;
  return {
    way: 'group-by-group',
    finish,
    direction: model.direction,
    steps: done.steps,
    setVolts: firstStep.setVolts,
    setVoltsCap: firstStep.capVolts,
    amps: Math.max(...done.steps.map((step) => step.setAmps ?? Math.abs(step.endAmps))),
    busbarsOff: false,
    takes: `Leads on one group after the other${channels.length > 1 ? `, ${names} at once` : ''}. Busbars stay.`,
    cautions:
      outside.length === 0
        ? []
        : [
            {
              code: 'ends-apart',
              text: `${groupsText(outside.map((task) => task.group))} cannot be brought in with ${names} and ${outside.length === 1 ? 'ends' : 'end'} outside the tolerance.`,
            },
          ],
  };
}

function assign(
  model: PlanModel,
  channels: ChannelParameters[],
  finish: Finish,
  tasks: GroupTask[],
  state: ModuleState,
): { steps: DraftStep[]; left: number[]; reason: string | null } {
  const soc = [...state.soc];
  const stepFor = (task: GroupTask, channel: ChannelParameters): DraftStep | NotPossible =>
    singleGroupStep(model, 'bulk', channel, finish, task, { ...state, soc });
  const { clipOnS, clipOffS } = model.input.workshop;
  const freeS = channels.map((channel) => Math.max(channel.freeInS, model.input.clipOnAtS));
  const steps: DraftStep[] = [];
  const left: number[] = [];
  let reason: string | null = null;
  for (const task of [...tasks].sort((a, b) => b.ampHours - a.ampHours || a.group - b.group)) {
    let best: { step: DraftStep; channel: number; doneS: number } | null = null;
    channels.forEach((channel, at) => {
      const step = stepFor(task, channel);
      if (!isStep(step)) {
        reason ??= step.reason;
        return;
      }
      const doneS = freeS[at]! + clipOnS + clipOffS + step.seconds;
      if (best === null || doneS < best.doneS) best = { step, channel: at, doneS };
    });
    // TypeScript does not see the assignment inside forEach.
    const found = best as { step: DraftStep; channel: number; doneS: number } | null;
    if (found === null) {
      left.push(task.group);
      continue;
    }
    freeS[found.channel] = found.doneS;
    soc[task.group] = found.step.socAfter[task.group]!;
    steps.push(found.step);
  }
  // Every step knows the whole module's state; in lanes side by side that is only so once all before it are done.
  let after = [...model.startSoc];
  const ordered = steps.map((step) => {
    after = [...after];
    after[step.groupIndexes[0]!] = step.socAfter[step.groupIndexes[0]!]!;
    return { ...step, socAfter: after };
  });
  return { steps: ordered, left, reason };
}
