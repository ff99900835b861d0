import type { ChannelParameters, Finish } from '../plan-types';
import { isStep, type Draft, type DraftStep, type NotPossible } from './draft';
import type { PlanModel } from './plan-model';
import { groupTasks, singleGroupStep, takesOneGroup, type GroupTask, type ModuleState } from './single-group';
import { groupsText } from './words';

/** Groups this near to the target, as a share of the tolerance, are left as they are. */
const LEAVE_SHARE = 1 / 3;

/**
 * Each group by itself, on one channel or on several at once.
 *
 * Several channels begin together and are swapped together, longest groups first, so that those of one round end near each
 * other; as many of the channels are used, quickest first, as has the last current end soonest. A group that no channel can
 * move is left as it is: the draft then ends apart, or is not possible where that is all of them.
 */
export function groupByGroupWay(model: PlanModel, channels: ChannelParameters[], finish: Finish): Draft | NotPossible {
  if (model.groups.length === 1) return { reason: 'This module has one group: its terminals are the group.' };
  const blind = channels.find((channel) => !takesOneGroup(channel));
  if (blind) return { reason: `${blind.name} cannot be set as low as one group.` };
  const tasks = groupTasks(model, model.startSoc, model.toleranceVolts * LEAVE_SHARE);
  const stepsBy = stepMaker(model, finish);
  const quickest = [...channels].sort((a, b) => b.maxAmps - a.maxAmps || a.channelId.localeCompare(b.channelId));
  let best: Rounds | null = null;
  for (let count = 1; count <= quickest.length; count += 1) {
    const rounds = inRounds(model, quickest.slice(0, count), tasks, stepsBy);
    if (
      best === null ||
      rounds.left.length < best.left.length ||
      (rounds.left.length === best.left.length && rounds.endS < best.endS)
    )
      best = rounds;
  }
  if (best === null || best.steps.length === 0)
    return { reason: best?.reason ?? `${channels.map((channel) => channel.name).join(' and ')} has nothing to move.` };
  return toDraft(model, best, finish);
}

function toDraft(model: PlanModel, { steps, left }: Rounds, finish: Finish): Draft {
  const names = [...new Set(steps.map((step) => step.channel!.name))].join(' and ');
  const outside = groupTasks(model, model.startSoc, model.toleranceVolts + 1e-5).filter((task) =>
    left.includes(task.group),
  );
  const one = outside.length === 1;
  return {
    way: 'group-by-group',
    finish,
    direction: model.direction,
    steps,
    setVolts: steps[0]!.setVolts,
    setVoltsCap: steps[0]!.capVolts,
    amps: Math.max(...steps.map((step) => step.setAmps ?? Math.abs(step.endAmps))),
    busbarsOff: false,
    takes: `Leads on one group after the other${names.includes(' and ') ? `, ${names} at once` : ''}. Busbars stay.`,
    cautions:
      outside.length === 0
        ? []
        : [
            {
              code: 'ends-apart',
              text: `${groupsText(outside.map((task) => task.group))} cannot be brought in with ${names} and ${one ? 'ends' : 'end'} outside the tolerance.`,
            },
          ],
  };
}

type StepMaker = (task: GroupTask, channel: ChannelParameters) => DraftStep | NotPossible;

/** Steps by group and channel, each run once. */
function stepMaker(model: PlanModel, finish: Finish): StepMaker {
  const state: ModuleState = { soc: model.startSoc, polarisation: model.startSoc.map(() => 0), movedIn: () => 0 };
  const made = new Map<string, DraftStep | NotPossible>();
  return (task, channel) => {
    const key = `${task.group}/${channel.channelId}`;
    const known = made.get(key) ?? singleGroupStep(model, 'bulk', channel, finish, task, state);
    made.set(key, known);
    return known;
  };
}

interface Rounds {
  steps: DraftStep[];
  left: number[];
  reason: string | null;
  /** Last current, s from now. */
  endS: number;
}

function inRounds(model: PlanModel, channels: ChannelParameters[], tasks: GroupTask[], stepBy: StepMaker): Rounds {
  const { clipOnS, clipOffS } = model.input.workshop;
  const waiting = [...tasks].sort((a, b) => b.ampHours - a.ampHours || a.group - b.group);
  const rounds: Rounds = {
    steps: [],
    left: [],
    reason: null,
    endS: Math.max(model.input.clipOnAtS, ...channels.map((channel) => channel.freeInS)),
  };
  const soc = [...model.startSoc];
  while (waiting.length > 0) {
    const round: DraftStep[] = [];
    for (const channel of channels) {
      const at = waiting.findIndex((task) => isStep(stepBy(task, channel)));
      if (at < 0) continue;
      const [task] = waiting.splice(at, 1);
      round.push(stepBy(task!, channel) as DraftStep);
    }
    if (round.length === 0) break;
    round.forEach((step, place) => {
      soc[step.groupIndexes[0]!] = step.socAfter[step.groupIndexes[0]!]!;
      rounds.steps.push({ ...step, together: place > 0, socAfter: [...soc] });
    });
    rounds.endS += round.length * (clipOnS + clipOffS) + Math.max(...round.map((step) => step.seconds));
  }
  for (const task of waiting) {
    rounds.left.push(task.group);
    const tried = stepBy(task, channels[0]!);
    if (!isStep(tried)) rounds.reason ??= tried.reason;
  }
  return rounds;
}
