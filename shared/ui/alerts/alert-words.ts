/** What alerts say of themselves. Pure. */
import type { AlertDto } from '@/shared/contract/alert';
import { alertKindNames, alertPath, type AlertKind } from '@/shared/contract/alert-kinds';
import type { ChargeCardDto } from '@/shared/contract/charge';
import { firstName, waitsForSwap } from '../charge/card-model';
import type { StageMark } from '../stage/stages';

export interface AlertLook {
  mark: StageMark;
  word: string;
}

const marks: Record<AlertKind, StageMark> = {
  'taper-begun': 'tapering',
  'charge-done': 'resting',
  rested: 'check-due',
  'check-due': 'check-due',
  overdue: 'overdue',
  'latest-start-missed': 'queued',
  'look-in-due': 'queued',
  'look-in-missed': 'check-due',
  'no-reading': 'queued',
  'step-swap': 'check-due',
  'odd-reading': 'overdue',
  'no-current': 'overdue',
  'too-warm': 'overdue',
  'over-voltage': 'overdue',
  'channel-fault': 'overdue',
  'wall-unseen': 'stopped',
};
export const lookOf = (alert: AlertDto): AlertLook => ({ mark: marks[alert.kind], word: alertKindNames[alert.kind] });

/** 'R-2406 at B2': the tag beside it says already that it is a look-in. */
export const titleOf = (alert: AlertDto): string => alert.title.replace(/^Look[- ]in at /, '');

const roleWords = { foreman: 'with the foremen', manager: 'with the managers' } as const;

/** Whose it is: 'nobody has it', 'yours', 'for Hella', 'with the foremen'; once taken who has it. */
export function whose(alert: AlertDto, personId: string): string {
  if (alert.takenBy) return alert.takenBy.id === personId ? 'you have it' : `${firstName(alert.takenBy.name)} has it`;
  if (alert.forRole) return roleWords[alert.forRole];
  if (!alert.for) return 'nobody has it';
  return alert.for.id === personId ? 'yours' : `for ${firstName(alert.for.name)}`;
}

/** What a reading answers. */
const asksForReading: readonly AlertKind[] = [
  'look-in-due',
  'look-in-missed',
  'no-reading',
  'odd-reading',
  'no-current',
  'too-warm',
  'over-voltage',
];

/** What to do about it, and where. */
export function stepOf(alert: AlertDto, card: ChargeCardDto | undefined): { title: string; path: string } {
  const live = alertPath(alert);
  if (alert.kind === 'wall-unseen') return { title: 'See the walls', path: '/workshop?section=walls' };
  if (alert.kind === 'check-due' || alert.kind === 'rested') return { title: 'Check now', path: `${live}/check` };
  if (asksForReading.includes(alert.kind)) return { title: 'Log a reading', path: `${live}/log` };
  if (alert.kind === 'overdue' && card && !waitsForSwap(card)) {
    if (card.stage === 'check-due') return { title: 'Check now', path: `${live}/check` };
    if (card.stage === 'queued') return { title: 'Checks before clipping on', path: `${live}/checks` };
  }
  return { title: 'Open the charge', path: live };
}

/** What came of it: 'Ines took it at 13:21.' */
export function outcomeOf(alert: AlertDto, at: (instant: string) => string): string {
  const taken =
    alert.takenBy && alert.takenAt ? `${firstName(alert.takenBy.name)} took it at ${at(alert.takenAt)}.` : '';
  const settled = alert.clearedAt ? `Settled ${at(alert.clearedAt)}.` : '';
  return [taken, settled].filter(Boolean).join(' ');
}
