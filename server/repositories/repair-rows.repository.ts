/** The rows that hang on repairs, for one repair or for a whole list at once. */
import { In, IsNull, type EntityManager, type FindOptionsOrder, type ObjectLiteral } from 'typeorm';
import { AdvisedItem } from '../entities/advised-item';
import { FittedSpare } from '../entities/fitted-spare';
import { PackReading } from '../entities/pack-reading';
import { Photo } from '../entities/photo';
import { RemovedModule } from '../entities/removed-module';
import { RepairEvent } from '../entities/repair-event';
import { RepairPerson } from '../entities/repair-person';
import { RepairWait } from '../entities/repair-wait';
import { SecondSource } from '../entities/second-source';

type RowOfRepair = ObjectLiteral & { workshopId: string; repairId: string };

const listing =
  <Row extends RowOfRepair>(entity: new () => Row, order: FindOptionsOrder<Row>) =>
  async (manager: EntityManager, workshopId: string, repairIds: readonly string[]): Promise<Map<string, Row[]>> => {
    if (repairIds.length === 0) return new Map();
    // The generic entity hides that it has these two columns from TypeORM's own types.
    const where = { workshopId, repairId: In([...repairIds]) } as object;
    const grouped = new Map<string, Row[]>();
    for (const row of await manager.find(entity, { where, order })) {
      const known = grouped.get(row.repairId);
      if (known) known.push(row);
      else grouped.set(row.repairId, [row]);
    }
    return grouped;
  };

/** By repair; the one who is asked first comes first. */
export const peopleOfRepairs = listing(RepairPerson, { place: 'ASC' });
/** By repair; the newest first, as all that follow. */
export const readingsOfRepairs = listing(PackReading, { at: 'DESC', createdAt: 'DESC', id: 'ASC' });
export const sourcesOfRepairs = listing(SecondSource, { at: 'DESC', createdAt: 'DESC', id: 'ASC' });
export const removedOfRepairs = listing(RemovedModule, { at: 'DESC', id: 'ASC' });
export const fittedOfRepairs = listing(FittedSpare, { at: 'DESC', id: 'ASC' });
export const photosOfRepairs = listing(Photo, { at: 'DESC', id: 'ASC' });
/** The first advised comes first. */
export const advisedOfRepairs = listing(AdvisedItem, { at: 'ASC', id: 'ASC' });
export const waitsOfRepairs = listing(RepairWait, { fromAt: 'DESC', id: 'ASC' });
export const eventsOfRepairs = listing(RepairEvent, { at: 'DESC', createdAt: 'DESC', id: 'ASC' });

export async function replacePeople(
  manager: EntityManager,
  workshopId: string,
  repairId: string,
  people: RepairPerson[],
): Promise<void> {
  await manager.delete(RepairPerson, { workshopId, repairId });
  if (people.length > 0) await manager.insert(RepairPerson, people);
}

export async function insertPackReading(manager: EntityManager, reading: PackReading): Promise<void> {
  await manager.insert(PackReading, reading);
}
export async function updatePackReading(
  manager: EntityManager,
  workshopId: string,
  id: string,
  patch: Partial<PackReading>,
): Promise<void> {
  await manager.update(PackReading, { workshopId, id }, patch);
}

export async function insertSecondSource(manager: EntityManager, source: SecondSource): Promise<void> {
  await manager.insert(SecondSource, source);
}
export async function updateSecondSource(
  manager: EntityManager,
  workshopId: string,
  id: string,
  patch: Partial<SecondSource>,
): Promise<void> {
  await manager.update(SecondSource, { workshopId, id }, patch);
}

export async function insertRemovedModule(manager: EntityManager, removed: RemovedModule): Promise<void> {
  await manager.insert(RemovedModule, removed);
}

export async function insertFittedSpare(manager: EntityManager, fitted: FittedSpare): Promise<void> {
  await manager.insert(FittedSpare, fitted);
}

export async function insertAdvised(manager: EntityManager, item: AdvisedItem): Promise<void> {
  await manager.insert(AdvisedItem, item);
}
export async function updateAdvised(
  manager: EntityManager,
  workshopId: string,
  id: string,
  patch: Partial<AdvisedItem>,
): Promise<void> {
  await manager.update(AdvisedItem, { workshopId, id }, patch);
}
export async function deleteAdvised(manager: EntityManager, workshopId: string, id: string): Promise<void> {
  await manager.delete(AdvisedItem, { workshopId, id });
}

export async function insertWait(manager: EntityManager, wait: RepairWait): Promise<void> {
  await manager.insert(RepairWait, wait);
}
export async function updateWait(
  manager: EntityManager,
  workshopId: string,
  id: string,
  patch: Partial<RepairWait>,
): Promise<void> {
  await manager.update(RepairWait, { workshopId, id }, patch);
}
/** Of the workshop's repairs, those that wait now. */
export const countOpenWaits = (manager: EntityManager, workshopId: string): Promise<number> =>
  manager.countBy(RepairWait, { workshopId, toAt: IsNull() });

export async function insertRepairEvents(manager: EntityManager, events: RepairEvent[]): Promise<void> {
  if (events.length > 0) await manager.insert(RepairEvent, events);
}
