/** When an alert rings, as a pure rule: raised once, again where the look says so, until somebody has it. */
import type { AlertDto, AlertKind } from '@/shared/contract/alert';
import type { SoundName } from './sound-contours';

const minute = 60_000;
const rules: Record<AlertKind, { sound: SoundName; after: readonly number[]; everyMs?: number }> = {
  'charge-done': { sound: 'ready', after: [0] },
  'check-due': { sound: 'check-due', after: [0, 5 * minute, 15 * minute] },
  'step-swap': { sound: 'check-due', after: [0, 5 * minute, 15 * minute] },
  overdue: { sound: 'overdue', after: [0], everyMs: minute },
  'look-in-due': { sound: 'look-in', after: [0] },
};
const urgency: readonly SoundName[] = ['overdue', 'check-due', 'ready', 'look-in'];

/** Whom an alert is for: its person, everybody where it has none, everybody when it is an alarm. */
export const concerns = (alert: AlertDto, personId: string): boolean =>
  alert.for === null || alert.for.id === personId || alert.level === 'alarm';

/** Whether the alert rings after `from` and not later than `to` (epoch ms). */
export function ringsBetween(alert: AlertDto, from: number, to: number): boolean {
  if (alert.takenBy !== null || alert.clearedAt !== null) return false;
  const raised = Date.parse(alert.raisedAt);
  const { after, everyMs } = rules[alert.kind];
  if (after.some((ms) => raised + ms > from && raised + ms <= to)) return true;
  if (!everyMs) return false;
  const turnsBefore = Math.max(0, Math.floor((from - raised) / everyMs));
  const next = raised + (turnsBefore + 1) * everyMs;
  return next > from && next <= to;
}

/** What an alert sounds like for a person in a stretch of time; null: it does not ring. */
export const ringOf = (alert: AlertDto, personId: string, from: number, to: number): SoundName | null =>
  concerns(alert, personId) && ringsBetween(alert, from, to) ? rules[alert.kind].sound : null;

/** Of several at once the most urgent is heard. */
export const mostUrgent = (sounds: readonly SoundName[]): SoundName | null =>
  urgency.find((sound) => sounds.includes(sound)) ?? null;
