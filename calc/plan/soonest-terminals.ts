import type { Caution, ChannelParameters, PlanInput, PlanOption, Refusal } from '../plan-types';
import { isPossible, type Draft, type NotPossible } from './draft';
import { groupByGroupWay } from './group-by-group-way';
import { planCautions } from './plan-cautions';
import { planModel, type PlanModel } from './plan-model';
import { refuseCharge } from './refuse-charge';
import { withTargetVolts } from './target-soc';
import { terminalsWay } from './terminals-way';
import { endsApart } from './option-cautions';
import { channelIdsOf, optionTotals } from './to-option';

/** Of the soonest way what a list shows of it. */
export interface SoonestWay extends Pick<PlanOption, 'channelIds' | 'totalS'> {
  /** That its groups end outside the tolerance, or far apart inside it; null: they do not. */
  apart: Caution | null;
}

export interface SoonestTerminals {
  /** Null: it cannot be done, or nothing is to be charged. */
  option: SoonestWay | null;
  /** Each group rests within the tolerance already. */
  alreadyWithin: boolean;
  refusals: Refusal[];
  /** Why no channel can, where none can. */
  reason: string | null;
  cautions: Caution[];
}

/**
 * The soonest way through the terminals, for a list of many spares: one draft a channel, over and settle, and a band for the
 * soonest of them alone. On the mark stands in where no channel can go over, and group by group where none takes the whole
 * module. The same numbers as in the whole plan (planCharge) with as many samples.
 *
 * @throws CalcInputError for a curve that cannot be
 */
export function soonestTerminals(asked: PlanInput): SoonestTerminals {
  const input = withTargetVolts(asked);
  const refusals = refuseCharge(input);
  if (refusals.length > 0) return { option: null, alreadyWithin: false, refusals, reason: null, cautions: [] };
  const model = planModel(input);
  const cautions = planCautions(model);
  if (model.startVolts.every((volts) => Math.abs(volts - model.targetVolts) <= model.toleranceVolts))
    return { option: null, alreadyWithin: true, refusals, reason: null, cautions };
  const { draft, reason } = soonestDraft(model);
  return {
    option: draft === null ? null : soonestWay(model, draft),
    alreadyWithin: false,
    refusals,
    reason: draft === null ? reason : null,
    cautions,
  };
}

/** Neither curve of the current nor sentences beside: a list of 200 spares has no time for them. */
function soonestWay(model: PlanModel, draft: Draft): SoonestWay {
  const totals = optionTotals(model, draft);
  return { channelIds: channelIdsOf(draft), totalS: totals.totalS, apart: endsApart(model, draft, totals) };
}

type DraftOn = (channel: ChannelParameters) => Draft | NotPossible;

function soonestDraft(model: PlanModel): { draft: Draft | null; reason: string } {
  let reason = 'No channel is in use here. Add a charger with its channels first.';
  const ways: DraftOn[] = [
    (channel) => terminalsWay(model, channel, 'over-and-settle'),
    (channel) => terminalsWay(model, channel, 'on-the-mark'),
    (channel) => groupByGroupWay(model, [channel], 'over-and-settle'),
  ];
  for (const draftOn of ways) {
    const found = soonestChannel(model, draftOn);
    if (found.draft !== null) return found;
    if (found.reason !== '') reason = found.reason;
  }
  return { draft: null, reason };
}

/**
 * Channels by the least time that they could need; as soon as one has been found to end before the next could, the others
 * need no draft.
 */
function soonestChannel(model: PlanModel, draftOn: DraftOn): { draft: Draft | null; reason: string } {
  const begin = ({ freeInS }: ChannelParameters): number => Math.max(model.input.clipOnAtS, freeInS);
  const ranked = model.input.channels
    .map((channel) => ({ channel, leastS: begin(channel) + leastSeconds(model, channel) }))
    .sort((one, other) => one.leastS - other.leastS);
  let best: { draft: Draft; endS: number } | null = null;
  let reason = '';
  for (const { channel, leastS } of ranked) {
    if (best !== null && leastS >= best.endS) break;
    const draft = draftOn(channel);
    if (!isPossible(draft)) {
      reason = draft.reason;
      continue;
    }
    const endS = begin(channel) + draft.steps.reduce((sum, { seconds }) => sum + seconds, 0);
    if (best === null || endS < best.endS) best = { draft, endS };
  }
  return { draft: best?.draft ?? null, reason };
}

/** Seconds that the group with the least to go needs at the channel's full current: no way of it can be quicker. */
function leastSeconds({ startSoc, targetSoc, groups, direction }: PlanModel, channel: ChannelParameters): number {
  const amps = direction === 'charge' ? channel.maxAmps : (channel.dischargeAmps ?? channel.maxAmps);
  const ampHours = startSoc.map((soc, group) => Math.abs(targetSoc - soc) * groups[group]!.capacityAh);
  return (3600 * Math.min(...ampHours)) / amps;
}
