import { IsNull, type EntityManager } from 'typeorm';
import { Place } from '../entities/place';
import { Work } from '../entities/work';
import { WorkStint } from '../entities/work-stint';

/** Those on the list. */
export const listPlaces = (manager: EntityManager, workshopId: string): Promise<Place[]> =>
  manager.find(Place, { where: { workshopId, retiredAt: IsNull() }, order: { name: 'ASC' } });

/** By id, those taken off the list too: work that is over keeps their names. */
export async function placesById(manager: EntityManager, workshopId: string): Promise<Map<string, Place>> {
  const rows = await manager.findBy(Place, { workshopId });
  return new Map(rows.map((row) => [row.id, row]));
}

/** Of those on the list. */
export const findPlace = (manager: EntityManager, workshopId: string, id: string): Promise<Place | null> =>
  manager.findOneBy(Place, { workshopId, id, retiredAt: IsNull() });

/** Of those on the list. */
export const findPlaceNamed = (manager: EntityManager, workshopId: string, name: string): Promise<Place | null> =>
  manager.findOneBy(Place, { workshopId, name, retiredAt: IsNull() });

export const savePlace = (manager: EntityManager, place: Place): Promise<Place> => manager.save(Place, place);

/** Deletes it, or where work that is over names it takes it off the list. */
export async function removePlaceRow(
  manager: EntityManager,
  workshopId: string,
  id: string,
  now: number,
): Promise<void> {
  const named =
    (await manager.countBy(Work, { workshopId, placeId: id })) +
    (await manager.countBy(WorkStint, { workshopId, placeId: id }));
  if (named > 0) await manager.update(Place, { workshopId, id }, { retiredAt: now });
  else await manager.delete(Place, { workshopId, id });
}
