import { In, IsNull, Like, Not, type EntityManager, type FindOptionsWhere } from 'typeorm';
import { openStages } from '@/shared/contract/charge';
import type { RepairState } from '@/shared/contract/repair';
import { Charge } from '../entities/charge';
import { ChargeEvent } from '../entities/charge-event';
import { Repair } from '../entities/repair';

export const findRepair = (manager: EntityManager, workshopId: string, id: string): Promise<Repair | null> =>
  manager.findOneBy(Repair, { workshopId, id });

export const findRepairNumbered = (
  manager: EntityManager,
  workshopId: string,
  number: string,
): Promise<Repair | null> => manager.findOneBy(Repair, { workshopId, number });

/** Neither handed over nor deleted. */
export const openRepair = { handedOverAt: IsNull(), deletedAt: IsNull() } as const;

const inState: Record<RepairState, FindOptionsWhere<Repair>> = {
  open: openRepair,
  'handed-over': { handedOverAt: Not(IsNull()), archivedAt: IsNull(), deletedAt: IsNull() },
  archived: { archivedAt: Not(IsNull()), deletedAt: IsNull() },
  deleted: { deletedAt: Not(IsNull()) },
};

/** The open repair that has reserved a spare. */
export const findRepairWithSpare = (
  manager: EntityManager,
  workshopId: string,
  spareId: string,
): Promise<Repair | null> => manager.findOneBy(Repair, { workshopId, spareId, ...openRepair });

/** Open repairs that have reserved a spare, by the spare's id. */
export async function reservationsBySpare(
  manager: EntityManager,
  workshopId: string,
): Promise<Map<string, Pick<Repair, 'id' | 'number' | 'spareId'>>> {
  const rows = await manager.find(Repair, {
    where: { workshopId, spareId: Not(IsNull()), ...openRepair },
    select: { id: true, number: true, spareId: true },
  });
  return new Map(rows.map((row) => [row.spareId ?? '', row]));
}

export const listOpenRepairs = (manager: EntityManager, workshopId: string): Promise<Repair[]> =>
  manager.find(Repair, { where: { workshopId, ...openRepair }, order: { bookedAt: 'ASC', id: 'ASC' } });

/** One page of the repairs in a state, the last handed over first. `looked` is in lower case. */
export const listRepairs = (
  manager: EntityManager,
  workshopId: string,
  state: RepairState,
  looked: string,
  page: number,
  pageSize: number,
): Promise<Repair[]> =>
  manager.find(Repair, {
    where: { workshopId, ...inState[state], ...(looked === '' ? {} : { searchText: Like(`%${plain(looked)}%`) }) },
    order: { handedOverAt: 'DESC', bookedAt: 'DESC', id: 'ASC' },
    skip: (page - 1) * pageSize,
    take: pageSize,
  });

/** The two marks that a search by LIKE understands become the one for any letter: nothing is missed by it. */
const plain = (looked: string): string => looked.replace(/[%_\\]/g, '_');

export const countRepairs = (manager: EntityManager, workshopId: string, state: RepairState): Promise<number> =>
  manager.countBy(Repair, { workshopId, ...inState[state] });

export async function insertRepair(manager: EntityManager, repair: Repair): Promise<void> {
  await manager.insert(Repair, repair);
}
export async function updateRepair(
  manager: EntityManager,
  workshopId: string,
  id: string,
  patch: Partial<Repair>,
): Promise<void> {
  await manager.update(Repair, { workshopId, id }, patch);
}

/** Id and number of these repairs, those that are over or deleted too. */
export async function repairRefs(
  manager: EntityManager,
  workshopId: string,
  ids: readonly string[],
): Promise<Map<string, Pick<Repair, 'id' | 'number'>>> {
  if (ids.length === 0) return new Map();
  const rows = await manager.find(Repair, {
    where: { workshopId, id: In([...ids]) },
    select: { id: true, number: true },
  });
  return new Map(rows.map(({ id, number }) => [id, { id, number }]));
}

/** When each of these repairs was booked, epoch ms. */
export async function bookedInstants(
  manager: EntityManager,
  workshopId: string,
  ids: readonly string[],
): Promise<Map<string, number>> {
  if (ids.length === 0) return new Map();
  const rows = await manager.find(Repair, {
    where: { workshopId, id: In([...ids]) },
    select: { id: true, createdAt: true },
  });
  return new Map(rows.map(({ id, createdAt }) => [id, createdAt]));
}

/** Every number of a repair that was ever used, those that only charges name too. */
export async function repairNumbers(manager: EntityManager, workshopId: string): Promise<string[]> {
  const repairs = await manager.find(Repair, { where: { workshopId }, select: { id: true, number: true } });
  const charges = await manager
    .createQueryBuilder(Charge, 'charge')
    .select('DISTINCT charge.repairRef', 'number')
    .where("charge.workshopId = :workshopId AND charge.repairRef LIKE 'R-%'", { workshopId })
    .getRawMany<{ number: string }>();
  return [...repairs, ...charges].map(({ number }) => number);
}

/** All charges of these repairs, the newest first. */
export const listChargesOfRepairs = (
  manager: EntityManager,
  workshopId: string,
  repairIds: readonly string[],
): Promise<Charge[]> =>
  repairIds.length === 0
    ? Promise.resolve([])
    : manager.find(Charge, {
        where: { workshopId, repairId: In([...repairIds]) },
        order: { createdAt: 'DESC', number: 'DESC' },
      });

/** Gives the open charges that name a repair's number to it. */
export async function adoptCharges(
  manager: EntityManager,
  workshopId: string,
  repair: Pick<Repair, 'id' | 'number'>,
): Promise<void> {
  await manager.update(
    Charge,
    { workshopId, repairRef: repair.number, repairId: IsNull(), stage: In([...openStages]) },
    { repairId: repair.id },
  );
}

/** Who has fitted the module of each charge, by the charge's id. */
export async function fittersOf(
  manager: EntityManager,
  workshopId: string,
  chargeIds: readonly string[],
): Promise<Map<string, string>> {
  if (chargeIds.length === 0) return new Map();
  const events = await manager.findBy(ChargeEvent, { workshopId, chargeId: In([...chargeIds]), kind: 'fitted' });
  return new Map(events.flatMap(({ chargeId, personId }) => (personId === null ? [] : [[chargeId, personId]])));
}
