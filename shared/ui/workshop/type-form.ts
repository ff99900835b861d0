import {
  chemistryNames,
  type ModuleTypeDto,
  type ModuleTypeInput,
  type resistanceKinds,
} from '@/shared/contract/equipment';
import type { LocaleMarks } from '../format/marks';
import { typedNumber } from './numbers-typed';

/** A module type as typed. `baseRev` is the revision that was changed here: an older one is refused, not written over. */
export type TypeTexts = Record<keyof ModuleTypeInput, string> & { baseRev: number };

export const resistanceNames: Record<(typeof resistanceKinds)[number], string> = {
  'pulse-0.5s': 'Pulse, 0.5 s',
  'pulse-10s': 'Pulse, 10 s',
  'ac-1khz': 'AC, 1 kHz',
  long: 'Long, settled',
};

/** Names of the fields, in their order on the page. */
export const typeFieldNames: Readonly<Record<keyof ModuleTypeInput, string>> = {
  name: 'Name',
  chemistry: 'Chemistry',
  groupsInSeries: 'Groups in series',
  cellsInParallel: 'Cells a group',
  ratedAh: 'Rated',
  chargeLimitVolts: 'Charge to',
  dischargeLimitVolts: 'Not below',
  floorVolts: 'Floor',
  maxChargeAmps: 'Current up to',
  maxDischargeAmps: 'Discharge up to',
  minChargeCelsius: 'Charge from',
  maxChargeCelsius: 'Charge up to',
  resistanceMilliohm: 'Resistance',
  resistanceKind: 'Measured as',
  linkMilliohm: 'Links',
  shelfVolts: 'Shelf voltage',
  selfDischargePercentPerMonth: 'Self-discharge',
  note: 'Note',
  curveId: 'Curve',
  pulseShortS: 'Short pulse',
  pulseShortMilliohm: 'It sees',
  pulseLongerS: 'Longer pulse',
  pulseLongerMilliohm: 'That sees',
  coldCurrentPercent: 'Under 10 °C',
  warmCurrentPercent: 'Over 45 °C',
  prechargeBelowVolts: 'Precharge under',
};

const leastDecimals: Partial<Record<keyof ModuleTypeInput, number>> = {
  chargeLimitVolts: 2,
  dischargeLimitVolts: 2,
  floorVolts: 2,
  shelfVolts: 2,
  prechargeBelowVolts: 2,
};

const empty: TypeTexts = {
  ...(Object.fromEntries(Object.keys(typeFieldNames).map((key) => [key, ''])) as Record<keyof ModuleTypeInput, string>),
  resistanceKind: 'pulse-10s',
  linkMilliohm: '0',
  baseRev: 0,
};

/** The form's texts of a type; without one, an empty form. */
export function typeTexts(type: ModuleTypeDto | null, marks: LocaleMarks): TypeTexts {
  if (!type) return empty;
  const texts = Object.fromEntries(
    (Object.keys(typeFieldNames) as (keyof ModuleTypeInput)[]).map((key) => {
      const value = type[key];
      return [key, typeof value === 'number' ? typedNumber(value, leastDecimals[key], marks) : (value ?? '')];
    }),
  ) as Record<keyof ModuleTypeInput, string>;
  return { ...texts, baseRev: type.rev };
}

/** A copy to begin a new type with: everything but the name. */
export const copiedTexts = (type: ModuleTypeDto, marks: LocaleMarks): TypeTexts => ({
  ...typeTexts(type, marks),
  name: '',
  baseRev: 0,
});

/** The texts as people read them: for the table of what differs. */
export const typeWords = (texts: TypeTexts): Record<string, string> => ({
  ...(texts as unknown as Record<string, string>),
  chemistry: chemistryNames[texts.chemistry as keyof typeof chemistryNames] ?? '',
  resistanceKind: resistanceNames[texts.resistanceKind as keyof typeof resistanceNames] ?? '',
});
