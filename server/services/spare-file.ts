/** One spare with what belongs to it; inside a transaction or out of one. */
import type { EntityManager } from 'typeorm';
import type { SpareDto } from '@/shared/contract/spare';
import type { ModuleType } from '../entities/module-type';
import type { Spare } from '../entities/spare';
import { invalid, notFound } from '../errors/domain-error';
import { findModuleType } from '../repositories/module-types.repository';
import { personRefs } from '../repositories/person-refs.repository';
import { listSpareCapacities } from '../repositories/spare-capacities.repository';
import { lastMoveOf } from '../repositories/spare-moves.repository';
import { findLastSpareReading, findSpare, openChargesBySpare } from '../repositories/spares.repository';
import { spareDto } from './spares-dto';

export async function knownSpare(manager: EntityManager, workshopId: string, id: string): Promise<Spare> {
  const row = await findSpare(manager, workshopId, id);
  if (!row) throw notFound('This spare');
  return row;
}

export async function spareDtoOf(manager: EntityManager, workshopId: string, id: string): Promise<SpareDto> {
  const row = await knownSpare(manager, workshopId, id);
  return spareDto(row, await typeOf(manager, workshopId, row.moduleTypeId), {
    reading: (await findLastSpareReading(manager, workshopId, id)) ?? undefined,
    charge: (await openChargesBySpare(manager, workshopId)).get(id),
    move: (await lastMoveOf(manager, workshopId, id)) ?? undefined,
    people: await personRefs(manager, workshopId),
    capacities: await listSpareCapacities(manager, workshopId, id),
  });
}

/** @throws DomainError 400 at the field where the type is not the workshop's */
export async function typeOf(manager: EntityManager, workshopId: string, id: string): Promise<ModuleType> {
  const type = await findModuleType(manager, workshopId, id);
  if (!type) throw invalid({ moduleTypeId: 'This module type is not on the list. Choose another.' });
  return type;
}
