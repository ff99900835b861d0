/** Ways, finishes and doubts of a plan in the words of the product. */
import type { Doubt, Finish, PlanOption, Way } from '@/calc/plan-types';

export const wayNames: Readonly<Record<Way, string>> = {
  terminals: 'Terminals',
  'group-by-group': 'Group by group',
  paralleled: 'Groups paralleled',
  resistor: 'Through a resistor',
};

export const finishNames: Readonly<Record<Finish, string>> = {
  'on-the-mark': 'on the mark',
  'over-and-settle': 'over and settle',
};

/** 'Terminals, over and settle, 20 A' */
export const optionTitle = (option: Pick<PlanOption, 'way' | 'finish'>): string =>
  option.way === 'resistor' ? wayNames.resistor : `${wayNames[option.way]}, ${finishNames[option.finish]}`;

/** The number that makes most of the band, and what to do about it. */
export const doubtWords: Readonly<Record<Doubt, { name: string; advice: string }>> = {
  capacity: { name: 'the spare’s capacity', advice: 'Measuring the capacity' },
  resistance: { name: 'the resistance', advice: 'Measuring the resistance' },
  current: { name: 'the charger’s current', advice: 'Checking the charger’s amps' },
  'spare-reading': { name: 'the spare’s reading', advice: 'Reading the spare again, with the pack’s meter,' },
  'target-reading': { name: 'the pack’s reading', advice: 'Reading the pack again' },
  curve: { name: 'the voltage curve', advice: 'A curve measured for this type' },
  temperature: { name: 'the temperature', advice: 'Measuring the temperature' },
};
