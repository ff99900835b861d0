import type { EntityManager } from 'typeorm';
import type { ChargerDto, ChargerInput } from '@/shared/contract/equipment';
import type { Deps, Member } from '../deps';
import { Charger } from '../entities/charger';
import { conflict, invalid, notFound, stale } from '../errors/domain-error';
import {
  findCharger,
  findChargerNamed,
  listChannels,
  listChargers,
  saveChannels,
  saveCharger,
} from '../repositories/chargers.repository';
import { peopleById } from '../repositories/charge-stock.repository';
import { findMeter } from '../repositories/meters.repository';
import { listOpenHolds } from '../repositories/open-holds.repository';
import { announceEquipment } from './announce';
import { channelHolders } from './channel-availability';
import { titleOf } from './charge-words';
import { channelChanges } from './channel-changes';
import { chargerDto } from './chargers-dto';
import { newId } from './ids';
import { nameTaken } from './name-taken';
import { inTransaction } from './unit-of-work';

/** All chargers, the retired ones marked. */
export const chargers = (deps: Deps, member: Member, now: number): Promise<ChargerDto[]> =>
  dtos(deps.dataSource.manager, member.workshopId, now);

export const charger = (deps: Deps, member: Member, id: string, now: number): Promise<ChargerDto> =>
  dtoOf(deps.dataSource.manager, member.workshopId, id, now);

export async function addCharger(deps: Deps, member: Member, input: ChargerInput, now: number): Promise<ChargerDto> {
  const { workshopId } = member;
  const dto = await inTransaction(deps, async (manager) => {
    await refuseName(manager, workshopId, input.name, null);
    await refuseUnknownMeter(manager, workshopId, input.meterId);
    const { name, place, meterId } = input;
    const row = Object.assign(new Charger(), {
      id: newId(),
      workshopId,
      name,
      place,
      meterId,
      retired: false,
      rev: 1,
      createdAt: now,
    });
    await saveCharger(manager, row);
    await saveChannels(manager, channelChanges(row, input.channels, await listChannels(manager, workshopId)).saved);
    return dtoOf(manager, workshopId, row.id, now);
  });
  announceEquipment(deps, member, now);
  return dto;
}

/**
 * Takes a charger as it is now: a channel left out is retired, one without an id is new. A retired charger comes back
 * into service. Charges that run keep the limits they were planned with.
 * @throws DomainError 412 stale, 409 name taken or a channel in use left out, 400 with the field at fault
 */
export async function changeCharger(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: ChargerInput,
  now: number,
): Promise<ChargerDto> {
  const { workshopId } = member;
  const dto = await inTransaction(deps, async (manager) => {
    const row = await known(manager, workshopId, id);
    if (row.rev !== rev) throw stale(await dtoOf(manager, workshopId, id, now));
    await refuseName(manager, workshopId, input.name, id);
    await refuseUnknownMeter(manager, workshopId, input.meterId);
    const changes = channelChanges(row, input.channels, await listChannels(manager, workshopId));
    await refuseInUse(manager, workshopId, changes.retiredIds, now);
    const { name, place, meterId } = input;
    await saveCharger(manager, Object.assign(row, { name, place, meterId, retired: false, rev: rev + 1 }));
    await saveChannels(manager, changes.saved);
    return dtoOf(manager, workshopId, id, now);
  });
  announceEquipment(deps, member, now);
  return dto;
}

/**
 * Takes a charger out of service: plans no longer offer it, and its past charges keep its name.
 * @throws DomainError 412 stale, 409 while a charge has one of its channels
 */
export async function retireCharger(deps: Deps, member: Member, id: string, rev: number, now: number): Promise<void> {
  const { workshopId } = member;
  await inTransaction(deps, async (manager) => {
    const row = await known(manager, workshopId, id);
    if (row.rev !== rev) throw stale(await dtoOf(manager, workshopId, id, now));
    const own = (await listChannels(manager, workshopId)).filter((channel) => channel.chargerId === id);
    await refuseInUse(
      manager,
      workshopId,
      own.map((channel) => channel.id),
      now,
    );
    await saveCharger(manager, Object.assign(row, { retired: true, rev: row.rev + 1 }));
  });
  announceEquipment(deps, member, now);
}

async function dtos(manager: EntityManager, workshopId: string, now: number): Promise<ChargerDto[]> {
  const channels = await listChannels(manager, workshopId);
  const holders = channelHolders(await listOpenHolds(manager, workshopId), now);
  const people = await peopleById(manager, workshopId);
  return (await listChargers(manager, workshopId)).map((row) => chargerDto(row, channels, holders, people));
}

async function dtoOf(manager: EntityManager, workshopId: string, id: string, now: number): Promise<ChargerDto> {
  const row = await known(manager, workshopId, id);
  const channels = await listChannels(manager, workshopId);
  const holders = channelHolders(await listOpenHolds(manager, workshopId), now);
  return chargerDto(row, channels, holders, await peopleById(manager, workshopId));
}

async function known(manager: EntityManager, workshopId: string, id: string): Promise<Charger> {
  const row = await findCharger(manager, workshopId, id);
  if (!row) throw notFound('This charger');
  return row;
}

async function refuseName(
  manager: EntityManager,
  workshopId: string,
  name: string,
  ownId: string | null,
): Promise<void> {
  const other = await findChargerNamed(manager, workshopId, name);
  if (other && other.id !== ownId)
    throw nameTaken(
      'name',
      other.retired
        ? `A retired charger is called ${name}. Choose another name, or bring that one back into service.`
        : `There is a charger called ${name} already. Choose another name.`,
    );
}

async function refuseUnknownMeter(manager: EntityManager, workshopId: string, meterId: string | null): Promise<void> {
  if (meterId !== null && !(await findMeter(manager, workshopId, meterId)))
    throw invalid({ meterId: 'This meter is not on the list. Choose another.' });
}

async function refuseInUse(
  manager: EntityManager,
  workshopId: string,
  channelIds: readonly string[],
  now: number,
): Promise<void> {
  const holders = channelHolders(await listOpenHolds(manager, workshopId), now);
  const channels = await listChannels(manager, workshopId);
  for (const channel of channels) {
    const holder = channelIds.includes(channel.id) ? holders.get(channel.id) : undefined;
    if (holder)
      throw conflict(
        'channel_in_use',
        `${channel.name} is taken by ${titleOf(holder.charge)}. Take it out of service when that charge is over.`,
      );
  }
}
