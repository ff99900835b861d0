import { planCharge, reckonCharge } from '@/calc/index';
import type { PlanInput, PlanOption } from '@/calc/plan-types';
import { reckonInput } from '../live-fixtures';
import { channel, lmoModule, lmoSpare, planInput } from '../plan-fixtures';
import { spreadsOf } from './world-spreads';
import { Chance, drawWorld } from './worlds';

/** Charges whose readings are watched for what is odd. */
export const watchedPlans: [string, PlanInput][] = [
  ['two groups at 10 A', planInput({ channels: [channel('A1', { displayStepVolts: 0.01 })] })],
  [
    'twelve groups at 4 A on thin leads',
    planInput({
      channels: [
        channel('A2', { maxAmps: 4, displayStepVolts: 0.01, senses: 'own-terminals', leadResistanceOhm: 0.004 }),
      ],
      module: { ...lmoModule, groupsInSeries: 12 },
      spare: { ...lmoSpare, groupVolts: Array.from({ length: 12 }, (_, group) => 3.75 + 0.0003 * group) },
    }),
  ],
];

const options = new Map<PlanInput, PlanOption>();

export function optionOf(plan: PlanInput): PlanOption {
  const known = options.get(plan);
  if (known) return known;
  const option = planCharge(plan).options.find((one) => one.id.startsWith('terminals/over-and-settle'))!;
  options.set(plan, option);
  return option;
}

/**
 * True charges without a fault, their curves bent as far as the model allows itself, looked at after every `lookEvery` readings
 * (no more than the reckoning keeps of the last ones, so that none is missed): their hours, and how often an alarm began.
 */
export function watchClean(everyS: number, lookEvery: number, charges: number): { hours: number; alarms: number } {
  let hours = 0;
  let alarms = 0;
  for (let at = 0; at < charges; at += 1) {
    const [, plan] = watchedPlans[at % watchedPlans.length]!;
    const option = optionOf(plan);
    const chance = new Chance(1000 + at);
    const world = drawWorld(plan, option, spreadsOf(plan), chance, { bent: true })!;
    const times = Array.from({ length: Math.floor(world.currentS / everyS) }, (_, k) => (k + 1) * everyS);
    const readings = world.readAt(times, chance).map((one) => ({ ...one, celsius: 25 + 0.7 * chance.normal() }));
    hours += world.currentS / 3600;
    let was = false;
    for (let look = lookEvery; look <= readings.length; look += lookEvery) {
      const nowS = readings[look - 1]!.s;
      const is = reckonCharge(reckonInput(plan, option, { nowS, readings: readings.slice(0, look) })).odd !== null;
      if (is && !was) alarms += 1;
      was = is;
    }
  }
  return { hours, alarms };
}
