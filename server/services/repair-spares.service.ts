/** The spare that is kept back for a repair. */
import type { EntityManager } from 'typeorm';
import type { RepairPageDto } from '@/shared/contract/repair';
import type { Deps, Member } from '../deps';
import type { Spare } from '../entities/spare';
import { conflict, invalid } from '../errors/domain-error';
import { findOpenChargeOfSpare } from '../repositories/charges.repository';
import { findRepairWithSpare } from '../repositories/repairs.repository';
import { findSpare } from '../repositories/spares.repository';
import { bare, titleOf } from './charge-words';
import { refuseDisagree } from './repair-disagree';
import { repairFacts } from './repair-facts';
import { changeRepair } from './repair-write';

/**
 * Reserves a spare, in place of the one that was reserved before.
 * @throws DomainError 409 with who has it, where another repair or charge does, or where it cannot be used; 400 another type
 */
export const reserveSpare = (
  deps: Deps,
  member: Member,
  id: string,
  input: { spareId: string },
  now: number,
): Promise<RepairPageDto> =>
  changeRepair(deps, member, id, now, { stock: true }, async ({ manager, file, note }) => {
    const { repair, type } = file;
    refuseDisagree(file, repairFacts(file));
    const spare = await findSpare(manager, member.workshopId, input.spareId);
    if (!spare) throw invalid({ spareId: 'This spare is not on the list. Choose another.' });
    if (type !== null && spare.moduleTypeId !== type.id)
      throw invalid({ spareId: `${spare.label} is of another type than the pack’s ${type.name}. Choose another.` });
    await refuseTaken(manager, spare, id);
    Object.assign(repair, { spareId: spare.id, spareAt: now, spareById: member.personId });
    note(`reserved ${spare.label}${spare.shelfPlace === null ? '' : `, ${spare.shelfPlace}`}`);
  });

async function refuseTaken(manager: EntityManager, spare: Spare, repairId: string): Promise<void> {
  const { workshopId, label } = spare;
  if (spare.fittedAt !== null) throw conflict('spare_fitted', `${label} was fitted and is no longer in stock.`);
  if (spare.quarantinedAt !== null)
    throw conflict(
      'quarantined',
      `${label} is in quarantine: ${bare(spare.quarantineReason ?? '')}. Take another spare.`,
    );
  await refuseReserved(manager, workshopId, spare, repairId);
  const charge = await findOpenChargeOfSpare(manager, workshopId, spare.id);
  if (charge !== null && charge.repairId !== repairId)
    throw conflict('spare_taken', `${label} is on ${titleOf(charge)}. Take another spare.`, {
      chargeId: charge.id,
      title: titleOf(charge),
      stage: charge.stage,
    });
}

/**
 * @param repairId the repair that wants it; null: none
 * @throws DomainError 409 with the repair that has it
 */
export async function refuseReserved(
  manager: EntityManager,
  workshopId: string,
  spare: Pick<Spare, 'id' | 'label'>,
  repairId: string | null,
): Promise<void> {
  const other = await findRepairWithSpare(manager, workshopId, spare.id);
  if (other === null || other.id === repairId) return;
  throw conflict(
    'spare_reserved',
    `${spare.label} is reserved for ${other.number}. Take another spare, or free it there.`,
    {
      repairId: other.id,
      number: other.number,
    },
  );
}

/** Gives the reserved spare back. @throws DomainError 412 stale, 409 where none is reserved or its charge is open */
export const freeSpare = (deps: Deps, member: Member, id: string, rev: number, now: number): Promise<RepairPageDto> =>
  changeRepair(deps, member, id, now, { rev, stock: true }, ({ file, note }) => {
    const { repair, spare } = file;
    if (spare === null) throw conflict('not_reserved', 'No spare is reserved for this repair.');
    const { open } = repairFacts(file);
    if (open !== null && open.spare.id === spare.id)
      throw conflict('spare_taken', `${spare.label} is on its charge. Drop or stop that first.`);
    Object.assign(repair, { spareId: null, spareAt: null, spareById: null });
    note(`gave ${spare.label} back`);
  });
