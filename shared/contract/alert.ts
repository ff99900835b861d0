import * as z from 'zod/mini';
import type { AlertKind } from './alert-kinds';
import { id, type Instant, type PersonRef } from './common';

export const alertLevels = ['tell', 'amber', 'alarm'] as const;
export type AlertLevel = (typeof alertLevels)[number];

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

export const passAlertSchema = z.object({ personId: id });
