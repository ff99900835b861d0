/** What screens say of a piece of other work. Pure; instants are epoch ms where a clock is asked. */
import type { StintDto, WorkDto, WorkState } from '@/shared/contract/work';
import { workPriorityNames } from '@/shared/contract/work-terms';
import { firstName } from '../charge/card-model';
import { duration } from '../format/duration';
import { EN_DASH, NBSP } from '../format/marks';

/** 'Brake bleed, R-2416' */
export const workTitle = ({ title, repair }: Pick<WorkDto, 'title' | 'repair'>): string =>
  repair ? `${title}, ${repair.number}` : title;

/** Likely to long: '30–45 min', '1 h 30–2 h 15'; once where both are the same: '30 min'. Takes minutes. */
export function workMinutes(likely: number, long: number): string {
  if (likely === long) return duration(likely * 60, 'minute');
  if (long < 60) return `${likely}${EN_DASH}${long}${NBSP}min`;
  return `${duration(likely * 60, 'minute')}${EN_DASH}${duration(long * 60, 'minute')}`;
}

/** What is left of it, and of how much: '20–30 min left of 40–60 min'; only the whole while nothing was done or taken. */
export function leftWords(work: Pick<WorkDto, LeftKeys>): string {
  const whole = workMinutes(work.likelyMinutes, work.longMinutes);
  if (work.leftMinutes >= work.likelyMinutes) return whole;
  if (work.leftMinutes === 0) return whole;
  return `${workMinutes(work.leftMinutes, work.leftLongMinutes)} left of ${whole}`;
}
type LeftKeys = 'likelyMinutes' | 'longMinutes' | 'leftMinutes' | 'leftLongMinutes';

export const workStateNames: Record<WorkState, string> = {
  open: 'Open',
  taken: 'Taken',
  begun: 'Begun',
  done: 'Done',
  dropped: 'Dropped',
};

export const isOver = (work: Pick<WorkDto, 'state'>): boolean => work.state === 'done' || work.state === 'dropped';

/** Stints that are still in somebody's hands, the begun one first, then by when they begin. */
export const inHand = (stints: readonly StintDto[]): StintDto[] =>
  stints
    .filter(({ state }) => state === 'taken' || state === 'begun')
    .sort((a, b) => Number(b.state === 'begun') - Number(a.state === 'begun') || a.from.localeCompare(b.from));

/** 'Begun by Ines', 'Taken by Bram, Suri', 'Open', 'Done by Ines'; for rows of a list. */
export function whoHasIt(work: Pick<WorkDto, 'state' | 'stints' | 'over'>): string {
  if (work.over) return `${workStateNames[work.state]} by ${firstName(work.over.by.name)}`;
  const hands = inHand(work.stints);
  const names = [...new Set(hands.map(({ person }) => firstName(person.name)))];
  if (names.length === 0) return 'Open';
  return `${hands[0]?.state === 'begun' ? 'Begun' : 'Taken'} by ${names.join(', ')}`;
}

/** 'bay 4 · brakes · high'; what it asks for beside its minutes. */
export const asksFor = (work: Pick<WorkDto, 'place' | 'skill' | 'priority'>): string =>
  [
    work.place?.name,
    work.skill?.name,
    work.priority === 'usual' ? null : `${workPriorityNames[work.priority].toLowerCase()} priority`,
  ]
    .filter(Boolean)
    .join(' · ');

/** It is past its due time, and not over. */
export const isWorkLate = (work: Pick<WorkDto, 'dueAt' | 'over'>, now: number): boolean =>
  work.over === null && work.dueAt !== null && Date.parse(work.dueAt) < now;
