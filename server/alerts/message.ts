/** An alert as it goes out of the house. */
import type { AlertLevel } from '@/shared/contract/alert';
import { alertKindNames, alertPath } from '@/shared/contract/alert-kinds';
import type { Alert } from '../entities/alert';
import type { OutboxEntry } from '../entities/outbox-entry';
import { clockText, durationText } from '../services/charge-words';

/** What comes this much after it was due says so, s. */
const LATE_S = 120;

export interface Message {
  /** Stable: the receiver tells by it what it has already. */
  alertId: string;
  turn: number;
  level: AlertLevel;
  /** What kind of thing it is: 'Check due'. */
  name: string;
  /** 'R-2406 at B2'. */
  title: string;
  seen: string;
  checkFirst: string;
  /** How it came late; empty where it did not. */
  late: string;
  /** Within the site. */
  path: string;
  /** 'Raised at 13:42.' in the workshop's zone. */
  raised: string;
  workshop: string;
}

export function messageOf(
  alert: Alert,
  entry: Pick<OutboxEntry, 'turn' | 'createdAt' | 'heldAt'>,
  workshop: { name: string; zone: string },
  now: number,
): Message {
  return {
    alertId: alert.id,
    turn: entry.turn,
    level: alert.level,
    name: alertKindNames[alert.kind],
    title: alert.title,
    seen: alert.seen,
    checkFirst: alert.checkFirst,
    late: lateText(entry, workshop.zone, now),
    path: alertPath(alert),
    raised: `Raised at ${clockText(alert.raisedAt, workshop.zone, now)}.`,
    workshop: workshop.name,
  };
}

function lateText({ createdAt, heldAt }: Pick<OutboxEntry, 'createdAt' | 'heldAt'>, zone: string, now: number): string {
  const lateS = (now - createdAt) / 1000;
  if (lateS < LATE_S) return '';
  const since = clockText(createdAt, zone, now);
  return heldAt === null
    ? `Sent ${durationText(lateS)} late, from ${since}.`
    : `Kept since ${since} for your quiet hours.`;
}

/** The words under the title: what was seen, what to check first, and how late it is. */
export const bodyOf = ({ seen, checkFirst, late }: Message): string =>
  [seen, checkFirst === '' ? '' : `Check first: ${lowerFirstOf(checkFirst)}`, late].filter(Boolean).join(' ');

const lowerFirstOf = (text: string): string => text.charAt(0).toLowerCase() + text.slice(1);
