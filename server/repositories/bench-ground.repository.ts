/** What the bench plan needs of charges and repairs beyond their own screens. */
import { In, IsNull, MoreThan, Not, type EntityManager } from 'typeorm';
import { openStages } from '@/shared/contract/charge';
import { Charge } from '../entities/charge';
import { Repair } from '../entities/repair';
import { RepairWait } from '../entities/repair-wait';

/** All that stand on the bench, and those that were over after `since` (epoch ms). */
export const listChargesSince = (manager: EntityManager, workshopId: string, since: number): Promise<Charge[]> =>
  manager.find(Charge, {
    where: [
      { workshopId, stage: In([...openStages]) },
      { workshopId, closedAt: MoreThan(since) },
    ],
    order: { number: 'ASC' },
  });

export async function repairsById(
  manager: EntityManager,
  workshopId: string,
  ids: readonly string[],
): Promise<Map<string, Repair>> {
  const rows = ids.length === 0 ? [] : await manager.findBy(Repair, { workshopId, id: In([...ids]) });
  return new Map(rows.map((row) => [row.id, row]));
}

/** Waits that go on, or ended after `since` (epoch ms). */
export const listWaitsSince = (manager: EntityManager, workshopId: string, since: number): Promise<RepairWait[]> =>
  manager.find(RepairWait, {
    where: [
      { workshopId, toAt: IsNull() },
      { workshopId, toAt: MoreThan(since) },
    ],
    order: { fromAt: 'ASC', id: 'ASC' },
  });

/** Targets that repairs were given, the latest first: what packs arrive with. */
export const listTargets = (manager: EntityManager, workshopId: string, count: number): Promise<ArrivedRepair[]> =>
  manager.find(Repair, {
    where: { workshopId, deletedAt: IsNull(), target: Not(IsNull()) },
    select: { id: true, packTypeId: true, moduleTypeId: true, target: true },
    order: { bookedAt: 'DESC', id: 'ASC' },
    take: count,
  });
export type ArrivedRepair = Pick<Repair, 'id' | 'packTypeId' | 'moduleTypeId' | 'target'>;
