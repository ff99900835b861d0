import type {
  ChannelParameters,
  ChargePlan,
  Finish,
  PlanInput,
  PlanOption,
  Refusal,
  RuledOutWay,
  Way,
} from '../plan-types';
import { quantile } from '../statistics/quantile';
import { isPossible, type Draft, type NotPossible } from './draft';
import { groupByGroupWay } from './group-by-group-way';
import { knownEndWay } from './known-end-way';
import { paralleledWay } from './paralleled-way';
import { planCautions } from './plan-cautions';
import { planModel, type PlanModel } from './plan-model';
import { refuseCharge } from './refuse-charge';
import { resistorWay } from './resistor-way';
import { takesOneGroup } from './single-group';
import { terminalsWay } from './terminals-way';
import { toOption } from './to-option';
import { countsFromEnd, isOnPlateau, withTargetVolts } from './target-soc';
import { durationText, limitText, voltsText } from './words';

const FINISHES: readonly Finish[] = ['over-and-settle', 'on-the-mark'];

/** One way of connecting and ending, where the others are not asked for. */
export interface OnlyWay {
  way: Way;
  finish: Finish;
}

/** A way that takes longer is left out, s, unless nothing is quicker. */
const LONGEST_OFFERED_S = 36 * 3600;

/**
 * Plans a spare: every way, finish and channel that brings it to the target, soonest first, each with its band, steps,
 * settings and cautions; what cannot be done with its reason; and the refusals where nothing may be done.
 *
 * Times are the core's (`chargeThroughTerminals` and its kin) on the nominal numbers, their bands come from a seeded sample
 * set: the same input gives the same digits. Seconds count from the wished clip-on in an option, from now in `readyByS`,
 * `clipOnAtS` and `latestStartS`.
 *
 * @param only one way and finish, in place of all: its options are those of the whole plan, but for the marks
 * @throws CalcInputError for a curve that cannot be
 */
export function planCharge(asked: PlanInput, only: OnlyWay | null = null): ChargePlan {
  const input = withTargetVolts(asked);
  const refusals = refuseCharge(input);
  if (refusals.length > 0) return refused(input, refusals);
  const model = planModel(input);
  const plan: ChargePlan = {
    direction: model.direction,
    options: [],
    ruledOut: [],
    // On the plateau volts that agree are no state of charge that agrees.
    alreadyWithin:
      !countsFromEnd(model) &&
      model.startVolts.every((volts) => Math.abs(volts - model.targetVolts) <= model.toleranceVolts),
    refusals: [],
    cautions: planCautions(model),
    groupAmpHours: groupAmpHours(model),
    startVolts: model.startVolts,
  };
  if (plan.alreadyWithin) return plan;

  let ceilings = 0;
  const take = (
    way: Way,
    finish: Finish,
    channel: { id: string | null; name: string | null },
    found: Draft | NotPossible,
  ): void => {
    if (isPossible(found)) plan.options.push(toOption(model, found));
    else {
      if (found.ceiling) ceilings += 1;
      plan.ruledOut.push({ way, finish, channelId: channel.id, channelName: channel.name, reason: found.reason });
    }
  };
  if (input.channels.length === 0 && input.neighbour === null)
    plan.ruledOut.push({
      way: 'terminals',
      finish: 'over-and-settle',
      channelId: null,
      channelName: null,
      reason: 'No channel is in use here. Add a charger with its channels first.',
    });
  if (countsFromEnd(model)) fromEnds(model, take, only);
  if (!countsFromEnd(model) || input.acceptWideBand === true) forEachWay(model, take, only);
  plan.options.sort((a, b) => a.totalS.p50 - b.totalS.p50 || a.handsOnS - b.handsOnS);
  leaveOutLong(plan, model);
  markSoonest(plan.options);
  if (input.acceptWideBand === false && !countsFromEnd(model) && isOnPlateau(model) && plan.options.length > 0)
    refusePlateau(plan, model);
  if (plan.options.length === 0 && plan.refusals.length === 0 && ceilings > 0)
    plan.refusals.push(ceilingRefusal(model, plan.ruledOut));
  return plan;
}

type Take = (
  way: Way,
  finish: Finish,
  channel: { id: string | null; name: string | null },
  found: Draft | NotPossible,
) => void;

