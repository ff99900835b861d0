import type { EntityManager } from 'typeorm';
import type { ResistorDto, ResistorInput } from '@/shared/contract/equipment';
import type { Deps, Member } from '../deps';
import { LevellingResistor } from '../entities/levelling-resistor';
import { notFound, stale } from '../errors/domain-error';
import {
  deleteResistor,
  findResistor,
  findResistorNamed,
  listResistors,
  saveResistor,
} from '../repositories/resistors.repository';
import { announceEquipment } from './announce';
import { newId } from './ids';
import { nameTaken } from './name-taken';
import { inTransaction } from './unit-of-work';

const resistorDto = ({ id, name, ohm, maxWatts, rev }: LevellingResistor): ResistorDto => ({
  id,
  name,
  ohm,
  maxWatts,
  rev,
});

export const resistors = async (deps: Deps, member: Member): Promise<ResistorDto[]> =>
  (await listResistors(deps.dataSource.manager, member.workshopId)).map(resistorDto);

export async function addResistor(deps: Deps, member: Member, input: ResistorInput, now: number): Promise<ResistorDto> {
  const { workshopId } = member;
  const resistor = await inTransaction(deps, async (manager) => {
    await refuseTakenName(manager, workshopId, input.name, null);
    return saveResistor(manager, Object.assign(new LevellingResistor(), input, { id: newId(), workshopId, rev: 1 }));
  });
  announceEquipment(deps, member, now);
  return resistorDto(resistor);
}

/** @throws DomainError 412 stale, 409 name taken */
export async function changeResistor(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: ResistorInput,
  now: number,
): Promise<ResistorDto> {
  const { workshopId } = member;
  const changed = await inTransaction(deps, async (manager) => {
    const resistor = await known(manager, workshopId, id);
    if (resistor.rev !== rev) throw stale(resistorDto(resistor));
    await refuseTakenName(manager, workshopId, input.name, id);
    return saveResistor(manager, Object.assign(resistor, input, { rev: rev + 1 }));
  });
  announceEquipment(deps, member, now);
  return resistorDto(changed);
}

/** Charges keep the resistor they were planned with, so it may go at any time. @throws DomainError 412 stale */
export async function removeResistor(deps: Deps, member: Member, id: string, rev: number, now: number): Promise<void> {
  await inTransaction(deps, async (manager) => {
    const resistor = await known(manager, member.workshopId, id);
    if (resistor.rev !== rev) throw stale(resistorDto(resistor));
    await deleteResistor(manager, member.workshopId, id);
  });
  announceEquipment(deps, member, now);
}

async function known(manager: EntityManager, workshopId: string, id: string): Promise<LevellingResistor> {
  const resistor = await findResistor(manager, workshopId, id);
  if (!resistor) throw notFound('This resistor');
  return resistor;
}

async function refuseTakenName(
  manager: EntityManager,
  workshopId: string,
  name: string,
  ownId: string | null,
): Promise<void> {
  const other = await findResistorNamed(manager, workshopId, name);
  if (other && other.id !== ownId)
    throw nameTaken('name', `There is a resistor called ${name} already. Choose another name.`);
}
