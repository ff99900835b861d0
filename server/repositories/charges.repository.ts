import { In, IsNull, LessThan, LessThanOrEqual, MoreThan, Not, type EntityManager } from 'typeorm';
import { openStages, type Stage } from '@/shared/contract/charge';
import { Charge } from '../entities/charge';
import { Workshop } from '../entities/workshop';

const closedStages = ['fitted', 'shelved', 'stopped'] as const satisfies readonly Stage[];

export const findCharge = (manager: EntityManager, workshopId: string, id: string): Promise<Charge | null> =>
  manager.findOneBy(Charge, { workshopId, id });

/** All that stand on the bench, and those that were stopped after `stoppedSince` (epoch ms). */
export async function listBenchCharges(
  manager: EntityManager,
  workshopId: string,
  stoppedSince: number,
  only?: readonly string[],
): Promise<Charge[]> {
  const which = { workshopId, ...(only ? { id: In([...only]) } : {}) };
  return manager.find(Charge, {
    where: [
      { ...which, stage: In([...openStages]) },
      { ...which, stage: 'stopped', stoppedAt: MoreThan(stoppedSince) },
    ],
    order: { number: 'ASC' },
  });
}

/** One page of the charges that are over, the last to end first. */
export const listClosedCharges = (
  manager: EntityManager,
  workshopId: string,
  page: number,
  pageSize: number,
): Promise<Charge[]> =>
  manager.find(Charge, {
    where: { workshopId, stage: In([...closedStages]) },
    order: { closedAt: 'DESC', number: 'DESC' },
    skip: (page - 1) * pageSize,
    take: pageSize,
  });

export type ChargeName = Pick<Charge, 'id' | 'number' | 'repairRef' | 'stage' | 'spareId' | 'topUpOf'>;
const nameColumns = { id: true, number: true, repairRef: true, stage: true, spareId: true, topUpOf: true } as const;

/** Names of charges by id; the heavy columns stay in the database. */
export async function chargeNames(
  manager: EntityManager,
  workshopId: string,
  ids: readonly string[],
): Promise<Map<string, ChargeName>> {
  if (ids.length === 0) return new Map();
  const rows: ChargeName[] = await manager.find(Charge, {
    where: { workshopId, id: In([...ids]) },
    select: nameColumns,
  });
  return new Map(rows.map((row) => [row.id, row]));
}

/** The charge that went on from this one. */
export const findTopUpOf = (manager: EntityManager, workshopId: string, id: string): Promise<ChargeName | null> =>
  manager.findOne(Charge, { where: { workshopId, topUpOf: id }, select: nameColumns });

/** The open charge that has a spare. */
export const findOpenChargeOfSpare = (
  manager: EntityManager,
  workshopId: string,
  spareId: string,
): Promise<Charge | null> => manager.findOneBy(Charge, { workshopId, spareId, stage: In([...openStages]) });

export async function insertCharge(manager: EntityManager, charge: Charge): Promise<void> {
  await manager.insert(Charge, charge);
}

/** Writes the columns that a running charge changes; plan and frozen inputs only where they are given. */
export async function updateCharge(
  manager: EntityManager,
  workshopId: string,
  id: string,
  patch: Partial<Charge>,
): Promise<void> {
  await manager.update(Charge, { workshopId, id }, patch);
}

/** Takes its answers, events, holds, look-ins and alerts with it. */
export async function deleteCharge(manager: EntityManager, workshopId: string, id: string): Promise<void> {
  await manager.delete(Charge, { workshopId, id });
}

/** Counts one more charge of the workshop and gives its running number. */
export async function nextChargeNumber(manager: EntityManager, workshopId: string): Promise<number> {
  await manager.increment(Workshop, { id: workshopId }, 'chargeCount', 1);
  const workshop = await manager.findOne(Workshop, {
    where: { id: workshopId },
    select: { id: true, chargeCount: true },
  });
  return workshop?.chargeCount ?? 0;
}

/** Counts one more change of the workshop's charges or alerts and gives the board's new revision. */
export async function raiseBoardRev(manager: EntityManager, workshopId: string): Promise<number> {
  await manager.increment(Workshop, { id: workshopId }, 'boardRev', 1);
  const workshop = await manager.findOne(Workshop, { where: { id: workshopId }, select: { id: true, boardRev: true } });
  return workshop?.boardRev ?? 0;
}

/** What wants attention at `now`, of all workshops: the one question that no workshop asks, but the sleeper. */
export async function listDueCharges(
  manager: EntityManager,
  now: number,
  limit: number,
): Promise<Pick<Charge, 'id' | 'workshopId' | 'nextDueAt'>[]> {
  return manager.find(Charge, {
    where: { nextDueAt: LessThanOrEqual(now) },
    select: { id: true, workshopId: true, nextDueAt: true },
    order: { nextDueAt: 'ASC' },
    take: limit,
  });
}

/** How many charges of a workshop have a due instant before `before` (epoch ms). */
export const countDueBefore = (manager: EntityManager, workshopId: string, before: number): Promise<number> =>
  manager.countBy(Charge, { workshopId, nextDueAt: LessThan(before) });

/** Earliest due instant of all workshops, epoch ms, but those of `skip`; null: nothing waits. */
export async function earliestDueAt(manager: EntityManager, skip: readonly string[]): Promise<number | null> {
  const row = await manager.findOne(Charge, {
    where: { nextDueAt: Not(IsNull()), ...(skip.length === 0 ? {} : { id: Not(In([...skip])) }) },
    select: { id: true, nextDueAt: true },
    order: { nextDueAt: 'ASC' },
  });
  return row?.nextDueAt ?? null;
}
