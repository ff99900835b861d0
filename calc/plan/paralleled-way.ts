import { joinGroups } from '../charge-paralleled';
import { voltsAtSoc } from '../curve/ocv';
import type { Caution, ChannelParameters, Finish } from '../plan-types';
import { isStep, type Draft, type NotPossible } from './draft';
import type { PlanModel } from './plan-model';
import { preLevel } from './pre-level';
import { groupsAt, seriesStep } from './series-step';
import { takesOneGroup } from './single-group';
import { stringCharge } from './string-charge';
import { ampsText } from './words';

/**
 * Busbars off, all groups joined, charged as one group of ΣQ; levelled first where joining them would push too much current.
 */
export function paralleledWay(model: PlanModel, channel: ChannelParameters, finish: Finish): Draft | NotPossible {
  const count = model.groups.length;
  if (count === 1) return { reason: 'This module has one group: there is nothing to join.' };
  if (!takesOneGroup(channel)) return { reason: `${channel.name} cannot be set as low as one group.` };
  const levelled = preLevel(model);
  if ('reason' in levelled) return levelled;

  const all = model.groups.map((_, group) => group);
  const joined = joinGroups(groupsAt(model, all, levelled.soc), model.curve);
  const direction = joined.restVolts <= model.targetVolts ? 'charge' : 'discharge';
  const joinedSoc =
    all.reduce((sum, group) => sum + levelled.soc[group]! * model.groups[group]!.capacityAh, 0) / joined.capacityAh;
  const bulk = seriesStep({
    model,
    kind: 'bulk',
    way: 'paralleled',
    channel,
    finish,
    direction,
    groupIndexes: all,
    groups: [{ ...joined, restVolts: voltsAtSoc(model.curve, joinedSoc), polarisationVolts: 0 }],
    linkOhm: 0,
    limitTimes: count,
    aimVolts: model.targetVolts,
    first: false,
    markVolts: model.markVolts,
    socBefore: all.map(() => joinedSoc),
    stringIn: (sample) => {
      const capacity = sample.capacityAh.reduce((sum, ampHours) => sum + ampHours, 0);
      const charge = sample.startSoc.reduce((sum, soc, group) => sum + soc * sample.capacityAh[group]!, 0);
      const step = direction === 'charge' ? model.efficiency / capacity : -1 / capacity;
      return {
        string: stringCharge(model.curve, [charge / capacity], [step]),
        ohm: 1 / sample.longOhm.reduce((sum, ohm) => sum + 1 / ohm, 0),
      };
    },
  });
  if (!isStep(bulk)) return bulk;
  return {
    way: 'paralleled',
    finish,
    direction,
    steps: [...levelled.steps, bulk],
    setVolts: bulk.setVolts,
    setVoltsCap: bulk.capVolts,
    amps: bulk.setAmps ?? Math.abs(bulk.trace[0]?.amps ?? bulk.endAmps),
    busbarsOff: true,
    takes:
      levelled.steps.length === 0
        ? 'Busbars off, groups joined plus to plus and minus to minus, busbars on again in the rest.'
        : 'Busbars off, groups levelled through a resistor, then joined plus to plus and minus to minus; busbars on again in the rest.',
    cautions: inrushCautions(levelled.inrushAmps, levelled.limitAmps, levelled.steps.length > 0),
  };
}

function inrushCautions(inrushAmps: number, limitAmps: number, levelledFirst: boolean): Caution[] {
  if (levelledFirst)
    return [
      {
        code: 'inrush',
        text: `Joined as they are, ${ampsText(inrushAmps)} would flow into one group; ${ampsText(limitAmps)} is the limit. Level them first, in the order of the steps.`,
      },
    ];
  if (inrushAmps < limitAmps / 2) return [];
  return [
    {
      code: 'inrush',
      text: `Joining them lets ${ampsText(inrushAmps)} flow into one group for a moment. ${ampsText(limitAmps)} is the limit.`,
    },
  ];
}
