import type { WorkshopDto } from '@/shared/contract/workshop';
import type { LocaleMarks } from '../format/marks';
import { typedNumber } from './numbers-typed';

/** The limits of the workshop as typed. */
export interface LimitTexts {
  toleranceMillivolts: string;
  minRestMinutes: string;
  lookInMinutes: string;
  inrushLimitC: string;
  lagLimitMillivolts: string;
  lookInVisitMinutes: string;
  fitMinutes: string;
  passOnTellMinutes: string;
  passOnAmberMinutes: string;
  passOnAlarmMinutes: string;
  technicianDecides: boolean;
  baseRev: number;
}
export type LimitKey = Exclude<keyof LimitTexts, 'technicianDecides' | 'baseRev'>;

/** A limit, its name, and what stands for it in a workshop that never set it. */
interface LimitField {
  key: LimitKey;
  name: string;
  unit: string;
  whole?: boolean;
  meaning: string;
  usual?: number;
}

export const limitFields: readonly LimitField[] = [
  {
    key: 'toleranceMillivolts',
    name: 'Tolerance',
    unit: 'mV',
    meaning: 'a group may rest this far off its target, to both sides',
  },
  {
    key: 'minRestMinutes',
    name: 'Rest at least',
    unit: 'min',
    whole: true,
    meaning: 'between the end of current and the check',
  },
  {
    key: 'lookInMinutes',
    name: 'Look-in every',
    unit: 'min',
    whole: true,
    meaning: 'while current flows; later it alarms',
  },
  {
    key: 'lookInVisitMinutes',
    name: 'A look-in takes',
    unit: 'min',
    whole: true,
    meaning: 'off the work that somebody does meanwhile',
    usual: 5,
  },
  {
    key: 'inrushLimitC',
    name: 'Inrush limit',
    unit: 'C',
    meaning: 'joining groups in parallel, times the capacity in an hour',
  },
  { key: 'lagLimitMillivolts', name: 'Lag limit', unit: 'mV', meaning: 'a group this far behind the others is odd' },
  {
    key: 'fitMinutes',
    name: 'A fit takes',
    unit: 'min',
    whole: true,
    meaning: 'kept free for it in the bench plan, once the module is ready',
    usual: 60,
  },
  {
    key: 'passOnAlarmMinutes',
    name: 'An alarm goes on after',
    unit: 'min',
    whole: true,
    meaning: 'that nobody has taken: to the foremen, then the managers; 0: never',
  },
  {
    key: 'passOnAmberMinutes',
    name: 'What needs a hand goes on after',
    unit: 'min',
    whole: true,
    meaning: 'that nobody has taken; 0: never',
  },
  {
    key: 'passOnTellMinutes',
    name: 'What only tells goes on after',
    unit: 'min',
    whole: true,
    meaning: 'that nobody has taken; 0: never',
  },
];
export const technicianDecidesName = 'A technician may decide between two sources';
export const limitNames: Readonly<Record<string, string>> = {
  ...Object.fromEntries(limitFields.map(({ key, name }) => [key, name])),
  technicianDecides: technicianDecidesName,
};

export const limitTexts = (workshop: WorkshopDto, marks: LocaleMarks): LimitTexts => ({
  ...(Object.fromEntries(
    limitFields.map(({ key, usual }) => [key, typedNumber(workshop[key] ?? usual, 0, marks)]),
  ) as Record<LimitKey, string>),
  technicianDecides: workshop.technicianDecides === true,
  baseRev: workshop.rev,
});

export interface HourTexts {
  name: string;
  zone: string;
  /** Monday first; null: closed. */
  workingHours: ({ from: string; to: string } | null)[];
  unattendedCharges: boolean;
  baseRev: number;
}

export const hourTexts = (workshop: WorkshopDto): HourTexts => ({
  name: workshop.name,
  zone: workshop.zone,
  workingHours: workshop.workingHours,
  unattendedCharges: workshop.unattendedCharges === true,
  baseRev: workshop.rev,
});

export const weekDays = ['Monday', 'Tuesday', 'Wednesday', 'Thursday', 'Friday', 'Saturday', 'Sunday'] as const;

export const dayWords = (day: { from: string; to: string } | null | undefined): string =>
  day ? `${day.from}–${day.to}` : 'closed';

export const unattendedName = 'Charges may run while nobody is there';

/** Name, zone and each day in words: for the table of what differs. */
export const hourNames: Readonly<Record<string, string>> = {
  name: 'Name',
  zone: 'Its clock',
  ...Object.fromEntries(weekDays.map((day) => [day, day])),
  unattendedCharges: unattendedName,
};
export const hourWords = (texts: HourTexts): Record<string, string | boolean> => ({
  name: texts.name,
  zone: texts.zone,
  ...Object.fromEntries(weekDays.map((day, i) => [day, dayWords(texts.workingHours[i])])),
  unattendedCharges: texts.unattendedCharges,
});
