import type { Deps, Member } from '../deps';
import type { Person } from '../entities/person';
import type { Session } from '../entities/session';
import { findSessionWithPerson, sessionsWithPersons } from '../repositories/sessions.repository';
import { findWallByTokenHash, updateWall, wallsById } from '../repositories/walls.repository';
import { readAccessToken } from './access-token';
import { sessionIdleMs } from './session-limits';
import { hashToken } from './tokens';
import { inTransaction } from './unit-of-work';

/** How exactly a wall's 'last heard' is kept, ms: a write for every question would be one too many. */
export const heardStepMs = 60_000;

type Asking = Pick<Deps, 'dataSource' | 'secrets'>;

export const memberFrom = (person: Person, sessionId: string): Member => ({
  workshopId: person.workshopId,
  personId: person.id,
  sessionId,
  name: person.name,
  role: person.role,
});

/** Whether a session still holds at `now`; its person's state is a question of its own. */
export const sessionHolds = (session: Session, now: number): boolean =>
  session.endedAt === null && now < session.expiresAt && now - session.lastUsedAt < sessionIdleMs;

/**
 * The member an access token stands for, as the database has them now: a role that was changed, a person who was
 * disabled or a session that was ended counts from the very next request.
 * @returns null for nobody; `accessUntil` is epoch ms
 */
export async function memberOf(
  deps: Asking,
  accessToken: string | undefined,
  now: number,
): Promise<{ member: Member; accessUntil: number } | null> {
  const claims = accessToken ? readAccessToken(deps.secrets, accessToken, now) : null;
  if (!claims) return null;
  const found = await findSessionWithPerson(deps.dataSource.manager, claims.workshopId, claims.sessionId);
  if (!found || found.person.id !== claims.personId) return null;
  if (!sessionHolds(found.session, now) || found.person.disabledAt !== null) return null;
  return { member: memberFrom(found.person, claims.sessionId), accessUntil: claims.expiresAt };
}

/** The wall a wall token stands for; null for none or a revoked one. Notes that it was heard of. */
export async function wallOf(
  deps: Asking,
  wallToken: string | undefined,
  now: number,
): Promise<{ id: string; workshopId: string } | null> {
  if (!wallToken) return null;
  const wall = await findWallByTokenHash(deps.dataSource.manager, hashToken(wallToken));
  if (!wall || wall.revokedAt !== null) return null;
  const { id, workshopId } = wall;
  if (wall.lastHeardAt === null || now - wall.lastHeardAt >= heardStepMs)
    await inTransaction(deps, (manager) => updateWall(manager, workshopId, id, { lastHeardAt: now }));
  return { id, workshopId };
}

/** Who was let in. */
export type LetIn = { kind: 'member'; member: Member } | { kind: 'wall'; wall: { id: string; workshopId: string } };
type EndReason = 'expired' | 'disabled' | 'role-changed' | 'revoked';

/** Why some of those who were let in have to go now; whoever may stay is not in it. One question for all sessions, one for all walls. */
export async function endReasonsOf(
  deps: Pick<Deps, 'dataSource'>,
  letIn: readonly LetIn[],
  now: number,
): Promise<Map<LetIn, EndReason>> {
  const { manager } = deps.dataSource;
  const walls = await wallsById(
    manager,
    letIn.flatMap((one) => (one.kind === 'wall' ? [one.wall.id] : [])),
  );
  const sessions = await sessionsWithPersons(
    manager,
    letIn.flatMap((one) => (one.kind === 'member' ? [one.member.sessionId] : [])),
  );
  const reasonOf = (one: LetIn): EndReason | null => {
    if (one.kind === 'wall') {
      const wall = walls.get(one.wall.id);
      return wall?.workshopId === one.wall.workshopId && wall.revokedAt === null ? null : 'revoked';
    }
    const { workshopId, sessionId, role } = one.member;
    const found = sessions.get(sessionId);
    if (!found || found.session.workshopId !== workshopId) return 'revoked';
    if (found.person.disabledAt !== null) return 'disabled';
    if (!sessionHolds(found.session, now)) return 'expired';
    return found.person.role === role ? null : 'role-changed';
  };
  return new Map(
    letIn.flatMap((one): [LetIn, EndReason][] => {
      const reason = reasonOf(one);
      return reason === null ? [] : [[one, reason]];
    }),
  );
}
