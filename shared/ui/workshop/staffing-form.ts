/** Hours, breaks, days off and skills of one person, as they are typed and as they read. Pure. */
import * as z from 'zod/mini';
import { staffingSchema, type SkillDto, type StaffingDto } from '@/shared/contract/staffing';
import type { DayHours } from '@/shared/contract/workshop';
import { EN_DASH, NBSP } from '../format/marks';
import { sameDays } from './settings-facts';

export interface BreakTexts {
  from: string;
  to: string;
}
export interface DayOffTexts {
  /** 'YYYY-MM-DD' or empty. */
  from: string;
  /** Empty: that one day. */
  to: string;
  note: string;
}
export interface StaffingTexts {
  /** false: the workshop's hours. */
  ownHours: boolean;
  /** Monday first; kept while the workshop's are chosen, so that nothing typed is lost. */
  hours: DayHours[];
  breaks: BreakTexts[];
  daysOff: DayOffTexts[];
  skillIds: string[];
  baseRev: number;
}

export const staffingTexts = (of: StaffingDto): StaffingTexts => ({
  ownHours: of.hours !== null,
  hours: of.hours ?? of.hoursNow,
  breaks: of.breaks,
  daysOff: of.daysOff.map(({ from, to, note }) => ({ from, to, note: note ?? '' })),
  skillIds: of.skillIds,
  baseRev: of.rev,
});

export const staffingForm = z.pipe(
  z.transform((raw: unknown): unknown => {
    const { ownHours, hours, breaks, daysOff, skillIds } = raw as StaffingTexts;
    return {
      hours: ownHours ? hours : null,
      breaks,
      daysOff: daysOff.map(({ from, to, note }) => ({ from, to: to === '' ? from : to, note })),
      skillIds,
    };
  }),
  staffingSchema,
);

/** 'Mon–Fri 08:00–17:00, Sat 08:00–12:00'; days without hours are not named. */
export function hoursWords(hours: readonly DayHours[]): string {
  const runs = sameDays([...hours]).filter(({ hours: words }) => words !== 'closed');
  if (runs.length === 0) return 'never there';
  return runs.map(({ days, hours: words }) => `${shortDays(days)}${NBSP}${words}`).join(', ');
}

const shortDays = (days: string): string =>
  days
    .split(EN_DASH)
    .map((day) => day.slice(0, 3))
    .join(EN_DASH);

/** '12:00–12:30, 15:00–15:15' */
export const breakWords = (breaks: readonly BreakTexts[]): string =>
  breaks.map(({ from, to }) => `${from}${EN_DASH}${to}`).join(', ');

const months = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'June', 'July', 'Aug', 'Sept', 'Oct', 'Nov', 'Dec'];
const dayMonth = (day: string): string => {
  const [, month = 1, of = 1] = day.split('-').map(Number);
  return `${of}${NBSP}${months[month - 1] ?? ''}`;
};

/** '24 Dec–2 Jan, leave' */
export const dayOffWords = ({ from, to, note }: { from: string; to: string; note: string | null }): string =>
  `${dayMonth(from)}${to === '' || to === from ? '' : `${EN_DASH}${dayMonth(to)}`}${note ? `, ${note}` : ''}`;

/** Those that are not over yet, the next one first. @param today 'YYYY-MM-DD' */
export const daysOffToCome = <T extends { from: string; to: string }>(daysOff: readonly T[], today: string): T[] =>
  daysOff.filter(({ from, to }) => (to || from) >= today).sort((a, b) => a.from.localeCompare(b.from));

/** Names of the skills, in the order of the workshop's list. */
export const skillNames = (skillIds: readonly string[], skills: readonly SkillDto[]): string =>
  skills
    .filter(({ id }) => skillIds.includes(id))
    .map(({ name }) => name)
    .join(', ');

export const staffingNames: Readonly<Record<string, string>> = {
  hours: 'Working hours',
  breaks: 'Breaks',
  daysOff: 'Days off',
  skills: 'Skills',
};

/** The texts in one level, for what differs between two of them. */
export const flatStaffing = (typed: StaffingTexts, skills: readonly SkillDto[]): Record<string, string> => ({
  hours: typed.ownHours ? hoursWords(typed.hours) : 'the workshop’s',
  breaks: breakWords(typed.breaks),
  daysOff: typed.daysOff.map(dayOffWords).join('; '),
  skills: skillNames(typed.skillIds, skills),
});
