import type { ChannelParameters, PlannedStep } from '../plan-types';
import { leadOhmOf } from '../plan/leads';
import type { PlanModel } from '../plan/plan-model';
import type { Source } from '../types';

/** Current of a step over thermal pauses, positive, A: its mean where the channel gives current a share of the time only. */
export const meanSetAmps = (step: PlannedStep, channel: ChannelParameters | undefined): number | null =>
  step.setAmps === null ? null : step.setAmps * (channel?.duty ?? 1);

/** What a channel gives in a step, as the plan has set it (settleSource). */
export function plannedSource(model: PlanModel, step: PlannedStep, channel: ChannelParameters): Source {
  const loadOhm = step.direction === 'discharge' ? channel.loadOhm : null;
  return {
    maxAmps: meanSetAmps(step, channel) ?? mostIntoLoad(model, step, channel),
    setVolts: step.setVolts,
    maxWatts: channel.maxWatts,
    leadResistanceOhm: leadOhmOf(channel),
    heldGroupVolts: null,
    loadOhm,
  };
}

/** A load resistor rules the current, up to what the module gives. */
function mostIntoLoad(model: PlanModel, step: PlannedStep, channel: ChannelParameters): number {
  const times = step.way === 'paralleled' ? step.groupIndexes.length : 1;
  const limit = model.input.module.maxDischargeAmps * times;
  return Math.min(limit, channel.dischargeAmps ?? Infinity) * (channel.duty ?? 1);
}
