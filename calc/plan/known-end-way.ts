import { voltsAtSoc } from '../curve/ocv';
import type { Caution, ChannelParameters } from '../plan-types';
import { isStep, type Draft, type DraftStep, type NotPossible } from './draft';
import { endStep } from './end-step';
import type { PlanModel } from './plan-model';
import type { Sample } from './samples';
import { groupsAt, sampleString, seriesStep } from './series-step';
import { takesOneGroup } from './single-group';
import { ampHoursText } from './words';

/** From here on to the end nothing is worth counting, as a share of the capacity. */
const NEAR_END = 0.005;

/**
 * To a state of charge where the voltage does not tell it: to a known end first, full or empty, then so many ampere-hours by
 * count. Through the terminals, or group by group where the channel takes one group.
 *
 * The count is what a person (or the charger) stops at by the amps it is set to, so its time is certain, and the doubts of
 * capacity and current show in the state of charge that it ends at.
 */
export function knownEndWay(
  model: PlanModel,
  end: 'full' | 'empty',
  way: 'terminals' | 'group-by-group',
  channel: ChannelParameters,
): Draft | NotPossible {
  const count = model.groups.length;
  if (way === 'terminals' && channel.singleGroup && count > 1)
    return { reason: `${channel.name} takes one group only.` };
  if (way === 'group-by-group' && !takesOneGroup(channel))
    return { reason: `${channel.name} cannot be set as low as one group.` };
  const all = model.groups.map((_, group) => group);
  const turns = way === 'terminals' ? [all] : all.map((group) => [group]);
  const soc = [...model.startSoc];
  const steps: DraftStep[] = [];
  for (const groupIndexes of turns) {
    const found = endAndCount(model, end, way, channel, groupIndexes, soc);
    if ('reason' in found) return found;
    for (const step of found) {
      step.socAfter.forEach((at, group) => (soc[group] = at));
      steps.push(step);
    }
  }
  const counted = steps.filter((step) => step.direction !== (end === 'full' ? 'charge' : 'discharge'));
  const ampHours = counted[0]?.ampHours ?? 0;
  const out = end === 'full' ? 'out' : 'in';
  return {
    way,
    finish: 'over-and-settle',
    direction: counted[0]?.direction ?? steps[0]!.direction,
    steps,
    setVolts: steps[0]!.setVolts,
    setVoltsCap: steps[0]!.capVolts,
    amps: steps[0]!.setAmps ?? channel.maxAmps,
    busbarsOff: false,
    takes:
      counted.length === 0
        ? `To ${end} and no further. Nothing comes apart.`
        : `To ${end} first, then ${ampHoursText(ampHours)} ${out} by count${way === 'terminals' ? '' : ', one group after the other'}. Nothing comes apart.`,
    cautions: way === 'terminals' && count > 1 ? [apart(end)] : [],
    knownEnd: end,
    endSocIn: (sample) => endSocIn(model, sample, steps[0]!, ampHours, end),
  };
}

const apart = (end: 'full' | 'empty'): Caution => ({
  code: 'ends-apart',
  text: `The first group that is ${end} ends it for all. How far the others are from ${end} cannot be read off here: charge group by group where that matters.`,
});

function endAndCount(
  model: PlanModel,
  end: 'full' | 'empty',
  way: 'terminals' | 'group-by-group',
  channel: ChannelParameters,
  groupIndexes: number[],
  soc: readonly number[],
): DraftStep[] | NotPossible {
  const first = endStep(model, end, way, channel, groupIndexes, soc);
  if (!isStep(first)) return first;
  const at = first.socAfter[groupIndexes[0]!]!;
  if (Math.abs(at - model.targetSoc) <= NEAR_END) return [first];
  const direction = end === 'full' ? 'discharge' : 'charge';
  const second = seriesStep({
    model,
    kind: 'bulk',
    way,
    channel,
    finish: 'over-and-settle',
    direction,
    groupIndexes,
    groups: groupsAt(model, groupIndexes, first.socAfter),
    linkOhm: way === 'terminals' ? model.input.module.linkResistanceOhm : 0,
    limitTimes: 1,
    aimVolts: groupIndexes.length * voltsAtSoc(model.curve, model.targetSoc),
    first: false,
    markVolts: model.markVolts * groupIndexes.length,
    socBefore: first.socAfter,
    stringIn: sampleString(model, groupIndexes, direction, () => 0),
  });
  if (!isStep(second)) return second;
  return [
    first,
    {
      ...second,
      secondsIn: () => second.seconds,
      ampHoursIn: (sample) => second.ampHours * sample.currentFactor,
    },
  ];
}

/** By the count from the end, with the sample's own capacity and with what its current is more than the count says. */
function endSocIn(model: PlanModel, sample: Sample, first: DraftStep, ampHours: number, end: 'full' | 'empty'): number {
  const group = first.groupIndexes[0]!;
  const from = first.socAfter[group]!;
  const moved = end === 'full' ? -ampHours : ampHours * model.efficiency;
  return from + (moved * sample.currentFactor) / sample.capacityAh[group]!;
}
