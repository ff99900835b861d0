import type { EntityManager } from 'typeorm';
import type { PlaceDto, PlaceInput } from '@/shared/contract/staffing';
import type { Deps, Member } from '../deps';
import { Place } from '../entities/place';
import { conflict, notFound, stale } from '../errors/domain-error';
import { findPlace, findPlaceNamed, listPlaces, removePlaceRow, savePlace } from '../repositories/places.repository';
import { listOpenWork, listOpenWorkOf } from '../repositories/work.repository';
import { announceBench } from './announce';
import { newId } from './ids';
import { nameTaken } from './name-taken';
import { inTransaction } from './unit-of-work';
import { inUseText } from './work-words';

const placeDto = ({ id, name, kind, rev }: Place, inUse: boolean): PlaceDto => ({ id, name, kind, inUse, rev });

/** Those on the list, by name. */
export async function placeDtos(manager: EntityManager, workshopId: string): Promise<PlaceDto[]> {
  const needed = new Set((await listOpenWork(manager, workshopId)).map(({ placeId }) => placeId));
  return (await listPlaces(manager, workshopId)).map((place) => placeDto(place, needed.has(place.id)));
}

/** @throws DomainError 409 name taken */
export async function addPlace(deps: Deps, member: Member, input: PlaceInput, now: number): Promise<PlaceDto> {
  const { workshopId } = member;
  const place = await inTransaction(deps, async (manager) => {
    await refuseTakenName(manager, workshopId, input.name, null);
    const row = Object.assign(new Place(), input, { id: newId(), workshopId, retiredAt: null, rev: 1 });
    return savePlace(manager, row);
  });
  announceBench(deps, workshopId, now);
  return placeDto(place, false);
}

/** @throws DomainError 412 stale, 409 name taken */
export async function changePlace(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: PlaceInput,
  now: number,
): Promise<PlaceDto> {
  const { workshopId } = member;
  const dto = await inTransaction(deps, async (manager) => {
    const { place, needing } = await known(manager, workshopId, id, rev);
    await refuseTakenName(manager, workshopId, input.name, id);
    return placeDto(await savePlace(manager, Object.assign(place, input, { rev: rev + 1 })), needing.length > 0);
  });
  announceBench(deps, workshopId, now);
  return dto;
}

/** Takes it off the list. @throws DomainError 412 stale, 409 while open work is to be done there */
export async function removePlace(deps: Deps, member: Member, id: string, rev: number, now: number): Promise<void> {
  const { workshopId } = member;
  await inTransaction(deps, async (manager) => {
    const { place, needing } = await known(manager, workshopId, id, rev);
    if (needing.length > 0) throw conflict('place_in_use', inUseText(needing, place.name));
    await removePlaceRow(manager, workshopId, id, now);
  });
  announceBench(deps, workshopId, now);
}

async function known(manager: EntityManager, workshopId: string, id: string, rev: number) {
  const place = await findPlace(manager, workshopId, id);
  if (!place) throw notFound('This place');
  const needing = await listOpenWorkOf(manager, workshopId, { placeId: id });
  if (place.rev !== rev) throw stale(placeDto(place, needing.length > 0));
  return { place, needing };
}

async function refuseTakenName(
  manager: EntityManager,
  workshopId: string,
  name: string,
  ownId: string | null,
): Promise<void> {
  const other = await findPlaceNamed(manager, workshopId, name);
  if (other && other.id !== ownId)
    throw nameTaken('name', `There is a place called ${name} already. Choose another name.`);
}
