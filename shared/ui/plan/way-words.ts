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

type Titled = Pick<PlanOption, 'way' | 'finish' | 'knownEnd'>;

/** How it ends: 'over and settle'; where it is counted, from which end: 'counted from full'. */
export const finishOf = ({ finish, knownEnd }: Titled): string =>
  knownEnd === undefined ? finishNames[finish] : `counted from ${knownEnd}`;

/** 'Terminals, over and settle' */
export const optionTitle = (option: Titled): string =>
  option.way === 'resistor' ? wayNames.resistor : `${wayNames[option.way]}, ${finishOf(option)}`;

/** The number that makes most of the band, and what to do about it. */
export const doubtWords: Readonly<Record<Doubt, { name: string; advice: string }>> = {
  capacity: { name: 'the spare’s capacity', advice: 'Measuring the capacity' },
  resistance: { name: 'the resistance', advice: 'Measuring the resistance' },
  current: { name: 'the charger’s current', advice: 'Checking the charger’s amps' },
  'spare-reading': { name: 'the spare’s reading', advice: 'Reading the spare again, with the pack’s meter,' },
  'target-reading': { name: 'the pack’s reading', advice: 'Reading the pack again' },
  charger: { name: 'the charger’s voltmeter', advice: 'Checking the charger’s voltmeter' },
  leads: { name: 'the leads', advice: 'Measuring the leads' },
  curve: { name: 'the voltage curve', advice: 'A curve measured for this type' },
  temperature: { name: 'the temperature', advice: 'Measuring the temperature' },
};
