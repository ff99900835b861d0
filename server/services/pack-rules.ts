/** What a pack must keep to, beside its shape: the module type is the workshop's, and its modules have as many groups. */
import type { EntityManager } from 'typeorm';
import type { PackInput } from '@/shared/contract/pack';
import type { ModuleType } from '../entities/module-type';
import { invalid } from '../errors/domain-error';
import { findModuleType } from '../repositories/module-types.repository';

/** @throws DomainError 400 with the field at fault */
export async function refuseOddPack(manager: EntityManager, workshopId: string, pack: PackInput): Promise<void> {
  if (pack.moduleTypeId === null) return;
  const type = await findModuleType(manager, workshopId, pack.moduleTypeId);
  if (!type) throw invalid({ 'pack.moduleTypeId': 'This module type is not on the list. Choose another.' });
  if (type.groupsInSeries !== pack.groupsPerModule)
    throw invalid({ 'pack.groupsPerModule': perModuleText(type, pack.groupsPerModule) });
}

const perModuleText = (type: ModuleType, typed: number): string =>
  `${type.name} has ${type.groupsInSeries} a module; ${typed} were typed. Change one of the two.`;

/** The columns of a pack, for a type or a repair. */
export const packColumnsOf = ({
  moduleTypeId,
  groupCount,
  groupsPerModule,
  positionOfGroup,
  bleedAmps,
  aimMillivolts,
}: PackInput) => ({
  moduleTypeId,
  groupCount,
  groupsPerModule,
  positionOfGroup,
  bleedAmps: bleedAmps ?? null,
  aimMillivolts: aimMillivolts ?? null,
});
