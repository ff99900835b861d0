import type { WaitsDto } from '@/shared/contract/waits';
import { NBSP } from '../format/marks';
import { addDays } from '../format/zone';
import { chargesWord } from './wait-words';

/** The hours lost in the last whole week, and how they stand against the first of the period. */
export function weekFigure(
  weeks: WaitsDto['weeks'],
  today: string,
): { monday: string; title: string; hours: number; note: string } | null {
  // The present week is not over: its hours say nothing beside a whole one.
  const whole = weeks.filter((week) => addDays(week.monday, 6) < today);
  const last = whole.at(-1);
  const first = whole[0];
  if (!last || !first) {
    const present = weeks.at(-1);
    return present
      ? { monday: present.monday, title: `Lost in week ${present.week}`, hours: present.lostHours, note: 'so far' }
      : null;
  }
  const more = Math.round(last.lostHours) - Math.round(first.lostHours);
  const note =
    last === first
      ? chargesWord(last.charges)
      : more === 0
        ? `as in week ${first.week}`
        : `${Math.abs(more)}${NBSP}h ${more < 0 ? 'less' : 'more'} than in week ${first.week}`;
  return { monday: last.monday, title: `Lost in week ${last.week}`, hours: last.lostHours, note };
}
