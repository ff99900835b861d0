import * as z from 'zod/mini';
import { id, type Instant, type PersonRef } from './common';

export const alertKinds = [
  'charge-done',
  'check-due',
  'overdue',
  'look-in-due',
  'look-in-missed',
  'step-swap',
  'odd-reading',
] as const;
export type AlertKind = (typeof alertKinds)[number];

export interface AlertDto {
  id: string;
  kind: AlertKind;
  level: 'tell' | 'amber' | 'alarm';
  chargeId: string;
  title: string;
  /** Whom it is for first. */
  for: PersonRef | null;
  seen: string;
  checkFirst: string;
  raisedAt: Instant;
  /** How long after its cause it was told, s: the server was off in between. */
  lateByS: number;
  takenBy: PersonRef | null;
  takenAt: Instant | null;
  /** When it was passed on to whom it is for now: for that person it rings from then. Null: it was never passed on. */
  passedAt: Instant | null;
  /** The cause is gone. */
  clearedAt: Instant | null;
}

export const passAlertSchema = z.object({ personId: id });
