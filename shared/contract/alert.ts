import * as z from 'zod/mini';
import { id, type Instant, type PersonRef } from './common';

export const alertKinds = [
  'taper-begun',
  'charge-done',
  'rested',
  'check-due',
  'overdue',
  'latest-start-missed',
  'look-in-due',
  'look-in-missed',
  'no-reading',
  'step-swap',
  'odd-reading',
  'no-current',
  'too-warm',
  'over-voltage',
  'wall-unseen',
] as const;
export type AlertKind = (typeof alertKinds)[number];

export const alertLevels = ['tell', 'amber', 'alarm'] as const;
export type AlertLevel = (typeof alertLevels)[number];

/** What each cause is called, on a screen as in a letter. */
export const alertKindNames: Record<AlertKind, string> = {
  'taper-begun': 'Taper begun',
  'charge-done': 'Current is over',
  rested: 'Settled',
  'check-due': 'Check due',
  overdue: 'Overdue',
  'latest-start-missed': 'Latest start missed',
  'look-in-due': 'Look-in due',
  'look-in-missed': 'Look-in missed',
  'no-reading': 'No reading',
  'step-swap': 'A hand is needed',
  'odd-reading': 'Odd reading',
  'no-current': 'No current',
  'too-warm': 'Too warm',
  'over-voltage': 'Over the voltage limit',
  'wall-unseen': 'Wall not seen',
};

export interface AlertDto {
  id: string;
  kind: AlertKind;
  level: AlertLevel;
  /** Null: it is not about a charge. */
  chargeId: string | null;
  title: string;
  /** Whom it is for first. */
  for: PersonRef | null;
  /** Nobody took it in time: it has gone on to those of this role, and to those above them. Null: it has not. */
  forRole: 'foreman' | 'manager' | null;
  /** Counts whom it has been with: the same alert comes anew with the next turn, and twice within one it is one. */
  turn: number;
  seen: string;
  checkFirst: string;
  raisedAt: Instant;
  /** How long after its cause it was told, s: the server was off in between. */
  lateByS: number;
  takenBy: PersonRef | null;
  takenAt: Instant | null;
  /** When it was passed on to whom it is for now: for them it rings from then. Null: it was never passed on. */
  passedAt: Instant | null;
  /** The cause is gone. */
  clearedAt: Instant | null;
}

/** Where an alert leads to, within this site. */
export const alertPath = (alert: Pick<AlertDto, 'chargeId'>): string =>
  alert.chargeId === null ? '/alerts' : `/charges/${alert.chargeId}`;

export const passAlertSchema = z.object({ personId: id });
