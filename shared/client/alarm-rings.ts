/** When an alert rings, as a pure rule: raised once, again where the look says so, until somebody has it. */
import type { AlertDto } from '@/shared/contract/alert';
import type { AlertKind } from '@/shared/contract/alert-kinds';
import type { Role } from '@/shared/contract/roles';
import type { SoundName } from './sound-contours';

const minute = 60_000;
/** After the first ring of what waits for a hand; what only tells rings once. */
const again = [0, 5 * minute, 15 * minute];
const rules: Record<AlertKind, { sound: SoundName; after: readonly number[]; everyMs?: number }> = {
  'taper-begun': { sound: 'look-in', after: [0] },
  'charge-done': { sound: 'ready', after: again },
  rested: { sound: 'check-due', after: again },
  'check-due': { sound: 'check-due', after: again },
  'step-swap': { sound: 'check-due', after: again },
  overdue: { sound: 'overdue', after: [0], everyMs: minute },
  'latest-start-missed': { sound: 'check-due', after: [0] },
  'look-in-due': { sound: 'look-in', after: [0] },
  'look-in-missed': { sound: 'look-in', after: again },
  'no-reading': { sound: 'look-in', after: again },
  'wall-unseen': { sound: 'look-in', after: [0] },
  // Over a limit of its type nothing waits.
  'too-warm': { sound: 'overdue', after: [0], everyMs: minute },
  'over-voltage': { sound: 'overdue', after: [0], everyMs: minute },
  // Where current flows it is an alarm; heard again where nobody has it.
  'channel-fault': { sound: 'overdue', after: again },
  // It asks for a look, not for a hand by the minute: heard once.
  'odd-reading': { sound: 'overdue', after: [0] },
  'no-current': { sound: 'overdue', after: [0] },
};
const urgency: readonly SoundName[] = ['overdue', 'check-due', 'ready', 'look-in'];

/** Neither taken nor over. */
export const isOpen = (alert: AlertDto): boolean => alert.takenBy === null && alert.clearedAt === null;

/** Who listens on this device. */
export interface Hearer {
  id: string;
  role: Role;
}

/**
 * Whom an alert is for: its person, everybody when it is an alarm; gone on because nobody took it, the foremen too, then the
 * managers. One that has no person and has not gone on is everybody's.
 */
export function concerns(alert: AlertDto, { id, role }: Hearer): boolean {
  if (alert.level === 'alarm' || alert.for?.id === id) return true;
  if (alert.forRole === null) return alert.for === null;
  return role === 'foreman' || (role === 'manager' && alert.forRole === 'manager');
}

/** Since when it rings, epoch ms: for whom it was passed to, from then. */
export const ringsSince = (alert: AlertDto): number => Date.parse(alert.passedAt ?? alert.raisedAt);

/** Whether the alert rings after `from` and not later than `to` (epoch ms). */
export function ringsBetween(alert: AlertDto, from: number, to: number): boolean {
  if (!isOpen(alert)) return false;
  const since = ringsSince(alert);
  const { after, everyMs } = rules[alert.kind];
  const turns = alert.level === 'tell' ? after.slice(0, 1) : after;
  if (turns.some((ms) => since + ms > from && since + ms <= to)) return true;
  if (!everyMs) return false;
  const turnsBefore = Math.max(0, Math.floor((from - since) / everyMs));
  const next = since + (turnsBefore + 1) * everyMs;
  return next > from && next <= to;
}

/**
 * What an alert sounds like for a person at `to`; null: it does not ring.
 * @param from till when it was heard on this device, epoch ms; null: never, so it rings however old it is
 */
export const ringOf = (alert: AlertDto, hearer: Hearer, from: number | null, to: number): SoundName | null => {
  if (!isOpen(alert) || !concerns(alert, hearer)) return null;
  return from === null || ringsBetween(alert, from, to) ? rules[alert.kind].sound : null;
};

/** Of several at once the most urgent is heard. */
export const mostUrgent = (sounds: readonly SoundName[]): SoundName | null =>
  urgency.find((sound) => sounds.includes(sound)) ?? null;
