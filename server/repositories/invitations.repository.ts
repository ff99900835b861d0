import { IsNull, type EntityManager } from 'typeorm';
import { Invitation } from '../entities/invitation';

/** By the hash of the link's token alone: who follows a link has not said a workshop. */
export const findInvitationByTokenHash = (manager: EntityManager, tokenHash: string): Promise<Invitation | null> =>
  manager.findOneBy(Invitation, { tokenHash });

export const findInvitation = (manager: EntityManager, workshopId: string, id: string): Promise<Invitation | null> =>
  manager.findOneBy(Invitation, { workshopId, id });

/** Invitations to join that were neither used nor recalled, newest first; lapsed ones too. */
export const listOpenInvitations = (manager: EntityManager, workshopId: string): Promise<Invitation[]> =>
  manager.find(Invitation, {
    where: { workshopId, kind: 'join', usedAt: IsNull(), recalledAt: IsNull() },
    order: { createdAt: 'DESC', id: 'ASC' },
    take: 200,
  });

export const insertInvitation = async (manager: EntityManager, invitation: Invitation): Promise<void> => {
  await manager.insert(Invitation, invitation);
};

/** Marks a link as used. @returns false when somebody else was first */
export async function useInvitation(
  manager: EntityManager,
  workshopId: string,
  id: string,
  now: number,
): Promise<boolean> {
  const { affected } = await manager.update(
    Invitation,
    { workshopId, id, usedAt: IsNull(), recalledAt: IsNull() },
    { usedAt: now },
  );
  return affected === 1;
}

/** Recalls the open links of one kind for an address: a newer one takes their place. */
export const recallLinks = async (
  manager: EntityManager,
  workshopId: string,
  which: { email: string; kind: 'join' | 'reset' } | { id: string } | { personId: string },
  now: number,
): Promise<void> => {
  await manager.update(
    Invitation,
    { workshopId, ...which, usedAt: IsNull(), recalledAt: IsNull() },
    { recalledAt: now },
  );
};
