import type { ChannelParameters, Finish } from '../plan-types';
import { chooseAim } from './aim';
import { isStep, type Draft, type NotPossible } from './draft';
import type { PlanModel } from './plan-model';
import { prechargeStep } from './precharge';
import { groupsAt, sampleString, seriesStep } from './series-step';
import type { ModuleState } from './single-group';
import { trimSteps } from './trim';
import { groupsText, groupText, millivoltsText } from './words';

/**
 * One current through all groups, and a trim of what it leaves.
 *
 * Where all groups end inside the tolerance there is no trim; else the current ends when the first group is at the target
 * and the others are finished group by group where a channel can do it. Where none can, the draft ends apart and says so.
 */
export function terminalsWay(model: PlanModel, channel: ChannelParameters, finish: Finish): Draft | NotPossible {
  const { module, channels } = model.input;
  const count = model.groups.length;
  if (channel.singleGroup && count > 1) return { reason: `${channel.name} takes one group only.` };
  const { direction } = model;
  const aim = chooseAim(model, direction);
  if (aim.ampHours <= 1e-6) return { reason: barredText(model, aim.first, aim.deviations) };
  const all = model.groups.map((_, group) => group);
  const room = model.toleranceVolts - Math.max(0, ...aim.deviations.map((off) => Math.abs(off)));
  // Where the groups already fill the tolerance, on the mark ends closer to its aim, so that the lowest stays inside.
  const mark =
    aim.kind === 'sum' ? Math.min(model.markVolts, Math.max(room, model.toleranceVolts / 10)) : model.markVolts;
  const pre = prechargeStep(model, channel);
  if (pre !== null && !isStep(pre)) return pre;
  const before = pre?.socAfter ?? model.startSoc;
  const bulk = seriesStep({
    model,
    kind: 'bulk',
    way: 'terminals',
    channel,
    finish,
    direction,
    groupIndexes: all,
    groups: groupsAt(model, all, before, pre?.polarisationAfter),
    linkOhm: module.linkResistanceOhm,
    limitTimes: 1,
    aimVolts: aim.sumVolts,
    first: aim.kind === 'first',
    markVolts: mark * count,
    ...(pre === null ? {} : { mostAmps: Infinity }),
    socBefore: before,
    stringIn: sampleString(model, all, direction, (sample) => pre?.ampHoursIn(sample) ?? 0),
  });
  if (!isStep(bulk)) return bulk;

  const sign = direction === 'charge' ? 1 : -1;
  const state: ModuleState = {
    soc: bulk.socAfter,
    polarisation: bulk.polarisationAfter,
    movedIn: (sample) => sign * (bulk.ampHoursIn(sample) + (pre?.ampHoursIn(sample) ?? 0)),
  };
  const trim =
    aim.outside.length > 0
      ? trimSteps(
          model,
          finish,
          state,
          Math.max(model.input.clipOnAtS, channel.freeInS) + (pre?.seconds ?? 0) + bulk.seconds,
        )
      : { steps: [], left: [] };
  const trimNames = [...new Set(trim.steps.map((step) => step.channel!.name))].join(' and ');
  const trimmed = trim.steps.map((step) => step.groupIndexes[0]!);
  const takes =
    trim.steps.length === 0
      ? "Leads on the module's own terminals. Nothing comes apart."
      : `Leads on the module's own terminals, then on ${groupsText(trimmed)} with ${trimNames}. Nothing comes apart.`;
  return {
    way: 'terminals',
    finish,
    direction,
    steps: [...(pre === null ? [] : [pre]), bulk, ...trim.steps],
    setVolts: bulk.setVolts,
    setVoltsCap: bulk.capVolts,
    amps: bulk.setAmps ?? Math.abs(bulk.trace[0]?.amps ?? bulk.endAmps),
    busbarsOff: false,
    takes,
    cautions: trim.left.length === 0 ? [] : [leftText(trim.left, channels.length)],
  };
}

function barredText(model: PlanModel, first: number, deviations: number[]): string {
  const up = model.direction === 'charge';
  const off = millivoltsText(deviations[first]!);
  return Math.abs(deviations[first]!) < 5e-4
    ? `${groupText(first)} is at the target already. A current through all groups would take it past.`
    : `${groupText(first)} is ${off} ${up ? 'over' : 'under'} the target already. A ${up ? 'charge' : 'discharge'} through all groups takes it farther away.`;
}

function leftText(left: number[], channelCount: number): Draft['cautions'][number] {
  const here = channelCount === 0 ? 'No channel here' : 'No channel here that clips to one group';
  return {
    code: 'ends-apart',
    text: `${groupsText(left)} ${left.length === 1 ? 'ends' : 'end'} outside the tolerance. ${here} can finish ${left.length === 1 ? 'it' : 'them'} alone.`,
  };
}
