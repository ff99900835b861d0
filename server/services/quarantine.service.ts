import type { EntityManager } from 'typeorm';
import type { QuarantineInput, SpareDto } from '@/shared/contract/spare';
import type { Deps, Member } from '../deps';
import type { Spare } from '../entities/spare';
import { conflict, stale } from '../errors/domain-error';
import { openChargesBySpare, saveSpare } from '../repositories/spares.repository';
import { announceStock } from './announce';
import { loadFile } from './charge-file';
import { isWaitingToStart } from './charge-stages';
import { titleOf } from './charge-words';
import { announce, type Announcement } from './charge-write';
import { knownSpare, spareDtoOf } from './spare-file';
import { takeOffQueue } from './take-off-queue';
import { inTransaction } from './unit-of-work';
import { lastChange, staleCharge } from './who-changed';

/**
 * Sets a spare aside with the reason: no plan takes it until it is released. A charge that waits for it is taken off in
 * the same transaction, where the person has seen that charge as it stands.
 * @param rev revision of the spare that the person saw
 * @throws DomainError 412 where spare or charge have changed; 409 where it is in quarantine already, is fitted, is on a
 * charge that is begun (stopped there, with the same), or has been planned meanwhile
 */
export async function quarantineSpare(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: QuarantineInput,
  now: number,
): Promise<SpareDto> {
  const { workshopId } = member;
  const { dto, announcement } = await inTransaction(deps, async (manager) => {
    const spare = await knownSpare(manager, workshopId, id);
    await refuseAside(manager, spare);
    if (spare.rev !== rev) throw stale(await spareDtoOf(manager, workshopId, id));
    const waiting = await setSpareAside(manager, member, spare, input, now);
    return { dto: await spareDtoOf(manager, workshopId, id), announcement: waiting };
  });
  if (announcement) announce(deps, announcement, now);
  else announceStock(deps, member, now);
  return dto;
}

/**
 * The same within a transaction of somebody else, for what is seen elsewhere: it is set aside as it stands now.
 * @returns what is to be announced of the charge that was taken off; null where none waited
 * @throws DomainError 409 as above
 */
export async function setSpareAside(
  manager: EntityManager,
  member: Member,
  spare: Spare,
  input: QuarantineInput,
  now: number,
): Promise<Announcement | null> {
  await refuseAside(manager, spare);
  const waiting = await takeOffSeen(manager, member, spare, input, now);
  const { condition, shelfPlace } = input;
  Object.assign(spare, {
    ...(condition ? { condition } : {}),
    ...(shelfPlace === undefined ? {} : { shelfPlace }),
    quarantinedAt: now,
    quarantineReason: input.reason,
    quarantinedById: member.personId,
    rev: spare.rev + 1,
  });
  await saveSpare(manager, spare);
  return waiting;
}

async function refuseAside(manager: EntityManager, spare: Spare): Promise<void> {
  if (spare.quarantinedAt !== null)
    throw conflict(
      'quarantined',
      `${spare.label} is in quarantine already: ${spare.quarantineReason}`,
      await spareDtoOf(manager, spare.workshopId, spare.id),
    );
  if (spare.fittedAt !== null) throw conflict('spare_fitted', `${spare.label} was fitted and is no longer in stock.`);
}

/** Takes the waiting charge off; null where none waits. */
async function takeOffSeen(
  manager: EntityManager,
  member: Member,
  spare: Spare,
  input: QuarantineInput,
  now: number,
): Promise<Announcement | null> {
  const { workshopId } = member;
  const open = (await openChargesBySpare(manager, workshopId)).get(spare.id);
  if (!open) return null;
  const present = await spareDtoOf(manager, workshopId, spare.id);
  if (!isWaitingToStart(open.stage))
    throw conflict(
      'spare_on_charge',
      `${spare.label} is on ${titleOf(open)}. Stop that charge: the quarantine is set with it.`,
      present,
    );
  if (input.charge?.id !== open.id)
    throw conflict(
      'spare_on_charge',
      `${spare.label} is ${open.stage} for ${titleOf(open)}, which falls away with a quarantine. Look at it, then decide.`,
      present,
    );
  const file = await loadFile(manager, workshopId, open.id);
  if (input.charge.rev !== open.rev) throw staleCharge(present, await lastChange(manager, file, member, now));
  return takeOffQueue(manager, member, file, input.reason, now);
}

/**
 * Gives a spare back to the shelf.
 * @param rev revision the person saw: what was set aside anew meanwhile, for another reason, is not released with it
 * @throws DomainError 409 where it is not in quarantine, 412 stale
 */
export async function releaseSpare(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  now: number,
): Promise<SpareDto> {
  const { workshopId } = member;
  const dto = await inTransaction(deps, async (manager) => {
    const spare = await knownSpare(manager, workshopId, id);
    if (spare.quarantinedAt === null)
      throw conflict(
        'not_quarantined',
        `${spare.label} is not in quarantine.`,
        await spareDtoOf(manager, workshopId, id),
      );
    if (spare.rev !== rev) throw stale(await spareDtoOf(manager, workshopId, id));
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
