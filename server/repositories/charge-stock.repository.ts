/** What charges need of stock, equipment and people: names, limits, and the spare's own state. */
import { In, type EntityManager } from 'typeorm';
import { Channel } from '../entities/channel';
import { ModuleType } from '../entities/module-type';
import { Person } from '../entities/person';
import { Spare } from '../entities/spare';
import { Workshop } from '../entities/workshop';

export type PersonName = Pick<Person, 'id' | 'name' | 'disabledAt'>;

const byId = <Row extends { id: string }>(rows: Row[]): Map<string, Row> => new Map(rows.map((row) => [row.id, row]));

export async function findWorkshop(manager: EntityManager, workshopId: string): Promise<Workshop | null> {
  return manager.findOneBy(Workshop, { id: workshopId });
}

export async function sparesById(
  manager: EntityManager,
  workshopId: string,
  ids: readonly string[],
): Promise<Map<string, Spare>> {
  return byId(ids.length === 0 ? [] : await manager.findBy(Spare, { workshopId, id: In([...ids]) }));
}

export async function typesById(
  manager: EntityManager,
  workshopId: string,
  ids: readonly string[],
): Promise<Map<string, ModuleType>> {
  return byId(ids.length === 0 ? [] : await manager.findBy(ModuleType, { workshopId, id: In([...ids]) }));
}

/** All people of a workshop, the disabled ones too: old events name them. */
export async function peopleById(manager: EntityManager, workshopId: string): Promise<Map<string, PersonName>> {
  return byId(
    await manager.find(Person, { where: { workshopId }, select: { id: true, name: true, disabledAt: true } }),
  );
}

/** All channels of a workshop, the retired ones too. */
export async function channelsById(manager: EntityManager, workshopId: string): Promise<Map<string, Channel>> {
  return byId(await manager.find(Channel, { where: { workshopId }, order: { name: 'ASC' } }));
}

export async function updateSpare(
  manager: EntityManager,
  workshopId: string,
  id: string,
  patch: Partial<Spare>,
): Promise<void> {
  await manager.update(Spare, { workshopId, id }, patch);
  await manager.increment(Spare, { workshopId, id }, 'rev', 1);
}
