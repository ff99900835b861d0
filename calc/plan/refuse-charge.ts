import type { PlanInput, Refusal, SpareCondition } from '../plan-types';
import { celsiusText, groupText, limitText, voltsText } from './words';
import { refuseNumbers } from './refuse-numbers';

/** Readings down to here are a meter's zero, below it the group is the wrong way round, V. */
const REVERSED_BELOW_VOLTS = -0.01;

const CONDITION_TEXT: Partial<Record<SpareCondition, string>> = {
  swollen: 'This module is swollen. A swollen module is not charged here. Set it aside and quarantine it.',
  leaking: 'This module is leaking. A leaking module is not charged here. Set it aside and quarantine it.',
  dented: 'This module is dented. A dented module is not charged here. Set it aside and quarantine it.',
  water: 'This module has been in water. It is not charged here. Set it aside and quarantine it.',
};

/**
 * What the data alone rules out for this spare and this target, on any charger.
 *
 * Names the volts, the limit and the correction. The module's own temperature counts where it was read, the room's else.
 *
 * @returns all that was found; the numbers that cannot be first, and then nothing else, as the rest could not be judged
 */
export function refuseCharge(input: PlanInput): Refusal[] {
  const unclear = refuseNumbers(input);
  const condition = refuseCondition(input);
  if (unclear.length > 0) return [...condition, ...unclear];
  return [...condition, ...refuseGroups(input), ...refuseTemperature(input), ...refuseTarget(input)];
}

function refuseCondition({ spare }: PlanInput): Refusal[] {
  if (spare.condition === 'sound') return [];
  if (spare.condition === 'quarantined') {
    const reason = spare.quarantineReason?.trim();
    const why = reason ? `: ${reason.replace(/[.\s]+$/, '')}` : '';
    return [
      {
        code: 'quarantined',
        group: null,
        text: `This module is in quarantine${why}. Release it there, or take another spare.`,
      },
    ];
  }
  if (spare.condition === 'deep-discharged')
    return [
      {
        code: 'deep-discharged',
        group: null,
        text: 'This module is marked deep-discharged. A deep-discharged module is not charged here. Set it aside and quarantine it.',
      },
    ];
  const text = CONDITION_TEXT[spare.condition];
  return text === undefined ? [] : [{ code: 'condition', group: null, text }];
}

function refuseGroups({ module, spare }: PlanInput): Refusal[] {
  return spare.groupVolts.flatMap((volts, group): Refusal[] => {
    const name = groupText(group);
    if (volts < REVERSED_BELOW_VOLTS)
      return [
        {
          code: 'reversed',
          group,
          text: `${name} reads ${voltsText(volts)}: reversed. Swap the meter's leads and read again. If it stays below zero, quarantine the module.`,
        },
      ];
    if (volts < module.floorVolts)
      return [
        {
          code: 'deep-discharged',
          group,
          text: `${name} is at ${voltsText(volts)}, under this type's floor of ${limitText(module.floorVolts)}. A deep-discharged module is not charged here. Set it aside and quarantine it.`,
        },
      ];
    return [];
  });
}

function refuseTemperature({ module, spare, celsius }: PlanInput): Refusal[] {
  const at = spare.celsius ?? celsius;
  const { minChargeCelsius: least, maxChargeCelsius: most } = module;
  const window = `${celsiusText(least)} to ${celsiusText(most)}`;
  if (at < least)
    return [
      {
        code: 'temperature',
        group: null,
        text: `The module is at ${celsiusText(at)}. This type is charged at ${window}. Warm it to ${celsiusText(least)} first.`,
      },
    ];
  if (at > most)
    return [
      {
        code: 'temperature',
        group: null,
        text: `The module is at ${celsiusText(at)}. This type is charged at ${window}. Let it cool to ${celsiusText(most)} first.`,
      },
    ];
  return [];
}

function refuseTarget({ module, target }: PlanInput): Refusal[] {
  if (target.volts > module.chargeLimitVolts)
    return [
      {
        code: 'target-over-limit',
        group: null,
        text: `The target ${voltsText(target.volts)} is over this type's ${limitText(module.chargeLimitVolts)}. Give ${voltsText(module.chargeLimitVolts)} or less.`,
      },
    ];
  if (target.volts < module.dischargeLimitVolts)
    return [
      {
        code: 'target-under-limit',
        group: null,
        text: `The target ${voltsText(target.volts)} is under this type's ${limitText(module.dischargeLimitVolts)}. Give ${voltsText(module.dischargeLimitVolts)} or more.`,
      },
    ];
  return [];
}
