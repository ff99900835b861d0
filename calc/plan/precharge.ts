import type { ChannelParameters } from '../plan-types';
import { isStep, type DraftStep, type NotPossible } from './draft';
import type { PlanModel } from './plan-model';
import { groupsAt, PRECHARGE_RATE_C, sampleString, seriesStep } from './series-step';
import { socOf } from './soc-of';
import { stringVolts } from './string-charge';
import { moduleString } from './aim';

/**
 * The own first step of a charge through the terminals where a group rests below its pre-charge volts: at a tenth of the
 * capacity per hour until the lowest is there. Null: no group is so low, or the target is not above.
 */
export function prechargeStep(model: PlanModel, channel: ChannelParameters): DraftStep | NotPossible | null {
  const below = model.input.module.prechargeBelowVolts ?? null;
  if (below === null || model.direction !== 'charge' || model.targetVolts <= below) return null;
  const upToSoc = socOf(model.curve, below);
  const ampHours = model.startSoc.reduce(
    (most, soc, group) => Math.max(most, ((upToSoc - soc) * model.groups[group]!.capacityAh) / model.efficiency),
    0,
  );
  if (!(ampHours > 1e-6)) return null;
  const all = model.groups.map((_, group) => group);
  const found = seriesStep({
    model,
    kind: 'bulk',
    way: 'terminals',
    channel,
    finish: 'over-and-settle',
    direction: 'charge',
    groupIndexes: all,
    groups: groupsAt(model, all, model.startSoc),
    linkOhm: model.input.module.linkResistanceOhm,
    limitTimes: 1,
    aimVolts: stringVolts(moduleString(model, 'charge'), ampHours),
    first: false,
    mostAmps: PRECHARGE_RATE_C * Math.min(...model.groups.map((group) => group.capacityAh)),
    markVolts: model.markVolts * all.length,
    socBefore: model.startSoc,
    stringIn: sampleString(model, all, 'charge', () => 0),
  });
  return isStep(found) ? { ...found, precharge: true } : found;
}
