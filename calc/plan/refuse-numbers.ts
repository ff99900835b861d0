import type { PlanInput, Refusal } from '../plan-types';
import { isGiven } from '../require';
import { groupText, limitText, voltsText } from './words';

/** Rest volts beyond this share over a group's limit are a slip of the pen, not an overcharged group. */
const SLIP_OVER_LIMIT = 1.1;

/**
 * Numbers that cannot be, each with what it was meant to be where that can be told.
 *
 * @returns one refusal per number at fault, empty where all of them can be
 */
export function refuseNumbers(input: PlanInput): Refusal[] {
  return [...countRefusals(input), ...voltRefusals(input), ...capacityRefusals(input), ...targetRefusals(input)];
}

const numbers = (text: string, group: number | null = null): Refusal => ({ code: 'numbers', group, text });

function countRefusals({ module, spare }: PlanInput): Refusal[] {
  const groups = module.groupsInSeries;
  if (!Number.isInteger(groups) || groups < 1)
    return [numbers(`The module type says ${groups} groups in series. Give a whole number from 1.`)];
  const given = spare.groupVolts.length;
  if (given === groups) return [];
  const volts = given === 1 ? '1 voltage is' : `${given} voltages are`;
  const counted = groups === 1 ? '1 group' : `${groups} groups`;
  return [numbers(`This type has ${counted}, ${volts} given. Type one for each group.`)];
}

function voltRefusals({ module, spare }: PlanInput): Refusal[] {
  const { chargeLimitVolts: limit, dischargeLimitVolts: least, groupsInSeries } = module;
  return spare.groupVolts.flatMap((volts, group) => {
    const name = groupText(group);
    if (!Number.isFinite(volts)) return [numbers(`${name} has no voltage. Type its rest voltage.`, group)];
    if (volts <= limit * SLIP_OVER_LIMIT) return [];
    const inside = (value: number): boolean => value >= least * 0.8 && value <= limit * 1.02;
    if (inside(volts / 1000))
      return [
        numbers(
          `${name}: ${volts} looks like millivolts. In volts it is ${voltsText(volts / 1000)}. Type it so.`,
          group,
        ),
      ];
    if (groupsInSeries > 1 && inside(volts / groupsInSeries))
      return [
        numbers(
          `${name}: ${voltsText(volts)} looks like the whole module. Over ${groupsInSeries} groups it is ${voltsText(volts / groupsInSeries)} each. Type each group.`,
          group,
        ),
      ];
    const shifted = [10, 100].map((by) => volts / by).find(inside);
    const guess =
      shifted === undefined ? 'Read it again.' : `A point in the wrong place? ${voltsText(shifted)} would fit.`;
    return [numbers(`${name}: ${limitText(volts)} is over this type's ${limitText(limit)}. ${guess}`, group)];
  });
}

function capacityRefusals({ module, spare }: PlanInput): Refusal[] {
  const capacities = Array.isArray(spare.capacityAh) ? spare.capacityAh : [spare.capacityAh];
  if (Array.isArray(spare.capacityAh) && capacities.length !== module.groupsInSeries)
    return [
      numbers(
        `${capacities.length} capacities for ${module.groupsInSeries} groups. Give one for each group, or one for all.`,
      ),
    ];
  const wrong = capacities.findIndex((ampHours) => !(ampHours > 0) || !Number.isFinite(ampHours));
  if (wrong >= 0) {
    const rated = module.ratedAh > 0 ? ` This type is rated ${module.ratedAh}\u00a0Ah.` : '';
    return [
      numbers(
        `A capacity of ${capacities[wrong]}\u00a0Ah cannot be charged. Give the measured or the rated one.${rated}`,
      ),
    ];
  }
  const most = Math.max(...capacities);
  if (module.ratedAh > 0 && most > module.ratedAh * 3)
    return [
      numbers(
        most / 1000 <= module.ratedAh * 3
          ? `${most}\u00a0Ah looks like milliampere-hours. It is ${most / 1000}\u00a0Ah. Type it so.`
          : `${most}\u00a0Ah is over three times the rated ${module.ratedAh}\u00a0Ah. Check the capacity.`,
      ),
    ];
  return [];
}

function targetRefusals({ module, target }: PlanInput): Refusal[] {
  const found: Refusal[] = [];
  const { volts, toleranceVolts: tolerance, soc } = target;
  if (isGiven(soc) && !(soc >= 0 && soc <= 1))
    found.push(
      numbers(
        soc > 1 && soc <= 100
          ? `A state of charge of ${soc} looks like per cent. As a share it is ${soc / 100}. Give 0 to 1.`
          : `A state of charge of ${soc} cannot be. Give 0 for empty to 1 for full.`,
      ),
    );
  if (!(volts > 0) || !Number.isFinite(volts))
    found.push(numbers('There is no target. Give the rest voltage per group.'));
  else if (volts / 1000 >= module.dischargeLimitVolts * 0.8 && volts / 1000 <= module.chargeLimitVolts * 1.02)
    found.push(
      numbers(`The target ${volts} looks like millivolts. In volts it is ${voltsText(volts / 1000)}. Type it so.`),
    );
  else if (
    module.groupsInSeries > 1 &&
    volts > module.chargeLimitVolts * SLIP_OVER_LIMIT &&
    volts / module.groupsInSeries <= module.chargeLimitVolts &&
    volts / module.groupsInSeries >= module.dischargeLimitVolts
  )
    found.push(
      numbers(
        `The target ${voltsText(volts)} looks like the whole module. Per group it is ${voltsText(volts / module.groupsInSeries)}. Type it so.`,
      ),
    );
  if (!(tolerance > 0) || !Number.isFinite(tolerance))
    found.push(numbers('There is no tolerance. Give it in millivolts, 5 for example.'));
  else if (tolerance > 0.1)
    found.push(
      numbers(
        tolerance >= 1
          ? `A tolerance of ${tolerance}\u00a0V is no match. Did you mean ${tolerance}\u00a0mV?`
          : `A tolerance of ${Math.round(tolerance * 1000)}\u00a0mV is no match. Give 100\u00a0mV at most.`,
      ),
    );
  return found;
}
