import type { EntityManager } from 'typeorm';
import { capabilitiesIn } from '@/shared/contract/roles';
import type { ActiveSessionDto, SessionDto } from '@/shared/contract/session';
import type { Deps, Member } from '../deps';
import type { Person } from '../entities/person';
import type { Workshop } from '../entities/workshop';
import { DomainError, notFound } from '../errors/domain-error';
import { findPerson, updatePerson } from '../repositories/people.repository';
import {
  deleteOldSessions,
  endSessionsOf,
  findSessionById,
  findSessionWithPerson,
  insertSession,
  listOpenSessions,
  updateSession,
} from '../repositories/sessions.repository';
import { findWorkshop } from '../repositories/workshops.repository';
import { signAccessToken } from './access-token';
import { deviceName } from './device-name';
import { newId } from './ids';
import { toInstant } from './instants';
import { newRefreshToken, openSuccessor, sealSuccessor, sessionOfToken } from './refresh-token';
import { sameText } from './secrets';
import { refreshGraceMs, sessionIdleMs, sessionLifeMs } from './session-limits';
import { hashToken } from './tokens';
import { inTransaction } from './unit-of-work';
import { sessionHolds } from './who-asks';

/** A session with the tokens that go into its cookies. */
export interface SignedIn {
  session: SessionDto;
  accessToken: string;
  refreshToken: string;
  /** Epoch ms: the refresh cookie lives as long. */
  expiresAt: number;
}

export const sessionDto = (person: Person, workshop: Workshop, expiresAt: number): SessionDto => ({
  person: { id: person.id, name: person.name, email: person.email, role: person.role },
  workshop: { id: workshop.id, name: workshop.name, zone: workshop.zone },
  capabilities: capabilitiesIn(person.role, workshop),
  expiresAt: toInstant(expiresAt),
});

const over = () => new DomainError(401, 'signed_out', 'Your session is over. Sign in again.');

async function workshopOf(manager: EntityManager, workshopId: string): Promise<Workshop> {
  const workshop = await findWorkshop(manager, workshopId);
  if (!workshop) throw notFound('The workshop');
  return workshop;
}

/** Opens a session for a person who has shown who they are; within the caller's transaction. */
export async function openSession(
  deps: Deps,
  manager: EntityManager,
  person: Person,
  userAgent: string | undefined,
  now: number,
): Promise<SignedIn> {
  const id = newId();
  const refreshToken = newRefreshToken(deps.secrets, id);
  const expiresAt = now + sessionLifeMs;
  await deleteOldSessions(manager, now - sessionLifeMs);
  await insertSession(manager, {
    id,
    workshopId: person.workshopId,
    personId: person.id,
    tokenHash: hashToken(refreshToken),
    previousTokenHash: null,
    successor: null,
    rotatedAt: null,
    device: deviceName(userAgent),
    createdAt: now,
    lastUsedAt: now,
    expiresAt,
    endedAt: null,
    endReason: null,
  });
  await updatePerson(manager, person.workshopId, person.id, { lastSeenAt: now });
  const workshop = await workshopOf(manager, person.workshopId);
  const claims = { personId: person.id, workshopId: person.workshopId, sessionId: id };
  return {
    session: sessionDto(person, workshop, expiresAt),
    accessToken: signAccessToken(deps.secrets, claims, now),
    refreshToken,
    expiresAt,
  };
}

/**
 * Takes a refresh token and gives the next one with a fresh access token. The token before last is answered with the
 * same successor for 20 s, because its answer may have been lost; used later it is a copy, and the session ends.
 * @throws DomainError 401 when the session is over
 */
export async function refreshSession(deps: Deps, token: string | undefined, now: number): Promise<SignedIn> {
  const sessionId = token ? sessionOfToken(deps.secrets, token) : null;
  if (!token || !sessionId) throw over();
  // Refusals are results here and not errors: an ended session has to be committed.
  const outcome = await inTransaction(deps, (manager) => rotate(deps, manager, token, sessionId, now));
  if (typeof outcome === 'object') return outcome;
  if (outcome === 'copied') {
    deps.log.warn({ sessionId }, 'a replaced refresh token was used: session ended');
    deps.hub.end({ sessionId }, 'revoked');
  }
  throw over();
}

async function rotate(
  deps: Deps,
  manager: EntityManager,
  token: string,
  sessionId: string,
  now: number,
): Promise<SignedIn | 'over' | 'copied'> {
  const session = await findSessionById(manager, sessionId);
  if (!session || !sessionHolds(session, now)) return 'over';
  const { workshopId } = session;
  const person = await findPerson(manager, workshopId, session.personId);
  if (!person || person.disabledAt !== null) return 'over';
  const hash = hashToken(token);
  let refreshToken: string;
  if (sameText(hash, session.tokenHash)) {
    refreshToken = newRefreshToken(deps.secrets, sessionId);
    await updateSession(manager, workshopId, sessionId, {
      tokenHash: hashToken(refreshToken),
      previousTokenHash: hash,
      successor: sealSuccessor(token, refreshToken),
      rotatedAt: now,
      lastUsedAt: now,
    });
    await updatePerson(manager, workshopId, person.id, { lastSeenAt: now });
  } else if (
    session.previousTokenHash !== null &&
    sameText(hash, session.previousTokenHash) &&
    session.successor !== null &&
    session.rotatedAt !== null &&
    now - session.rotatedAt < refreshGraceMs
  ) {
    refreshToken = openSuccessor(token, session.successor);
  } else {
    await updateSession(manager, workshopId, sessionId, { endedAt: now, endReason: 'copied', successor: null });
    return 'copied';
  }
  const claims = { personId: person.id, workshopId, sessionId };
  return {
    session: sessionDto(person, await workshopOf(manager, workshopId), session.expiresAt),
    accessToken: signAccessToken(deps.secrets, claims, now),
    refreshToken,
    expiresAt: session.expiresAt,
  };
}

/** The session as its owner sees it. */
export async function describeSession(deps: Deps, member: Member): Promise<SessionDto> {
  const { manager } = deps.dataSource;
  const found = await findSessionWithPerson(manager, member.workshopId, member.sessionId);
  if (!found) throw over();
  return sessionDto(found.person, await workshopOf(manager, member.workshopId), found.session.expiresAt);
}

/** Signs this device out. */
export async function endSession(deps: Deps, member: Member, now: number): Promise<void> {
  await inTransaction(deps, (manager) =>
    updateSession(manager, member.workshopId, member.sessionId, {
      endedAt: now,
      endReason: 'sign-out',
      successor: null,
    }),
  );
  deps.hub.end({ sessionId: member.sessionId }, 'sign-out');
}

/** Signs the person out on every device. */
export async function endAllSessions(deps: Deps, member: Member, now: number): Promise<void> {
  await inTransaction(deps, (manager) => endSessionsOf(manager, member.workshopId, member.personId, now, 'sign-out'));
  deps.hub.end({ personId: member.personId }, 'sign-out');
}

/** Where the person is signed in, latest used first. */
export async function listSessions(deps: Deps, member: Member, now: number): Promise<ActiveSessionDto[]> {
  const open = await listOpenSessions(
    deps.dataSource.manager,
    member.workshopId,
    member.personId,
    now,
    now - sessionIdleMs,
  );
  return open.map((session) => ({
    id: session.id,
    current: session.id === member.sessionId,
    device: session.device,
    lastUsedAt: toInstant(session.lastUsedAt),
    createdAt: toInstant(session.createdAt),
  }));
}
