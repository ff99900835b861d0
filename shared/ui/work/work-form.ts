/** A piece of other work as it is typed. Pure; texts and choices, read by the contract's own schema. */
import * as z from 'zod/mini';
import { workSchema, type WorkDto } from '@/shared/contract/work';
import { workPriorityNames, type WorkPriority } from '@/shared/contract/work-terms';
import { parseTimeOfDay, timeOfDayText } from '../format/parse';
import { dayOf, instantOfDay, localTime } from '../format/zone';
import type { DayAndTime } from '../primitives/date-time-field';

export interface WorkTyped {
  title: string;
  likelyMinutes: string;
  /** Empty: half as long again. */
  longMinutes: string;
  /** Empty: everybody can do it. */
  skillId: string;
  /** Empty: anywhere. */
  placeId: string;
  priority: WorkPriority;
  /** No time: whenever. */
  dueAt: DayAndTime;
  /** Empty: for no repair. */
  repairId: string;
  splittable: boolean;
  note: string;
  baseRev: number;
}

/** A new piece: for this repair, in this place, where they are known. */
export const emptyWork = (today: string, { repairId = '', placeId = '' } = {}): WorkTyped => ({
  title: '',
  likelyMinutes: '',
  longMinutes: '',
  skillId: '',
  placeId,
  priority: 'usual',
  dueAt: { day: today, time: '' },
  repairId,
  splittable: false,
  note: '',
  baseRev: 0,
});

export function workTexts(work: WorkDto, zone: string, today: string): WorkTyped {
  const due = work.dueAt === null ? null : Date.parse(work.dueAt);
  const { hour, minute } = localTime(due ?? 0, zone);
  return {
    title: work.title,
    likelyMinutes: String(work.likelyMinutes),
    longMinutes: String(work.longMinutes),
    skillId: work.skill?.id ?? '',
    placeId: work.place?.id ?? '',
    priority: work.priority,
    dueAt: due === null ? { day: today, time: '' } : { day: dayOf(due, zone), time: timeOfDayText(hour * 60 + minute) },
    repairId: work.repair?.id ?? '',
    splittable: work.splittable,
    note: work.note ?? '',
    baseRev: work.rev,
  };
}

/** The due instant; an empty time is none, what is no time is left to the contract to say so. */
function due({ day, time }: DayAndTime, zone: string): string | null {
  if (time.trim() === '') return null;
  const minutes = parseTimeOfDay(time);
  return minutes === null ? time : new Date(instantOfDay(day, minutes, zone)).toISOString();
}
const orNull = (text: string): string | null => (text === '' ? null : text);

/** @param zone of the workshop, in which the due time is typed */
export const workForm = (zone: string) =>
  z.pipe(
    z.transform((raw: unknown): unknown => {
      const { baseRev: _, ...typed } = raw as WorkTyped;
      return {
        ...typed,
        skillId: orNull(typed.skillId),
        placeId: orNull(typed.placeId),
        repairId: orNull(typed.repairId),
        dueAt: due(typed.dueAt, zone),
      };
    }),
    workSchema,
  );

export const workNames = {
  title: 'What is to be done',
  likelyMinutes: 'Likely',
  longMinutes: 'At most, nine times in ten',
  skill: 'Skill',
  place: 'Place',
  priority: 'Priority',
  due: 'Due',
  repair: 'For the repair',
  splittable: 'May be done in parts',
  note: 'Note',
} as const;

/** What the choices are called, by their ids. */
export interface WorkNamed {
  skill: (id: string) => string;
  place: (id: string) => string;
  repair: (id: string) => string;
}

/** The texts in one level, for what differs between two of them. */
export const flatWork = (typed: WorkTyped, named: WorkNamed): Record<string, unknown> => ({
  title: typed.title,
  likelyMinutes: typed.likelyMinutes,
  longMinutes: typed.longMinutes,
  skill: typed.skillId && named.skill(typed.skillId),
  place: typed.placeId && named.place(typed.placeId),
  priority: workPriorityNames[typed.priority],
  due: typed.dueAt.time.trim() === '' ? '' : `${typed.dueAt.day} ${typed.dueAt.time}`,
  repair: typed.repairId && named.repair(typed.repairId),
  splittable: typed.splittable,
  note: typed.note,
});

/** What stands in the folded part: 'usual priority, any place, no due time'. */
export function foldedWords(typed: WorkTyped, named: WorkNamed): string {
  const parts = [
    typed.repairId ? `for ${named.repair(typed.repairId)}` : 'for no repair',
    typed.placeId ? named.place(typed.placeId) : 'any place',
    typed.skillId ? named.skill(typed.skillId) : 'no skill asked for',
    `${workPriorityNames[typed.priority].toLowerCase()} priority`,
    typed.dueAt.time.trim() === '' ? 'no due time' : `due ${typed.dueAt.time}`,
    ...(typed.splittable ? ['in parts'] : []),
  ];
  return parts.join(', ');
}
