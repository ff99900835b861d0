/** The packs that a workshop meets again and again. */
import type { EntityManager } from 'typeorm';
import type { PackTypeDto, PackTypeInput } from '@/shared/contract/pack';
import type { Deps, Member } from '../deps';
import { PackType } from '../entities/pack-type';
import { notFound, stale } from '../errors/domain-error';
import { listModuleTypes } from '../repositories/module-types.repository';
import { findPackType, findPackTypeNamed, listPackTypes, savePackType } from '../repositories/pack-types.repository';
import { announceEquipment } from './announce';
import { newId } from './ids';
import { nameTaken } from './name-taken';
import { packColumnsOf, refuseOddPack } from './pack-rules';
import { packDto } from './repair-dto';
import { inTransaction } from './unit-of-work';

export const packTypes = (deps: Deps, member: Member): Promise<PackTypeDto[]> =>
  dtosOf(deps.dataSource.manager, member.workshopId);

async function dtosOf(manager: EntityManager, workshopId: string): Promise<PackTypeDto[]> {
  const names = new Map((await listModuleTypes(manager, workshopId)).map(({ id, name }) => [id, name]));
  return (await listPackTypes(manager, workshopId)).map((type) => ({
    id: type.id,
    name: type.name,
    pack: packDto(type, names.get(type.moduleTypeId ?? '') ?? null),
    usualArrivalVolts: type.usualArrivalVolts,
    note: type.note,
    rev: type.rev,
  }));
}

async function dtoOf(manager: EntityManager, workshopId: string, id: string): Promise<PackTypeDto> {
  const found = (await dtosOf(manager, workshopId)).find((type) => type.id === id);
  if (!found) throw notFound('This pack type');
  return found;
}

/** @throws DomainError 409 name taken, 400 with the field at fault */
export async function addPackType(deps: Deps, member: Member, input: PackTypeInput, now: number): Promise<PackTypeDto> {
  const { workshopId } = member;
  const dto = await inTransaction(deps, async (manager) => {
    await refuseTakenName(manager, workshopId, input.name, null);
    await refuseOddPack(manager, workshopId, input.pack);
    const row = Object.assign(new PackType(), packColumnsOf(input.pack), {
      id: newId(),
      workshopId,
      name: input.name,
      usualArrivalVolts: input.usualArrivalVolts ?? null,
      note: input.note,
      rev: 1,
      createdAt: now,
    });
    await savePackType(manager, row);
    return dtoOf(manager, workshopId, row.id);
  });
  announceEquipment(deps, member, now);
  return dto;
}

/**
 * Changes a pack type. Repairs that exist keep the pack they were booked with.
 * @throws DomainError 412 stale, 409 name taken, 400 with the field at fault
 */
export async function changePackType(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: PackTypeInput,
  now: number,
): Promise<PackTypeDto> {
  const { workshopId } = member;
  const dto = await inTransaction(deps, async (manager) => {
    const row = await findPackType(manager, workshopId, id);
    if (!row) throw notFound('This pack type');
    if (row.rev !== rev) throw stale(await dtoOf(manager, workshopId, id));
    await refuseTakenName(manager, workshopId, input.name, id);
    await refuseOddPack(manager, workshopId, input.pack);
    await savePackType(
      manager,
      Object.assign(row, packColumnsOf(input.pack), {
        name: input.name,
        usualArrivalVolts: input.usualArrivalVolts ?? null,
        note: input.note,
        rev: rev + 1,
      }),
    );
    return dtoOf(manager, workshopId, id);
  });
  announceEquipment(deps, member, now);
  return dto;
}

async function refuseTakenName(
  manager: EntityManager,
  workshopId: string,
  name: string,
  ownId: string | null,
): Promise<void> {
  const other = await findPackTypeNamed(manager, workshopId, name);
  if (other && other.id !== ownId)
    throw nameTaken('name', `There is a pack type called ${name} already. Choose another name.`);
}
