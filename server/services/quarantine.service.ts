import type { SpareDto } from '@/shared/contract/spare';
import type { Deps, Member } from '../deps';
import { conflict } from '../errors/domain-error';
import { openChargesBySpare, saveSpare } from '../repositories/spares.repository';
import { announceStock } from './announce';
import { titleOf } from './charge-words';
import { knownSpare, spareDtoOf } from './spare-file';
import { inTransaction } from './unit-of-work';

/**
 * Sets a spare aside with the reason: no plan takes it until it is released.
 * @throws DomainError 409 where it is in quarantine already, is fitted, or is on a charge (stopped there, with the same)
 */
export async function quarantineSpare(
  deps: Deps,
  member: Member,
  id: string,
  reason: string,
  now: number,
): Promise<SpareDto> {
  const { workshopId } = member;
  const dto = await inTransaction(deps, async (manager) => {
    const spare = await knownSpare(manager, workshopId, id);
    const present = await spareDtoOf(manager, workshopId, id);
    if (spare.quarantinedAt !== null)
      throw conflict('quarantined', `${spare.label} is in quarantine already: ${spare.quarantineReason}`, present);
    if (spare.fittedAt !== null) throw conflict('spare_fitted', `${spare.label} was fitted and is no longer in stock.`);
    const charge = (await openChargesBySpare(manager, workshopId)).get(id);
    if (charge)
      throw conflict(
        'spare_on_charge',
        `${spare.label} is on ${titleOf(charge)}. Stop that charge: the quarantine is set with it.`,
        present,
      );
    Object.assign(spare, {
      quarantinedAt: now,
      quarantineReason: reason,
      quarantinedById: member.personId,
      rev: spare.rev + 1,
    });
    await saveSpare(manager, spare);
    return spareDtoOf(manager, workshopId, id);
  });
  announceStock(deps, member, now);
  return dto;
}

/** @throws DomainError 409 where it is not in quarantine */
export async function releaseSpare(deps: Deps, member: Member, id: string, now: number): Promise<SpareDto> {
  const { workshopId } = member;
  const dto = await inTransaction(deps, async (manager) => {
    const spare = await knownSpare(manager, workshopId, id);
    if (spare.quarantinedAt === null)
      throw conflict(
        'not_quarantined',
        `${spare.label} is not in quarantine.`,
        await spareDtoOf(manager, workshopId, id),
      );
    Object.assign(spare, {
      quarantinedAt: null,
      quarantineReason: null,
      quarantinedById: null,
      rev: spare.rev + 1,
    });
    await saveSpare(manager, spare);
    return spareDtoOf(manager, workshopId, id);
  });
  announceStock(deps, member, now);
  return dto;
}
