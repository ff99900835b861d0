/** What a person waits for: the open charges of theirs, or of a repair they work on. */
import { In, MoreThan, type EntityManager } from 'typeorm';
import { openStages } from '@/shared/contract/charge';
import { Charge } from '../entities/charge';
import { LookIn } from '../entities/look-in';
import { RepairPerson } from '../entities/repair-person';

/** A charge without its plan, which is large. */
export type WaitedFor = Pick<
  Charge,
  'id' | 'personId' | 'clipOnAt' | 'startedAt' | 'checkDueAt' | 'likelyAt' | 'plannedLikelyAt' | 'readyAt'
>;

/** Those that are begun or to come, and not ready yet. */
export async function chargesWaitedFor(
  manager: EntityManager,
  workshopId: string,
  personId: string,
): Promise<WaitedFor[]> {
  const repairs = await manager.findBy(RepairPerson, { workshopId, personId });
  const stage = In(openStages.filter((one) => one !== 'ready' && one !== 'planned'));
  return manager.find(Charge, {
    where: [
      { workshopId, stage, personId },
      { workshopId, stage, repairId: In(repairs.map(({ repairId }) => repairId)) },
    ],
    select: {
      id: true,
      personId: true,
      clipOnAt: true,
      startedAt: true,
      checkDueAt: true,
      likelyAt: true,
      plannedLikelyAt: true,
      readyAt: true,
    },
    order: { id: 'ASC' },
  });
}

/** When the charges of a person ask for a look-in after `from`, epoch ms, ascending; those that are done left out. */
export async function lookInsAhead(
  manager: EntityManager,
  workshopId: string,
  personId: string,
  from: number,
): Promise<number[]> {
  const own = await manager.find(Charge, {
    where: { workshopId, personId, stage: In([...openStages]) },
    select: { id: true },
  });
  const rows = await manager.find(LookIn, {
    where: { workshopId, chargeId: In(own.map(({ id }) => id)), dueAt: MoreThan(from) },
    order: { dueAt: 'ASC' },
  });
  return rows.flatMap(({ dueAt, doneAt }) => (doneAt === null ? [dueAt] : []));
}
