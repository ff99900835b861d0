import type { EntityManager } from 'typeorm';
import { can, capabilitiesIn, type Capability } from '@/shared/contract/roles';
import type { Member } from '../deps';
import { findWorkshop } from '../repositories/workshops.repository';

/** Whether somebody holds a capability: by the role, or by a setting of the workshop that gives the role more. */
export async function may(manager: EntityManager, member: Member, capability: Capability): Promise<boolean> {
  if (can(member.role, capability)) return true;
  const settings = await findWorkshop(manager, member.workshopId);
  return settings !== null && capabilitiesIn(member.role, settings).includes(capability);
}
