import type { PlanModel } from '../plan/plan-model';
import { sampleOf } from '../plan/samples';
import { splitLongResistance } from '../resistance/long-resistance';
import { LIVE_SPREADS } from './live-spreads';
import { MODEL_AXIS } from './live-draws';
import type { LiveModel } from './live-model';
import type { Followed } from './follow-readings';
import { mean } from '../statistics/mean';

/** A resistance is not nothing. */
const LEAST_FACTOR = 0.2;

/** The plan's module with what the readings have taught: its capacity and resistance where they have, and the samples. */
export function learnedModel(
  model: PlanModel,
  { set, learnedUnderCurrent: learned, lookedAtSoc }: Followed,
  endSoc: number,
): LiveModel {
  const plain: LiveModel = { ...model, weights: null, planned: model.nominal };
  if (set === null) return plain;
  const capacity = learned.capacityAh ? learned.capacityAh.mean / mean(model.nominal.capacityAh) : 1;
  const resistance = learned.longOhm ? learned.longOhm.mean / mean(model.nominal.longOhm) : 1;
  // Between now and the end of the current the model's error forgets itself.
  const kept = lookedAtSoc === null ? 0 : Math.exp(-Math.abs(endSoc - lookedAtSoc) / LIVE_SPREADS.modelCorrelationSoc);
  const samples = Array.from(set.weights, (_, at) => {
    const sample = sampleOf(model.basis, set.drawsOf(at));
    const shared = set.sharedOf('volts', at);
    const variance = kept ** 2 * (shared.variance ?? 0) + 1 - kept ** 2;
    const error = kept * shared.mean + Math.sqrt(variance) * sample.draws[MODEL_AXIS]!;
    // The error under current is one of the resistance, as it is then.
    const factor = Math.max(LEAST_FACTOR, 1 + LIVE_SPREADS.modelRelative * error);
    for (let group = 0; group < sample.longOhm.length; group += 1) sample.longOhm[group]! *= factor;
    return sample;
  });
  return {
    ...plain,
    groups: model.groups.map((group) => ({
      ...group,
      capacityAh: group.capacityAh * capacity,
      ...splitLongResistance((group.ohmicResistanceOhm + group.polarisationResistanceOhm) * resistance),
    })),
    nominal: {
      ...model.nominal,
      capacityAh: model.nominal.capacityAh.map((ampHours) => ampHours * capacity),
      longOhm: model.nominal.longOhm.map((ohm) => ohm * resistance),
    },
    samples: () => samples,
    sampleCount: samples.length,
    weights: set.weights,
  };
}
