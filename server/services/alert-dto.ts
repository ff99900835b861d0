import type { AlertDto } from '@/shared/contract/alert';
import type { PersonRef } from '@/shared/contract/common';
import type { Alert } from '../entities/alert';
import type { PersonName } from '../repositories/charge-stock.repository';
import { toInstant, toOptionalInstant } from './instants';

/** A person as every DTO names them; null where there is none. */
export function personRef(people: ReadonlyMap<string, PersonName>, id: string | null): PersonRef | null {
  return id === null ? null : { id, name: people.get(id)?.name ?? 'somebody' };
}

export const alertDto = (alert: Alert, people: ReadonlyMap<string, PersonName>): AlertDto => ({
  id: alert.id,
  kind: alert.kind,
  level: alert.level,
  chargeId: alert.chargeId,
  title: alert.title,
  for: personRef(people, alert.personId),
  forRole: alert.forRole,
  turn: alert.turn,
  seen: alert.seen,
  checkFirst: alert.checkFirst,
  raisedAt: toInstant(alert.raisedAt),
  lateByS: alert.lateByS,
  takenBy: personRef(people, alert.takenById),
  takenAt: toOptionalInstant(alert.takenAt),
  passedAt: toOptionalInstant(alert.passedAt),
  clearedAt: toOptionalInstant(alert.clearedAt),
});
