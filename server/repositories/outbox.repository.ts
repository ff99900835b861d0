import { Brackets, In, IsNull, LessThan, LessThanOrEqual, MoreThan, Not, type EntityManager } from 'typeorm';
import { OutboxEntry } from '../entities/outbox-entry';

export async function insertEntries(manager: EntityManager, entries: readonly OutboxEntry[]): Promise<void> {
  if (entries.length > 0) await manager.insert(OutboxEntry, [...entries]);
}

/** What of an alert still waits is not needed any more. */
export async function dropWaitingEntries(
  manager: EntityManager,
  workshopId: string,
  alertId: string,
  reason: string,
  now: number,
  beforeTurn = Infinity,
): Promise<void> {
  await manager.update(
    OutboxEntry,
    {
      ...{ workshopId, alertId, state: 'waiting' as const },
      ...(beforeTurn === Infinity ? {} : { turn: LessThan(beforeTurn) }),
    },
    { state: 'dropped', reason, endedAt: now },
  );
}

/** What was put off for the quiet hours of a person is looked at anew: they are not what they were. */
export async function releaseHeld(
  manager: EntityManager,
  workshopId: string,
  personId: string,
  now: number,
): Promise<void> {
  await manager.update(
    OutboxEntry,
    { workshopId, personId, state: 'waiting', heldAt: Not(IsNull()), dueAt: MoreThan(now) },
    { dueAt: now },
  );
}

/**
 * What is to go out at `now`, of all workshops: the one question that no workshop asks, but the dispatcher.
 * @param furthest no try and no lease lies further ahead than this, epoch ms; one that does was set by a clock that was
 *   set back since, and is due
 */
export const listDueEntries = (
  manager: EntityManager,
  now: number,
  furthest: { due: number; lease: number },
  limit: number,
): Promise<OutboxEntry[]> =>
  manager
    .createQueryBuilder(OutboxEntry, 'entry')
    .where('entry.state = :state', { state: 'waiting' })
    .andWhere(
      new Brackets((either) =>
        either
          .where('entry.due_at <= :now', { now })
          .orWhere('entry.due_at > :furthestDue AND entry.held_at IS NULL', { furthestDue: furthest.due }),
      ),
    )
    .andWhere(
      new Brackets((either) =>
        either
          .where('entry.leased_until IS NULL')
          .orWhere('entry.leased_until <= :now', { now })
          .orWhere('entry.leased_until > :furthestLease', { furthestLease: furthest.lease }),
      ),
    )
    .orderBy('entry.due_at', 'ASC')
    .addOrderBy('entry.id', 'ASC')
    .take(limit)
    .getMany();

export async function leaseEntries(manager: EntityManager, ids: readonly string[], until: number): Promise<void> {
  await manager.update(OutboxEntry, { id: In([...ids]) }, { leasedUntil: until });
}

/** Gives back what a process that ended had in hand; only the server that holds the data folder may. */
export async function freeLeases(manager: EntityManager): Promise<void> {
  await manager.update(OutboxEntry, { leasedUntil: Not(IsNull()) }, { leasedUntil: null });
}

/** Writes what came of an entry, where it still waits for that. */
export async function settleEntry(
  manager: EntityManager,
  workshopId: string,
  id: string,
  state: OutboxEntry['state'],
  patch: Partial<OutboxEntry>,
): Promise<void> {
  await manager.update(OutboxEntry, { workshopId, id, state }, patch);
}

/** When the dispatcher has something to do next, epoch ms; null: nothing waits. */
export async function earliestEntryDueAt(manager: EntityManager): Promise<number | null> {
  const waiting = await manager.findOne(OutboxEntry, {
    where: { state: 'waiting', leasedUntil: IsNull() },
    select: { id: true, dueAt: true },
    order: { dueAt: 'ASC' },
  });
  const leased = await manager.findOne(OutboxEntry, {
    where: { state: 'waiting', leasedUntil: Not(IsNull()) },
    select: { id: true, leasedUntil: true },
    order: { leasedUntil: 'ASC' },
  });
  const receipt = await manager.findOne(OutboxEntry, {
    where: { receiptDueAt: Not(IsNull()) },
    select: { id: true, receiptDueAt: true },
    order: { receiptDueAt: 'ASC' },
  });
  const instants = [waiting?.dueAt, leased?.leasedUntil, receipt?.receiptDueAt].filter(
    (at): at is number => at !== undefined && at !== null,
  );
  return instants.length === 0 ? null : Math.min(...instants);
}

/** Entries whose receipts can be asked for, of all workshops. */
export const listReceiptsDue = (manager: EntityManager, now: number, limit: number): Promise<OutboxEntry[]> =>
  manager.find(OutboxEntry, {
    where: { receiptDueAt: LessThanOrEqual(now) },
    order: { receiptDueAt: 'ASC', id: 'ASC' },
    take: limit,
  });

/** What was given up, the latest first. */
export const listDeadEntries = (manager: EntityManager, workshopId: string): Promise<OutboxEntry[]> =>
  manager.find(OutboxEntry, {
    where: { workshopId, state: 'dead' },
    order: { endedAt: 'DESC', id: 'ASC' },
    take: 200,
  });

export const findDeadEntry = (manager: EntityManager, workshopId: string, id: string): Promise<OutboxEntry | null> =>
  manager.findOneBy(OutboxEntry, { workshopId, id, state: 'dead' });

/** How many wait, and how many were given up. */
export async function countEntries(
  manager: EntityManager,
  workshopId: string,
): Promise<{ waiting: number; dead: number }> {
  return {
    waiting: await manager.countBy(OutboxEntry, { workshopId, state: 'waiting' }),
    dead: await manager.countBy(OutboxEntry, { workshopId, state: 'dead' }),
  };
}