function forEachWay(model: PlanModel, take: Take, only: OnlyWay | null): void {
  const { channels, resistors, neighbour } = model.input;
  const named = (channel: ChannelParameters): { id: string; name: string } => ({
    id: channel.channelId,
    name: channel.name,
  });
  const severalGroups = model.groups.length > 1;
  const asks = (way: Way): boolean => only === null || only.way === way;
  const single = channels.filter((channel) => channel.singleGroup && takesOneGroup(channel));
  for (const finish of FINISHES) {
    if (only !== null && only.finish !== finish) continue;
    for (const channel of channels) {
      if (asks('terminals')) take('terminals', finish, named(channel), terminalsWay(model, channel, finish));
      if (!severalGroups) continue;
      if (asks('group-by-group'))
        take('group-by-group', finish, named(channel), groupByGroupWay(model, [channel], finish));
      if (asks('paralleled')) take('paralleled', finish, named(channel), paralleledWay(model, channel, finish));
    }
    if (severalGroups && single.length > 1 && asks('group-by-group')) {
      const names = single.map((channel) => channel.name).join(' + ');
      const found = groupByGroupWay(model, single, finish);
      // Where one of them alone is quicker than sharing, it stands there by itself already.
      if (!isPossible(found) || new Set(found.steps.map((step) => step.channel?.channelId)).size > 1)
        take('group-by-group', finish, { id: null, name: names }, found);
    }
  }
  if (neighbour === null || !asks('resistor')) return;
  if (resistors.length === 0)
    take('resistor', 'over-and-settle', { id: null, name: null }, { reason: "No resistor is on the workshop's list." });
  for (const resistor of resistors)
    take('resistor', 'over-and-settle', { id: null, name: resistor.name }, resistorWay(model, neighbour, resistor));
}

/** From full and from empty: the one may be sooner, the other nearer to the target and so surer. */
function fromEnds(model: PlanModel, take: Take, only: OnlyWay | null): void {
  const all = model.groups.length > 1 ? (['terminals', 'group-by-group'] as const) : (['terminals'] as const);
  const ways = all.filter((way) => only === null || only.way === way);
  for (const channel of model.input.channels)
    for (const way of ways)
      for (const end of ['full', 'empty'] as const)
        take(
          way,
          'over-and-settle',
          { id: channel.channelId, name: channel.name },
          knownEndWay(model, end, way, channel),
        );
}

/** A bare voltage target on the plateau that nobody has accepted the band of. */
function refusePlateau(plan: ChargePlan, model: PlanModel): void {
  const { totalS } = plan.options[0]!;
  const ends = model.samples().map((sample) => Math.min(1, Math.max(0, sample.targetSoc)));
  const soc = { p10: quantile(ends, 0.1), p50: quantile(ends, 0.5), p90: quantile(ends, 0.9) };
  const percent = (share: number): string => `${Math.round(share * 100)}\u00a0%`;
  plan.refusals.push({
    code: 'numbers',
    group: null,
    text: `The curve is flat at ${voltsText(model.targetVolts)}: that may be ${percent(soc.p10)} to ${percent(soc.p90)} of charge, and take ${durationText(totalS.p10)} to ${durationText(totalS.p90)}. Give the pack's state of charge and count from full or empty, or accept this band.`,
    plateau: { totalS, soc },
  });
  plan.options = [];
}

function leaveOutLong(plan: ChargePlan, model: PlanModel): void {
  const offered = plan.options.filter((option) => option.totalS.p50 - option.queueS <= LONGEST_OFFERED_S);
  if (offered.length === 0) return;
  for (const option of plan.options) {
    if (offered.includes(option)) continue;
    const channel = model.input.channels.find((one) => one.channelId === option.channelIds[0]);
    const resistor = model.input.resistors.find((one) => one.resistorId === option.steps[0]?.resistorId);
    plan.ruledOut.push({
      way: option.way,
      finish: option.finish,
      channelId: channel?.channelId ?? null,
      channelName: channel?.name ?? resistor?.name ?? null,
      reason: `Would take ${durationText(option.totalS.p50 - option.queueS)} and is left out.`,
    });
  }
  plan.options = offered;
}

/** Only what ends inside the tolerance is marked; what must come apart competes for the first mark, not for the second. */
function markSoonest(options: PlanOption[]): void {
  const good = options.filter((option) => option.withinTolerance);
  if (good[0]) good[0].soonest = true;
  const stays = good.find((option) => !option.busbarsOff);
  if (stays) stays.soonestBusbarsStay = true;
}

function groupAmpHours(model: PlanModel): number[] {
  return model.startSoc.map((soc, group) => {
    const needed = (model.targetSoc - soc) * model.groups[group]!.capacityAh;
    return needed > 0 ? needed / model.efficiency : needed;
  });
}

function ceilingRefusal(model: PlanModel, ruledOut: RuledOutWay[]): Refusal {
  const fixed = model.input.channels.filter((channel) => !channel.adjustableVolts);
  const lowest = fixed.reduce((least, channel) => (channel.maxVolts < least.maxVolts ? channel : least), fixed[0]!);
  const reason = ruledOut.find(
    (one) => one.channelId === lowest.channelId && one.way === 'terminals' && one.finish === 'over-and-settle',
  )?.reason;
  return {
    code: 'ceiling',
    group: null,
    text: `${reason ?? `${lowest.name} always charges to ${limitText(lowest.maxVolts)}.`} Take a charger whose voltage can be set.`,
  };
}

function refused(input: PlanInput, refusals: Refusal[]): ChargePlan {
  const sum = input.spare.groupVolts.reduce((total, volts) => total + volts, 0);
  return {
    direction: sum <= input.target.volts * input.spare.groupVolts.length ? 'charge' : 'discharge',
    options: [],
    ruledOut: [],
    alreadyWithin: false,
    refusals,
    cautions: [],
    groupAmpHours: [],
    startVolts: [...input.spare.groupVolts],
  };
}
