import type { WaitsDto } from '@/shared/contract/waits';
import { NBSP } from '../format/marks';
import { addDays } from '../format/zone';

/** The last whole week, and how it stands against the first of the period. */
export function weekFigure(
  weeks: WaitsDto['weeks'],
  today: string,
): { title: string; hours: number; note: string } | null {
  // The present week is not over: its hours say nothing beside a whole one.
  const whole = weeks.filter((week) => addDays(week.monday, 6) < today);
  const last = whole.at(-1);
  const first = whole[0];
  if (!last || !first) {
    const present = weeks.at(-1);
    return present ? { title: `Waited in week ${present.week}`, hours: present.waitHours, note: 'so far' } : null;
  }
  const more = Math.round(last.waitHours) - Math.round(first.waitHours);
  const note =
    last === first
      ? `${last.charges} charges`
      : more === 0
        ? `as in week ${first.week}`
        : `${Math.abs(more)}${NBSP}h ${more < 0 ? 'less' : 'more'} than in week ${first.week}`;
  return { title: `Waited in week ${last.week}`, hours: last.waitHours, note };
}
