import type { ChannelParameters } from '../plan-types';
import type { PlanModel } from '../plan/plan-model';
import { SAMPLE_AXES, type Sample } from '../plan/samples';
import { inverseNormal } from '../statistics/inverse-normal';
import { latinHypercube } from '../statistics/latin-hypercube';
import { LIVE_SPREADS } from './live-spreads';

/** The axis that a running charge adds after those of the plan: what its model is off under current. */
export const MODEL_AXIS = SAMPLE_AXES.length;
export const LIVE_AXES = SAMPLE_AXES.length + 1;
export const LEADS_AXIS = SAMPLE_AXES.indexOf('leads');

/** Sets that were drawn last: each reading of a charge starts from the same one. */
const drawn = new Map<string, Float64Array>();
const MOST_DRAWN = 16;

/**
 * The plan's Latin hypercube with the axes of a running charge, as standard normal draws, `LIVE_AXES` a sample. Not to be
 * changed.
 */
export function liveDraws(count: number, seed: number): Float64Array {
  const key = `${count}/${seed}`;
  const known = drawn.get(key);
  if (known) return known;
  const draws = Float64Array.from(latinHypercube(count, LIVE_AXES, seed).flat(), inverseNormal);
  if (drawn.size >= MOST_DRAWN) drawn.delete(drawn.keys().next().value!);
  drawn.set(key, draws);
  return draws;
}

/** Leads between a charger's own terminals and the module in one sample, ohm; as entered in a sample of the plan alone. */
export function leadOhmOf(channel: ChannelParameters, sample: Sample): number {
  const draw = sample.draws[LEADS_AXIS] ?? 0;
  if (channel.leadResistanceOhm > 0) return channel.leadResistanceOhm * Math.exp(LIVE_SPREADS.leadRelative * draw);
  return channel.senses === 'module' ? 0 : LIVE_SPREADS.leadUnknownOhm * Math.max(0, draw);
}

/**
 * Axes that readings can say something of. The others (of the target, or without a spread) keep their even draws whatever is
 * read: they are independent of it.
 */
export function readAxes({ spreads, basis, input }: PlanModel): number[] {
  const counts: Partial<Record<(typeof SAMPLE_AXES)[number], number>> = {
    capacity: spreads.capacityRelative,
    resistance: spreads.resistanceRelative,
    current: spreads.currentRelative,
    'spare-meter': spreads.meterVolts,
    'spare-scatter': spreads.readingVolts,
    'spare-hysteresis': spreads.hysteresisVolts,
    'self-discharge': basis.lostSoc * spreads.selfDischargeRelative,
    'charger-meter': 1,
    curve: spreads.curveVolts,
    temperature: spreads.temperatureCelsius,
  };
  const axes = SAMPLE_AXES.flatMap((axis, at) => ((counts[axis] ?? 0) > 0 ? [at] : []));
  const leads = input.channels.some((channel) => channel.senses === 'own-terminals' || channel.leadResistanceOhm > 0);
  return leads ? [...axes, LEADS_AXIS] : axes;
}
