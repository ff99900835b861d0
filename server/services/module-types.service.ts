import type { EntityManager } from 'typeorm';
import { CalcInputError, checkOwnCurve, publishedCurves } from '@/calc/index';
import type { ModuleTypeDto, ModuleTypeInput } from '@/shared/contract/equipment';
import type { Deps, Member } from '../deps';
import { ModuleType } from '../entities/module-type';
import { conflict, invalid, notFound, stale } from '../errors/domain-error';
import {
  countTypeUse,
  deleteModuleType,
  findModuleType,
  findModuleTypeNamed,
  listModuleTypes,
  saveModuleType,
} from '../repositories/module-types.repository';
import { countPacksOfModuleType } from '../repositories/pack-types.repository';
import { announceEquipment } from './announce';
import { newId } from './ids';
import { nothingMore } from './module-type-defaults';
import { moduleTypeDto } from './module-types-dto';
import { nameTaken } from './name-taken';
import { pulseSeconds } from './plan-parameters';
import { inTransaction } from './unit-of-work';

export async function moduleTypes(deps: Deps, member: Member): Promise<ModuleTypeDto[]> {
  const manager = deps.dataSource.manager;
  const uses = await countTypeUse(manager, member.workshopId);
  return (await listModuleTypes(manager, member.workshopId)).map((type) => moduleTypeDto(type, uses.get(type.id)));
}

export const moduleType = (deps: Deps, member: Member, id: string): Promise<ModuleTypeDto> =>
  dtoOf(deps.dataSource.manager, member.workshopId, id);

export async function addModuleType(
  deps: Deps,
  member: Member,
  input: ModuleTypeInput,
  now: number,
): Promise<ModuleTypeDto> {
  const { workshopId } = member;
  const dto = await inTransaction(deps, async (manager) => {
    await refuseTakenName(manager, workshopId, input.name, null);
    const type = Object.assign(new ModuleType(), nothingMore, given(input), {
      id: newId(),
      workshopId,
      rev: 1,
      createdAt: now,
    });
    refuseMisfits(type);
    await saveModuleType(manager, type);
    return dtoOf(manager, workshopId, type.id);
  });
  announceEquipment(deps, member, now);
  return dto;
}

/**
 * Changes a type. Charges that exist keep the numbers they were planned with.
 * @throws DomainError 412 stale, 409 name taken, 400 where the number of groups would no longer fit the readings
 */
export async function changeModuleType(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: ModuleTypeInput,
  now: number,
): Promise<ModuleTypeDto> {
  const { workshopId } = member;
  const dto = await inTransaction(deps, async (manager) => {
    const type = await known(manager, workshopId, id);
    const present = await dtoOf(manager, workshopId, id);
    if (type.rev !== rev) throw stale(present);
    await refuseTakenName(manager, workshopId, input.name, id);
    if (input.groupsInSeries !== type.groupsInSeries && present.spareCount + present.chargeCount > 0)
      throw invalid({
        groupsInSeries: `The readings of this type’s spares have ${type.groupsInSeries} groups. Add a new type for another number.`,
      });
    if (input.groupsInSeries !== type.groupsInSeries && (await countPacksOfModuleType(manager, workshopId, id)) > 0)
      throw invalid({
        groupsInSeries: `Packs have modules of this type with ${type.groupsInSeries} groups. Add a new type for another number.`,
      });
    const changed = Object.assign(type, given(input), { rev: rev + 1 });
    refuseMisfits(changed);
    await saveModuleType(manager, changed);
    return dtoOf(manager, workshopId, id);
  });
  announceEquipment(deps, member, now);
  return dto;
}

/** @throws DomainError 412 stale, 409 while spares or charges are of this type */
export async function removeModuleType(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  now: number,
): Promise<void> {
  await inTransaction(deps, async (manager) => {
    const present = await dtoOf(manager, member.workshopId, id);
    if (present.rev !== rev) throw stale(present);
    const packs = await countPacksOfModuleType(manager, member.workshopId, id);
    if (packs > 0 && present.spareCount + present.chargeCount === 0)
      throw conflict(
        'type_in_use',
        `${present.name} stands in ${counted(packs, 'pack')}. A type in use cannot be removed.`,
        present,
      );
    if (present.spareCount + present.chargeCount > 0)
      throw conflict(
        'type_in_use',
        `${present.name} has ${counted(present.spareCount, 'spare')} and ${counted(present.chargeCount, 'charge')}. A type in use cannot be removed.`,
        present,
      );
    await deleteModuleType(manager, member.workshopId, id);
  });
  announceEquipment(deps, member, now);
}

const counted = (count: number, thing: string): string => `${count} ${thing}${count === 1 ? '' : 's'}`;

async function known(manager: EntityManager, workshopId: string, id: string): Promise<ModuleType> {
  const type = await findModuleType(manager, workshopId, id);
  if (!type) throw notFound('This module type');
  return type;
}

async function dtoOf(manager: EntityManager, workshopId: string, id: string): Promise<ModuleTypeDto> {
  const type = await known(manager, workshopId, id);
  return moduleTypeDto(type, (await countTypeUse(manager, workshopId)).get(id));
}

/** What was left out stays as it is. */
const given = (input: ModuleTypeInput): ModuleTypeInput =>
  Object.fromEntries(Object.entries(input).filter(([, value]) => value !== undefined)) as ModuleTypeInput;

/** Curves and pulses against the rest of the type. @throws DomainError 400 at the field */
function refuseMisfits(type: ModuleType): void {
  if (type.curveId !== null && !publishedCurves(type.chemistry).some(({ id }) => id === type.curveId))
    throw invalid({ curveId: 'This curve is of another chemistry. Choose one of this chemistry.' });
  const own = type.ownCurve;
  if (own !== null) {
    const rows = own.soc.map((soc, at) => [soc, own.volts[at]!]);
    if (!checkOwnCurve(rows, type.chemistry).ok)
      throw invalid({ chemistry: 'Its own curve cannot be of this chemistry. Remove the curve first.' });
  }
  if (type.pulseShortS !== null && type.resistanceMilliohm === null)
    throw invalid({ resistanceMilliohm: 'The pulses are read against the whole resistance. Type it.' });
  try {
    pulseSeconds(type);
  } catch (error) {
    if (!(error instanceof CalcInputError)) throw error;
    throw invalid({
      pulseLongerMilliohm: 'Must be under the long resistance that follows from the typed one. Check all three.',
    });
  }
}

async function refuseTakenName(
  manager: EntityManager,
  workshopId: string,
  name: string,
  ownId: string | null,
): Promise<void> {
  const other = await findModuleTypeNamed(manager, workshopId, name);
  if (other && other.id !== ownId)
    throw nameTaken('name', `There is a type called ${name} already. Choose another name.`);
}
