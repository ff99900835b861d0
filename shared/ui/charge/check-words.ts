/** The verdict of a check in words (look: voice 13). Pure. */
import type { CheckVerdict, GroupVerdict } from '@/calc/plan-types';
import { ampHours, deviationWords, millivolts } from '../format/quantities';
import type { LocaleMarks } from '../format/marks';

/** 'Group 2', 'Groups 1 and 3', 'Groups 1, 3 and 2 more' */
export function groupsWords(groups: readonly number[]): string {
  const names = groups.map((group) => String(group + 1));
  if (names.length === 1) return `Group ${names[0]}`;
  const list =
    names.length > 4
      ? `${names.slice(0, 3).join(', ')} and ${names.length - 3} more`
      : `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`;
  return `Groups ${list}`;
}

/** 'Group 2 needs 0.6 Ah more', 'Groups 1 and 3 must lose up to 0.4 Ah' */
export function needsWords(groups: readonly GroupVerdict[], marks: LocaleMarks): string {
  const outside = groups.filter((group) => !group.within);
  if (outside.length === 0) return '';
  const name = groupsWords(outside.map((group) => group.group));
  const most = Math.max(...outside.map((group) => Math.abs(group.ampHoursToGo)));
  const amount = ampHours(most, marks);
  const few = outside.length > 1 ? 'up to ' : '';
  const verb = outside.length > 1 ? 'need' : 'needs';
  const up = outside.every((group) => group.ampHoursToGo > 0);
  const down = outside.every((group) => group.ampHoursToGo < 0);
  if (up) return `${name} ${verb} ${few}${amount} more`;
  if (down) return `${name} ${outside.length > 1 ? 'hold' : 'holds'} ${few}${amount} too much`;
  return `${name} ${verb} up to ${amount}, up and down`;
}

/** 'Group 2 is 7 mV below, outside.' */
export function outsideWords(verdict: Pick<CheckVerdict, 'groups'>): string {
  const outside = verdict.groups.filter((group) => !group.within);
  const worst = outside.reduce<GroupVerdict | null>(
    (most, one) => (most === null || Math.abs(one.deviationVolts) > Math.abs(most.deviationVolts) ? one : most),
    null,
  );
  if (worst === null) return 'All groups are inside.';
  if (outside.length === 1) return `Group ${worst.group + 1} is ${deviationWords(worst.deviationVolts)}, outside.`;
  return `${groupsWords(outside.map((group) => group.group))} are outside, at most ${deviationWords(worst.deviationVolts)}.`;
}

/** '2 mV above, inside' beside a field. */
export const verdictWords = (verdict: GroupVerdict): string =>
  `${deviationWords(verdict.deviationVolts)}, ${verdict.within ? 'inside' : 'outside'}`;

/** 'within 5 mV' of a whole check. */
export const withinWords = (toleranceVolts: number): string => `within ${millivolts(toleranceVolts)}`;
