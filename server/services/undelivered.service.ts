import type { UndeliveredDto } from '@/shared/contract/alert-settings';
import type { Deps, Member } from '../deps';
import type { OutboxEntry } from '../entities/outbox-entry';
import { conflict, notFound } from '../errors/domain-error';
import { alertsById } from '../repositories/alerts.repository';
import { peopleById } from '../repositories/charge-stock.repository';
import { findDeadEntry, listDeadEntries, settleEntry } from '../repositories/outbox.repository';
import { personRef } from './alert-dto';
import { toInstant } from './instants';
import { inTransaction } from './unit-of-work';

/** What was given up after all tries, the latest first. */
export async function undelivered(deps: Deps, member: Member): Promise<UndeliveredDto[]> {
  const { manager } = deps.dataSource;
  const { workshopId } = member;
  const entries = await listDeadEntries(manager, workshopId);
  const alerts = await alertsById(manager, workshopId, [...new Set(entries.map((entry) => entry.alertId))]);
  const people = await peopleById(manager, workshopId);
  return entries.flatMap((entry): UndeliveredDto[] => {
    const alert = alerts.get(entry.alertId);
    const person = personRef(people, entry.personId);
    if (!alert || person === null) return [];
    const { id, kind, level, title } = alert;
    return [
      {
        id: entry.id,
        alert: { id, kind, level, title },
        person,
        way: entry.way,
        tries: entry.tries,
        reason: entry.reason ?? '',
        at: toInstant(entry.endedAt ?? entry.createdAt),
        open: alert.clearedAt === null && alert.takenAt === null,
      },
    ];
  });
}

/** Tries anew from the beginning. @throws DomainError 404, 409 where nobody needs it any more */
export async function sendAgain(deps: Deps, member: Member, id: string, now: number): Promise<void> {
  await decide(deps, member, id, { state: 'waiting', dueAt: now, tries: 0, heldAt: null, endedAt: null }, true);
  deps.outbox.poke();
}

/** It is known, and nothing more is to be done. @throws DomainError 404 */
export const dropUndelivered = (deps: Deps, member: Member, id: string, now: number): Promise<void> =>
  decide(deps, member, id, { state: 'dropped', endedAt: now }, false);

const decide = (
  deps: Deps,
  member: Member,
  id: string,
  patch: Partial<OutboxEntry>,
  stillOpen: boolean,
): Promise<void> =>
  inTransaction(deps, async (manager) => {
    const { workshopId } = member;
    const entry = await findDeadEntry(manager, workshopId, id);
    if (!entry) throw notFound('This alert that could not be brought');
    const alert = (await alertsById(manager, workshopId, [entry.alertId])).get(entry.alertId);
    if (stillOpen && (!alert || alert.clearedAt !== null || alert.takenAt !== null))
      throw conflict('alert_over', 'Somebody has it, or it is settled. There is nothing to send.');
    await settleEntry(manager, workshopId, id, 'dead', patch);
  });
