import type { EntityManager } from 'typeorm';
import { LevellingResistor } from '../entities/levelling-resistor';

export const listResistors = (manager: EntityManager, workshopId: string): Promise<LevellingResistor[]> =>
  manager.find(LevellingResistor, { where: { workshopId }, order: { name: 'ASC' } });

export const findResistor = (
  manager: EntityManager,
  workshopId: string,
  id: string,
): Promise<LevellingResistor | null> => manager.findOneBy(LevellingResistor, { workshopId, id });

export const findResistorNamed = (
  manager: EntityManager,
  workshopId: string,
  name: string,
): Promise<LevellingResistor | null> => manager.findOneBy(LevellingResistor, { workshopId, name });

export const saveResistor = (manager: EntityManager, resistor: LevellingResistor): Promise<LevellingResistor> =>
  manager.save(LevellingResistor, resistor);

export async function deleteResistor(manager: EntityManager, workshopId: string, id: string): Promise<void> {
  await manager.delete(LevellingResistor, { workshopId, id });
}
