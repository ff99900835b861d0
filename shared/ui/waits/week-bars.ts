import type { WaitWeekDto } from '@/shared/contract/waits';
import type { WaitBar } from '../charts/bar-layout';

/** A label 'wk 23' needs this much, and a bare number this much, px. */
const [named, bare] = [60, 26];

/** The bars; where weeks stand close, only every so many has its number. */
export function weekBars(weeks: readonly WaitWeekDto[], today: string, width: number): WaitBar[] {
  const pitch = width / Math.max(1, weeks.length);
  const every = Math.max(1, Math.ceil(bare / pitch));
  return weeks.map((week, at) => ({
    key: week.monday,
    // The last one always, and counted from it: the present week is what one looks for.
    label: (weeks.length - 1 - at) % every !== 0 ? '' : pitch > named ? `wk ${week.week}` : String(week.week),
    used: week.usedHours,
    lost: week.lostHours,
    present: at === weeks.length - 1 && week.monday <= today,
  }));
}
