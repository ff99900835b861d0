/** What is said of a free stretch and of the work that fits it. Pure; instants are epoch ms. */
import type { FitDto, FreeStretchDto } from '@/shared/contract/bench-plan';
import { NBSP } from '../format/marks';

/** 'Fits the wait at 14:55', 'Fits the wait now', 'Fits at 14:55'. @param at writes an instant */
export function fitsTitle(stretch: Pick<FreeStretchDto, 'from' | 'waitOf'>, now: number, at: (ms: number) => string) {
  const from = Date.parse(stretch.from);
  const when = from <= now ? 'now' : `at ${at(from)}`;
  return `Fits ${stretch.waitOf ? 'the wait ' : ''}${when}`;
}

/** Minutes of a stretch that are still to come. */
export const minutesLeft = ({ from, to }: Pick<FreeStretchDto, 'from' | 'to'>, now: number): number =>
  Math.max(0, Math.floor((Date.parse(to) - Math.max(now, Date.parse(from))) / 60_000));

/** '30 min · bay 4 · your skill'; of work that is done in parts '40 min of 60'. */
export function fitDetail({ work }: Pick<FitDto, 'work'>, minutes: number): string {
  const part = minutes < work.leftLongMinutes ? ` of ${work.leftLongMinutes}` : '';
  return [
    `${minutes}${NBSP}min${part}`,
    work.place?.name,
    work.skill ? 'your skill' : null,
    work.priority === 'high' || work.priority === 'urgent' ? work.priority : null,
  ]
    .filter(Boolean)
    .join(' · ');
}
