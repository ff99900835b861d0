import type { ChannelParameters } from '../plan-types';
import { latinHypercubeNormal } from '../statistics/latin-hypercube';
import type { PlanModel } from './plan-model';
import type { Sample } from './samples';

/** Leads of which nobody has said anything, there and back with their clips, ohm: a guess between 5 and 20 mΩ. */
const GUESSED_LEAD_OHM = 0.01;
/** Of leads that were not measured, by the logarithm: a guess, half to twice from 10 to 90 %. */
const GUESSED_LEAD_SD = 0.5;
/** So that the leads are drawn apart from everything else. */
const LEAD_SEED_STEP = 7919;

/** Ohm between a supply's own sense points and the module; 0 where it senses at the module. */
export function leadOhmOf(channel: ChannelParameters): number {
  if (channel.senses === 'module') return 0;
  if (channel.leadsMeasured !== false) return channel.leadResistanceOhm;
  return channel.leadResistanceOhm > 0 ? channel.leadResistanceOhm : GUESSED_LEAD_OHM;
}

/** The leads in one sample; undefined where they are known and so the same in all. */
export function leadOhmIn(model: PlanModel, channel: ChannelParameters): ((sample: Sample) => number) | undefined {
  if (channel.senses === 'module' || channel.leadsMeasured !== false) return undefined;
  const ohm = leadOhmOf(channel);
  return (sample) => ohm * Math.exp(GUESSED_LEAD_SD * leadDraw(model, sample));
}

const drawn = new WeakMap<PlanModel, Map<Sample, number>>();

function leadDraw(model: PlanModel, sample: Sample): number {
  let draws = drawn.get(model);
  if (!draws) {
    const points = latinHypercubeNormal(model.samples.length, 1, model.input.seed + LEAD_SEED_STEP);
    draws = new Map(model.samples.map((one, at) => [one, points[at]![0]!]));
    drawn.set(model, draws);
  }
  return draws.get(sample) ?? 0;
}
