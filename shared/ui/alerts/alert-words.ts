/** What alerts say of themselves. Pure. */
import type { AlertDto, AlertKind } from '@/shared/contract/alert';
import type { ChargeCardDto } from '@/shared/contract/charge';
import { firstName, waitsForSwap } from '../charge/card-model';
import type { StageMark } from '../stage/stages';

export interface AlertLook {
  mark: StageMark;
  word: string;
}

const looks: Record<AlertKind, AlertLook> = {
  overdue: { mark: 'overdue', word: 'Overdue' },
  'check-due': { mark: 'check-due', word: 'Check due' },
  'charge-done': { mark: 'resting', word: 'Current is over' },
  'step-swap': { mark: 'check-due', word: 'A hand is needed' },
  'look-in-due': { mark: 'queued', word: 'Look-in due' },
  'look-in-missed': { mark: 'check-due', word: 'Look-in missed' },
  'odd-reading': { mark: 'overdue', word: 'Odd reading' },
};
export const lookOf = (alert: AlertDto): AlertLook => looks[alert.kind];

/** 'R-2406 at B2': the tag beside it says already that it is a look-in. */
export const titleOf = (alert: AlertDto): string => alert.title.replace(/^Look[- ]in at /, '');

/** Whose it is: 'nobody has it', 'yours', 'for Hella'; once taken who has it. */
export function whose(alert: AlertDto, personId: string): string {
  if (alert.takenBy) return alert.takenBy.id === personId ? 'you have it' : `${firstName(alert.takenBy.name)} has it`;
  if (!alert.for) return 'nobody has it';
  return alert.for.id === personId ? 'yours' : `for ${firstName(alert.for.name)}`;
}

/** What to do about it, and where. */
export function stepOf(alert: AlertDto, card: ChargeCardDto | undefined): { title: string; path: string } {
  const live = `/charges/${alert.chargeId}`;
  if (alert.kind === 'check-due') return { title: 'Check now', path: `${live}/check` };
  if (alert.kind === 'look-in-due' || alert.kind === 'look-in-missed' || alert.kind === 'odd-reading')
    return { title: 'Log a reading', path: `${live}/log` };
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
